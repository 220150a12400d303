import type { Circuit } from '../circuit/model.ts';
import type { ActuatorAnswer, DependentReason, PumpAnswer, TrapAnswer } from '../engine/table/answers.ts';
import type { RowNumbers } from '../engine/table/row-numbers.ts';

/** What holds for the whole table. */
export interface Conditions {
  readonly pumps: 'running' | 'stopped';
  /** Part id → where the actuator stands; absent = between its stops. */
  readonly places?: Readonly<Record<string, 'in' | 'out'>>;
  /** Id of one of the circuit's load cases; absent = the loads that the parts say. */
  readonly loadCase?: string;
  /** Part id → position of a valve that stays there: combinations of the others alone. For panels too large to list. */
  readonly held?: Readonly<Record<string, number>>;
}

export interface Request {
  readonly circuit: Circuit;
  readonly conditions: Conditions;
}

/** Everything that can be said about one row, in words. */
export interface Explanation {
  readonly row: number;
  readonly positions: readonly number[];
  /** Valves that pressures or actuators move. */
  readonly dependents: readonly DependentReason[];
  readonly actuators: readonly ActuatorAnswer[];
  readonly pumps: readonly PumpAnswer[];
  readonly trapped: readonly TrapAnswer[];
  readonly notes: readonly string[];
  /** Pressures, flows and speeds of the row; SI. */
  readonly numbers: RowNumbers;
}

export type { RowNumbers } from '../engine/table/row-numbers.ts';
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
  PowerLossVerdict,
  TrappedPanel,
  TrappedPanelReason,
  TrappedReason,
  TrappedSummary,
} from './bleed-results.ts';
export type { LeverMove, MoveEffect, MoveNote, MovesAnswer, MoveStage, VentAnswer } from './moves-results.ts';
export type { AskAnswer, Next } from './ask-results.ts';
export type { CoilLogic, CoilLogicCoil, LogicSignal, LogicStepWords, SignalGroupWords } from './coil-logic-results.ts';
export type {
  FoldAnswer,
  FoldBy,
  FoldItem,
  FoldRow,
  Influence,
  InfluenceOf,
  InfluenceRow,
  SubCircuit,
} from './fold-results.ts';
export type {
  LossActuator,
  PlanLevel,
  PlanPowerLoss,
  PlanProblem,
  PlanReport,
  PlanTrace,
  PowerLossCase,
  StepMotion,
  StepReport,
  TraceEvent,
  TracedActuator,
  TracedStep,
  TraceSample,
} from './plan-results.ts';
export type { Check, CheckedInput, CheckedRule, RuleAnswer, RuleCases, RuleOutcome } from './check-results.ts';

export type {
  DependentReason,
  ActuatorAnswer as ActuatorReason,
  PumpAnswer as PumpReason,
  TrapAnswer as TrappedLine,
} from '../engine/table/answers.ts';
/** One link of a reason: a sentence, and what to light on the sheet for it. */
export type { Step as ReasonStep } from '../engine/table/reasons.ts';
