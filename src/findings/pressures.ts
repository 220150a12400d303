import type { Network } from '../network/network.ts';
import { PressureSolver } from '../engine/table/resolve.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import type { Evidence } from './finding.ts';

/** Rows whose pressures are computed for findings; a longer table is looked at in its first ones and at rest. */
const MOST_ROWS = 600;

/** Steady pressures of a table's rows, with the pumps running and every actuator between its stops. */
export interface Pressures {
  /** Solved rows, 0-based, and for each the pressure of every line, Pa. */
  readonly rows: readonly number[];
  readonly of: readonly Float64Array[];
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
  const rest = table.restRow();
  const wanted = Array.from({ length: Math.min(table.count, MOST_ROWS) }, (_, row) => row);
  if (rest >= wanted.length) wanted.push(rest);
  for (const row of wanted) {
    const { result } = solver.solve(row, false);
    if (result.status !== 'solved') continue;
    rows.push(row);
    of.push(Float64Array.from(net.lines, (_, line) => solver.pressure(result, line)));
  }
  const found: Pressures = { rows, of, source: highestSource(net) };
  known.set(table, found);
  return found;
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
