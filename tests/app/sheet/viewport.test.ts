import { expect, test } from 'vitest';
import { fitTo, MAX_SCALE, MIN_SCALE, panBy, reveal, toScreen, toSheet, zoomAt } from '../../../src/app/sheet/viewport.ts';
import { wheeled } from '../../../src/app/sheet/wheel.ts';
import { columnsInSight, zoneAt } from '../../../src/app/sheet/zones.ts';

const VIEW = { x: 10, y: 20, scale: 8 };
const still = { deltaX: 0, deltaY: 0, deltaMode: 0, ctrlKey: false, metaKey: false, shiftKey: false };

test('sheet and screen are inverse to each other', () => {
  expect(toSheet(VIEW, toScreen(VIEW, { x: 3, y: 4 }))).toEqual({ x: 3, y: 4 });
  expect(toScreen(VIEW, { x: 11, y: 20 })).toEqual({ x: 8, y: 0 });
});

test.each([0.5, 2, 1000, 0.0001])('a zoom by %d keeps the point under the pointer', (factor) => {
  const pointer = { x: 130, y: 70 };
  const zoomed = zoomAt(VIEW, pointer, factor);
  expect(toSheet(zoomed, pointer).x).toBeCloseTo(toSheet(VIEW, pointer).x);
  expect(toSheet(zoomed, pointer).y).toBeCloseTo(toSheet(VIEW, pointer).y);
  expect(zoomed.scale).toBeGreaterThanOrEqual(MIN_SCALE);
  expect(zoomed.scale).toBeLessThanOrEqual(MAX_SCALE);
});

test('a fitted box is whole and in the middle', () => {
  const box = { x: -20, y: 5, width: 200, height: 50 };
  const view = fitTo(box, { width: 800, height: 400 }, 0);
  expect(view.scale).toBe(4);
  expect(toScreen(view, { x: -20, y: 30 })).toEqual({ x: 0, y: 200 });
  expect(toScreen(view, { x: 180, y: 30 })).toEqual({ x: 800, y: 200 });
});

test('what is in sight is left alone; what is not comes in by the shortest way', () => {
  const size = { width: 800, height: 400 };
  expect(reveal(VIEW, size, { x: 50, y: 40, width: 4, height: 4 })).toBe(VIEW);
  // 100 × 50 M are in sight; the box ends at 124 + 2 M.
  expect(reveal(VIEW, size, { x: 120, y: 40, width: 4, height: 4 })).toEqual({ x: 26, y: 20, scale: 8 });
});

test('a wheel notch zooms, two fingers pan, a pinch zooms, Shift pans across', () => {
  const at = { x: 0, y: 0 };
  expect(wheeled(VIEW, { ...still, deltaY: -100 }, at).scale).toBeGreaterThan(8);
  expect(wheeled(VIEW, { ...still, deltaX: 3, deltaY: 8 }, at)).toEqual(panBy(VIEW, -3, -8));
  expect(wheeled(VIEW, { ...still, deltaY: 4, ctrlKey: true }, at).scale).toBeLessThan(8);
  expect(wheeled(VIEW, { ...still, deltaY: 80, shiftKey: true }, at)).toEqual(panBy(VIEW, -80, 0));
});

test('zones are numbered across and lettered down, from the origin', () => {
  expect([{ x: 0, y: 0 }, { x: 45, y: 20 }, { x: -1, y: -1 }].map(zoneAt)).toEqual(['A1', 'B3', '−A−1']);
  expect(columnsInSight({ x: 0, y: 0, scale: 8 }, { width: 480, height: 100 }).map(({ name }) => name)).toEqual(['1', '2', '3']);
});
