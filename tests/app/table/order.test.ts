import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { countBits, has } from '../../../src/base/bits.ts';
import { readCircuit } from '../../../src/circuit/file.ts';
import { columnGroups, optionsOf, planeOf } from '../../../src/app/table/columns.ts';
import type { Column } from '../../../src/app/table/columns.ts';
import { orderRows } from '../../../src/app/table/order.ts';
import type { ColumnFilter, Order, Sort } from '../../../src/app/table/order.ts';
import { Asked } from '../../table-of.ts';

const read = readCircuit(readFileSync(new URL('../../../examples/log-deck.spool.json', import.meta.url), 'utf8'));
if (!read.ok) throw new Error('the example cannot be read');
const { table } = new Asked(read.value);
const columns = columnGroups(table).flatMap((group) => group.columns);
const column = (of: Column['of'], index = 0): Column => {
  const found = columns.find((each) => each.of === of && each.index === index);
  if (!found) throw new Error(`no column ${of} ${index}`);
  return found;
};

function arrange(filters: readonly ColumnFilter[], sort?: Sort): Order | undefined {
  const work = orderRows(table, filters, sort);
  for (let step = work.next(); ; step = work.next()) if (step.done) return step.value;
}
const all = Array.from({ length: table.count }, (_, row) => row);

test('all rows in their own order need no list', () => {
  expect(arrange([])).toBeUndefined();
  expect(arrange([], { column: column('row'), falling: false })).toBeUndefined();
});

test('rows that fall are the rows that rise, backwards', () => {
  expect([...(arrange([], { column: column('row'), falling: true })?.rows ?? [])]).toEqual([...all].reverse());
});

test.each(['input', 'actuator', 'pump', 'blocked', 'trapped', 'notes'] as const)(
  'a filter by %s keeps just the rows that have it',
  (of) => {
    for (const option of optionsOf(table, column(of))) {
      const plane = planeOf(table, column(of), option.value);
      const kept = arrange([{ column: column(of), keep: [option.value] }]);
      expect([...(kept?.rows ?? [])]).toEqual(all.filter((row) => has(plane, row)));
      expect(kept?.rows.length).toBe(option.rows);
    }
  },
);

test('the rows of an actuator filter say its word', () => {
  for (const { value, text } of optionsOf(table, column('actuator', 1))) {
    const kept = arrange([{ column: column('actuator', 1), keep: [value] }]);
    expect([...(kept?.rows ?? [])]).toEqual(all.filter((row) => table.actuator(1, row) === text));
  }
});

test('two filters keep what both keep', () => {
  const kept = arrange([
    { column: column('input', 0), keep: [0, 2] },
    { column: column('input', 2), keep: [1] },
  ]);
  expect([...(kept?.rows ?? [])]).toEqual(
    all.filter((row) => table.position(0, row) !== 1 && table.position(2, row) === 1),
  );
});

const blockedLines = (row: number): number =>
  table.data.lines.filter((_, line) => table.blocked(line, row) !== undefined).length;

test.each([false, true])(
  'sorting by blocked lines counts them, rows of one count stay in row order (falling: %s)',
  (falling) => {
    const rows = [...(arrange([], { column: column('blocked'), falling })?.rows ?? [])];
    const expected = [...all].sort((a, b) => (falling ? -1 : 1) * (blockedLines(a) - blockedLines(b)) || a - b);
    expect(rows).toEqual(expected);
  },
);

test('the place of each row leads back to it', () => {
  const order = arrange([{ column: column('input', 0), keep: [1] }], { column: column('pump'), falling: true });
  if (!order) throw new Error('no order');
  order.rows.forEach((row, place) => expect((order.places[row] ?? 0) - 1).toBe(place));
  expect(all.filter((row) => order.places[row] === 0)).toEqual(all.filter((row) => table.position(0, row) !== 1));
});

test('every row has one position, one verdict and one level', () => {
  for (const each of [
    ...columns.filter(({ of }) => of === 'input' || of === 'actuator' || of === 'pump'),
    column('notes'),
  ]) {
    const rows = optionsOf(table, each).reduce((sum, option) => sum + option.rows, 0);
    expect(rows, each.id).toBe(table.count);
    const planes = optionsOf(table, each).map((option) => countBits(planeOf(table, each, option.value)));
    expect(planes.reduce((a, b) => a + b, 0)).toBe(table.count);
  }
});
