import type { Step } from './reasons.ts';
import type { ActuatorVerdict, PumpVerdict, TrapReason } from './words.ts';

/** What is said about one actuator, pump and line of a row. */
export interface ActuatorAnswer {
  readonly part: string;
  readonly label: string;
  readonly verdict: ActuatorVerdict;
  readonly notes: readonly string[];
  readonly rests?: { readonly why: string; readonly candidates: readonly ActuatorVerdict[] };
  /** Another value could give another verdict; false = it holds for any sensible values. */
  readonly onValues: boolean;
  readonly steps: readonly Step[];
}

export interface PumpAnswer {
  readonly part: string;
  readonly label: string;
  readonly verdict: PumpVerdict;
  readonly rests?: { readonly why: string; readonly candidates: readonly PumpVerdict[] };
  readonly onValues: boolean;
  readonly steps: readonly Step[];
}

/** Where a valve stands that pressures or actuators move, and why. */
export interface DependentReason {
  readonly part: string;
  readonly label: string;
  readonly position: number;
  readonly name: string;
  /** No setting agrees with the pressures that it causes. */
  readonly hunts: boolean;
  /** Names of positions that it has in other settings that agree: which holds depends on what came before. */
  readonly others: readonly string[];
  readonly steps: readonly Step[];
}

export interface TrapAnswer {
  readonly line: number;
  readonly name: string;
  readonly reasons: readonly { readonly kind: TrapReason; readonly text: string }[];
  readonly steps: readonly Step[];
}
