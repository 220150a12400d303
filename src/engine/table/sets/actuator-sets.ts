import type { NetActuator, Network } from '../../../network/network.ts';
import { isEqualSided } from '../../paths/actuator-bits.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import type { ActuatorMotion } from '../../paths/diagrams/actuator-motion.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import { at, operations } from '../../paths/diagrams/reach-sets.ts';
import type { SetAlgebra } from '../../paths/diagrams/set-algebra.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { motionWords } from '../actuator-outcomes.ts';
import { ACTUATOR_NOTES, ACTUATOR_VERDICTS } from '../words.ts';
import type { ActuatorNote, ActuatorVerdict } from '../words.ts';

/** Sets by index of the verdict or note. */
export interface ActuatorSets {
  readonly verdicts: readonly Diagram[];
  readonly notes: readonly Diagram[];
}

/** Pa: what the atmosphere can push with; as in `actuatorOutcome`. */
const ATMOSPHERE = 101_325;

/**
 * The combinations of each verdict and note of one actuator, by the rules of `actuatorOutcome`, open paths
 * alone: where loads, rivals or settings decide, the verdict is `rests on pressure`.
 */
export function actuatorSets(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra>,
  motions: MotionSets,
  index: number,
): ActuatorSets {
  const actuator = net.actuators[index] as NetActuator;
  const m = motions.actuators[index] as ActuatorMotion;
  const { and, or, minus, not } = operations(paths);
  const verdicts: Diagram[] = ACTUATOR_VERDICTS.map(() => NONE);
  const notes: Diagram[] = ACTUATOR_NOTES.map(() => NONE);
  let left: Diagram = ALL;
  /** Gives the verdict to those combinations that have none yet; returns them. */
  const decide = (verdict: ActuatorVerdict, set: Diagram): Diagram => {
    const at = ACTUATOR_VERDICTS.indexOf(verdict);
    const now = and(set, left);
    verdicts[at] = or(verdicts[at] as Diagram, now);
    left = minus(left, set);
    return now;
  };
  const note = (name: ActuatorNote, set: Diagram): void => {
    notes[ACTUATOR_NOTES.indexOf(name)] = set;
  };
  const when = (yes: boolean): Diagram => (yes ? ALL : NONE);
  const words = motionWords(actuator);
  const notOut = when(conditions.places[index] !== 'out');
  const notIn = when(conditions.places[index] !== 'in');
  const equal = when(isEqualSided(actuator));

  decide('undetermined', paths.hunts);
  decide('rests on pressure', m.rests);
  decide(words.out, m.out);
  decide(words.in, m.in);

  // Pressure may also come through another actuator that pushes against this one.
  const underA = at(motions.underPressure, actuator.a);
  const underB = at(motions.underPressure, actuator.b);
  decide('at stop', or(minus(minus(underA, underB), notOut), minus(minus(underB, underA), notIn)));
  decide('held', minus(or(m.fedA, m.fedB), and(equal, m.fedA, m.fedB, m.fromBtoA, m.fromAtoB)));

  const freeOut = and(or(and(m.exitB, m.fillA), and(m.fromBtoA, or(m.fillA, equal))), notOut);
  const freeIn = and(or(and(m.exitA, or(m.fillB, m.fromAtoB)), and(equal, m.fromAtoB)), notIn);
  // A chamber that cannot fill holds by suction alone.
  const suckOut = and(minus(or(m.exitB, m.fromBtoA), freeOut), notOut);
  const suckIn = and(minus(m.exitA, freeIn), notIn);
  const { way, size } = actuator.push;
  const breaks = (area: number): Diagram => when(size > ATMOSPHERE * area);
  const movesOut = way === 'out' ? or(freeOut, and(suckOut, breaks(actuator.areaA))) : NONE;
  const movesIn = way === 'in' ? or(freeIn, and(suckIn, breaks(actuator.areaB))) : NONE;
  const tankA = at(paths.toTank, actuator.a);
  const tankB = actuator.b < 0 ? ALL : at(paths.toTank, actuator.b);
  decide(
    'rests on pressure',
    or(
      and(when(way === 'both'), or(freeOut, freeIn)),
      minus(movesOut, or(tankB, m.fromBtoA)),
      minus(movesIn, or(tankA, m.fromAtoB)),
    ),
  );
  // Or against the back pressure of a pump that is open to tank.
  decide(
    'rests on pressure',
    or(and(movesIn, at(paths.fromSource, actuator.a)), and(movesOut, at(paths.fromSource, actuator.b))),
  );
  const pushedOut = decide(words.pushedOut, movesOut);
  const pushedIn = decide(words.pushedIn, movesIn);
  note('void forms', or(minus(pushedOut, freeOut), minus(pushedIn, freeIn)));
  const both = decide('held', not(or(freeOut, freeIn)));
  const oneWay = decide('held one way', or(minus(freeOut, freeIn), minus(freeIn, freeOut)));
  note('outward by suction only', and(or(both, and(oneWay, freeIn)), suckOut));
  note('inward by suction only', and(or(both, and(oneWay, freeOut)), suckIn));
  note('free outward', and(oneWay, freeOut));
  note('free inward', and(oneWay, freeIn));
  decide('floats', ALL);
  return { verdicts, notes };
}
