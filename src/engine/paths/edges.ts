import { emptySet, fillRange, fullSet } from '../../base/bits.ts';
import type { BitSet } from '../../base/bits.ts';
import type { Network } from '../../network/network.ts';

/**
 * The open paths of a network as directed edges, in adjacency lists over typed arrays, with the set
 * of states in which each is open. States are counted in mixed radix, the first input slowest.
 */
export interface EdgeSet {
  readonly states: number;
  /** Distinct sets of states, shared by edges; entry 0 is "all states". */
  readonly masks: readonly BitSet[];
  /** Masks that follow dependent valves. */
  readonly follows: readonly Follower[];
  /**
   * Paths that another line opens: by its pressure (lock checks), or by being let down (the ways back through a
   * shuttle valve). Their mask is decided by the engine, state by state.
   */
  readonly pilots: readonly { readonly line: number; readonly base: number; readonly vented: boolean }[];
  readonly forward: Adjacency;
  readonly backward: Adjacency;
  /** The same without throttled paths. */
  readonly freeForward: Adjacency;
  readonly freeBackward: Adjacency;
  /** With the ways through valves that pressures may open; the same lists where there are none. */
  readonly valveForward: Adjacency;
  readonly valveBackward: Adjacency;
  /**
   * Relief valves that do not let out straight to a tank, with the mask of the states in which their
   * outlet is not open to tank either: there they may drive something. The engine fills these masks.
   */
  readonly reliefs: readonly { readonly relief: number; readonly mask: number }[];
  /** Lock checks that a load may hold open over their pilot line; the engine fills these masks too. */
  readonly loadPilots: readonly { readonly line: number; readonly mask: number }[];
  /** Ways back through shuttle valves where open paths do not tell at which inlet the ball stands; filled likewise. */
  readonly backs: readonly Back[];
}

/** A way back over pilot `pilot`, to line `to`, past the other inlet on line `other`. */
export interface Back {
  readonly pilot: number;
  readonly to: number;
  readonly other: number;
  readonly mask: number;
}

/** Edges `start[l] … start[l + 1] - 1` leave line l: they lead to `to`, open in mask `mask`. */
export interface Adjacency {
  readonly start: Int32Array;
  readonly to: Int32Array;
  /** Index into masks, or masks.length + index into pilots. */
  readonly mask: Int32Array;
}

/** This mask holds the rows in which the dependent valve stands in one of `positions` (bit mask). */
export interface Follower {
  readonly mask: number;
  readonly dependent: number;
  readonly positions: number;
}

/** Words `at` … `at + width - 1` of the masks that follow dependent valves, for other settings of these. */
export function follow(
  masks: readonly BitSet[],
  follows: readonly Follower[],
  settings: DependentPlanes,
  at: number,
  width: number,
): void {
  for (const { mask, dependent, positions } of follows) {
    const target = masks[mask] as BitSet;
    target.fill(0, at, at + width);
    settings[dependent]?.forEach((plane, p) => {
      if (plane === undefined || ((positions >>> p) & 1) === 0) return;
      for (let w = at; w < at + width; w++) target[w] = (target[w] as number) | (plane[w] as number);
    });
  }
}

interface Edge {
  readonly from: number;
  readonly to: number;
  readonly mask: number;
  readonly free: boolean;
}

/** Rows in which each dependent valve stands in each of its positions: [dependent][position]; absent = none. */
export type DependentPlanes = readonly (readonly (BitSet | undefined)[])[];

