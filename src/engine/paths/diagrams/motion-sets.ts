import type { NetActuator, Network } from '../../../network/network.ts';
import { isEqualSided, loadAgainst, pushes } from '../actuator-bits.ts';
import { REST_REASONS } from '../motion-bits.ts';
import type { PathConditions } from '../reach.ts';
import { rest } from './actuator-motion.ts';
import type { ActuatorMotion, ChamberSets } from './actuator-motion.ts';
import { chamberSets } from './chamber-sets.ts';
import type { Diagram, Diagrams } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';
import { driveByDisplaced } from './displaced-sets.ts';
import type { OpenPathSets } from './open-paths.ts';
import { at, eliminate, none, operations, reachSets } from './reach-sets.ts';
import type { Operations, ReachSets } from './reach-sets.ts';
import type { SetAlgebra } from './set-algebra.ts';
import type { LineSets } from './set-edges.ts';

export { operations } from './reach-sets.ts';
export type { ActuatorMotion, ChamberSets } from './actuator-motion.ts';

export interface MotionSets {
  readonly reach: ReachSets;
  readonly actuators: readonly ActuatorMotion[];
  readonly underPressure: LineSets;
  /** Lines that displaced oil gets to. */
  readonly pushed: LineSets;
  /** Lines through which displaced oil goes from one actuator into another. */
  readonly carries: LineSets;
}

/** Motions in every combination by the rules of `reach`, `chambersOf`, `findMotion` and `driveByDisplaced`. */
export function motionSets(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra> | OpenPathSets<Diagrams>,
): MotionSets {
  const reach = reachSets(net, conditions, paths);
  const ops = operations(paths);
  const chambers = chamberSets(net, conditions, paths, reach);
  const actuators = net.actuators.map((actuator, i) =>
    start(conditions, paths, reach, chambers[i] as ChamberSets, actuator, i),
  );
  markRivals(net, reach, ops, actuators);
  const pushed = driveByDisplaced(net, conditions, paths, reach, actuators);
  return {
    reach,
    actuators,
    underPressure: reach.underPressure,
    pushed,
    carries: carrying(net, paths, reach, actuators, pushed),
  };
}

function start(
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra>,
  r: ReachSets,
  ch: ChamberSets,
  actuator: NetActuator,
  i: number,
): ActuatorMotion {
  const ops = operations(paths);
  const { and, or, minus } = ops;
  const { a, b } = actuator;
  const { toTank } = paths;
  const { exitA, exitB, softExitA, softExitB, fillA, fillB, fromBtoA, fromAtoB } = ch;
  const [fedA, fedB] = [at(r.anyPressed, a), at(r.anyPressed, b)];
  const when = (yes: boolean): Diagram => (yes ? ALL : NONE);
  const notOut = when(conditions.places[i] !== 'out');
  const notIn = when(conditions.places[i] !== 'in');
  const equal = when(isEqualSided(actuator));
  const against = (sense: 'in' | 'out'): Diagram => when(loadAgainst(actuator)(sense) !== 0);
  const pushing = (way: 'in' | 'out'): Diagram => when(pushes(actuator, way) !== 0);
  const [tankA, tankB] = [at(toTank, a), at(toTank, b)];

  // Both chambers on one pump line: the larger side wins; equal sides balance.
  const regenerative = minus(and(fedA, fromBtoA), equal);
  const balanced = and(equal, fedA, fedB, fromBtoA, fromAtoB);
  const goOut = minus(and(fedA, or(exitB, regenerative), notOut), balanced);
  const goIn = minus(and(fedB, exitA, notIn), or(balanced, goOut));
  const stuckOut = minus(and(fedA, notOut), or(exitB, regenerative, balanced));
  const stuckIn = minus(and(fedB, notIn), or(exitA, balanced, goOut));
  const motion: ActuatorMotion = {
    ...ch,
    fedA,
    fedB,
    out: goOut,
    in: goIn,
    displaced: NONE,
    rests: NONE,
    why: REST_REASONS.map(() => NONE),
  };
  rest(ops, motion, 'load', or(and(or(goOut, stuckOut), against('in')), and(or(goIn, stuckIn), against('out'))));
  rest(
    ops,
    motion,
    'bleed',
    or(and(goOut, tankA), and(goIn, tankB), and(stuckOut, tankA, fillB), and(stuckIn, tankB, fillA)),
  );
  rest(
    ops,
    motion,
    'two feeds',
    minus(and(fedA, fedB, or(exitA, exitB, and(equal, or(fromBtoA, fromAtoB)))), or(regenerative, balanced)),
  );
  const [stuckOutAlone, stuckInAlone] = [minus(stuckOut, fedB), minus(stuckIn, fedA)];
  rest(ops, motion, 'pressure valve', or(and(stuckOutAlone, at(r.toRelief, b)), and(stuckInAlone, at(r.toRelief, a))));
  rest(ops, motion, 'pressed line', or(and(stuckOutAlone, softExitB), and(stuckInAlone, softExitA)));
  if (r.valves) {
    const [wayOutA, wayOutB] = [at(r.valves.exits, a), at(r.valves.exits, b)];
    const freeOutB = b < 0 ? ALL : wayOutB;
    const [softA, softB] = [at(r.valves.pressed, a), at(r.valves.pressed, b)];
    // Fed, let out, bled or let go only over a valve that pressures open.
    const viaValve = or(
      and(minus(fedA, goOut), freeOutB, notOut),
      and(minus(fedB, goIn), wayOutA, notIn),
      and(minus(softA, fedA), or(freeOutB, minus(fromBtoA, equal)), notOut),
      and(minus(softB, fedB), wayOutA, notIn),
      and(goOut, wayOutA),
      and(goIn, wayOutB),
      and(minus(pushing('in'), exitA), wayOutA, notIn),
      and(minus(pushing('out'), exitB), freeOutB, notOut),
    );
    rest(ops, motion, 'pressure valve', minus(viaValve, balanced));
  }
  return motion;
}

/** Two actuators that one source could move at once: which goes first, only pressures tell. */
function markRivals(net: Network, r: ReachSets, ops: Operations, actuators: readonly ActuatorMotion[]): void {
  const { and, or } = ops;
  for (const field of r.pressed) {
    const offered = net.actuators.map(({ a, b }, i) => {
      const { out, in: inward } = actuators[i] as ActuatorMotion;
      return or(and(out, at(field, a)), and(inward, at(field, b)));
    });
    let once: Diagram = NONE;
    let twice: Diagram = NONE;
    for (const set of offered) {
      twice = or(twice, and(once, set));
      once = or(once, set);
    }
    offered.forEach((set, i) => rest(ops, actuators[i] as ActuatorMotion, 'rivals', and(set, twice)));
  }
}

function carrying(
  net: Network,
  paths: OpenPathSets<SetAlgebra>,
  r: ReachSets,
  actuators: readonly ActuatorMotion[],
  pushed: LineSets,
): LineSets {
  const { and, or } = operations(paths);
  const into = none(net);
  net.actuators.forEach(({ a, b }, i) => {
    const { out, in: inward, displaced } = actuators[i] as ActuatorMotion;
    into[a] = or(at(into, a), and(out, displaced));
    if (b >= 0) into[b] = or(at(into, b), and(inward, displaced));
  });
  eliminate(net, paths, { edges: paths.edges.backward, gate: r.notFree }).spread(into);
  return into.map((set, line) => and(set, at(pushed, line)));
}
