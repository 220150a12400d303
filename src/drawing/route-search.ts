import type { Point } from '../base/points.ts';
import type { Field } from './route-field.ts';
import { FLAG, lowerBound } from './route-field.ts';

/** Directions by index: right, down, left, up. Opposite = index + 2. */
export type Direction = 0 | 1 | 2 | 3;
export const opposite = (d: Direction): Direction => ((d + 2) % 4) as Direction;

/** What a route pays, in modules of length. A line through a part is the last resort. */
const COST = { bend: 6, joinedBend: 2, cross: 3, corner: 25, foreign: 40, margin: 4, box: 600, own: 0.45 } as const;

/** Routes that cost this much run through a part. */
export const THROUGH_PART = COST.box * 0.5;

export interface Leg {
  readonly from: Point;
  /** Directions in which it may set out; the first step in the first of them costs no bend. */
  readonly headings: readonly Direction[];
  readonly to: Point;
  /** Direction in which the last step should arrive; undefined = any. Arriving against it is not allowed. */
  readonly arrive?: Direction;
}

export interface Found {
  readonly points: readonly Point[];
  readonly heading: Direction;
  readonly cost: number;
}

/** A* over (node, heading). Ties fall to the lower state number, so equal input gives equal routes. */
export function searchLeg(field: Field, leg: Leg): Found | undefined {
  const { xs, ys } = field;
  const width = xs.length;
  const states = width * ys.length * 4;
  const start = nodeAt(field, leg.from);
  const goal = nodeAt(field, leg.to);
  if (start === undefined || goal === undefined) return undefined;
  const best = new Float64Array(states).fill(Infinity);
  const came = new Int32Array(states).fill(-1);
  const heap = new Heap();
  const perModule = field.joins ? COST.own : 1;
  const perBend = field.joins ? COST.joinedBend : COST.bend;
  const guess = (node: number, heading: Direction): number => {
    const dx = leg.to.x - (xs[node % width] as number);
    const dy = leg.to.y - (ys[Math.floor(node / width)] as number);
    const length = (Math.abs(dx) + Math.abs(dy)) * perModule;
    const straight = (dx === 0 && (dy === 0 || heading % 2 === 1)) || (dy === 0 && heading % 2 === 0);
    return length + (straight ? 0 : perBend);
  };
  for (const heading of leg.headings) {
    const state = start * 4 + heading;
    best[state] = 0;
    heap.push(guess(start, heading), state);
  }
  const done = new Uint8Array(states);
  let reached = -1;
  let reachedCost = Infinity;
  for (let state = heap.pop(); state >= 0; state = heap.pop()) {
    if (done[state] === 1) continue;
    done[state] = 1;
    const cost = best[state] as number;
    if (cost >= reachedCost) break;
    const node = state >> 2;
    const heading = (state & 3) as Direction;
    if (node === goal) {
      const last = leg.arrive === undefined || leg.arrive === heading ? 0 : leg.arrive === opposite(heading) ? Infinity : COST.bend;
      if (cost + last < reachedCost) {
        reachedCost = cost + last;
        reached = state;
      }
      continue;
    }
    for (let turn = 0; turn < 4; turn++) {
      const way = turn as Direction;
      if (way === opposite(heading)) continue;
      const next = neighbour(field, node, way);
      if (next < 0) continue;
      const total = cost + turnCost(field, node, heading, way) + stepCost(field, node, next, way);
      const nextState = next * 4 + way;
      if (total < (best[nextState] as number)) {
        best[nextState] = total;
        came[nextState] = state;
        heap.push(total + guess(next, way), nextState);
      }
    }
  }
  if (reached < 0 || reachedCost === Infinity) return undefined;
  const points: Point[] = [];
  for (let state = reached; state >= 0; state = came[state] as number) {
    const node = state >> 2;
    points.push({ x: xs[node % width] as number, y: ys[Math.floor(node / width)] as number });
  }
  return { points: points.reverse(), heading: (reached & 3) as Direction, cost: reachedCost };
}

function nodeAt(field: Field, p: Point): number | undefined {
  const i = lowerBound(field.xs, p.x);
  const j = lowerBound(field.ys, p.y);
  return field.xs[i] === p.x && field.ys[j] === p.y ? j * field.xs.length + i : undefined;
}

function neighbour(field: Field, node: number, way: Direction): number {
  const width = field.xs.length;
  switch (way) {
    case 0:
      return node % width === width - 1 ? -1 : node + 1;
    case 1:
      return node + width < field.nodes.length ? node + width : -1;
    case 2:
      return node % width === 0 ? -1 : node - 1;
    case 3:
      return node - width;
  }
}

function turnCost(field: Field, node: number, heading: Direction, way: Direction): number {
  const flags = field.nodes[node] as number;
  if (heading === way) return 0;
  // A corner on another line would read as a joint.
  const touch = (flags & (FLAG.foreignAcross | FLAG.foreignUpright)) !== 0 ? COST.corner : 0;
  return touch + ((flags & FLAG.own) !== 0 ? COST.joinedBend : COST.bend);
}

function stepCost(field: Field, node: number, next: number, way: Direction): number {
  const width = field.xs.length;
  const first = Math.min(node, next);
  const flat = way % 2 === 0;
  const flags = (flat ? field.across[first] : field.upright[first]) as number;
  const length = flat
    ? Math.abs((field.xs[next % width] as number) - (field.xs[node % width] as number))
    : Math.abs((field.ys[Math.floor(next / width)] as number) - (field.ys[Math.floor(node / width)] as number));
  let cost = length * ((flags & FLAG.own) !== 0 ? COST.own : 1);
  if ((flags & FLAG.box) !== 0) cost += COST.box;
  else if ((flags & FLAG.margin) !== 0) cost += COST.margin * length;
  if ((flags & FLAG.foreign) !== 0) cost += COST.foreign + COST.foreign * length;
  const there = field.nodes[next] as number;
  if ((there & FLAG.foreignCorner) !== 0) cost += COST.corner;
  else if ((there & (flat ? FLAG.foreignUpright : FLAG.foreignAcross)) !== 0) cost += COST.cross;
  return cost;
}

/** Least cost first; equal costs by state number. */
class Heap {
  readonly #costs: number[] = [];
  readonly #states: number[] = [];

  push(cost: number, state: number): void {
    let at = this.#costs.length;
    this.#costs.push(cost);
    this.#states.push(state);
    while (at > 0) {
      const up = (at - 1) >> 1;
      if (!this.#before(at, up)) break;
      this.#swap(at, up);
      at = up;
    }
  }

  /** −1 when empty. */
  pop(): number {
    if (this.#states.length === 0) return -1;
    const top = this.#states[0] as number;
    const cost = this.#costs.pop() as number;
    const state = this.#states.pop() as number;
    if (this.#states.length > 0) {
      this.#costs[0] = cost;
      this.#states[0] = state;
      this.#sink();
    }
    return top;
  }

  #sink(): void {
    const size = this.#states.length;
    for (let at = 0; ; ) {
      let least = at;
      for (const down of [2 * at + 1, 2 * at + 2]) if (down < size && this.#before(down, least)) least = down;
      if (least === at) return;
      this.#swap(at, least);
      at = least;
    }
  }

  #before(a: number, b: number): boolean {
    const x = this.#costs[a] as number;
    const y = this.#costs[b] as number;
    return x < y || (x === y && (this.#states[a] as number) < (this.#states[b] as number));
  }

  #swap(a: number, b: number): void {
    for (const list of [this.#costs, this.#states]) {
      const held = list[a] as number;
      list[a] = list[b] as number;
      list[b] = held;
    }
  }
}
