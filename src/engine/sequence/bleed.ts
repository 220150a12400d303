import type { Budget } from '../../base/budget.ts';
import { Cancelled, unlimited } from '../../base/budget.ts';
import type { Network } from '../../network/network.ts';
import { BleedModel } from './bleed-model.ts';
import { reasonsFor } from './bleed-start.ts';
import type { HeldReason } from './bleed-start.ts';
import { cautionsOf, weightOf } from './cautions.ts';
import type { MoveCaution, Standing } from './cautions.ts';
import { keyOf } from './pressure-state.ts';
import type { Held } from './pressure-state.ts';

/** One move of one lever; rows and lines by their index. */
export interface BleedMove {
  readonly input: number;
  readonly from: number;
  readonly to: number;
  /** The row that it leads to. */
  readonly row: number;
  readonly cautions: readonly MoveCaution[];
  /** Shown lines that this move lets down to tank. */
  readonly vents: readonly number[];
  /** Shown lines that hold pressure after it. */
  readonly held: readonly number[];
}

export interface BleedPlan {
  readonly row: number;
  /** Shown lines under pressure once the pumps have stopped, with the reasons. */
  readonly start: readonly { readonly line: number; readonly reasons: readonly HeldReason[] }[];
  /** What moves or empties when the pumps stop, before any lever is touched. */
  readonly stopping: readonly MoveCaution[];
  readonly moves: readonly BleedMove[];
  /** Shown lines still under pressure after the list; `never`: no position of any lever opens it to tank. */
  readonly left: readonly { readonly line: number; readonly never: boolean }[];
  /** False: the search ran out of states, so a shorter list, or one that leaves less, may exist. */
  readonly proven: boolean;
  /** States looked at. */
  readonly states: number;
}

export interface BleedOptions {
  readonly budget?: Budget;
  /** Most states to look at. */
  readonly mostStates?: number;
}

const MOST_STATES = 60_000;
const CANCEL_EVERY = 256;

/** A state found by the search, and the move that led there. */
interface Node extends Standing {
  readonly depth: number;
  weight: number;
  from: Node | undefined;
  input: number;
  position: number;
  readonly left: number;
}

/** The plan again with bleed valves standing open, where the levers alone leave pressure. */
export interface PointPlan {
  /** Shown lines on which a bleed valve is opened first. */
  readonly points: readonly number[];
  /** What moves or empties when they are opened. */
  readonly opening: readonly MoveCaution[];
  /** Shown lines that still hold pressure then. */
  readonly held: readonly number[];
  readonly moves: readonly BleedMove[];
  readonly left: BleedPlan['left'];
  readonly proven: boolean;
}

/**
 * What the levers do once bleed valves stand open on the lines that no lever opens to tank; if pressure
 * is left even so, also on the lines that it is left in. Undefined where the levers do it alone.
 */
export function planWithPoints(model: BleedModel, plan: BleedPlan, options: BleedOptions = {}): PointPlan | undefined {
  if (plan.left.length === 0) return undefined;
  const { net } = model;
  const never = model.neverOpen();
  const unopened = plan.start.map(({ line }) => line).filter((line) => never[line] === 1);
  const stood = model.stand(plan.row, model.before(plan.row));
  const planWith = (wanted: readonly number[]): PointPlan => {
    const points = [...new Set(wanted)].sort((a, b) => a - b);
    const open = new BleedModel(net, model.conditions, points, model.settings);
    const first = open.stand(plan.row, stood.held);
    const { best, proven } = search(open, rootOf(net, first), options);
    return {
      points,
      opening: cautionsOf(net, undefined, stood.held, first, -1, -1),
      held: listHeld(net, first.held),
      moves: movesTo(open, best),
      left: leftLines(open, best.held),
      proven,
    };
  };
  const some = unopened.length > 0 ? planWith(unopened) : undefined;
  if (some?.left.length === 0) return some;
  return planWith([...unopened, ...plan.left.map(({ line }) => line), ...(some?.left ?? []).map(({ line }) => line)]);
}

const rootOf = (net: Network, first: Standing): Node => ({
  ...first,
  depth: 0,
  weight: 0,
  from: undefined,
  input: -1,
  position: -1,
  left: shownHeld(net, first.held),
});

/**
 * The shortest list of lever moves after which no shown line holds pressure, the pumps being stopped in
 * `row` (0-based); among equally short ones that with the least to be cautious of. Where no list does it,
 * the shortest of those that leave the fewest lines. A move counts on the position that it ends in, and
 * never on those that it passes. Throws `Cancelled`, and a RangeError for a row that does not exist.
 */
