import type { Budget } from '../../base/budget.ts';
import { Cancelled, unlimited } from '../../base/budget.ts';
import type { Network } from '../../network/network.ts';
import type { BleedModel } from './bleed-model.ts';
import { cautionsOf, weightOf } from './cautions.ts';
import type { Standing } from './cautions.ts';
import { LeversNeeded } from './levers-needed.ts';
import { keyOf } from './pressure-state.ts';
import type { Held } from './pressure-state.ts';

export interface BleedOptions {
  readonly budget?: Budget;
  /** Most states to look at. */
  readonly mostStates?: number;
}

const MOST_STATES = 60_000;
/** States that are looked at, once a shortest list is known, for one with less to be cautious of. */
const MOST_TIES = 8_000;
const CANCEL_EVERY = 256;

/** A state found by the search, and the move that led there. */
export interface Node extends Standing {
  depth: number;
  weight: number;
  from: Node | undefined;
  input: number;
  position: number;
  readonly left: number;
  /** Levers that have to be moved yet, at least. */
  readonly needed: number;
  queued: boolean;
}

export interface Found {
  readonly best: Node;
  /** No shorter list leaves as little, and none leaves less. */
  readonly proven: boolean;
  readonly states: number;
}

/** Shown lines that hold pressure. */
const shownHeld = (net: Network, { lines }: Held): number => {
  let count = 0;
  for (let line = 0; line < net.shown; line++) count += lines[line] as number;
  return count;
};

/** No list can leave fewer: lines that are held now and that nothing ever opens to tank. */
function leastPossible(model: BleedModel, { held }: Standing): number {
  const never = model.neverOpen();
  let count = 0;
  for (let line = 0; line < model.net.shown; line++) count += (held.lines[line] as number) & (never[line] as number);
  return count;
}

/**
 * The state with the fewest lines under pressure that moves of levers lead to from `first`, by the fewest moves, and
 * of these by those with the least to be cautious of. Where one round runs out of states, the next starts from the
 * best state so far: a list still, but the shortest only if no list could be shorter.
 */
export function searchMoves(
  model: BleedModel,
  first: Standing,
  { budget = unlimited, mostStates = MOST_STATES }: BleedOptions,
): Found {
  const least = leastPossible(model, first);
  const needed = new LeversNeeded(model);
  const root: Node = {
    ...first,
    depth: 0,
    weight: 0,
    from: undefined,
    input: -1,
    position: -1,
    left: shownHeld(model.net, first.held),
    needed: needed.count(first.row, first.held),
    queued: false,
  };
  let found = searchFrom(model, root, least, needed, budget, mostStates);
  let { proven, states } = found;
  for (let start = root; !found.proven && found.best.left < start.left;) {
    start = found.best;
    found = searchFrom(model, start, least, needed, budget, mostStates);
    states += found.states;
    proven = found.best.left <= least && found.best.depth <= root.needed;
  }
  return { best: found.best, proven, states };
}

/** Best first by moves made and moves needed yet, which never overrates (A*; Hart, Nilsson and Raphael 1968). */
function searchFrom(
  model: BleedModel,
  root: Node,
  least: number,
  needed: LeversNeeded,
  budget: Budget,
  mostStates: number,
): Found {
  const { net, strides } = model;
  const known = new Map<string, Node>([[keyOf(root.row, root.held), root]]);
  const queue = new Queue();
  queue.push(root);
  let best = root;
  let looked = 0;
  let ties = 0;
  const done = (): boolean => best.left <= least && queue.least() >= best.depth;
  while (!queue.empty()) {
    // A shortest list is known: go on only for one that asks for less caution.
    if (done() && (best.weight === 0 || queue.least() > best.depth || ties++ >= MOST_TIES)) break;
    if (known.size >= mostStates) break;
    if (looked++ % CANCEL_EVERY === 0) {
      if (budget.cancelled()) throw new Cancelled();
      budget.progress(Math.min(1, known.size / mostStates));
    }
    const node = queue.pop();
    if (node.left <= least) continue;
    const made: Node[] = [];
    net.inputs.forEach(({ positions }, input) => {
      const stride = strides[input] as number;
      const now = Math.floor(node.row / stride) % positions.length;
      for (let position = 0; position < positions.length; position++) {
        if (position === now) continue;
        const stand = model.stand(node.row + (position - now) * stride, node.held);
        const key = keyOf(stand.row, stand.held);
        const there = known.get(key);
        const depth = node.depth + 1;
        if (there && (there.depth < depth || (there.depth === depth && there.weight <= node.weight))) continue;
        const weight = node.weight + weightOf(cautionsOf(net, node, node.held, stand, input, position));
        const by = { depth, weight, from: node, input, position };
        if (there) {
          if (there.depth === depth && there.weight <= weight) continue;
          Object.assign(there, by);
          made.push(there);
          continue;
        }
        const left = shownHeld(net, stand.held);
        const fresh: Node = { ...stand, ...by, left, needed: needed.count(stand.row, stand.held), queued: false };
        known.set(key, fresh);
        made.push(fresh);
      }
    });
    for (const next of made) if (better(next, best)) best = next;
    // The last one pushed is the next one looked at: of those alike the first.
    made.reverse().sort((a, b) => b.weight - a.weight);
    for (const next of made) queue.push(next);
  }
  return { best, proven: done() || queue.empty(), states: known.size };
}

const better = (a: Node, b: Node): boolean =>
  a.left !== b.left ? a.left < b.left : a.depth !== b.depth ? a.depth < b.depth : a.weight < b.weight;

/** Nodes by moves in all, the deepest first. */
class Queue {
  readonly #buckets: Node[][][] = [];
  #count = 0;

  push(node: Node): void {
    const total = node.depth + node.needed;
    const bucket = (this.#buckets[total] ??= []);
    (bucket[node.depth] ??= []).push(node);
    node.queued = true;
    this.#count += 1;
  }

  empty(): boolean {
    this.#tidy();
    return this.#count === 0;
  }

  /** Moves in all of the next node; Infinity when there is none. */
  least(): number {
    this.#tidy();
    const at = this.#buckets.findIndex((bucket) => bucket?.some((list) => list.length > 0));
    return at < 0 ? Infinity : at;
  }

  pop(): Node {
    const node = this.#last()?.pop();
    if (!node) throw new Error('the queue is empty');
    this.#count -= 1;
    node.queued = false;
    return node;
  }

  #last(): Node[] | undefined {
    for (const bucket of this.#buckets) {
      const list = bucket?.findLast((nodes) => nodes !== undefined && nodes.length > 0);
      if (list) return list;
    }
    return undefined;
  }

  /** Drops what was pushed again, by a shorter or safer way, and looked at since. */
  #tidy(): void {
    for (let list = this.#last(); list && !isCurrent(list); list = this.#last()) {
      list.pop();
      this.#count -= 1;
    }
  }
}

const isCurrent = (list: readonly Node[]): boolean => list.at(-1)?.queued === true;
