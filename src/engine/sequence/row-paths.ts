import { has, wordsFor } from '../../base/bits.ts';
import type { Network } from '../../network/network.ts';
import { PathSolver } from '../paths/block.ts';
import type { Adjacency, EdgeSet } from '../paths/edges.ts';
import { sourceLines } from '../paths/reach.ts';
import type { PathConditions } from '../paths/reach.ts';

/** The open paths of one row, by themselves: lock checks that a pilot may open are listed apart. */
export interface RowPaths {
  /** Line → lines that oil can go on to. */
  readonly onward: readonly (readonly number[])[];
  /** Lock checks whose own part lets them open here; `from` and `to` are the way that the pilot opens. */
  readonly pilots: readonly PilotWay[];
  /** 1 = an open path leads from this line to tank, or through a stopped pump that leaks. */
  readonly toTank: Uint8Array;
  /** The same without the leakage of pumps, which lets pressure down slowly. */
  readonly firm: Uint8Array;
  /** 1 = a chamber on this line can fill from tank. */
  readonly fills: Uint8Array;
}

export interface PilotWay {
  readonly index: number;
  /** Line whose pressure opens it. */
  readonly pilot: number;
  readonly from: number;
  readonly to: number;
}

/**
 * Open paths row by row, each worked out once. `pumpsRunning` false: pumps that are not tight leak their
 * outlet down. `points`: lines with a bleed valve that stands open.
 */
export class RowPathsCache {
  readonly net: Network;
  readonly edges: EdgeSet;
  readonly #leaking: readonly number[];
  readonly #sources: readonly number[];
  readonly #ends: readonly number[];
  readonly #rows = new Map<number, RowPaths>();

  constructor(net: Network, edges: EdgeSet, pumpsRunning: boolean, points: readonly number[] = []) {
    this.net = net;
    this.edges = edges;
    this.#ends = [...tankLines(net), ...points];
    this.#sources = sourceLines(net, { pumpsRunning, places: [] }).filter((line) => line >= 0);
    this.#leaking = pumpsRunning ? [] : net.pumps.flatMap((pump) => (pump.tightWhenStopped ? [] : [pump.outlet]));
  }

  at(row: number): RowPaths {
    const known = this.#rows.get(row);
    if (known) return known;
    const made = this.#make(row);
    this.#rows.set(row, made);
    return made;
  }

  #make(row: number): RowPaths {
    const { net, edges } = this;
    const onward = openEdges(edges.forward, edges, row);
    const back = openEdges(edges.backward, edges, row);
    const { ways, vents } = ledWays(edges, row);
    let firm = mark(back, this.#ends, net);
    // A shuttle valve lets back through an inlet once the other is let down, and that may let down the other of the next.
    for (let left = vents, grown = true; grown && left.length > 0;) {
      const fed = mark(onward, this.#sources, net);
      const open = left.filter(({ line }) => firm[line] === 1 && fed[line] !== 1);
      left = left.filter((way) => !open.includes(way));
      for (const { from, to } of open) {
        onward[from]?.push(to);
        back[to]?.push(from);
      }
      firm = mark(back, this.#ends, net);
      grown = open.length > 0;
    }
    const toTank = this.#leaking.length === 0 ? firm : mark(back, [...this.#ends, ...this.#leaking], net);
    const fills = mark(onward, tankLines(net), net);
    return { onward, pilots: ways, toTank, firm, fills };
  }
}

const tankLines = (net: Network): number[] => net.lines.flatMap((line, index) => (line.tank ? [index] : []));

function openEdges(list: Adjacency, edges: EdgeSet, row: number): number[][] {
  const lines = list.start.length - 1;
  return Array.from({ length: lines }, (_, line) => {
    const out: number[] = [];
    for (let e = list.start[line] as number; e < (list.start[line + 1] as number); e++) {
      const mask = edges.masks[list.mask[e] as number];
      if (mask && has(mask, row)) out.push(list.to[e] as number);
    }
    return out;
  });
}

/** A way that stands open while `line` is let down. */
interface VentWay {
  readonly line: number;
  readonly from: number;
  readonly to: number;
}

/** Ways that another line opens: by its pressure, or by being let down. */
function ledWays(edges: EdgeSet, row: number): { ways: PilotWay[]; vents: VentWay[] } {
  const { forward, masks, pilots } = edges;
  const ways: PilotWay[] = [];
  const vents: VentWay[] = [];
  if (pilots.length === 0) return { ways, vents };
  for (let from = 0; from + 1 < forward.start.length; from++) {
    for (let e = forward.start[from] as number; e < (forward.start[from + 1] as number); e++) {
      const index = (forward.mask[e] as number) - masks.length;
      const spec = pilots[index];
      const base = spec && masks[spec.base];
      if (!base || !has(base, row)) continue;
      const to = forward.to[e] as number;
      if (spec.vented) vents.push({ line: spec.line, from, to });
      else ways.push({ index, pilot: spec.line, from, to });
    }
  }
  ways.sort((a, b) => a.index - b.index);
  return { ways, vents };
}

/** Marks everything that can be reached from `from`; a tank is not passed through. */
function mark(next: readonly (readonly number[])[], from: readonly number[], net: Network): Uint8Array {
  const seen = new Uint8Array(net.lines.length);
  const queue: number[] = [];
  for (const line of from) {
    if (seen[line] === 1) continue;
    seen[line] = 1;
    queue.push(line);
  }
  for (let head = 0; head < queue.length; head++) {
    for (const to of next[queue[head] as number] ?? []) {
      if (seen[to] === 1) continue;
      seen[to] = 1;
      if (net.lines[to]?.tank !== true) queue.push(to);
    }
  }
  return seen;
}

/** Words in a block, and most of them that are looked through one by one. */
const BLOCK = 128;
const MOST_WORDS = 16_384;

/**
 * 1 = no combination of positions opens this line to tank, the pumps being stopped. Past half a million
 * rows, or with bleed valves on `points`, a line counts as opened where its paths would lead to tank with every lever in its best position.
 */
export function linesNeverOpen(
  net: Network,
  edges: EdgeSet,
  conditions: PathConditions,
  points: readonly number[],
): Uint8Array {
  const words = wordsFor(edges.states);
  if (words > MOST_WORDS || points.length > 0) return neverConnected(net, edges, points);
  const never = new Uint8Array(net.lines.length).fill(1);
  const solver = new PathSolver(net, edges, { ...conditions, pumpsRunning: false }, Math.min(BLOCK, words));
  for (let at = 0; at < words; at += BLOCK) {
    const { reach, spreader } = solver.solve(at, Math.min(BLOCK, words - at));
    never.forEach((still, line) => {
      if (still === 1 && spreader.anyIn(reach.toTank, line)) never[line] = 0;
    });
  }
  return never;
}

function neverConnected(net: Network, { backward }: EdgeSet, points: readonly number[]): Uint8Array {
  const next = Array.from({ length: net.lines.length }, (_, line) => [
    ...backward.to.subarray(backward.start[line], backward.start[line + 1]),
  ]);
  const leaking = net.pumps.flatMap((pump) => (pump.tightWhenStopped ? [] : [pump.outlet]));
  return mark(next, [...tankLines(net), ...points, ...leaking], net).map((on) => 1 - on);
}
