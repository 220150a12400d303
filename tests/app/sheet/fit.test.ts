import { expect, test } from 'vitest';
import { fitClear } from '../../../src/app/sheet/fit.ts';
import { toScreen } from '../../../src/app/sheet/viewport.ts';
import type { Box } from '../../../src/base/points.ts';
import { overlaps } from '../../../src/drawing/geometry.ts';

const sheet = { width: 1300, height: 480 };
/** A tall row of parts, and one that stands low at the right. */
const items: Box[] = [
  { x: 0, y: 0, width: 10, height: 60 },
  { x: 30, y: 10, width: 10, height: 20 },
  { x: 80, y: 5, width: 12, height: 10 },
];
const corner: Box = { x: 950, y: 320, width: 340, height: 130 };

const onScreen = (cover: readonly Box[]): Box[] => {
  const view = fitClear(items, sheet, cover);
  return items.map((item) => ({ ...toScreen(view, item), width: item.width * view.scale, height: item.height * view.scale }));
};

test('everything is in sight and nothing lies under a cover', () => {
  const shown = onScreen([corner]);
  for (const box of shown) {
    expect(box.x).toBeGreaterThanOrEqual(0);
    expect(box.y).toBeGreaterThanOrEqual(0);
    expect(box.x + box.width).toBeLessThanOrEqual(sheet.width);
    expect(box.y + box.height).toBeLessThanOrEqual(sheet.height);
    expect(overlaps(box, corner)).toBe(false);
  }
});

test('a cover over an empty corner costs no size', () => {
  expect(fitClear(items, sheet, [corner]).scale).toBe(fitClear(items, sheet, []).scale);
});

test('a cover that is in the way pushes the circuit aside', () => {
  const left: Box = { x: 0, y: 0, width: 400, height: 480 };
  for (const box of onScreen([left])) expect(box.x).toBeGreaterThanOrEqual(400);
});

test('a cover over nearly everything does not shrink the circuit to a stamp', () => {
  const most: Box = { x: 0, y: 0, width: 1200, height: 470 };
  expect(fitClear(items, sheet, [most]).scale).toBe(fitClear(items, sheet, []).scale);
});
