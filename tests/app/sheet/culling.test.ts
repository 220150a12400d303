import { expect, test } from 'vitest';
import { within } from '../../../src/app/sheet/culling.ts';
import { routeAll } from '../../../src/drawing/routing.ts';
import { buildScene } from '../../../src/drawing/scene.ts';
import { sheetOf } from '../../bench/sheet-circuits.ts';

const REGION = { x: 0, y: -60, width: 60, height: 80 };

test('a large sheet draws what reaches into the region and leaves out what is far from it', () => {
  const circuit = sheetOf(160);
  // Each line straight from port to port is enough here.
  const scene = buildScene(circuit, new Map());
  const near = within(REGION, scene);
  const ids = new Set(near.parts.map(({ id }) => id));
  for (const { id, box } of scene.parts) {
    const touches = box.x < 60 && box.x + box.width > 0 && box.y < 20 && box.y + box.height > -60;
    if (touches) expect(ids.has(id)).toBe(true);
    if (box.x > 60 + 40 || box.y > 20 + 40) expect(ids.has(id)).toBe(false);
  }
  expect(near.labels.length).toBeLessThan(scene.labels.length / 2);
});

test('a small sheet is drawn whole', () => {
  const circuit = sheetOf(20);
  const scene = buildScene(circuit, routeAll(circuit));
  expect(within({ x: 5000, y: 5000, width: 1, height: 1 }, scene)).toBe(scene);
});
