import { expect, test } from 'vitest';
import {
  circuitBounds,
  connectionAt,
  connectionsTouching,
  nearestPort,
  partAt,
  partsTouching,
  portPlace,
} from '../../src/drawing/geometry.ts';
import { lineNumbers } from '../../src/drawing/lines.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { circuit, joins, part, ref } from './samples.ts';

// A relief valve has P 4 M above and T 4 M below its origin.
test.each([
  [0, false, { x: 10, y: 16 }, 'up'],
  [90, false, { x: 14, y: 20 }, 'right'],
  [180, false, { x: 10, y: 24 }, 'down'],
  [270, false, { x: 6, y: 20 }, 'left'],
  [90, true, { x: 14, y: 20 }, 'right'],
] as const)('turned %i, flipped %s, port P stands at %o and looks %s', (turn, flip, at, side) => {
  const sheet = circuit([part('RV', 'relief-valve', { x: 10, y: 20 }, turn, flip)]);
  expect(portPlace(sheet, ref('RV.P'))).toMatchObject({ at, side });
});

test('a flipped motor has its ports on the other side', () => {
  const sheet = circuit([part('M', 'motor', { x: 0, y: 0 }, 0, true)]);
  expect(portPlace(sheet, ref('M.A'))).toMatchObject({ at: { x: 4, y: 0 }, side: 'right' });
});

test('a part that does not exist has no port; a port that does not exist is at the part', () => {
  const sheet = circuit([part('RV', 'relief-valve', { x: 3, y: 4 })]);
  expect(portPlace(sheet, ref('X.P'))).toBeUndefined();
  expect(portPlace(sheet, ref('RV.X'))).toMatchObject({ at: { x: 3, y: 4 }, role: 'joint' });
});

test('the nearest port within reach, with one left out', () => {
  const sheet = circuit([part('a', 'check-valve', { x: 0, y: 0 }), part('b', 'check-valve', { x: 6, y: 0 })]);
  expect(nearestPort(sheet, { x: 0.4, y: -2.8 }, 1)?.ref).toEqual({ part: 'a', port: 'B' });
  expect(nearestPort(sheet, { x: 0.4, y: -2.8 }, 1, ref('a.B'))).toBeUndefined();
  expect(nearestPort(sheet, { x: 0.4, y: -2.8 }, 9, ref('a.B'))?.ref).toEqual({ part: 'b', port: 'B' });
});

test('of parts that overlap the one drawn last is found', () => {
  const sheet = circuit([part('a', 'gauge', { x: 0, y: 0 }), part('b', 'gauge', { x: 1, y: 0 })]);
  expect(partAt(sheet, { x: 0, y: 0 })?.id).toBe('b');
  expect(partAt(sheet, { x: -1.9, y: 0 })?.id).toBe('a');
  expect(partAt(sheet, { x: 20, y: 0 })).toBeUndefined();
});

test('a box touches the parts and lines that it meets', () => {
  const sheet = circuit(
    [
      part('a', 'check-valve', { x: 0, y: 0 }),
      part('b', 'check-valve', { x: 0, y: -20 }),
      part('c', 'gauge', { x: 30, y: 0 }),
    ],
    joins('a.B b.A'),
  );
  const routes = routeAll(sheet);
  const box = { x: -1, y: -12, width: 2, height: 2 };
  expect(connectionsTouching(sheet, routes, box).map((c) => c.id)).toEqual(['c1']);
  expect(partsTouching(sheet, box)).toEqual([]);
  expect(partsTouching(sheet, { x: -9, y: -2, width: 50, height: 4 }).map((p) => p.id)).toEqual(['a', 'c']);
  expect(connectionAt(sheet, routes, { x: 0.5, y: -10 })?.id).toBe('c1');
  expect(connectionAt(sheet, routes, { x: 2, y: -10 })).toBeUndefined();
});

test('the bounds hold parts, routes and labels; an empty sheet still has a size', () => {
  const sheet = circuit([part('a', 'check-valve', { x: 0, y: 0 })]);
  expect(circuitBounds(sheet)).toEqual({ x: -2, y: -3, width: 4, height: 6 });
  expect(
    circuitBounds(
      sheet,
      new Map([
        [
          'c',
          [
            { x: 0, y: 0 },
            { x: 0, y: 40 },
          ],
        ],
      ]),
    ).height,
  ).toBe(43);
  expect(circuitBounds(circuit([])).width).toBeGreaterThan(0);
});

test('connections that share a port are one line, and only those', () => {
  const sheet = circuit([], joins('a.P b.P', 'c.P d.P', 'b.P e.P', 'd.T a.T'));
  expect([...lineNumbers(sheet).values()]).toEqual([0, 1, 0, 2]);
});
