import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../../src/analysis/analyse.ts';
import { unlimited } from '../../../../src/base/budget.ts';
import { Diagrams } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { oneMoveFrom } from '../../../../src/engine/paths/diagrams/one-move.ts';
import { openPathSets } from '../../../../src/engine/paths/diagrams/open-paths.ts';
import { cubeSet } from '../../../../src/engine/table/fold/cube.ts';
import { pathOutcomes } from '../../../../src/engine/table/fold/outcome-sets.ts';
import { openPathSource } from '../../../../src/engine/table/rules/sources.ts';
import { StateTable } from '../../../../src/engine/table/state-table.ts';
import { tabulate } from '../../../../src/engine/table/tabulate.ts';
import { TRAP_REASONS } from '../../../../src/engine/table/words.ts';
import { randomCircuit } from '../../../random-circuit.ts';

test('one move of one lever, against all moves tried', () => {
  fc.assert(
    fc.property(fc.array(fc.tuple(fc.nat(1), fc.nat(2), fc.nat(2)), { maxLength: 8 }), (members) => {
      const sets = new Diagrams([2, 3, 3], { order: [2, 0, 1] });
      const set = members.reduce(
        (all, at) =>
          sets.or(
            all,
            cubeSet(
              sets,
              at.map((p) => 1 << p),
            ),
          ),
        0,
      );
      const found = oneMoveFrom(sets, set);
      for (let a = 0; a < 2; a++)
        for (let b = 0; b < 3; b++)
          for (let c = 0; c < 3; c++) {
            const moved = members.some((at) => [a, b, c].filter((p, i) => p !== at[i]).length === 1);
            expect(sets.has(found, [a, b, c])).toBe(moved);
          }
    }),
    { numRuns: 100, seed: 2 },
  );
});

test('the sets have the rows of the table, reason by reason', () => {
  const met = new Map<string, number>();
  fc.assert(
    fc.property(randomCircuit(4), fc.boolean(), (drawn, pumpsRunning) => {
      const net = networkOf(drawn);
      fc.pre(net.dependents.length === 0);
      const conditions = { pumpsRunning, places: net.actuators.map(() => 'between' as const) };
      const table = new StateTable(tabulate(net, conditions, unlimited, { pressureRows: 0, rowByRow: true }));
      const { sets, trapped } = pathOutcomes(net, conditions, openPathSets(net, conditions));
      table.data.lines.forEach((line, i) => {
        for (const { word, set } of trapped(i)) {
          let count = 0n;
          for (let row = 0; row < table.count; row++) {
            const holds = table.trapped(i, row).some((reason) => reason === word);
            if (holds) count += 1n;
            expect(sets.has(set, table.positionsOf(row)), `${word} of ${line.name} in row ${row + 1}`).toBe(holds);
          }
          expect(sets.count(set)).toBe(count);
          met.set(word, (met.get(word) ?? 0) + Number(count));
        }
      });
    }),
    { numRuns: 80, seed: 17 },
  );
  for (const reason of ['load', 'left behind', 'stopped', 'heat']) expect(met.get(reason) ?? 0).toBeGreaterThan(5);
});

test('rules are sure of nothing that a table with pressures denies, and rule nothing out that it has', () => {
  let sure = 0;
  fc.assert(
    fc.property(randomCircuit(3), fc.boolean(), (drawn, pumpsRunning) => {
      const net = networkOf(drawn);
      fc.pre(net.dependents.length === 0);
      const conditions = { pumpsRunning, places: net.actuators.map(() => 'between' as const) };
      const table = new StateTable(tabulate(net, conditions, unlimited, { pressureRows: 1000 }));
      const paths = openPathSets(net, conditions);
      const source = openPathSource(net, conditions, paths);
      table.data.lines.forEach((line, i) => {
        for (const reason of TRAP_REASONS) {
          const truth = source.trapped(i, [reason]);
          for (let row = 0; row < table.count; row++) {
            const at = table.positionsOf(row);
            const holds = table.trapped(i, row).includes(reason);
            const what = `${reason} of ${line.name} in row ${row + 1}`;
            if (paths.sets.has(truth.sure, at)) {
              sure += 1;
              expect(holds, what).toBe(true);
            }
            if (holds) expect(paths.sets.has(truth.maybe, at), what).toBe(true);
          }
        }
      });
    }),
    { numRuns: 40, seed: 17 },
  );
  expect(sure).toBeGreaterThan(20);
});
