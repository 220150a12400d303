import type { Network } from '../../../network/network.ts';
import { pushes } from '../actuator-bits.ts';
import { compileLinks, sourceLines } from '../reach.ts';
import type { Links, PathConditions } from '../reach.ts';
import type { Diagram } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';
import { Elimination } from './eliminate.ts';
import type { Ways } from './eliminate.ts';
import type { OpenPathSets } from './open-paths.ts';
import type { SetAlgebra } from './set-algebra.ts';
import type { LineSets } from './set-edges.ts';

/** Which lines oil can get to; see `Reach` for the same over bit planes. */
export interface ReachSets {
  readonly links: Links;
  readonly notFree: LineSets;
  readonly notToTank: LineSets;
  /** Per source, in the order of `sourceLines`. */
  readonly pressed: readonly LineSets[];
  readonly pressedFree: readonly LineSets[];
  readonly anyPressed: LineSets;
  readonly notPressed: LineSets;
  readonly underPressure: LineSets;
  readonly toRelief: LineSets;
  readonly exits: LineSets;
  readonly freeExits: LineSets;
  readonly softExits: LineSets;
  /** Exits and pressure over valves that pressures may open; undefined where there are none. */
  readonly valves: { readonly exits: LineSets; readonly pressed: LineSets } | undefined;
  readonly leaves: LineSets;
  readonly fills: LineSets;
  readonly plainFills: LineSets;
  /** Searches along open paths into lines not freely open to tank / not open to tank at all. */
  readonly aheadUnderPressure: Elimination;
  readonly aheadShut: Elimination;
}

export const none = (net: Network): LineSets => net.lines.map(() => NONE);
export const at = (field: LineSets, line: number): Diagram => (line < 0 ? NONE : (field[line] as Diagram));

/** Searches over the ways of these circuits, one elimination each. */
export const eliminate = (net: Network, paths: OpenPathSets<SetAlgebra>, ways: Omit<Ways, 'open'>): Elimination =>
  new Elimination(paths.sets, net, { ...ways, open: paths.edges.open });

