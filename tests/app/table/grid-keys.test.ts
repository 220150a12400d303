import { expect, test } from 'vitest';
import { gridMove } from '../../../src/app/table/grid-keys.ts';
import type { Spot } from '../../../src/app/table/grid-keys.ts';

const EXTENT = { columns: 5, places: 18, page: 6 };
const body = (column: number, place: number): Spot => ({ zone: 'body', column, place });
const go = (key: string, from: Spot, ctrlKey = false): Spot | undefined => gridMove({ key, ctrlKey }, from, EXTENT);

// The keys of a grid in the ARIA Authoring Practices.
test('arrows go one cell and stop at the edges', () => {
  expect(go('ArrowDown', body(2, 3))).toEqual(body(2, 4));
  expect(go('ArrowDown', body(2, 17))).toEqual(body(2, 17));
  expect(go('ArrowRight', body(4, 3))).toEqual(body(4, 3));
  expect(go('ArrowLeft', body(0, 3))).toEqual(body(0, 3));
});

test('up from the first row is the head, and down from the head is the row it came from', () => {
  const head: Spot = { zone: 'head', column: 1, place: 0 };
  expect(go('ArrowUp', body(1, 0))).toEqual(head);
  expect(go('ArrowUp', head)).toEqual(head);
  expect(go('ArrowDown', head)).toEqual(body(1, 0));
});

test('pages, ends of the row and ends of the table', () => {
  expect(go('PageDown', body(1, 15))).toEqual(body(1, 17));
  expect(go('PageUp', body(1, 3))).toEqual(body(1, 0));
  expect(go('Home', body(3, 9))).toEqual(body(0, 9));
  expect(go('End', body(3, 9), true)).toEqual(body(3, 17));
});

test('other keys are not the grid’s', () => {
  expect(go('x', body(0, 0))).toBeUndefined();
});

test('a current row that is filtered out (place −1) goes to the first one shown', () => {
  expect(go('ArrowDown', body(0, -1))).toEqual(body(0, 0));
});