export function planBleed(model: BleedModel, row: number, options: BleedOptions = {}): BleedPlan {
  const { net } = model;
  if (!Number.isInteger(row) || row < 0 || row >= model.states) throw new RangeError(`there is no row ${row + 1}`);
  const initial = model.before(row);
  const first = model.stand(row, initial);
  const root = rootOf(net, first);
  const found = search(model, root, options);
  const moves = movesTo(model, found.best);
  return {
    row,
    start: startLines(model, row, first.held),
    stopping: cautionsOf(net, undefined, initial, first, -1, -1),
    moves,
    left: leftLines(model, found.best.held),
    proven: found.proven,
    states: found.states,
  };
}

interface Found {
  readonly best: Node;
  readonly proven: boolean;
  readonly states: number;
}

/** Where one round runs out of states, the next starts from the best state so far: a list still, but not shown to be the shortest. */
function search(model: BleedModel, root: Node, { budget = unlimited, mostStates = MOST_STATES }: BleedOptions): Found {
  const least = leastPossible(model, root);
  let found = searchFrom(model, root, least, budget, mostStates);
  let { states } = found;
  let { proven } = found;
  for (let start = root; !found.proven && found.best.left < start.left;) {
    start = found.best;
    found = searchFrom(model, start, least, budget, mostStates);
    states += found.states;
    proven = false;
  }
  return { best: found.best, proven, states };
}

function searchFrom(model: BleedModel, root: Node, least: number, budget: Budget, mostStates: number): Found {
  const { net, strides } = model;
  const known = new Map<string, Node>([[keyOf(root.row, root.held), root]]);
  let best = root;
  let level: Node[] = [root];
  let looked = 0;
  while (level.length > 0 && best.left > least && known.size < mostStates) {
    const next: Node[] = [];
    const visit = (node: Node, input: number, now: number, position: number): void => {
      const stand = model.stand(node.row + (position - now) * (strides[input] as number), node.held);
      const key = keyOf(stand.row, stand.held);
      const there = known.get(key);
      if (there && (there.depth <= node.depth || there.weight <= node.weight)) return;
      const weight = node.weight + weightOf(cautionsOf(net, node, node.held, stand, input, position));
      const by = { weight, from: node, input, position };
      if (there) {
        if (weight < there.weight) Object.assign(there, by);
        return;
      }
      const made: Node = { ...stand, ...by, depth: node.depth + 1, left: shownHeld(net, stand.held) };
      known.set(key, made);
      next.push(made);
    };
    for (const node of level) {
      if (looked++ % CANCEL_EVERY === 0) {
        if (budget.cancelled()) throw new Cancelled();
        budget.progress(Math.min(1, known.size / mostStates));
      }
      if (known.size >= mostStates) break;
      net.inputs.forEach(({ positions }, input) => {
        const now = Math.floor(node.row / (strides[input] as number)) % positions.length;
        for (let p = 0; p < positions.length; p++) if (p !== now) visit(node, input, now, p);
      });
    }
    for (const node of next) {
      if (node.left < best.left || (node.left === best.left && node.depth === best.depth && node.weight < best.weight))
        best = node;
    }
    level = next;
  }
  return { best, proven: best.left <= least || known.size < mostStates, states: known.size };
}

/** No list can leave fewer: lines that are held now and that nothing ever opens to tank. */
function leastPossible(model: BleedModel, { held }: Node): number {
  const never = model.neverOpen();
  let count = 0;
  for (let line = 0; line < model.net.shown; line++) count += (held.lines[line] as number) & (never[line] as number);
  return count;
}

const shownHeld = (net: Network, { lines }: Held): number => {
  let count = 0;
  for (let line = 0; line < net.shown; line++) count += lines[line] as number;
  return count;
};

const listHeld = (net: Network, { lines }: Held): number[] =>
  Array.from({ length: net.shown }, (_, line) => line).filter((line) => lines[line] === 1);

function movesTo(model: BleedModel, end: Node): BleedMove[] {
  const { net, strides } = model;
  const chain: Node[] = [];
  for (let node: Node | undefined = end; node?.from; node = node.from) chain.unshift(node);
  return chain.map((node): BleedMove => {
    const before = node.from as Node;
    const from =
      Math.floor(before.row / (strides[node.input] as number)) % (net.inputs[node.input]?.positions.length ?? 1);
    return {
      input: node.input,
      from,
      to: node.position,
      row: node.row,
      cautions: cautionsOf(net, before, before.held, node, node.input, node.position),
      vents: listHeld(net, before.held).filter((line) => node.held.lines[line] === 0),
      held: listHeld(net, node.held),
    };
  });
}

function startLines(model: BleedModel, row: number, held: Held): BleedPlan['start'] {
  const under = model.running.under(row);
  const left = model.running.leftBehind(row);
  return listHeld(model.net, held).map((line) => ({
    line,
    reasons: reasonsFor(model.net, line, under, left, held.pressed, held.stores),
  }));
}

function leftLines(model: BleedModel, held: Held): BleedPlan['left'] {
  const never = model.neverOpen();
  return listHeld(model.net, held).map((line) => ({ line, never: never[line] === 1 }));
}
