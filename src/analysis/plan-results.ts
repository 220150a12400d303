import type { PlanStep } from '../circuit/plan.ts';
import type { TraceSample } from '../engine/sequence/play/trace.ts';

export type { TraceEvent, TraceSample } from '../engine/sequence/play/trace.ts';

/** What happened when a plan was played, sample by sample: what step diagrams draw. SI; lists run as in the samples. */
export interface PlanTrace {
  readonly actuators: readonly TracedActuator[];
  /** Valves of the circuit, commanded ones first, then those that pressures or actuators move. */
  readonly valves: readonly { readonly part: string; readonly label: string; readonly positions: readonly string[] }[];
  readonly coils: readonly { readonly part: string; readonly label: string; readonly name: string }[];
  readonly pumps: readonly TracedPart[];
  readonly accumulators: readonly TracedPart[];
  readonly switches: readonly TracedPart[];
  /** Names of the shown lines. */
  readonly lines: readonly string[];
  readonly steps: readonly TracedStep[];
  readonly samples: readonly TraceSample[];
}

export interface TracedPart {
  readonly part: string;
  readonly label: string;
}

export interface TracedActuator extends TracedPart {
  readonly rotary: boolean;
  /** m from stop to stop; absent = endless, as a motor is. */
  readonly stroke?: number;
}

export interface TracedStep {
  readonly id: string;
  /** Its name, or its number from 1. */
  readonly name: string;
  /** s from the start of the plan. */
  readonly start: number;
  readonly end: number;
  /** Index of its first sample; the next step's first ends it. */
  readonly first: number;
}

/** `fault`: the plan does not do what it says, or must not be run; `caution`: it does, with something to know; `note`: for information. */
export type PlanLevel = 'fault' | 'caution' | 'note';

export type PlanProblemKind =
  /** The plan speaks of what the circuit does not have, or in a way that cannot be read. */
  | 'plan'
  | 'both coils on'
  | 'moved unasked'
  | 'did not move'
  | 'not finished'
  | 'wrong order'
  | 'wrong way'
  | 'never ended'
  | 'over relief while idle'
  | 'pressure left trapped'
  | 'load unsecured'
  | 'void forms'
  | 'no steady state'
  | 'undetermined'
  | 'chatter'
  | 'not closed'
  | 'cannot resume';

export interface PlanProblem {
  readonly kind: PlanProblemKind;
  readonly level: PlanLevel;
  /** In words: the step, the part. */
  readonly where: string;
  readonly what: string;
  readonly remedy: string;
  /** Index of the step; absent = the plan as a whole. */
  readonly step?: number;
  /** s from the start of the plan. */
  readonly time?: number;
  /** Part ids, and indices of lines, to mark on the sheet. */
  readonly parts: readonly string[];
  readonly lines: readonly number[];
}

/** One motion of one actuator within a step. */
export interface StepMotion extends TracedPart {
  readonly rotary: boolean;
  readonly way: '+' | '-';
  /** It stands in what the step expects. */
  readonly asked: boolean;
  /** s from the start of the plan. */
  readonly start: number;
  readonly end: number;
  /** m (rad) where it began and where it came to. */
  readonly from: number;
  readonly to: number;
  /** It came to the stop that lies this way. */
  readonly atStop: boolean;
  /** What drives it while it moves. */
  readonly by: 'pump' | 'load';
}

export interface StepReport {
  readonly id: string;
  readonly name: string;
  /** Coils on, levers held and pumps stopped, in words; empty = everything at rest. */
  readonly commands: readonly string[];
  readonly expect: string;
  readonly endsBy: string;
  readonly outcome: 'done' | 'never ended' | 'not played';
  readonly start: number;
  readonly end: number;
  readonly motions: readonly StepMotion[];
  /** J that the pumps give and that turn into heat; m³ that the pumps deliver. */
  readonly energyIn: number;
  readonly energyLost: number;
  readonly volume: number;
  readonly problems: readonly PlanProblem[];
}

export const POWER_LOSSES = ['coils off, pumps running', 'coils off, pumps stopped', 'pumps stopped'] as const;
export type PowerLossCase = (typeof POWER_LOSSES)[number];

/** What one actuator does once the power is gone. */
export interface LossActuator extends TracedPart {
  readonly comes:
    'holds' | 'drops' | 'moves by spring' | 'moves by stored oil' | 'goes on' | 'starts' | 'floats' | 'creeps' | 'open';
  /** m (rad) where it stood and where it comes to. */
  readonly from: number;
  readonly to: number;
}

/** The power is lost at one moment of the plan. */
export interface PlanPowerLoss {
  readonly step: number;
  readonly at: 'mid-motion' | 'step end';
  readonly time: number;
  readonly lost: PowerLossCase;
  readonly actuators: readonly LossActuator[];
  /** Names of lines that stay under pressure. */
  readonly underPressure: readonly string[];
  /** The rest of the plan checks out from here once the power is back; otherwise why it does not. */
  readonly resumes: boolean;
  readonly why?: string;
}

export interface PlanReport {
  readonly plan: string;
  readonly name: string;
  /** Id of the load case that it was played under. */
  readonly loadCase?: string;
  /** No fault, in any step or of the plan as a whole. */
  readonly good: boolean;
  /** Of the plan as a whole; those of steps stand with them. */
  readonly problems: readonly PlanProblem[];
  readonly steps: readonly StepReport[];
  readonly trace: PlanTrace;
  /** Sums over the steps: s, J, J, m³. */
  readonly time: number;
  readonly energyIn: number;
  readonly energyLost: number;
  readonly volume: number;
  readonly powerLoss: readonly PlanPowerLoss[];
  /** Laws and defaults that the numbers rest on, in words. */
  readonly assumptions: readonly string[];
}

/** Steps for a motion sequence, not played yet. */
export interface PlanDraft {
  /** Part id → `out` for actuators that have to stand out before the first step. */
  readonly start: Readonly<Record<string, string>>;
  readonly steps: readonly Omit<PlanStep, 'id'>[];
}
