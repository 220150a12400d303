import { wordsFor } from '../../base/bits.ts';
import type { Network } from '../../network/network.ts';
import { PathSolver } from '../paths/block.ts';
import type { EdgeSet } from '../paths/edges.ts';
import type { PathConditions } from '../paths/reach.ts';
import { sideLine } from './pressure-state.ts';

/** Why a line is under pressure at the start. `row` is the row before the move of `input`. */
export type HeldReason =
  | {
      readonly kind: 'load';
      readonly actuator: number;
      /** Pa, where one load alone presses. */ readonly pressure?: number;
    }
  | { readonly kind: 'stopped' }
  | { readonly kind: 'left behind'; readonly input: number; readonly from: number; readonly row: number }
  | { readonly kind: 'stored'; readonly accumulator: number }
  /** From another line that is open to it, or through a piston. */
  | { readonly kind: 'joined' };

/** What the running machine leaves in its lines, row by row. */
export class RunningRows {
  readonly net: Network;
  readonly #solver: PathSolver;
  readonly #words: number;
  readonly #blocks = new Map<number, ReturnType<PathSolver['solve']>>();
  readonly #strides: readonly number[];

  constructor(net: Network, edges: EdgeSet, conditions: PathConditions) {
    this.net = net;
    this.#solver = new PathSolver(net, edges, { ...conditions, pumpsRunning: true }, 1);
    this.#words = wordsFor(edges.states);
    this.#strides = stridesOf(net);
  }

  /** 1 = under pressure in this row while the pumps run. */
  under(row: number): Uint8Array {
    const { reach } = this.#block(row);
    const bit = row & 31;
    return Uint8Array.from(this.net.lines, (_, line) => ((reach.leaves[line] as number) >>> bit) & 1);
  }

  toTank(row: number): Uint8Array {
    const { reach } = this.#block(row);
    return Uint8Array.from(this.net.lines, (_, line) => ((reach.toTank[line] as number) >>> (row & 31)) & 1);
  }

  /** Moves of one lever that lead to this row, and what each leaves under pressure here. */
  leftBehind(row: number): { input: number; from: number; row: number; lines: Uint8Array }[] {
    const open = this.toTank(row);
    return this.net.inputs.flatMap(({ positions }, input) => {
      const stride = this.#strides[input] as number;
      const now = Math.floor(row / stride) % positions.length;
      return positions.flatMap((_, from) => {
        if (from === now) return [];
        const before = row + (from - now) * stride;
        const lines = this.under(before).map((on, line) => (open[line] === 1 ? 0 : on));
        return lines.includes(1) ? [{ input, from, row: before, lines }] : [];
      });
    });
  }

  #block(row: number): ReturnType<PathSolver['solve']> {
    const word = row >>> 5;
    if (row < 0 || word >= this.#words) throw new RangeError(`there is no row ${row + 1}`);
    const known = this.#blocks.get(word);
    if (known) return known;
    const made = this.#solver.solve(word, 1);
    this.#blocks.set(word, made);
    return made;
  }
}

/** Mixed radix: how far one step of each input moves the row; the last input is the fastest. */
export function stridesOf(net: Network): number[] {
  const out = new Array<number>(net.inputs.length);
  let stride = 1;
  for (let i = net.inputs.length - 1; i >= 0; i--) {
    out[i] = stride;
    stride *= net.inputs[i]?.positions.length ?? 1;
  }
  return out;
}

/** Pa that a load makes in the chamber that bears it: F/A, or torque over displacement. 0 where the size is not known. */
export function loadPressure(net: Network, side: number): number {
  const actuator = net.actuators[side >> 1];
  const area = side % 2 === 0 ? actuator?.areaA : actuator?.areaB;
  return actuator && area !== undefined && area > 0 && actuator.push.by === 'load' ? actuator.push.size / area : 0;
}

/** The reasons for pressure in one line of the start state. */
export function reasonsFor(
  net: Network,
  line: number,
  under: Uint8Array,
  left: readonly { input: number; from: number; row: number; lines: Uint8Array }[],
  pressed: Uint8Array,
  stores: Uint8Array,
): HeldReason[] {
  const sides = [...pressed.keys()].filter((side) => pressed[side] === 1 && sideLine(net, side) === line);
  const reasons: HeldReason[] = sides.map((side) => {
    const pressure = sides.length === 1 ? loadPressure(net, side) : 0;
    return { kind: 'load', actuator: side >> 1, ...(pressure > 0 && { pressure }) };
  });
  net.accumulators.forEach((store, accumulator) => {
    if (store.line === line && stores[accumulator] === 1) reasons.push({ kind: 'stored', accumulator });
  });
  if (under[line] === 1) reasons.push({ kind: 'stopped' });
  for (const { input, from, row, lines } of left)
    if (lines[line] === 1) reasons.push({ kind: 'left behind', input, from, row });
  return reasons.length > 0 ? reasons : [{ kind: 'joined' }];
}
