import type { Circuit } from '../circuit/model.ts';
import type { RowNumbers } from '../engine/table/resolve.ts';
import type { ActuatorVerdict, PumpVerdict, TrapReason } from '../engine/table/words.ts';

/** What holds for the whole table. */
export interface Conditions {
  readonly pumps: 'running' | 'stopped';
  /** Part id → where the actuator stands; absent = between its stops. */
  readonly places?: Readonly<Record<string, 'in' | 'out'>>;
  /** Id of one of the circuit's load cases; absent = the loads that the parts say. */
  readonly loadCase?: string;
}

export interface Request {
  readonly circuit: Circuit;
  readonly conditions: Conditions;
}

/** One link of a reason: a sentence, and what to light on the sheet for it. */
export interface ReasonStep {
  readonly text: string;
  /** Indices of lines in the table. */
  readonly lines: readonly number[];
  /** Part ids that the oil passes or that stop it. */
  readonly parts: readonly string[];
}

export interface ActuatorReason {
  readonly part: string;
  readonly label: string;
  readonly verdict: ActuatorVerdict;
  readonly notes: readonly string[];
  /** Why open paths leave it to pressures, and which verdicts are possible. */
  readonly rests?: { readonly why: string; readonly candidates: readonly ActuatorVerdict[] };
  /** Another value could give another verdict; false = it holds for any sensible values. */
  readonly onValues: boolean;
  readonly steps: readonly ReasonStep[];
}

export interface PumpReason {
  readonly part: string;
  readonly label: string;
  readonly verdict: PumpVerdict;
  readonly rests?: { readonly why: string; readonly candidates: readonly PumpVerdict[] };
  readonly onValues: boolean;
  readonly steps: readonly ReasonStep[];
}

export interface TrappedLine {
  readonly line: number;
  readonly name: string;
  readonly reasons: readonly { readonly kind: TrapReason; readonly text: string }[];
  readonly steps: readonly ReasonStep[];
}

/** Everything that can be said about one row, in words. */
export interface Explanation {
  readonly row: number;
  readonly positions: readonly number[];
  readonly actuators: readonly ActuatorReason[];
  readonly pumps: readonly PumpReason[];
  readonly trapped: readonly TrappedLine[];
  readonly notes: readonly string[];
  /** Pressures, flows and speeds of the row; SI. */
  readonly numbers: RowNumbers;
}

export type { RowNumbers } from '../engine/table/resolve.ts';
export type { Finding } from '../findings/finding.ts';
export type {
  BleedAnswer,
  BleedCaution,
  BleedLine,
  BleedPoints,
  BleedStep,
  HeldLine,
  LeftLine,
  PowerLossActuator,
  PowerLossAnswer,
  PowerLossOutcome,
  TrappedReason,
  TrappedSummary,
} from './bleed-results.ts';
export type { Check, CheckedInput, CheckedRule, RuleAnswer, RuleCases, RuleOutcome } from './check-results.ts';