export function reachSets(net: Network, conditions: PathConditions, paths: OpenPathSets<SetAlgebra>): ReachSets {
  const { edges, toTank, freeToTank, fromSource } = paths;
  const { and, or, not } = operations(paths);
  const links = compileLinks(net, conditions.places);
  const spread = (field: LineSets, ways: Omit<Ways, 'open'>): LineSets => eliminate(net, paths, ways).spread(field);

  const notFree = freeToTank.map(not);
  const notToTank = toTank.map(not);
  const aheadUnderPressure = eliminate(net, paths, { edges: edges.forward, gate: notFree });
  const aheadShut = eliminate(net, paths, { edges: edges.forward, gate: notToTank });
  const sources = sourceLines(net, conditions);
  const seedOf = (line: number): LineSets => {
    const field = none(net);
    if (line >= 0) field[line] = notFree[line] as Diagram;
    return field;
  };
  const pressed = sources.map((line) => aheadUnderPressure.spread(seedOf(line)));
  const freeAhead = eliminate(net, paths, { edges: edges.freeForward, gate: notFree });
  const pressedFree = sources.map((line) => freeAhead.spread(seedOf(line)));
  const anyPressed = net.lines.map((_, line) => or(...pressed.map((field) => at(field, line))));
  const notPressed = anyPressed.map(not);
  const underPressure = spread([...anyPressed], { edges: edges.forward, gate: notFree, links: links.push });

  const toRelief = none(net);
  for (const relief of net.reliefs) toRelief[relief.from] = or(at(toRelief, relief.from), at(toTank, relief.to));
  for (const valve of net.valves) {
    // One that its own inlet opens lets out as a relief valve does.
    if (valve.signals.some((signal) => signal.line === valve.from && signal.factor > 0))
      toRelief[valve.from] = or(at(toRelief, valve.from), at(toTank, valve.to));
  }
  spread(toRelief, { edges: edges.backward });

  const takesOil = (seed: LineSets): LineSets => takeOil(net, conditions, seed);
  const back = { edges: edges.backward, links: links.pull, fromTank: true };
  const exits = spread(takesOil(toTank), { ...back, gate: notPressed });
  const freeExits = spread(takesOil(freeToTank), { ...back, edges: edges.freeBackward, gate: notPressed });
  // Oil may also be forced into a line under pressure, by the ratio of areas.
  const softExits = spread(takesOil(toTank), back).map((set, line) => or(set, at(anyPressed, line)));
  const plainFills = fromSource.map((set, line) => (net.lines[line]?.tank ? ALL : set));
  spread(plainFills, { edges: edges.forward, fromTank: true });
  const fills = spread([...plainFills], { edges: edges.forward, links: links.push, fromTank: true });
  const valves = waysOverValves();
  const leaves = valves ? underPressure.map((set, line) => or(set, at(valves.pressed, line))) : underPressure;
  return {
    links,
    notFree,
    notToTank,
    pressed,
    pressedFree,
    anyPressed,
    notPressed,
    underPressure,
    toRelief,
    exits,
    freeExits,
    softExits,
    valves,
    leaves,
    fills,
    plainFills,
    aheadUnderPressure,
    aheadShut,
  };

  function waysOverValves(): ReachSets['valves'] {
    for (const { relief, mask } of edges.reliefs) edges.open[mask] = at(notToTank, net.reliefs[relief]?.to ?? 0);
    if (edges.loadPilots.length > 0) {
      const field = none(net);
      net.actuators.forEach((actuator, i) => {
        const { a, b } = actuator;
        if (conditions.places[i] !== 'in' && pushes(actuator, 'in') !== 0) field[a] = at(notToTank, a);
        if (conditions.places[i] !== 'out' && pushes(actuator, 'out') !== 0 && b >= 0) field[b] = at(notToTank, b);
      });
      spread(field, { edges: edges.forward, gate: notToTank, links: links.push });
      for (const { line, mask } of edges.loadPilots) edges.open[mask] = at(field, line);
    }
    for (const { pilot, to, other, mask } of edges.backs) {
      const pressing = (line: number): Diagram => or(at(fromSource, line), at(underPressure, line));
      const shut = paths.sets.not(edges.open[edges.pilots[pilot]?.mask ?? 0] as Diagram);
      edges.open[mask] = and(shut, or(not(pressing(other)), pressing(to)));
    }
    const led = [...edges.reliefs, ...edges.loadPilots, ...edges.backs];
    const mayOpen = or(...led.map(({ mask }) => edges.open[mask] as Diagram));
    const live = net.valves.length > 0 ? ALL : mayOpen;
    if (live === NONE) return undefined;
    const exits = spread([...softExits], { edges: edges.valveBackward, links: links.pull, fromTank: true });
    const pressed = spread([...anyPressed], { edges: edges.valveForward, gate: notFree, links: links.push });
    return { exits: exits.map((set) => and(set, live)), pressed: pressed.map((set) => and(set, live)) };
  }
}

/** The line where a single-acting cylinder that can still go out swallows oil by itself; -1: none. As in `takeIn`. */
export function swallowsAt(net: Network, conditions: PathConditions, actuator: number): number {
  const { a, b } = net.actuators[actuator] as Network['actuators'][number];
  return b < 0 && conditions.places[actuator] !== 'out' ? a : -1;
}

/** The seeds, and the lines that swallow oil by themselves; as `takeIn`. */
function takeOil(net: Network, conditions: PathConditions, seeds: LineSets): LineSets {
  const field = [...seeds];
  net.actuators.forEach((_, i) => {
    const line = swallowsAt(net, conditions, i);
    if (line >= 0) field[line] = ALL;
  });
  for (const store of net.accumulators) if (!store.charged) field[store.line] = ALL;
  return field;
}

export interface Operations {
  readonly and: (...list: Diagram[]) => Diagram;
  readonly or: (...list: Diagram[]) => Diagram;
  readonly minus: (a: Diagram, b: Diagram) => Diagram;
  readonly not: (a: Diagram) => Diagram;
}

/** The operations on any number of sets. */
export function operations({ sets }: { readonly sets: SetAlgebra }): Operations {
  return {
    and: (...list) => {
      let all: Diagram = ALL;
      for (const set of list) all = sets.and(all, set);
      return all;
    },
    or: (...list) => {
      let any: Diagram = NONE;
      for (const set of list) any = sets.or(any, set);
      return any;
    },
    minus: (a, b) => sets.minus(a, b),
    not: (a) => sets.not(a),
  };
}
