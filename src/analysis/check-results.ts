import type { RuleAnswer } from '../engine/table/rules/answer.ts';

export type { RuleAnswer, RuleCases, RuleOutcome } from '../engine/table/rules/answer.ts';

/** A rule and its answer. */
export interface CheckedRule {
  /** Of the rule in the circuit; absent = it came from elsewhere. */
  readonly id?: string;
  readonly text: string;
  readonly answer: RuleAnswer;
}

/** Inputs in the order of a combination's positions. */
export interface CheckedInput {
  readonly label: string;
  readonly positions: readonly string[];
}

export interface Check {
  readonly rules: readonly CheckedRule[];
  readonly inputs: readonly CheckedInput[];
  /** False where the panel is too large to list: then rows have no numbers, and open paths alone have answered. */
  readonly listed: boolean;
  /** Labels of valves that pressures or actuators move, where open paths alone have answered: there open paths put them. */
  readonly followers?: readonly string[];
}
