import type { Network } from '../../../network/network.ts';
import { loadAgainst } from '../actuator-bits.ts';
import type { PathConditions } from '../reach.ts';
import type { ActuatorMotion } from './actuator-motion.ts';
import { spreadApart } from './apart.ts';
import type { Ends } from './apart.ts';
import type { Diagram } from './diagrams.ts';
import { NONE } from './diagrams.ts';
import type { Ways } from './eliminate.ts';
import type { OpenPathSets } from './open-paths.ts';
import { at, eliminate, none, operations } from './reach-sets.ts';
import type { ReachSets } from './reach-sets.ts';
import type { SetAlgebra } from './set-algebra.ts';
import type { LineSets } from './set-edges.ts';

/** Motions by displaced oil where the order in which actuators are driven does not matter. */
export interface Closure {
  /** Lines that displaced oil gets to, in the combinations that are settled. */
  readonly pushed: LineSets;
  /** Combinations in which the order may matter: nothing is said of them. */
  readonly open: Diagram;
}

/**
 * Adds the motions that displaced oil drives, all at once, in combinations without doubt, in which no actuator gets
 * oil of others on both sides. There the rounds of `driveByDisplaced` come to the same whatever their order: the least
 * solution of "oil gets here, or gets through an actuator that it drives". Round by round most sets on the way are
 * none of the answer.
 */
export function closeDisplaced(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra>,
  r: ReachSets,
  actuators: readonly ActuatorMotion[],
  doubtful: Diagram,
): Closure {
  const { and, or, minus } = operations(paths);
  const seeds = none(net);
  const seed = (line: number, motion: Diagram): void => {
    if (line >= 0 && motion !== NONE)
      seeds[line] = or(at(seeds, line), minus(and(motion, at(r.notFree, line)), doubtful));
  };
  net.actuators.forEach(({ a, b }, i) => {
    const { out, in: inward } = actuators[i] as ActuatorMotion;
    seed(b, out);
    seed(a, inward);
  });
  if (seeds.every((set) => set === NONE)) return { pushed: seeds, open: doubtful };

  /** Where oil in chamber A, or B, would drive the actuator out, or in. */
  const ways = net.actuators.map((_, i) => {
    const { out, in: inward, fedA, fedB, exitA, exitB } = actuators[i] as ActuatorMotion;
    const moving = or(out, inward);
    return {
      takesA: or(fedA, moving),
      takesB: or(fedB, moving),
      goOut: conditions.places[i] === 'out' ? NONE : minus(exitB, or(fedA, moving)),
      goIn: conditions.places[i] === 'in' ? NONE : minus(exitA, or(fedB, moving)),
    };
  });
  const search: Ways = {
    open: paths.edges.open,
    edges: paths.edges.forward,
    gate: r.notFree,
    links: r.links.push,
    passes: (actuator, to) => {
      const way = ways[actuator];
      if (way === undefined) return NONE;
      return net.actuators[actuator]?.b === to ? way.goOut : way.goIn;
    },
  };
  const pushed = eliminate(net, paths, search).spread([...seeds]);
  const oil = (i: number, a: Diagram, b: Diagram): Ends => {
    const { takesA, takesB } = ways[i] as (typeof ways)[number];
    return [minus(a, takesA), minus(b, takesB)];
  };
  const shared = net.actuators.map(({ a, b }, i) => oil(i, at(pushed, a), at(pushed, b)));
  // What an actuator pushes out itself is no oil of others.
  const misled = shared.flatMap(([a, b], i) => (and(a, b) === NONE ? [] : [i]));
  const apart = spreadApart(paths.sets, net, search, seeds, misled);
  let open = doubtful;
  const driven = net.actuators.map((actuator, i) => {
    const { a, b } = actuator;
    const { goOut, goIn } = ways[i] as (typeof ways)[number];
    const alone = apart.get(i);
    const [oilA, oilB] = alone ? oil(i, ...alone) : (shared[i] as Ends);
    const out = and(oilA, goOut);
    const inward = and(oilB, goIn);
    const against = loadAgainst(actuator);
    open = or(
      open,
      and(oilA, oilB),
      and(out, at(paths.toTank, a)),
      and(inward, at(paths.toTank, b)),
      against('in') === 0 ? NONE : out,
      against('out') === 0 ? NONE : inward,
    );
    return { out, inward };
  });
  driven.forEach(({ out, inward }, i) => {
    const m = actuators[i] as ActuatorMotion;
    const [goOut, goIn] = [minus(out, open), minus(inward, open)];
    m.out = or(m.out, goOut);
    m.in = or(m.in, goIn);
    m.displaced = or(m.displaced, goOut, goIn);
  });
  return { pushed: pushed.map((set) => minus(set, open)), open };
}
