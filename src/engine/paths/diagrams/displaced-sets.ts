import type { NetActuator, Network } from '../../../network/network.ts';
import { loadAgainst, pushes } from '../actuator-bits.ts';
import { REST_REASONS } from '../motion-bits.ts';
import type { PathConditions } from '../reach.ts';
import { rest } from './actuator-motion.ts';
import type { ActuatorMotion } from './actuator-motion.ts';
import type { Diagram } from './diagrams.ts';
import { NONE } from './diagrams.ts';
import { closeDisplaced } from './displaced-closure.ts';
import type { OpenPathSets } from './open-paths.ts';
import { at, none, operations } from './reach-sets.ts';
import type { ReachSets } from './reach-sets.ts';
import type { SetAlgebra } from './set-algebra.ts';
import type { LineSets } from './set-edges.ts';

const PRESSED_LINE = REST_REASONS.indexOf('pressed line');

/**
 * What a moving actuator pushes out may drive the next one, and so on. Adds those motions and returns the
 * lines that this oil gets to.
 */
export function driveByDisplaced(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra>,
  r: ReachSets,
  actuators: readonly ActuatorMotion[],
): LineSets {
  const ops = operations(paths);
  const { and, or, minus } = ops;
  const pushed = none(net);
  /** Oil that has not been pushed on yet. */
  let fresh = none(net);
  let doubtful = or(...actuators.map((motion) => motion.rests));
  // A load whose oil has no free way to tank may drive other actuators with it; its own oil does not drive it back.
  const yielding = net.actuators.map((actuator, i) => {
    const m = actuators[i] as ActuatorMotion;
    const push = (line: number, way: 'in' | 'out', exit: Diagram, fed: Diagram): Diagram => {
      if (line < 0 || pushes(actuator, way) === 0) return NONE;
      const set = minus(and(exit, at(r.notFree, line)), fed);
      fresh[line] = or(at(fresh, line), set);
      return set;
    };
    return or(push(actuator.a, 'in', m.exitA, m.fedA), push(actuator.b, 'out', m.exitB, m.fedB));
  });
  doubtful = or(doubtful, ...yielding);
  const closure = closeDisplaced(net, conditions, paths, r, actuators, doubtful);
  // Where the order of the rounds may matter, they are gone through.
  const { open } = closure;
  let moved = open === NONE ? [] : net.actuators.map((_, i) => i);
  while (moved.length > 0) {
    const push = (line: number, motion: Diagram): void => {
      if (line < 0 || motion === NONE) return;
      const set = minus(and(motion, open, at(r.notFree, line)), at(pushed, line));
      fresh[line] = or(at(fresh, line), set);
    };
    for (const i of moved) {
      const { a, b } = net.actuators[i] as NetActuator;
      const { out, in: inward } = actuators[i] as ActuatorMotion;
      push(b, out);
      push(a, inward);
    }
    r.aheadUnderPressure.spread(fresh);
    const touched = fresh.map((set, line) => {
      const before = pushed[line] as Diagram;
      pushed[line] = or(before, set);
      return pushed[line] !== before;
    });
    fresh = none(net);
    // One that a load pushes may also be driven back once others have moved.
    moved = net.actuators
      .flatMap(({ a, b }, i) => (touched[a] || (b >= 0 && touched[b]) || yielding[i] !== NONE ? [i] : []))
      .filter(drive);
  }
  markRings();
  return pushed.map((set, line) => or(set, at(closure.pushed, line)));

  function drive(i: number): boolean {
    const { a, b } = net.actuators[i] as NetActuator;
    const m = actuators[i] as ActuatorMotion;
    const yields = yielding[i] as Diagram;
    const held = yields === NONE ? NONE : minus(yields, othersPush(i));
    const moving = or(m.out, m.in, held);
    const oilA = minus(at(pushed, a), or(m.fedA, moving));
    const oilB = minus(at(pushed, b), or(m.fedB, moving));
    const goOut = conditions.places[i] === 'out' ? NONE : and(minus(oilA, oilB), m.exitB);
    const goIn = conditions.places[i] === 'in' ? NONE : and(minus(oilB, oilA), m.exitA);
    const both = and(oilA, oilB, or(m.exitA, m.exitB));
    const now = or(goOut, goIn);
    if (or(now, both) === NONE) return false;
    m.out = or(m.out, goOut);
    m.in = or(m.in, goIn);
    m.displaced = or(m.displaced, now);
    const bleeds = or(and(goOut, at(paths.toTank, a)), and(goIn, at(paths.toTank, b)));
    const against = loadAgainst(net.actuators[i] as NetActuator);
    const loaded = or(against('in') === 0 ? NONE : goOut, against('out') === 0 ? NONE : goIn);
    rest(ops, m, 'upstream', and(now, doubtful));
    rest(ops, m, 'load', loaded);
    rest(ops, m, 'bleed', bleeds);
    rest(ops, m, 'two feeds', both);
    doubtful = or(doubtful, loaded, bleeds, both);
    return now !== NONE;
  }

  /** Combinations in which some other actuator pushes oil out. */
  function othersPush(i: number): Diagram {
    return or(...actuators.flatMap((m, j) => (j === i ? [] : [m.out, m.in, yielding[j] as Diagram])));
  }

  /** Oil forced back into a line under pressure may turn a whole ring of actuators. */
  function markRings(): void {
    const ring = or(...actuators.map((m) => m.why[PRESSED_LINE] as Diagram));
    if (ring === NONE) return;
    net.actuators.forEach(({ a, b }, i) => {
      const m = actuators[i] as ActuatorMotion;
      const under = or(at(r.underPressure, a), at(r.underPressure, b));
      rest(ops, m, 'upstream', minus(and(ring, under), or(m.out, m.in)));
    });
  }
}