/** `settings`: where the dependent valves stand; a network that has some throws without it. */
export function compileEdges(net: Network, settings?: DependentPlanes): EdgeSet {
  if (net.dependents.length > 0 && settings === undefined)
    throw new Error('open paths need to know where the dependent valves stand');
  const radices = net.inputs.map((input) => input.positions.length);
  const states = radices.reduce((n, r) => n * r, 1);
  const masks: BitSet[] = [fullSet(states)];
  const known = new Map<string, number>();
  const follows: Follower[] = [];
  const maskOf = (input: number, positions: number): number => {
    const dependent = input - radices.length;
    const radix = radices[input] ?? net.dependents[dependent]?.positions.length;
    if (input < 0 || radix === undefined || positions === (1 << radix) - 1) return 0;
    const key = `${input}:${positions}`;
    let index = known.get(key);
    if (index === undefined) {
      index = masks.length;
      if (dependent < 0) masks.push(positionMask(radices, input, positions, states));
      else {
        masks.push(emptySet(states));
        follows.push({ mask: index, dependent, positions });
      }
      known.set(key, index);
    }
    return index;
  };

  const pilots: { line: number; base: number; vented: boolean }[] = [];
  const edges: Edge[] = [];
  const pilotEdges: (Omit<Edge, 'mask'> & { pilot: number })[] = [];
  for (const path of net.paths) {
    const base = maskOf(path.input, path.positions);
    const free = !path.throttled;
    if (path.pilot >= 0 || path.vent >= 0) {
      const vented = path.vent >= 0;
      pilotEdges.push({ from: path.from, to: path.to, free, pilot: pilots.length });
      pilots.push({ line: vented ? path.vent : path.pilot, base, vented });
      continue;
    }
    edges.push({ from: path.from, to: path.to, mask: base, free });
    if (!path.oneWay) edges.push({ from: path.to, to: path.from, mask: base, free });
  }
  if (settings) follow(masks, follows, settings, 0, masks[0]?.length ?? 0);
  // Pilot masks are numbered after the fixed ones, whose number is known only now.
  for (const { pilot, ...edge } of pilotEdges) edges.push({ ...edge, mask: masks.length + pilot });

  const turn = (edge: Edge): Edge => ({ ...edge, from: edge.to, to: edge.from });
  const reversed = edges.map(turn);
  const lines = net.lines.length;
  const reliefs = net.reliefs
    .flatMap(({ to }, relief) => (net.lines[to]?.tank ? [] : [relief]))
    .map((relief, i) => ({ relief, mask: masks.length + pilots.length + i }));
  const afterReliefs = masks.length + pilots.length + reliefs.length;
  const loaded = net.actuators.some(({ push }) => push.way !== 'none');
  const held = loaded ? pilotEdges.filter(({ pilot }) => pilots[pilot]?.vented === false) : [];
  const loadPilots = held.map(({ pilot }, i) => ({ line: pilots[pilot]?.line ?? 0, mask: afterReliefs + i }));
  const backs = pilotEdges
    .filter(({ pilot }) => pilots[pilot]?.vented === true)
    .map(({ pilot, to }, i): Back => {
      const mask = afterReliefs + loadPilots.length + i;
      return { pilot, to, other: pilots[pilot]?.line ?? 0, mask };
    });
  const valves = [
    ...backs.map(({ pilot, to, mask }): Edge => ({ from: pilotEdges[pilot]?.from ?? 0, to, mask, free: false })),
    ...held.map(({ from, to }, i): Edge => ({ from, to, mask: loadPilots[i]?.mask ?? 0, free: false })),
    ...net.valves
      .filter((valve) => valve.duty !== 'closes')
      .map(({ from, to }): Edge => ({ from, to, mask: 0, free: false })),
    ...reliefs.map(({ relief, mask }): Edge => ({
      from: net.reliefs[relief]?.from ?? 0,
      to: net.reliefs[relief]?.to ?? 0,
      mask,
      free: false,
    })),
  ];
  const forward = adjacency(lines, edges);
  const backward = adjacency(lines, reversed);
  return {
    states,
    masks,
    follows,
    pilots,
    reliefs,
    loadPilots,
    backs,
    forward,
    backward,
    freeForward: adjacency(
      lines,
      edges.filter((edge) => edge.free),
    ),
    freeBackward: adjacency(
      lines,
      reversed.filter((edge) => edge.free),
    ),
    valveForward: valves.length === 0 ? forward : adjacency(lines, [...edges, ...valves]),
    valveBackward: valves.length === 0 ? backward : adjacency(lines, [...reversed, ...valves.map(turn)]),
  };
}

function adjacency(lines: number, edges: readonly Edge[]): Adjacency {
  const useful = edges.filter((edge) => edge.from !== edge.to);
  const start = new Int32Array(lines + 1);
  for (const edge of useful) start[edge.from + 1] = (start[edge.from + 1] as number) + 1;
  for (let l = 0; l < lines; l++) start[l + 1] = (start[l + 1] as number) + (start[l] as number);
  const next = start.slice();
  const to = new Int32Array(useful.length);
  const mask = new Int32Array(useful.length);
  for (const edge of useful) {
    const slot = next[edge.from] as number;
    next[edge.from] = slot + 1;
    to[slot] = edge.to;
    mask[slot] = edge.mask;
  }
  return { start, to, mask };
}

/** The states in which `input` stands in one of `positions` (a bit mask). */
export function positionMask(radices: readonly number[], input: number, positions: number, states: number): BitSet {
  const set = emptySet(states);
  const radix = radices[input] as number;
  const stride = radices.slice(input + 1).reduce((n, r) => n * r, 1);
  const period = stride * radix;
  for (let p = 0; p < radix; p++) {
    if (((positions >>> p) & 1) === 0) continue;
    for (let from = p * stride; from < states; from += period) fillRange(set, from, from + stride);
  }
  return set;
}
