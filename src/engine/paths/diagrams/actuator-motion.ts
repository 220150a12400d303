import { REST_REASONS } from '../motion-bits.ts';
import type { RestReason } from '../motion-bits.ts';
import type { Diagram } from './diagrams.ts';
import { NONE } from './diagrams.ts';
import type { Operations } from './reach-sets.ts';

/** What the chambers of one actuator can do; see `Chambers` for the same over bit planes. */
export interface ChamberSets {
  readonly exitA: Diagram;
  readonly exitB: Diagram;
  readonly softExitA: Diagram;
  readonly softExitB: Diagram;
  readonly fillA: Diagram;
  readonly fillB: Diagram;
  readonly fromBtoA: Diagram;
  readonly fromAtoB: Diagram;
}

/** Motion of one actuator; see `Motion`. */
export interface ActuatorMotion extends ChamberSets {
  readonly fedA: Diagram;
  readonly fedB: Diagram;
  out: Diagram;
  in: Diagram;
  displaced: Diagram;
  /** Open paths leave the motion to the pressures. */
  rests: Diagram;
  /** The same by reason, in the order of `REST_REASONS`. */
  readonly why: Diagram[];
}

/** Leaves the motion to the pressures in these combinations. */
export function rest({ or }: Operations, motion: ActuatorMotion, reason: RestReason, set: Diagram): void {
  if (set === NONE) return;
  const index = REST_REASONS.indexOf(reason);
  motion.why[index] = or(motion.why[index] as Diagram, set);
  motion.rests = or(motion.rests, set);
}
