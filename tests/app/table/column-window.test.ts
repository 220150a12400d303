import fc from 'fast-check';
import { expect, test } from 'vitest';
import { drawnColumns, seenColumns } from '../../../src/app/table/column-window.ts';
import type { Column } from '../../../src/app/table/columns.ts';

const columnsOf = (widths: readonly number[]): Column[] =>
  widths.map((width, i) => ({ id: `c${i}`, of: 'number', index: 0, title: '', track: `${width}px`, width }));
const MANY = 10_000;

test('every column that the window shows a pixel of is drawn, and the row numbers always', () => {
  fc.assert(
    fc.property(
      fc.array(fc.integer({ min: 20, max: 300 }), { minLength: 1, maxLength: 60 }),
      fc.integer({ min: 0, max: 9000 }),
      fc.integer({ min: 1, max: 2000 }),
      (widths, left, width) => {
        const columns = columnsOf(widths);
        const drawn = drawnColumns(columns, seenColumns(columns, MANY, left, width)).map(({ c }) => c);
        expect(drawn[0]).toBe(0);
        let x = 0;
        widths.forEach((each, c) => {
          if (x + each > left && x < left + width) expect(drawn).toContain(c);
          x += each;
        });
      },
    ),
  );
});

test('a wide table of many rows leaves columns out; one of few rows, or one that fits, does not', () => {
  const columns = columnsOf(Array.from({ length: 50 }, () => 100));
  expect(drawnColumns(columns, seenColumns(columns, MANY, 2000, 1000)).map(({ c }) => c)).toEqual([
    0,
    ...Array.from({ length: 16 }, (_, i) => 17 + i),
  ]);
  expect(seenColumns(columns, 27, 2000, 1000)).toEqual({ first: 0, end: 50 });
  expect(seenColumns(columns, MANY, 0, 5000)).toEqual({ first: 0, end: 50 });
});
