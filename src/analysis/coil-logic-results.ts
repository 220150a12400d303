import type { Problem } from '../base/result.ts';
import type { Expression } from '../engine/sequence/coil-conditions.ts';

export type { Expression } from '../engine/sequence/coil-conditions.ts';

/** What a control has to do for a step plan. Steps, signals and coils are numbered from 0 in all lists. */
export interface CoilLogic {
  readonly plan: string;
  readonly name: string;
  readonly steps: readonly LogicStepWords[];
  readonly signals: readonly LogicSignal[];
  readonly coils: readonly CoilLogicCoil[];
  /** Pairs of steps that ask for other coils and can look alike to all signals; they need a memory. */
  readonly clashes: readonly {
    readonly steps: readonly [number, number];
    readonly signals: readonly string[];
    readonly coils: readonly string[];
  }[];
  /** Absent = the motions are no closed cycle; `groupProblems` says why. */
  readonly groups?: SignalGroupWords;
  readonly groupProblems: readonly Problem[];
  readonly interlocks: readonly { readonly rule: string; readonly terms: readonly string[] }[];
  /** Rules that the coils cannot see to, and why. */
  readonly unexpressed: readonly { readonly rule: string; readonly why: string }[];
  /** What a panel builder has to know beyond all that. */
  readonly warnings: readonly Problem[];
  /** IEC 61131-3; `signals`: coils from the sensors where they tell, `steps`: all coils from the step memory. */
  readonly text: { readonly signals: string; readonly steps: string };
}

export interface LogicStepWords {
  readonly id: string;
  /** Its name, or its number from 1. */
  readonly name: string;
  readonly motions: string;
  /** Names of the coils that are on. */
  readonly coils: readonly string[];
  /** What ends it, as a condition. */
  readonly ends: string;
}

export interface LogicSignal {
  readonly kind: 'sensor' | 'switch';
  /** `CLAMP out`, `PS1`. */
  readonly name: string;
  /** Id of the actuator or switch. */
  readonly part: string;
  /** Steps that it ends. */
  readonly ends: readonly number[];
  /** A condition of a coil by signals reads it. */
  readonly read: boolean;
}

export interface CoilLogicCoil {
  readonly part: string;
  /** Name within its valve. */
  readonly coil: string;
  /** `Y1`, or `V1.a` where several valves have an `a`. */
  readonly name: string;
  readonly on: readonly number[];
  /** By signals alone while the cycle runs, as words and as a tree; absent = they do not tell. */
  readonly bySignals?: { readonly words: string; readonly expression: Expression; readonly least: boolean };
  readonly bySteps: { readonly words: string; readonly expression: Expression };
  /** Steps, on and off, that signals do not tell apart. */
  readonly clashes: readonly { readonly on: number; readonly off: number }[];
}

export interface SignalGroupWords {
  /** The motions in trade notation, and the step of the plan that each belongs to. */
  readonly motions: readonly { readonly text: string; readonly step: number }[];
  /** Runs of these motions, both ends counted. */
  readonly division: readonly { readonly from: number; readonly to: number }[];
  readonly lastJoinsFirst: boolean;
  /** Signal groups that a cascade needs. */
  readonly count: number;
  /** `after`: number of the motion whose end changes the group. */
  readonly changeOvers: readonly { readonly after: number; readonly from: number; readonly to: number }[];
  readonly opposed: readonly { readonly motion: number; readonly text: string }[];
}
