import type { Adjacency } from '../edges.ts';
import type { Link } from '../field.ts';

/**
 * In what order to eliminate the lines of a search, and which ways that joins: the shape alone, whatever is
 * open. Ways are numbered; a way that elimination makes has its number from the start.
 */
export interface EliminationPlan {
  readonly ways: number;
  /** Edge e of the adjacency is way `edgeWay[e]`; -1: it leads nowhere. */
  readonly edgeWay: Int32Array;
  /** Ways through actuators. */
  readonly links: readonly { readonly way: number; readonly actuator: number; readonly to: number }[];
  readonly steps: readonly EliminationStep[];
}

/** A line goes: every way into it is joined to every way out of it. */
export interface EliminationStep {
  readonly line: number;
  /** Ways into it from lines that go later, and those lines. */
  readonly into: Int32Array;
  readonly from: Int32Array;
  readonly outOf: Int32Array;
  readonly to: Int32Array;
  /** `into` × `outOf`: the way that the two make together; -1: back to where it began. */
  readonly joined: Int32Array;
}

type Links = readonly (readonly Link[])[];

const KNOWN = new WeakMap<Adjacency, Map<Links | undefined, EliminationPlan[]>>();

/** Made once for each shape of search. */
export function planFor(
  edges: Adjacency,
  links: Links | undefined,
  tank: readonly boolean[],
  fromTank: boolean,
): EliminationPlan {
  let shapes = KNOWN.get(edges);
  if (shapes === undefined) KNOWN.set(edges, (shapes = new Map<Links | undefined, EliminationPlan[]>()));
  let plans = shapes.get(links);
  if (plans === undefined) shapes.set(links, (plans = []));
  return (plans[fromTank ? 1 : 0] ??= makePlan(edges, links, tank, fromTank));
}

function makePlan(
  edges: Adjacency,
  links: Links | undefined,
  tank: readonly boolean[],
  fromTank: boolean,
): EliminationPlan {
  const lines = tank.length;
  const number = new Int32Array(lines * lines).fill(-1);
  const ahead: number[][] = tank.map(() => []);
  const back: number[][] = tank.map(() => []);
  let ways = 0;
  const way = (from: number, to: number): number => {
    if (from === to) return -1;
    const known = number[from * lines + to] as number;
    if (known >= 0) return known;
    ahead[from]?.push(to);
    back[to]?.push(from);
    number[from * lines + to] = ways;
    return ways++;
  };
  const edgeWay = new Int32Array(edges.to.length).fill(-1);
  const linked: EliminationPlan['links'][number][] = [];
  for (let from = 0; from < lines; from++) {
    // Tanks absorb.
    if (tank[from] === true && !fromTank) continue;
    for (let e = edges.start[from] as number; e < (edges.start[from + 1] as number); e++)
      edgeWay[e] = way(from, edges.to[e] as number);
    for (const { to, actuator } of links?.[from] ?? [])
      if (to !== from) linked.push({ way: way(from, to), actuator, to });
  }

  const steps: EliminationStep[] = [];
  const left = tank.map((_, line) => line);
  while (left.length > 0) {
    // The line with the fewest ways through it goes first.
    let first = 0;
    let least = Infinity;
    for (let i = 0; i < left.length; i++) {
      const other = left[i] as number;
      const through = (ahead[other] as number[]).length * (back[other] as number[]).length;
      if (through >= least) continue;
      least = through;
      first = i;
    }
    const line = left.splice(first, 1)[0] as number;
    const from = Int32Array.from(back[line] as number[]);
    const to = Int32Array.from(ahead[line] as number[]);
    for (const other of from) remove(ahead[other] as number[], line);
    for (const other of to) remove(back[other] as number[], line);
    const joined = new Int32Array(from.length * to.length);
    for (let i = 0; i < from.length; i++)
      for (let o = 0; o < to.length; o++) joined[i * to.length + o] = way(from[i] as number, to[o] as number);
    steps.push({
      line,
      into: from.map((other) => number[other * lines + line] as number),
      from,
      outOf: to.map((other) => number[line * lines + other] as number),
      to,
      joined,
    });
  }
  return { ways, edgeWay, links: linked, steps };
}

function remove(list: number[], line: number): void {
  list.splice(list.indexOf(line), 1);
}
