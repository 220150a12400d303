import { settle } from './pressure-state.ts';
import type { BleedModel } from './bleed-model.ts';
import { cautionsOf } from './cautions.ts';
import type { MoveCaution } from './cautions.ts';
import { RowPathsCache } from './row-paths.ts';

/** What the loss of the control voltage does to valves and lines; levers stay where they are. */
export interface PowerLossRows {
  readonly before: number;
  /** The row after it: every valve with coils at its rest position, those with detents where they were. */
  readonly after: number;
  /** Inputs that went to rest. */
  readonly returned: readonly number[];
  /** Shown lines under pressure once all has come to rest, the pumps running on or stopped. */
  readonly running: readonly number[];
  readonly stopped: readonly number[];
  /** What comes down, is driven by stored oil or runs empty when the pumps stop too. */
  readonly stopping: readonly MoveCaution[];
  /** The same where the pumps stop and the coils stay on. */
  readonly alone: readonly number[];
  readonly stoppingAlone: readonly MoveCaution[];
}

/** Coil valves go to rest, levers stay. Throws a RangeError for a row (0-based) that does not exist. */
export function loseCoils(model: BleedModel, running: RowPathsCache, row: number): PowerLossRows {
  const { net, links, strides, states } = model;
  if (!Number.isInteger(row) || row < 0 || row >= states) throw new RangeError(`there is no row ${row + 1}`);
  const returned: number[] = [];
  let after = row;
  net.inputs.forEach(({ positions, rest, by }, input) => {
    const stride = strides[input] as number;
    const now = Math.floor(row / stride) % positions.length;
    if (by !== 'coil' || rest === undefined || rest === now) return;
    after += (rest - now) * stride;
    returned.push(input);
  });
  const initial = model.before(row);
  const under = model.running.under(after);
  const on = settle(net, links, running.at(after), initial, under);
  const off = model.stand(after, initial);
  const alone = model.stand(row, initial);
  const shown = (lines: Uint8Array): number[] =>
    Array.from({ length: net.shown }, (_, line) => line).filter((line) => lines[line] === 1);
  return {
    before: row,
    after,
    returned,
    running: shown(on.lines.map((held, line) => held | (under[line] as number))),
    stopped: shown(off.held.lines),
    stopping: cautionsOf(net, undefined, initial, off, -1, -1),
    alone: shown(alone.held.lines),
    stoppingAlone: cautionsOf(net, undefined, initial, alone, -1, -1),
  };
}

/** The open paths of every row with the pumps running. */
export const runningPaths = (model: BleedModel): RowPathsCache =>
  new RowPathsCache(model.net, model.runningEdges, true);
