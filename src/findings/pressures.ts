import { has, members } from '../base/bits.ts';
import type { Network } from '../network/network.ts';
import { PressureSolver } from '../engine/table/resolve.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import { spreadOver } from './evidence.ts';
import type { Evidence } from './finding.ts';

/** Rows of a table that is looked at as a whole; each costs a solve. */
const ALL_ROWS = 1000;
/** Rows that a longer one is looked at in. */
const SOME_ROWS = 160;

/** Steady pressures of a table's rows, with the pumps running and every actuator between its stops. */
export interface Pressures {
  /** Solved rows, 0-based, and for each the pressure of every line, Pa. */
  readonly rows: readonly number[];
  readonly of: readonly Float64Array[];
  /** Rows looked at, those without a steady state included. */
  readonly looked: number;
  /** Pa: the highest at which a pump or accumulator can stand. */
  readonly source: number;
}

const known = new WeakMap<StateTable, Pressures>();

export function pressuresOf({ net, table }: Evidence): Pressures {
  const before = known.get(table);
  if (before) return before;
  const places = net.actuators.map(() => 'between' as const);
  const solver = new PressureSolver(net, { pumpsRunning: true, places }, table.data.dependentPlanes);
  const rows: number[] = [];
  const of: Float64Array[] = [];
  const looked =
    table.count <= ALL_ROWS ? Array.from({ length: table.count }, (_, row) => row) : telling(table, SOME_ROWS);
  for (const row of looked) {
    const { result } = solver.solve(row);
    if (result.status !== 'solved') continue;
    rows.push(row);
    of.push(Float64Array.from(net.lines, (_, line) => solver.pressure(result, line)));
  }
  const found: Pressures = { rows, of, looked: looked.length, source: highestSource(net) };
  known.set(table, found);
  return found;
}

/**
 * Rows of a long table in which a pressure is likely to be high: rest, every single lever moved from it, a row for
 * each verdict and line class that occurs at all, two levers moved from rest, and some others spread over the table.
 * Neighbours follow each other, since each solve starts from the one before.
 */
export function telling(table: StateTable, most: number): number[] {
  const taken = new Set<number>();
  const take = (row: number): void => {
    if (taken.size < most) taken.add(row);
  };
  const { data } = table;
  const rest = table.positionsOf(table.restRow());
  take(table.rowOf(rest));
  const moves = data.inputs.flatMap(({ positions }, input) =>
    positions.flatMap((_, to) => (to === rest[input] ? [] : [{ input, to }])),
  );
  const moved = (...some: readonly { readonly input: number; readonly to: number }[]): number =>
    table.rowOf(rest.map((at, i) => some.find(({ input }) => input === i)?.to ?? at));
  for (const move of moves) take(moved(move));
  for (const list of [data.actuatorPlanes, data.pumpPlanes, data.linePlanes]) {
    for (const plane of list.flat()) {
      if (!plane || [...taken].some((row) => has(plane, row))) continue;
      for (const row of members(plane)) {
        take(row);
        break;
      }
    }
  }
  const pairs = moves.flatMap((one, i) =>
    moves.slice(i + 1).flatMap((two) => (two.input === one.input ? [] : [[one, two] as const])),
  );
  const room = Math.floor(((most - taken.size) * 3) / 4);
  for (const k of spreadOver(pairs.length, room)) take(moved(...(pairs[k] ?? [])));
  for (const row of spreadOver(table.count, most - taken.size)) take(row);
  return [...taken];
}

/** What relief valves, compensators and stores allow, with the rise of a relief valve at the flow of all pumps. */
function highestSource(net: Network): number {
  const flow = net.pumps.reduce((sum, pump) => sum + pump.flow, 0);
  return Math.max(
    0,
    ...net.reliefs.map(({ setting, override }) => setting + override * flow),
    ...net.pumps.map(({ setting }) => setting),
    ...net.accumulators.map(({ charged, pressure }) => (charged ? pressure : 0)),
  );
}
