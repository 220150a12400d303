import type { NetActuator, Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import { operations } from '../../paths/diagrams/motion-sets.ts';
import type { ActuatorMotion, MotionSets } from '../../paths/diagrams/motion-sets.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import { isEqualSided } from '../../paths/actuator-bits.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { motionWords } from '../actuator-outcomes.ts';
import type { ActuatorVerdict } from '../words.ts';

/** Pa: what the atmosphere can push with; as in `actuatorOutcome`. */
const ATMOSPHERE = 101_325;

/**
 * The combinations of each verdict of one actuator, by the rules of `actuatorOutcome`, open paths alone:
 * where loads, rivals or settings decide, the verdict is `rests on pressure`.
 */
export function verdictSets(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets,
  motions: MotionSets,
  index: number,
): ReadonlyMap<ActuatorVerdict, Diagram> {
  const actuator = net.actuators[index] as NetActuator;
  const m = motions.actuators[index] as ActuatorMotion;
  const { and, or, minus, not } = operations(paths);
  const found = new Map<ActuatorVerdict, Diagram>();
  let left: Diagram = ALL;
  /** Gives the verdict to those combinations that have none yet. */
  const decide = (verdict: ActuatorVerdict, set: Diagram): void => {
    found.set(verdict, or(found.get(verdict) ?? NONE, and(set, left)));
    left = minus(left, set);
  };
  const when = (yes: boolean): Diagram => (yes ? ALL : NONE);
  const words = motionWords(actuator);
  const notOut = when(conditions.places[index] !== 'out');
  const notIn = when(conditions.places[index] !== 'in');
  const equal = when(isEqualSided(actuator));
  const at = (field: readonly Diagram[], line: number): Diagram => (line < 0 ? NONE : (field[line] as Diagram));

  decide('undetermined', paths.hunts);
  decide('rests on pressure', m.rests);
  decide(words.out, m.out);
  decide(words.in, m.in);

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
  decide(words.pushedOut, movesOut);
  decide(words.pushedIn, movesIn);
  decide('held', not(or(freeOut, freeIn)));
  decide('held one way', or(minus(freeOut, freeIn), minus(freeIn, freeOut)));
  decide('floats', ALL);
  return found;
}
