import type { Point } from '../base/points.ts';
import type { Field } from './route-field.ts';
import { FLAG, lowerBound } from './route-field.ts';

/** Directions by index: right, down, left, up. Opposite = index + 2. */
export type Direction = 0 | 1 | 2 | 3;
export const opposite = (d: Direction): Direction => ((d + 2) % 4) as Direction;

/** What a route pays, in modules of length. A line through a part is the last resort. */
const COST = {
  bend: 6,
  joinedBend: 3,
  cross: 3,
  corner: 25,
  foreign: 40,
  margin: 4,
  box: 600,
  letter: 18,
  own: 0.7,
  atEnd: 1.5,
  offMiddle: 0.01,
} as const;
/** Among equal estimates the nearer to the goal goes first. */
const EAGER = 1 + 1e-7;

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
    const dy = leg.to.y - (ys[(node / width) | 0] as number);
    return ((Math.abs(dx) + Math.abs(dy)) * perModule + leastBends(dx, dy, heading, leg.arrive) * perBend) * EAGER;
  };
  // Bends right at a port crowd its letter and marks; of equal jogs the middle one reads best.
  const fromPort = leg.headings.length === 1 ? COST.atEnd : 0;
  const middle = { x: Math.round((leg.from.x + leg.to.x) / 2), y: Math.round((leg.from.y + leg.to.y) / 2) };
  const offMiddle = (node: number, way: Direction): number =>
    COST.offMiddle *
    Math.abs(way % 2 === 0 ? (ys[(node / width) | 0] as number) - middle.y : (xs[node % width] as number) - middle.x);
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
      const last =
        leg.arrive === undefined || leg.arrive === heading
          ? 0
          : leg.arrive === opposite(heading)
            ? Infinity
            : COST.bend + COST.atEnd;
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
      const turning = way === heading ? 0 : turnCost(field, node) + (node === start ? fromPort : offMiddle(node, way));
      const total = cost + turning + stepCost(field, node, next, way);
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
    points.push({ x: xs[node % width] as number, y: ys[(node / width) | 0] as number });
  }
  return { points: points.reverse(), heading: (reached & 3) as Direction, cost: reachedCost };
}

/** Fewest turns to the goal at (dx, dy), the turn into `arrive` on the goal counted; never too many. */
export function leastBends(dx: number, dy: number, heading: Direction, arrive: Direction | undefined): number {
  const flat = heading % 2 === 0;
  const ahead = (flat ? dx : dy) * (heading < 2 ? 1 : -1);
  const beside = flat ? dy : dx;
  const turnsTo = (want: Direction): number => {
    if (want === heading) return beside === 0 && ahead >= 0 ? 0 : beside !== 0 && ahead >= 0 ? 2 : 4;
    if (want === opposite(heading)) return beside !== 0 ? 2 : ahead === 0 ? 2 : 4;
    if (beside === 0) return ahead >= 0 ? 1 : 3;
    const towards = (want < 2 ? 1 : -1) * beside > 0;
    return towards && ahead >= 0 ? 1 : 3;
  };
  if (arrive !== undefined) return turnsTo(arrive);
  if (beside === 0) return ahead >= 0 ? 0 : 3;
  return ahead >= 0 ? 1 : 2;
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

function turnCost(field: Field, node: number): number {
  const flags = field.nodes[node] as number;
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
    : Math.abs((field.ys[(next / width) | 0] as number) - (field.ys[(node / width) | 0] as number));
  let cost = length * ((flags & FLAG.own) !== 0 ? COST.own : 1);
  if ((flags & FLAG.box) !== 0) cost += COST.box;
  else if ((flags & FLAG.margin) !== 0) cost += COST.margin * length;
  if ((flags & FLAG.letter) !== 0) cost += COST.letter;
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
    const costs = this.#costs;
    const states = this.#states;
    let at = costs.length;
    costs.push(cost);
    states.push(state);
    while (at > 0) {
      const up = (at - 1) >> 1;
      const other = costs[up] as number;
      if (other < cost || (other === cost && (states[up] as number) <= state)) break;
      costs[at] = other;
      states[at] = states[up] as number;
      at = up;
    }
    costs[at] = cost;
    states[at] = state;
  }

  /** −1 when empty. */
  pop(): number {
    const costs = this.#costs;
    const states = this.#states;
    if (states.length === 0) return -1;
    const top = states[0] as number;
    const cost = costs.pop() as number;
    const state = states.pop() as number;
    const size = states.length;
    if (size === 0) return top;
    let at = 0;
    for (let down = 1; down < size; down = 2 * at + 1) {
      if (down + 1 < size && before(costs, states, down + 1, down)) down++;
      const other = costs[down] as number;
      if (cost < other || (cost === other && state < (states[down] as number))) break;
      costs[at] = other;
      states[at] = states[down] as number;
      at = down;
    }
    costs[at] = cost;
    states[at] = state;
    return top;
  }
}

function before(costs: readonly number[], states: readonly number[], a: number, b: number): boolean {
  const x = costs[a] as number;
  const y = costs[b] as number;
  return x < y || (x === y && (states[a] as number) < (states[b] as number));
}
