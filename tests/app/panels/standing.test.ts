import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { explainRow, tabulate } from '../../../src/analysis/analyse.ts';
import { sayStanding } from '../../../src/app/panels/standing.ts';
import { unlimited } from '../../../src/base/budget.ts';
import { StateTable } from '../../../src/engine/table/state-table.ts';
import { openCircuit } from '../../../src/parts/open.ts';

const opened = openCircuit(readFileSync(new URL('../../../examples/log-deck.spool.json', import.meta.url), 'utf8'));
if (!opened.ok) throw new Error('the worked circuit does not open');
const circuit = opened.value;
const table = new StateTable(tabulate(circuit, { pumps: 'running' }, unlimited));
const LIFT = { of: 'actuator', key: 'LIFT' } as const;

test('a held load holds for any values', () => {
  const row = table.rowOf([0, 1, 1]);
  expect(table.actuator(1, row)).toBe('held');
  expect(sayStanding(explainRow(circuit, { pumps: 'running' }, row), table, LIFT, undefined, true)).toBe(
    'Holds for any values, between its stops.',
  );
});

test('a motion rests on values, entered or assumed, and is said with its place', () => {
  const row = table.rowOf([0, 0, 1]);
  const said = (assumed: boolean): string | undefined =>
    sayStanding(explainRow(circuit, { pumps: 'running' }, row), table, LIFT, { LIFT: 'in' }, assumed);
  expect(said(true)).toBe('Rests on entered and assumed values, at its inner stop.');
  expect(said(false)).toBe('Rests on entered values, at its inner stop.');
});
