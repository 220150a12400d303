import { expect, test } from 'vitest';
import { balloons } from '../../../src/app/sheet/balloons.ts';
import { hitAt, inBand } from '../../../src/app/sheet/hit.ts';
import type { HitMap } from '../../../src/app/sheet/hit.ts';
import { keyOf, portTowards, readingOrder, stepFrom } from '../../../src/app/sheet/reading-order.ts';

/** A pump at the lower left, a valve above it to the right, a tank below the pump. */
const MAP: HitMap = {
  parts: [
    { id: 'T1', box: { x: -2, y: 12, width: 4, height: 3 } },
    { id: 'P1', box: { x: -3, y: -3, width: 6, height: 6 } },
    { id: 'V1', box: { x: 10, y: -2, width: 12, height: 4 } },
  ],
  ports: [
    { part: 'T1', port: 'T', at: { x: 0, y: 12 }, side: 'up', joint: false },
    { part: 'P1', port: 'P', at: { x: 0, y: -4 }, side: 'up', joint: false },
    { part: 'P1', port: 'S', at: { x: 0, y: 4 }, side: 'down', joint: false },
    { part: 'V1', port: 'P', at: { x: 15, y: 2 }, side: 'down', joint: false },
  ],
  routes: [
    {
      id: 'c1',
      points: [
        { x: 0, y: 4 },
        { x: 0, y: 12 },
      ],
    },
  ],
};

test.each([
  [{ x: 0.3, y: -3.8 }, 'port P1.P'],
  [{ x: 1, y: 1 }, 'part P1'],
  [{ x: 0.4, y: 8 }, 'connection c1'],
  [{ x: 6, y: 8 }, 'paper'],
])('at %o stands %s', (p, wanted) => {
  const hit = hitAt(MAP, p, 0.8);
  const said =
    hit.type === 'port'
      ? `port ${hit.port.part}.${hit.port.port}`
      : hit.type === 'paper'
        ? 'paper'
        : `${hit.type} ${hit.id}`;
  expect(said).toBe(wanted);
});

test('a hit on a line gives the foot on it', () => {
  expect(hitAt(MAP, { x: 0.4, y: 8 }, 0.8)).toMatchObject({ at: { x: 0, y: 8 }, segment: 0 });
});

test('the rubber band takes what lies wholly inside', () => {
  expect(inBand(MAP, { x: -5, y: -5, width: 10, height: 25 })).toEqual({
    parts: ['T1', 'P1'],
    connections: ['c1'],
    labels: [],
  });
  expect(inBand(MAP, { x: -5, y: -5, width: 10, height: 10 })).toEqual({ parts: ['P1'], connections: [], labels: [] });
});

test('reading order: rows from the top, each part followed by its ports, lines last', () => {
  const all = readingOrder(MAP, false).map(keyOf);
  expect(all).toEqual([
    'sheet-part-P1',
    'sheet-port-P1.P',
    'sheet-port-P1.S',
    'sheet-part-V1',
    'sheet-port-V1.P',
    'sheet-part-T1',
    'sheet-port-T1.T',
    'sheet-connection-c1',
  ]);
  expect(readingOrder(MAP, true).map(keyOf)).toEqual(all.filter((key) => !key.startsWith('sheet-part')));
});

test('a step past either end leaves the sheet', () => {
  const order = readingOrder(MAP, false);
  expect(stepFrom(order, undefined, 1)).toEqual(order[0]);
  expect(stepFrom(order, order.at(-1), 1)).toBeUndefined();
  expect(stepFrom(order, order[0], -1)).toBeUndefined();
});

test('arrows go to the next port that way', () => {
  expect(portTowards(MAP, { x: 0, y: 4 }, 0, 1)).toEqual({ type: 'port', part: 'T1', port: 'T' });
  expect(portTowards(MAP, { x: 0, y: 4 }, 1, 0)).toEqual({ type: 'port', part: 'V1', port: 'P' });
  expect(portTowards(MAP, { x: 0, y: -4 }, 0, -1)).toBeUndefined();
});

test('balloons of one part do not cover each other', () => {
  const steps = [1, 2, 3].map((number) => ({ number, lines: [], parts: ['P1'], current: false }));
  const placed = balloons(steps, MAP, []);
  expect(placed.map(({ number }) => number)).toEqual([1, 2, 3]);
  for (const a of placed)
    for (const b of placed) if (a !== b) expect(Math.hypot(a.at.x - b.at.x, a.at.y - b.at.y)).toBeGreaterThan(2.1);
});
