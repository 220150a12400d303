import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../src/analysis/analyse.ts';
import { unlimited } from '../../../src/base/budget.ts';
import { LateSolver } from '../../../src/engine/table/late-rows.ts';
import type { LateRows } from '../../../src/engine/table/late-rows.ts';
import { StateTable } from '../../../src/engine/table/state-table.ts';
import { tabulate } from '../../../src/engine/table/tabulate.ts';
import type { Network } from '../../../src/network/network.ts';
import { family } from '../../bench/circuits.ts';
import { randomCircuit } from '../../random-circuit.ts';

/** All that a row says. */
function said(table: StateTable, row: number): unknown {
  const { data } = table;
  return {
    actuators: data.actuators.map((_, i) => [
      table.actuator(i, row),
      table.actuatorNotes(i, row),
      table.actuatorRests(i, row),
      table.actuatorOnValues(i, row),
    ]),
    pumps: data.pumps.map((_, i) => [table.pump(i, row), table.pumpOnValues(i, row)]),
    lines: data.lines.map((_, i) => [table.line(i, row), table.blocked(i, row), table.trapped(i, row)]),
  };
}

interface Both {
  readonly early: StateTable;
  readonly whole: StateTable;
  readonly ahead: (rows: readonly number[]) => StateTable;
}

/** The table of open paths, the whole one, and the first with rows asked for ahead. */
function both(net: Network, pumpsRunning: boolean): Both {
  const where = { pumpsRunning, places: net.actuators.map(() => 'between' as const) };
  const early = tabulate(net, where, unlimited, { pressureRows: 0 });
  const whole = tabulate(net, where, unlimited, { pressureRows: 100_000 });
  const solver = new LateSolver(net, where, true);
  const known = new Map<number, LateRows>();
  return {
    early: new StateTable(early),
    whole: new StateTable(whole),
    ahead: (rows) => {
      for (const late of solver.solve(rows)) for (const row of rows) if (row >>> 5 === late.word) known.set(row, late);
      return new StateTable(early, { of: (row) => known.get(row) });
    },
  };
}

test(
  'rows that are asked for ahead say what the whole table says, in any order, on random circuits',
  { timeout: 60_000 },
  () => {
    let changed = 0;
    fc.assert(
      fc.property(
        randomCircuit(4, 14),
        fc.boolean(),
        fc.array(fc.nat(), { minLength: 1, maxLength: 8 }),
        (drawn, running, picks) => {
          const net = networkOf(drawn);
          if (net.dependents.length > 0) return;
          const { early, whole, ahead } = both(net, running);
          const rows = picks.map((pick) => pick % whole.count);
          const table = ahead(rows);
          for (const row of rows) {
            expect(said(table, row), `row ${row}`).toEqual(said(whole, row));
            if (JSON.stringify(said(early, row)) !== JSON.stringify(said(whole, row))) changed += 1;
          }
          // Rows that nobody asked for are as open paths have left them.
          const other = Array.from({ length: whole.count }, (_, row) => row).find((row) => !rows.includes(row));
          if (other !== undefined) expect(said(table, other)).toEqual(said(early, other));
        },
      ),
      { numRuns: 150, seed: 20 },
    );
    expect(changed).toBeGreaterThan(40);
  },
);

test('the same for every row of four mixed valves, some rows at a time from the end', () => {
  const { whole, ahead } = both(networkOf(family('MIX', 4)), true);
  let table: StateTable | undefined;
  for (let last = whole.count; last > 0; last -= 7)
    table = ahead(Array.from({ length: Math.min(7, last) }, (_, i) => last - 1 - i));
  for (let row = 0; row < whole.count; row++) expect(said(table as StateTable, row)).toEqual(said(whole, row));
});
