import { expect, test } from 'vitest';
import { ROW_HEIGHT, RowWindow } from '../../../src/app/table/row-window.svelte.ts';

function opened(count: number, height: number): RowWindow {
  const rows = new RowWindow();
  rows.count = count;
  rows.height = height;
  return rows;
}

test('rows in the window have places of their own in the page, wherever it stands', () => {
  for (const [count, height] of [
    [3 ** 13, 500],
    [100, 251],
    [5, 800],
  ] as const) {
    const rows = opened(count, height);
    for (const share of [0, 0.1, 0.33, 0.5, 0.977, 1]) {
      rows.moveTo((count * ROW_HEIGHT - height) * share);
      expect(rows.last - rows.first).toBeLessThanOrEqual(rows.slots);
      expect(rows.base).toBeLessThanOrEqual(rows.first);
      expect(rows.first - rows.base).toBeLessThan(rows.slots);
    }
  }
});

test('the first row drawn stands where scrolling has brought it, also where the scroll bar is scaled', () => {
  const rows = opened(3 ** 14, 500);
  expect(rows.scaled).toBe(true);
  const top = 2_345_678 * ROW_HEIGHT + 7;
  rows.moveTo(top);
  // Seen from the upper edge of the window, row 2,345,678 is 7 px up.
  const onPage = rows.offset + (2_345_678 - rows.base) * ROW_HEIGHT;
  expect(onPage - rows.scrollTop).toBe(-7);
});
