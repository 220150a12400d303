import type { Network } from '../../network/network.ts';
import { BleedModel } from './bleed-model.ts';
import { searchMoves } from './bleed-search.ts';
import type { BleedOptions, Node } from './bleed-search.ts';
import { reasonsFor } from './bleed-start.ts';
import type { HeldReason } from './bleed-start.ts';
import { cautionsOf } from './cautions.ts';
import type { MoveCaution } from './cautions.ts';
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
    const { best, proven } = searchMoves(open, first, options);
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

/**
 * The shortest list of lever moves after which no shown line holds pressure, the pumps being stopped in
 * `row` (0-based); among equally short ones that with the least to be cautious of, as far as they are looked at. Where no list does it,
 * the shortest of those that leave the fewest lines. A move counts on the position that it ends in, and
 * never on those that it passes. Throws `Cancelled`, and a RangeError for a row that does not exist.
 */
export function planBleed(model: BleedModel, row: number, options: BleedOptions = {}): BleedPlan {
  const { net } = model;
  if (!Number.isInteger(row) || row < 0 || row >= model.states) throw new RangeError(`there is no row ${row + 1}`);
  const initial = model.before(row);
  const first = model.stand(row, initial);
  const found = searchMoves(model, first, options);
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
