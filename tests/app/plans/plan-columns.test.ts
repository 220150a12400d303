import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { planColumns } from '../../../src/app/plans/plan-columns.ts';
import { withUnit } from '../../../src/app/plans/with-unit.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { openCircuit } from '../../../src/parts/open.ts';

function example(name: string): Circuit {
  const read = openCircuit(readFileSync(new URL(`../../../examples/${name}.spool.json`, import.meta.url), 'utf8'));
  if (!read.ok) throw new Error(name);
  return read.value;
}

test('coils under their valves, pumps behind them, levers only where there are no coils', () => {
  const { groups, levers } = planColumns(example('crate-pusher'), undefined);
  expect(groups.map(({ label, cells }) => `${label}: ${cells.map(({ ref }) => ref).join(' ')}`)).toEqual([
    'V1: V1.a V1.b',
    'V2: V2.a V2.b',
    'Pumps: PUMP',
  ]);
  expect(levers).toEqual([]);
});

test('a valve with coils that a step holds by hand gets a column as well', () => {
  const circuit = example('crate-pusher');
  const plan = { id: 'p', name: 'p', steps: [{ id: 's1', levers: { V2: 'push' }, ends: { by: 'motion' as const } }] };
  expect(planColumns(circuit, plan).levers.map(({ part }) => part)).toEqual(['V2']);
});

test('a number alone takes the unit that stood there', () => {
  expect(withUnit('3', 'time', '500 ms')).toBe('3 ms');
  expect(withUnit('3', 'time', '')).toBe('3 s');
  expect(withUnit('120', 'length', 'out')).toBe('120 mm');
  expect(withUnit('2 min', 'time', '3 s')).toBe('2 min');
  expect(withUnit('soon', 'time', '3 s')).toBe('soon');
});
