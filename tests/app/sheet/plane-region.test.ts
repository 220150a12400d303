import { expect, test } from 'vitest';
import { drawnRegion, settledScale } from '../../../src/app/sheet/plane-region.ts';

const SIZE = { width: 800, height: 400 };

test('while a wheel turns the drawing keeps its scale, unless the picture would get too coarse', () => {
  expect(settledScale(8, 9, true)).toBe(8);
  expect(settledScale(8, 9, false)).toBe(9);
  expect(settledScale(4, 40, true)).toBe(40);
  expect(settledScale(40, 4, true)).toBe(4);
});

test('the drawn region holds the view and stays the same for small pans', () => {
  const first = drawnRegion(undefined, { x: 0, y: 0, scale: 8 }, SIZE);
  expect(first).toEqual({ x: -50, y: -25, width: 200, height: 100 });
  expect(drawnRegion(first, { x: 30, y: -20, scale: 8 }, SIZE)).toBe(first);
  const further = drawnRegion(first, { x: 60, y: 0, scale: 8 }, SIZE);
  expect(further.x).toBeLessThan(60);
  expect(further.x + further.width).toBeGreaterThan(160);
});

test('far in, what was drawn for a wide view is left out again', () => {
  const wide = drawnRegion(undefined, { x: 0, y: 0, scale: 1 }, SIZE);
  expect(drawnRegion(wide, { x: 100, y: 100, scale: 2 }, SIZE)).toBe(wide);
  const close = drawnRegion(wide, { x: 100, y: 100, scale: 16 }, SIZE);
  expect(close.width).toBeLessThan(wide.width / 4);
});
