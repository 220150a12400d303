import { emptySet, wordsFor } from '../../base/bits.ts';
import type { UnitSystem } from '../../base/units.ts';
import { hold, holdEach, MOST_HELD } from '../../network/hold.ts';
import type { Network } from '../../network/network.ts';
import { PathSolver } from '../paths/block.ts';
import { compileEdges } from '../paths/edges.ts';
import type { PathConditions } from '../paths/reach.ts';
import { Settlers, solveOne } from './one-state.ts';
import type { OneState } from './one-state.ts';
import type { Plane, TableData } from './table-data.ts';
import { LINE_CLASSES, TRAP_REASONS } from './words.ts';

/** The same circuit with one held lever in another position: its rows are one move away from those of the same number. */
export interface Beside {
  /** The move that leads here, in words. */
  readonly text: string;
  readonly at: (conditions: PathConditions, row: number, units: UnitSystem) => OneState;
}

/**
 * The states with levers held otherwise. `moved`: per move, where the held inputs then stand (always the same inputs),
 * and the move in words. All of them are positions of one more input, so that one search does for thirty.
 */
export function besidesOf(
  net: Network,
  moved: readonly { readonly held: readonly (number | undefined)[]; readonly text: string }[],
): Beside[] {
  if (net.dependents.length > 0) {
    return moved.map(({ held, text }) => {
      const one = hold(net, held);
      return { text, at: (conditions, row, units) => solveOne(one, conditions, row, undefined, units) };
    });
  }
  const out: Beside[] = [];
  for (let start = 0; start < moved.length; start += MOST_HELD) {
    const some = moved.slice(start, start + MOST_HELD);
    let settlers: Settlers | undefined;
    some.forEach(({ text }, k) => {
      const at: Beside['at'] = (conditions, row, units) => {
        const choices = some.map(({ held }) => held);
        settlers ??= new Settlers(holdEach(net, choices));
        return solveOne(settlers.net, conditions, row * some.length + k, settlers, units);
      };
      out.push({ text, at });
    });
  }
  return out;
}

const CUT_OFF = LINE_CLASSES.indexOf('cut off');
/** Words of states that are searched at once. */
const BLOCK = 128;
const LEFT_BEHIND = TRAP_REASONS.indexOf('left behind');

/**
 * Adds what moves of held levers leave behind to a table in which they are held: lines cut off here that were
 * under pressure one move before. `running`: the same table with the pumps running; `moved`: per move of a held
 * lever, where the held inputs of `net` then stand.
 */
export function withLeftBehind(
  data: TableData,
  running: TableData,
  net: Network,
  conditions: PathConditions,
  moved: readonly (readonly (number | undefined)[])[],
): TableData {
  const planes = data.lines.map((_, line) =>
    Uint32Array.from(data.trapPlanes[line]?.[LEFT_BEHIND] ?? emptySet(data.count)),
  );
  const where = { ...conditions, pumpsRunning: true };
  const before = net.dependents.length === 0 ? together(net, where, moved) : oneByOne(net, where, moved, data.count);
  before((row, under) => {
    const [word, bit] = [row >>> 5, 1 << (row & 31)];
    planes.forEach((plane, line) => {
      if (!under(line)) return;
      const shut = (data.linePlanes[line]?.[CUT_OFF]?.[word] ?? 0) & (running.linePlanes[line]?.[CUT_OFF]?.[word] ?? 0);
      plane[word] = (plane[word] ?? 0) | (shut & bit);
    });
  });
  return {
    ...data,
    trapPlanes: data.trapPlanes.map((reasons, line) =>
      reasons.map((plane, reason): Plane | undefined => (reason === LEFT_BEHIND ? planes[line] : plane)),
    ),
  };
}

/** Calls back with the row of the table and which lines are under pressure, for every state one move of a held lever away. */
type Before = (each: (row: number, under: (line: number) => boolean) => void) => void;

/** All moves as positions of one more input, 32 states to a word. */
const together =
  (net: Network, conditions: PathConditions, moved: readonly (readonly (number | undefined)[])[]): Before =>
  (each) => {
    for (let start = 0; start < moved.length; start += MOST_HELD) {
      const choices = moved.slice(start, start + MOST_HELD);
      const all = holdEach(net, choices);
      const count = all.inputs.reduce((n, input) => n * input.positions.length, 1);
      const words = wordsFor(count);
      const solver = new PathSolver(all, compileEdges(all), conditions, Math.min(BLOCK, words));
      for (let at = 0; at < words; at += BLOCK) {
        const width = Math.min(BLOCK, words - at);
        const { leaves } = solver.solve(at, width).reach;
        for (let state = 32 * at; state < Math.min(count, 32 * (at + width)); state++) {
          const [word, bit] = [(state >>> 5) - at, state & 31];
          each(Math.floor(state / choices.length), (line) => (((leaves[line * width + word] ?? 0) >>> bit) & 1) === 1);
        }
      }
    }
  };

/** State by state, since pressures decide where dependent valves stand. */
const oneByOne =
  (
    net: Network,
    conditions: PathConditions,
    moved: readonly (readonly (number | undefined)[])[],
    count: number,
  ): Before =>
  (each) => {
    for (const held of moved) {
      const one = hold(net, held);
      const settlers = new Settlers(one);
      for (let row = 0; row < count; row++) {
        const state = solveOne(one, conditions, row, settlers);
        each(row, (line) => state.on(state.block.reach.leaves, line));
      }
    }
  };
