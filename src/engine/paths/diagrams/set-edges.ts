import type { Network } from '../../../network/network.ts';
import type { Adjacency, Back } from '../edges.ts';
import type { Diagram } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';
import type { SetAlgebra } from './set-algebra.ts';

/** A set of combinations per line. */
export type LineSets = Diagram[];

/** The open paths as directed edges whose masks are diagrams; see `compileEdges` for the same over bit planes. */
export interface SetEdges {
  /** By mask number; 0 is always open. Those of lock checks come last and change while they settle. */
  readonly open: Diagram[];
  readonly pilots: readonly {
    readonly line: number;
    readonly base: Diagram;
    readonly mask: number;
    readonly vented: boolean;
  }[];
  /** As in `EdgeSet`: ways that pressures may open, and the masks of those that loads or back pressure open. */
  readonly reliefs: readonly { readonly relief: number; readonly mask: number }[];
  readonly loadPilots: readonly { readonly line: number; readonly mask: number }[];
  readonly backs: readonly Back[];
  readonly valveForward: Adjacency;
  readonly valveBackward: Adjacency;
  readonly forward: Adjacency;
  readonly backward: Adjacency;
  readonly freeForward: Adjacency;
  readonly freeBackward: Adjacency;
}

interface Edge {
  readonly from: number;
  readonly to: number;
  readonly mask: number;
  readonly free: boolean;
}

/** Of each dependent valve the combinations in which it stands in each position. */
export type SetPositions = readonly (readonly Diagram[])[];

/** Throws where nobody says where the dependent valves stand. */
export function compileSetEdges(net: Network, sets: SetAlgebra, settled?: SetPositions): SetEdges {
  if (net.dependents.length > 0 && settled === undefined)
    throw new Error('nobody says where the dependent valves stand');
  /** Combinations in which an input, or a dependent valve after all inputs, stands in one of `positions`. */
  const standing = (input: number, positions: number): Diagram => {
    if (input < net.inputs.length) return sets.literal(input, positions);
    const valve = settled?.[input - net.inputs.length] ?? [];
    return valve.reduce((all, set, p) => (((positions >>> p) & 1) === 1 ? sets.or(all, set) : all), NONE);
  };
  const open: Diagram[] = [ALL];
  const numbers = new Map<Diagram, number>([[ALL, 0]]);
  const edges: Edge[] = [];
  const piloted: {
    readonly base: Diagram;
    readonly line: number;
    readonly from: number;
    readonly to: number;
    readonly free: boolean;
    readonly vented: boolean;
  }[] = [];
  for (const path of net.paths) {
    const base = path.input < 0 ? ALL : standing(path.input, path.positions);
    const free = !path.throttled;
    if (path.pilot >= 0 || path.vent >= 0) {
      const vented = path.vent >= 0;
      piloted.push({ base, line: vented ? path.vent : path.pilot, from: path.from, to: path.to, free, vented });
      continue;
    }
    if (base === NONE) continue;
    let mask = numbers.get(base);
    if (mask === undefined) {
      mask = open.length;
      open.push(base);
      numbers.set(base, mask);
    }
    edges.push({ from: path.from, to: path.to, mask, free });
    if (!path.oneWay) edges.push({ from: path.to, to: path.from, mask, free });
  }
  const pilots = piloted.map(({ base, line, from, to, free, vented }) => {
    const mask = open.length;
    open.push(NONE);
    edges.push({ from, to, mask, free });
    return { line, base, mask, vented };
  });
  const closed = (): number => open.push(NONE) - 1;
  const reliefs = net.reliefs.flatMap(({ to }, relief) => (net.lines[to]?.tank ? [] : [{ relief, mask: closed() }]));
  const loaded = net.actuators.some(({ push }) => push.way !== 'none');
  const held = loaded ? piloted.filter(({ vented }) => !vented) : [];
  const loadPilots = held.map(({ line }) => ({ line, mask: closed() }));
  const backs = piloted.flatMap(({ to, line, vented }, pilot) =>
    vented ? [{ pilot, to, other: line, mask: closed() }] : [],
  );
  const valves: Edge[] = [
    ...backs.map(({ pilot, to, mask }) => ({ from: piloted[pilot]?.from ?? 0, to, mask, free: false })),
    ...held.map(({ from, to }, i) => ({ from, to, mask: loadPilots[i]?.mask ?? 0, free: false })),
    ...net.valves
      .filter((valve) => valve.duty !== 'closes')
      .map(({ from, to }) => ({ from, to, mask: 0, free: false })),
    ...reliefs.map(({ relief, mask }) => ({
      from: net.reliefs[relief]?.from ?? 0,
      to: net.reliefs[relief]?.to ?? 0,
      mask,
      free: false,
    })),
  ];
  const turned = valves.map((edge) => ({ ...edge, from: edge.to, to: edge.from }));
  const reversed = edges.map((edge) => ({ ...edge, from: edge.to, to: edge.from }));
  const lines = net.lines.length;
  return {
    open,
    pilots,
    reliefs,
    loadPilots,
    backs,
    valveForward: adjacency(net.lines.length, [...edges, ...valves]),
    valveBackward: adjacency(net.lines.length, [...reversed, ...turned]),
    forward: adjacency(lines, edges),
    backward: adjacency(lines, reversed),
    freeForward: adjacency(
      lines,
      edges.filter((edge) => edge.free),
    ),
    freeBackward: adjacency(
      lines,
      reversed.filter((edge) => edge.free),
    ),
  };
}

function adjacency(lines: number, edges: readonly Edge[]): Adjacency {
  const leaving = Array.from({ length: lines }, (): Edge[] => []);
  for (const edge of edges) if (edge.from !== edge.to) leaving[edge.from]?.push(edge);
  const start = new Int32Array(lines + 1);
  leaving.forEach((list, line) => (start[line + 1] = (start[line] as number) + list.length));
  const all = leaving.flat();
  return { start, to: Int32Array.from(all, (edge) => edge.to), mask: Int32Array.from(all, (edge) => edge.mask) };
}
