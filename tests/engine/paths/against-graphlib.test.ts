import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf, tabulate, explainRow } from '../../../src/analysis/analyse.ts';
import { has } from '../../../src/base/bits.ts';
import { unlimited } from '../../../src/base/budget.ts';
import { StateTable } from '../../../src/engine/table/state-table.ts';
import { LINE_CLASSES } from '../../../src/engine/table/words.ts';
import { randomCircuit } from '../../random-circuit.ts';
import { plainState } from './reference.ts';

test('line classes agree with the graph library on 1,000 random circuits, in every state', { timeout: 120_000 }, () => {
  let states = 0;
  fc.assert(
    fc.property(randomCircuit(3, 11), fc.constantFrom('running' as const, 'stopped' as const), (circuit, pumps) => {
      const net = networkOf(circuit);
      const table = new StateTable(tabulate(circuit, { pumps }, unlimited));
      for (let row = 0; row < table.count; row++) {
        const plain = plainState(net, table.positionsOf(row), pumps === 'running');
        if (!plain.settled) continue;
        states += 1;
        for (let line = 0; line < net.shown; line++) {
          const source = plain.fromSource[line];
          const expected = source
            ? plain.toTank[line]
              ? 'flows to tank'
              : 'fed'
            : plain.toTank[line]
              ? 'vented'
              : 'cut off';
          const found = table.line(line, row);
          expect(
            found === 'carries displaced oil' ? 'cut off' : found,
            `${net.lines[line]?.name} in row ${row + 1}`,
          ).toBe(expected);
        }
      }
    }),
    { numRuns: 1000, seed: 20261201 },
  );
  expect(states).toBeGreaterThan(2000);
});

test('every actuator, pump and line has exactly one word in every state', () => {
  fc.assert(
    fc.property(randomCircuit(4), fc.constantFrom('running' as const, 'stopped' as const), (circuit, pumps) => {
      const data = tabulate(circuit, { pumps }, unlimited);
      for (const planes of [...data.actuatorPlanes, ...data.pumpPlanes, ...data.linePlanes]) {
        for (let row = 0; row < data.count; row++) {
          expect(planes.filter((plane) => plane !== undefined && has(plane, row)).length).toBe(1);
        }
      }
    }),
    { numRuns: 150, seed: 7 },
  );
});

test('a blocked line is fed or cut off, and a trapped one is cut off or stored', () => {
  fc.assert(
    fc.property(randomCircuit(4), fc.constantFrom('running' as const, 'stopped' as const), (circuit, pumps) => {
      const table = new StateTable(tabulate(circuit, { pumps }, unlimited, { pressureRows: 0 }));
      for (let row = 0; row < table.count; row++) {
        table.data.lines.forEach((_, line) => {
          const name = table.line(line, row);
          const blocked = table.blocked(line, row);
          if (blocked === 'under pressure') expect(name).toBe('fed');
          expect(blocked === 'cut off').toBe(name === 'cut off');
          const trapped = table.trapped(line, row);
          if (trapped.length > 0) expect(name).toBe(trapped.includes('stored') ? 'fed' : 'cut off');
        });
      }
      expect(LINE_CLASSES.length).toBe(5);
    }),
    { numRuns: 150, seed: 11 },
  );
});

test('with the pressures, lines are blocked and trapped only where open paths say so', () => {
  fc.assert(
    fc.property(randomCircuit(3), fc.constantFrom('running' as const, 'stopped' as const), (circuit, pumps) => {
      const table = new StateTable(tabulate(circuit, { pumps }, unlimited));
      const paths = new StateTable(tabulate(circuit, { pumps }, unlimited, { pressureRows: 0 }));
      for (let row = 0; row < table.count; row++) {
        table.data.lines.forEach((_, line) => {
          expect(table.line(line, row)).toBe(paths.line(line, row));
          const blocked = table.blocked(line, row);
          if (blocked !== undefined) expect(blocked).toBe(paths.blocked(line, row));
          for (const reason of table.trapped(line, row)) expect(paths.trapped(line, row)).toContain(reason);
        });
      }
    }),
    { numRuns: 100, seed: 13 },
  );
});

test('the words of a row say what the table says', () => {
  fc.assert(
    fc.property(
      randomCircuit(3),
      fc.constantFrom('running' as const, 'stopped' as const),
      fc.nat(),
      (circuit, pumps, pick) => {
        const table = new StateTable(tabulate(circuit, { pumps }, unlimited));
        const row = pick % table.count;
        const words = explainRow(circuit, { pumps }, row);
        expect(words.positions).toEqual(table.positionsOf(row));
        words.actuators.forEach((answer, i) => {
          expect(answer.verdict).toBe(table.actuator(i, row));
          expect(answer.steps.length).toBeGreaterThan(0);
          if (answer.rests) expect(answer.rests.candidates.length).toBeGreaterThan(1);
        });
        words.pumps.forEach((answer, i) => expect(answer.verdict).toBe(table.pump(i, row)));
        table.data.lines.forEach((line, i) => {
          const said = words.trapped.find((entry) => entry.line === i)?.reasons.map((reason) => reason.kind) ?? [];
          expect(said, line.name).toEqual(table.trapped(i, row));
        });
      },
    ),
    { numRuns: 400, seed: 3 },
  );
});
