import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../../src/analysis/analyse.ts';
import { unlimited } from '../../../../src/base/budget.ts';
import { Diagrams } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { motionSets } from '../../../../src/engine/paths/diagrams/motion-sets.ts';
import { openPathSets } from '../../../../src/engine/paths/diagrams/open-paths.ts';
import { cubeSet } from '../../../../src/engine/table/fold/cube.ts';
import { oneMoveFrom, sealedSets } from '../../../../src/engine/table/rules/sealed-sets.ts';
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

test('what open paths are sure of is in the table, and what the table says they do not rule out', () => {
  let sure = 0;
  fc.assert(
    fc.property(randomCircuit(3), fc.boolean(), (drawn, pumpsRunning) => {
      const net = networkOf(drawn);
      const conditions = { pumpsRunning, places: net.actuators.map(() => 'between' as const) };
      const table = new StateTable(tabulate(net, conditions, unlimited, { pressureRows: 0 }));
      const paths = openPathSets(net, conditions);
      const sealed = sealedSets(net, conditions, paths, () => motionSets(net, conditions, paths));
      table.data.lines.forEach((line, i) => {
        const compare = (
          name: string,
          truth: { sure: number; maybe: number },
          holds: (row: number) => boolean,
        ): void => {
          for (let row = 0; row < table.count; row++) {
            const at = table.positionsOf(row);
            const what = `${name} of ${line.name} in row ${row + 1}`;
            if (paths.sets.has(truth.sure, at)) {
              sure += 1;
              expect(holds(row), what).toBe(true);
            }
            if (holds(row)) expect(paths.sets.has(truth.maybe, at), what).toBe(true);
          }
        };
        for (const reason of TRAP_REASONS)
          compare(reason, sealed.trapped(i, [reason]), (row) => table.trapped(i, row).includes(reason));
      });
    }),
    { numRuns: 50, seed: 17 },
  );
  expect(sure).toBeGreaterThan(20);
});
