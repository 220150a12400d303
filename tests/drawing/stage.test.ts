import { expect, test } from 'vitest';
import { hopsOf, withHops } from '../../src/drawing/hops.ts';
import { crossings } from '../../src/drawing/joints.ts';
import { quickRoute } from '../../src/drawing/quick-route.ts';
import { routeAll, routingSheet } from '../../src/drawing/routing.ts';
import { buildScene } from '../../src/drawing/scene.ts';
import { partBox } from '../../src/drawing/shapes.ts';
import { overlaps } from '../../src/drawing/geometry.ts';
import { circuit, joins, part } from './samples.ts';

test('a quick route begins and ends at its ports, is right-angled, and goes round a part in the way', () => {
  const sheet = circuit(
    [
      part('F1', 'filter', { x: 0, y: 40 }),
      part('F2', 'filter', { x: 0, y: 0 }),
      part('F3', 'filter', { x: 1, y: 20 }),
    ],
    joins('F1.B F2.A'),
  );
  const points = quickRoute(routingSheet(sheet), sheet.connections[0] as (typeof sheet.connections)[0]);
  expect([points[0], points.at(-1)]).toEqual([
    { x: 0, y: 36 },
    { x: 0, y: 4 },
  ]);
  const inTheWay = partBox(sheet.parts[2] as (typeof sheet.parts)[0]);
  points.slice(1).forEach((b, i) => {
    const a = points[i] as typeof b;
    expect(a.x === b.x || a.y === b.y).toBe(true);
    const box = {
      x: Math.min(a.x, b.x) - 0.1,
      y: Math.min(a.y, b.y) - 0.1,
      width: Math.abs(a.x - b.x) + 0.2,
      height: Math.abs(a.y - b.y) + 0.2,
    };
    expect(overlaps(box, inTheWay)).toBe(false);
  });
});

test('a flat line hops over an upright one of another line, once, and ends where it ended', () => {
  const sheet = circuit(
    [
      part('F1', 'filter', { x: -20, y: 0 }, 90),
      part('F2', 'filter', { x: 20, y: 0 }, 90),
      part('F3', 'filter', { x: 0, y: 20 }),
      part('F4', 'filter', { x: 0, y: -20 }),
    ],
    joins('F1.B F2.A', 'F3.B F4.A'),
  );
  const routes = routeAll(sheet);
  const found = crossings(sheet, routes);
  expect(found.length).toBe(1);
  const plain = buildScene(sheet, routes);
  const hopping = buildScene(sheet, routes, { hops: true });
  const core = (scene: typeof plain, id: string) =>
    scene.lines.find((l) => l.connection === id)?.strokes.find((s) => s.role === 'core')?.lines[0] ?? [];
  const bumped = plain.lines.filter(
    ({ connection }) => core(hopping, connection).length > core(plain, connection).length,
  );
  expect(bumped).toHaveLength(1);
  const id = bumped[0]?.connection ?? '';
  expect(core(hopping, id)[0]).toEqual(core(plain, id)[0]);
  expect(core(hopping, id).at(-1)).toEqual(core(plain, id).at(-1));
  expect(Math.min(...core(hopping, id).map((p) => p.y))).toBeCloseTo((found[0]?.y ?? 0) - 0.55);
  expect(withHops([], hopsOf(found))).toEqual([]);
});
