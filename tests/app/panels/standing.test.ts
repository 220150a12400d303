import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { explainRow, numbersOf, tabulate } from '../../../src/analysis/analyse.ts';
import { sayFigures, sayStanding } from '../../../src/app/panels/standing.ts';
import { unlimited } from '../../../src/base/budget.ts';
import { StateTable } from '../../../src/engine/table/state-table.ts';
import { openCircuit } from '../../../src/parts/open.ts';

const opened = openCircuit(readFileSync(new URL('../../../examples/log-deck.spool.json', import.meta.url), 'utf8'));
if (!opened.ok) throw new Error('the worked circuit does not open');
const circuit = opened.value;
const table = new StateTable(tabulate(circuit, { pumps: 'running' }, unlimited));
const LIFT = { of: 'actuator', key: 'LIFT' } as const;
const figures = (row: number, units: 'metric' | 'us'): string | undefined => {
  const [numbers] = numbersOf(circuit, { pumps: 'running' }, [row]);
  return numbers && sayFigures(table, numbers, LIFT, units);
};

test('of a held load the pressure under it is said, and nothing of what an earlier state may have left on the rod side', () => {
  const row = table.rowOf([0, 1, 1]);
  expect(table.actuator(1, row)).toBe('held');
  // 20 kN less 0.2 kN of friction on 63 mm bore.
  expect(figures(row, 'metric')).toBe('A 64 bar');
  expect(figures(row, 'us')).toBe('A 921 psi');
  expect(sayStanding(explainRow(circuit, { pumps: 'running' }, row), table, LIFT, undefined, true)).toBe(
    'Holds for any values, between its stops.',
  );
});

test('of a moving one speed, flow and both sides are said, and that they rest on values', () => {
  const row = table.rowOf([0, 0, 1]);
  // 20 L/min on 63 mm bore: 107 mm/s.
  expect(figures(row, 'metric')).toMatch(/^107 mm\/s, 20 L\/min, A 6\d bar, B /);
  const said = (assumed: boolean): string | undefined =>
    sayStanding(explainRow(circuit, { pumps: 'running' }, row), table, LIFT, { LIFT: 'in' }, assumed);
  expect(said(true)).toBe('Rests on entered and assumed values, at its inner stop.');
  expect(said(false)).toBe('Rests on entered values, at its inner stop.');
});
