import type { Plane } from '../engine/table/table-data.ts';
import type { RuleCases } from '../engine/table/rules/answer.ts';
import type { CheckedInput } from './check-results.ts';

export type { Next } from '../engine/table/rules/continue.ts';

/** The combinations in which a condition holds. */
export interface AskAnswer {
  readonly text: string;
  readonly inputs: readonly CheckedInput[];
  readonly combinations: bigint;
  readonly matches: bigint;
  /** Combinations in which a verdict or figure that it speaks of is left open. */
  readonly undecided: bigint;
  /** Rows of the table; absent where there are too many combinations to list, and open paths alone have answered. */
  readonly rows?: { readonly matches: Plane; readonly undecided: Plane };
  /** Too many to list: the matches in few words. */
  readonly cases?: RuleCases;
  /** Labels of valves that pressures or actuators move, where open paths alone have answered: there open paths put them. */
  readonly followers?: readonly string[];
}
