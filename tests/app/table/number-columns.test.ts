import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { numberCells, numberColumns } from '../../../src/app/table/number-columns.ts';
import { numbersOf } from '../../../src/analysis/analyse.ts';
import { readCircuit } from '../../../src/circuit/file.ts';
import { Asked } from '../../table-of.ts';

const read = readCircuit(readFileSync(new URL('../../../examples/kiln-pusher.spool.json', import.meta.url), 'utf8'));
if (!read.ok) throw new Error('the example cannot be read');
const { table } = new Asked(read.value);
const rowOf = (row: number) => {
  const [numbers] = numbersOf(read.value, { pumps: 'running' }, [row]);
  if (!numbers) throw new Error('no numbers');
  return numbers;
};

test('columns come in their own order, with units of either system', () => {
  const titles = (units: 'metric' | 'us'): string[] =>
    numberColumns(table, ['power', 'forces'], units).flatMap(({ title, columns }) => [
      title,
      ...columns.map((column) => column.title),
    ]);
  expect(titles('metric').slice(0, 4)).toEqual(['Forces', 'PUSH, kN', 'GATE, kN', 'Power']);
  expect(titles('us').slice(0, 3)).toEqual(['Forces', 'PUSH, lbf', 'GATE, lbf']);
  expect(numberColumns(table, [], 'metric')).toEqual([]);
});

test('the pump gives its 60 L/min, the power adds up, and shut-in oil has no figure', () => {
  const cells = numberCells(table, rowOf(0), 'metric', true);
  expect(cells.get('delivered:0')).toEqual({ text: '60', assumed: true });
  const power = (share: string): number => Number(cells.get(`power:${share}`)?.text);
  expect(power('pumps')).toBeGreaterThan(1);
  expect(power('pumps') + power('loads') + power('stores')).toBeCloseTo(power('useful') + power('lost'), 1);
  expect(cells.get('through')?.text).toContain('V1 P→A 60');
  const held = numberCells(table, rowOf(1), 'metric', true);
  const shut = table.data.lines.findIndex(({ name }) => name === 'V1.A');
  expect(held.get(`pressure:${shut}`)?.text).toBe('?');
});
