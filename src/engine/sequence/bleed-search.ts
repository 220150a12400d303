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

const MOST_STATES = 30_000;
/** States that are looked at, once a shortest list is known, for one with less to be cautious of. */
const MOST_TIES = 1_000;
/** States that one step of a list made step by step may cost. */
const MOST_CLIMB = 4_000;
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
 * of these by those with the least to be cautious of. First a list is made step by step, each step the shortest that
 * lets some line down; then the shortest is looked for. Where that runs out of states, the better of both is taken,
 * and it is proven only if no list could be shorter.
 */
export function searchMoves(
  model: BleedModel,
  first: Standing,
  { budget = unlimited, mostStates = MOST_STATES }: BleedOptions,
): Found {
  const least = leastPossible(model, first);
  const search = new Search(model, budget, mostStates);
  const root = search.node(first, { depth: 0, weight: 0, from: undefined, input: -1, position: -1 });
  const list = search.climb(root, least);
  const found = search.best(root, least, list);
  return { ...found, proven: found.proven || (found.best.left <= least && found.best.depth <= root.needed) };
}

type Step = Pick<Node, 'depth' | 'weight' | 'from' | 'input' | 'position'>;

class Search {
  readonly #model: BleedModel;
  readonly #needed: LeversNeeded;
  readonly #budget: Budget;
  readonly #mostStates: number;
  #looked = 0;
  #states = 0;

  constructor(model: BleedModel, budget: Budget, mostStates: number) {
    this.#model = model;
    this.#needed = new LeversNeeded(model);
    this.#budget = budget;
    this.#mostStates = mostStates;
  }

  node(stand: Standing, step: Step): Node {
    const left = shownHeld(this.#model.net, stand.held);
    const needed = this.#needed.count(stand.row, stand.held);
    this.#states += 1;
    return { ...stand, ...step, left, needed, queued: false };
  }

  /** Step by step down to as few lines as that leads to, each step by the fewest moves. */
  climb(root: Node, least: number): Node {
    let at = root;
    while (at.left > least) {
      const next = this.#nearestBelow(at);
      if (!next) break;
      at = next;
    }
    return at;
  }

  #nearestBelow(start: Node): Node | undefined {
    const known = new Map([[keyOf(start.row, start.held), start]]);
    const until = this.#states + MOST_CLIMB;
    for (let level = [start]; level.length > 0 && this.#states < until;) {
      const next: Node[] = [];
      for (const node of level) {
        if (this.#states < until) next.push(...this.#expand(node, known));
      }
      // Of those alike the first whose load comes down: it has to at some time, and then no longer hangs over the rest.
      const lowest = next.toSorted((a, b) => a.left - b.left || b.weight - a.weight)[0];
      if (lowest && lowest.left < start.left) return lowest;
      level = next;
    }
    return undefined;
  }

  /** Best first by moves made and moves needed yet, which never overrates (A*; Hart, Nilsson and Raphael 1968). */
  best(root: Node, least: number, list: Node): Found {
    const known = new Map<string, Node>([[keyOf(root.row, root.held), root]]);
    const queue = new Queue();
    queue.push(root);
    let best = list;
    let ties = 0;
    const done = (): boolean => best.left <= least && queue.least() >= best.depth;
    while (!queue.empty()) {
      // A shortest list is known: go on only for one that asks for less caution.
      if (done() && (best.weight === 0 || queue.least() > best.depth || ties++ >= MOST_TIES)) break;
      if (known.size >= this.#mostStates) break;
      const node = queue.pop();
      if (node.left <= least) continue;
      const made = this.#expand(node, known);
      for (const next of made) if (better(next, best)) best = next;
      // The last one pushed is the next one looked at: of those alike the first.
      made.reverse().sort((a, b) => b.weight - a.weight);
      const longest = best.left <= least ? best.depth : Infinity;
      for (const next of made) if (next.depth + next.needed <= longest) queue.push(next);
    }
    return { best, proven: done() || queue.empty(), states: this.#states };
  }

  /** What one move leads to, where nothing shorter or safer was known; entered in `known`. */
  #expand(node: Node, known: Map<string, Node>): Node[] {
    const { net, strides } = this.#model;
    if (this.#looked++ % CANCEL_EVERY === 0) {
      if (this.#budget.cancelled()) throw new Cancelled();
      this.#budget.progress(Math.min(1, known.size / this.#mostStates));
    }
    const made: Node[] = [];
    net.inputs.forEach(({ positions }, input) => {
      const stride = strides[input] as number;
      const now = Math.floor(node.row / stride) % positions.length;
      for (let position = 0; position < positions.length; position++) {
        if (position === now) continue;
        const stand = this.#model.stand(node.row + (position - now) * stride, node.held);
        const key = keyOf(stand.row, stand.held);
        const there = known.get(key);
        const depth = node.depth + 1;
        if (there && (there.depth < depth || (there.depth === depth && there.weight <= node.weight))) continue;
        const weight = node.weight + weightOf(cautionsOf(net, node, node.held, stand, input, position));
        if (there && there.depth === depth && there.weight <= weight) continue;
        const step = { depth, weight, from: node, input, position };
        const fresh = there ? Object.assign(there, step) : this.node(stand, step);
        known.set(key, fresh);
        made.push(fresh);
      }
    });
    return made;
  }
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
