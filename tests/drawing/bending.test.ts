import fc from 'fast-check';
import { expect, test } from 'vitest';
import { clearBends, setBends } from '../../src/circuit/bends.ts';
import { moveParts } from '../../src/circuit/build.ts';
import { all, applyEdit, changeConnection } from '../../src/circuit/edit.ts';
import { moveSegment, slideBends, withoutBendsAt } from '../../src/drawing/bending.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { circuit, joins, part, valve } from './samples.ts';

const SHEET = circuit(
  [valve('V1', { x: 0, y: 30 }), part('F1', 'filter', { x: 30, y: 0 }), part('F2', 'filter', { x: 12, y: 14 })],
  joins('V1.A F1.A'),
);
const route = (sheet = SHEET) => routeAll(sheet).get('c1') ?? [];

test('a stretch that is moved stays where it was put, whatever stands there', () => {
  fc.assert(
    fc.property(fc.nat(20), fc.integer({ min: -12, max: 12 }), (pick, by) => {
      const before = route();
      const segment = pick % (before.length - 1);
      const { bends, segment: now } = moveSegment(before, segment, by);
      const drawn = route(applyEdit(SHEET, setBends(SHEET, 'c1', bends)));
      const [a, b] = [before[segment], before[segment + 1]];
      const [c, d] = [drawn[now], drawn[now + 1]];
      const flat = a?.y === b?.y;
      const wanted = (a?.[flat ? 'y' : 'x'] ?? 0) + by;
      // The stretch between the two ports, at y 28 and y 4, leaves a stub of 1 M at each.
      expect(c?.[flat ? 'y' : 'x']).toBe(segment === 1 ? Math.min(27, Math.max(5, wanted)) : wanted);
      expect(d?.[flat ? 'y' : 'x']).toBe(c?.[flat ? 'y' : 'x']);
      expect(drawn[0]).toEqual(before[0]);
      expect(drawn.at(-1)).toEqual(before.at(-1));
    }),
    { numRuns: 60 },
  );
});

test('a straight line from port to port gets a jog with a stub at both ends', () => {
  const points = [
    { x: 0, y: 20 },
    { x: 0, y: 0 },
  ];
  const { bends } = moveSegment(points, 0, 5);
  expect(bends).toEqual([
    { x: 0, y: 18 },
    { x: 5, y: 18 },
    { x: 5, y: 2 },
    { x: 0, y: 2 },
  ]);
});

test('moved back, a stretch leaves no bend more than it needs', () => {
  const there = moveSegment(route(), 1, 4);
  const drawn = route(applyEdit(SHEET, setBends(SHEET, 'c1', there.bends)));
  const back = moveSegment(drawn, there.segment, -4);
  expect(back.bends).toEqual(route().slice(1, -1));
});

test('bends are taken away at one stretch, or all at once', () => {
  const { bends, segment } = moveSegment(route(), 1, -6);
  const bent = applyEdit(SHEET, setBends(SHEET, 'c1', bends));
  const left = withoutBendsAt(bent.connections[0] as (typeof bent.connections)[0], route(bent), segment);
  expect(left).toHaveLength(bends.length - 2);
  expect(applyEdit(bent, clearBends(bent, ['c1']))).toEqual(SHEET);
  expect(() => clearBends(SHEET, ['c1'])).toThrow('No bend');
});

test('a bend that stood straight over a port goes along with the part, so that no jog comes in', () => {
  const { bends } = moveSegment(route(), 1, -6);
  const bent = applyEdit(SHEET, setBends(SHEET, 'c1', bends));
  const slid = slideBends(bent, new Set(['V1']), 3, 0);
  const moved = applyEdit(
    bent,
    all([moveParts(bent, ['V1'], 3, 0), ...[...slid].map(([id, to]) => changeConnection(id, { bends: to }))]),
  );
  expect(route(moved)).toHaveLength(route(bent).length);
  expect(route(moved)[0]?.x).toBe((route(bent)[0]?.x ?? 0) + 3);
});
