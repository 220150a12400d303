import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Point } from '../../src/base/points.ts';
import type { Circuit, Part } from '../../src/circuit/model.ts';
import { inflate, overlaps } from '../../src/drawing/geometry.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { partReach } from '../../src/drawing/shapes.ts';
import { circuit, joins, part, unplacedRig, valve } from './samples.ts';

const spot = (sheet: Circuit, id: string): Point => {
  const found = sheet.parts.find((p) => p.id === id)?.at;
  if (!found) throw new Error(`${id} has no place`);
  return found;
};

function expectApart(parts: readonly Part[]): void {
  parts.forEach((a, i) => {
    for (const b of parts.slice(i + 1)) {
      // 4 M between outlines: 2 M round each.
      if (overlaps(inflate(partReach(a), 1.99), inflate(partReach(b), 1.99)))
        throw new Error(`${a.id} and ${b.id} are too close`);
    }
  });
}

const KINDS = [
  'fixed-pump',
  'compensated-pump',
  'tank',
  'relief-valve',
  'directional-valve',
  'cylinder',
  'motor',
  'double-lock-check',
  'lock-check',
  'one-way-throttle',
  'check-valve',
  'filter',
  'accumulator',
  'gauge',
  'junction',
  'plug',
  'no-such-kind',
];
const PORTS: Readonly<Record<string, readonly string[]>> = {
  'fixed-pump': ['P', 'S'],
  'compensated-pump': ['P', 'S'],
  tank: ['T'],
  'relief-valve': ['P', 'T'],
  'directional-valve': ['P', 'T', 'A', 'B'],
  motor: ['A', 'B', 'L'],
  'double-lock-check': ['V1', 'V2', 'C1', 'C2'],
  'lock-check': ['V', 'C', 'X'],
  accumulator: ['A'],
  gauge: ['M'],
  junction: ['J'],
  plug: ['A'],
};

const anyCircuit: fc.Arbitrary<Circuit> = fc
  .array(fc.constantFrom(...KINDS), { minLength: 1, maxLength: 14 })
  .chain((kinds) => {
    const parts = kinds.map((kind, i) => (kind === 'directional-valve' ? valve(`p${i}`) : part(`p${i}`, kind)));
    const ports = parts.flatMap((p) => (PORTS[p.kind] ?? ['A', 'B']).map((port) => `${p.id}.${port}`));
    return fc
      .array(fc.tuple(fc.constantFrom(...ports), fc.constantFrom(...ports)), { maxLength: 20 })
      .map((pairs) => circuit(parts, joins(...pairs.map(([a, b]) => `${a} ${b}`))));
  });

test('every part gets a place on the grid, and no two come closer than 4 M', () => {
  fc.assert(
    fc.property(anyCircuit, (sheet) => {
      const placed = placeMissing(sheet);
      for (const each of placed.parts) {
        expect(Number.isInteger(each.at?.x)).toBe(true);
        expect(Number.isInteger(each.at?.y)).toBe(true);
      }
      expectApart(placed.parts);
    }),
    { numRuns: 120 },
  );
});

test('equal circuits are placed alike', () => {
  fc.assert(
    fc.property(anyCircuit, (sheet) => {
      expect(placeMissing(structuredClone(sheet))).toEqual(placeMissing(sheet));
    }),
    { numRuns: 30 },
  );
});

test('a circuit that has all its places is the same object again', () => {
  const sheet = circuit([part('a', 'gauge', { x: 1, y: 2 })]);
  expect(placeMissing(sheet)).toBe(sheet);
});

test('the rig reads from the pump at the bottom to the actuators on top', () => {
  const rig = placeMissing(unplacedRig());
  const y = (id: string): number => spot(rig, id).y;
  for (const [upper, lower] of [
    ['C1', 'DLC'],
    ['DLC', 'V1'],
    ['V1', 'PU'],
    ['M1', 'TH'],
    ['TH', 'V2'],
    ['V2', 'PU'],
    ['PU', 'T0'],
    ['V1', 'T2'],
    ['V2', 'T3'],
    ['M1', 'T4'],
    ['RV', 'T1'],
  ] as const) {
    expect([upper, lower, y(upper) < y(lower)]).toEqual([upper, lower, true]);
  }
  expect(y('V1')).toBe(y('V2'));
  expect(spot(rig, 'V1').x).toBeLessThan(spot(rig, 'V2').x);
  expectApart(rig.parts);
});

test('what stands over a valve is in line with it', () => {
  const rig = placeMissing(unplacedRig());
  expect(spot(rig, 'DLC').x).toBe(spot(rig, 'V1').x);
  expect(spot(rig, 'C1').x).toBe(spot(rig, 'V1').x);
});

test('parts that have a place keep it, and the new ones stand clear of them', () => {
  const rig = unplacedRig();
  const fixed: Circuit = {
    ...rig,
    parts: rig.parts.map((p) => (p.id === 'V1' ? { ...p, at: { x: 200, y: 100 } } : p)),
  };
  const placed = placeMissing(fixed);
  expect(spot(placed, 'V1')).toEqual({ x: 200, y: 100 });
  expectApart(placed.parts);
  // The actuator goes with its valve.
  expect(spot(placed, 'C1')).toMatchObject({ x: 200 });
  expect(spot(placed, 'C1').y).toBeLessThan(100);
});

test('an unconnected part is put beside a placed drawing, not on it', () => {
  const placed = placeMissing(circuit([part('a', 'double-lock-check', { x: 0, y: 0 }), part('b', 'gauge')]));
  expect(spot(placed, 'b').x).toBeGreaterThan(8);
});

test('overlapping places of the user are left alone', () => {
  const sheet = circuit([part('a', 'gauge', { x: 0, y: 0 }), part('b', 'gauge', { x: 1, y: 0 }), part('c', 'gauge')]);
  const placed = placeMissing(sheet);
  expect([spot(placed, 'a'), spot(placed, 'b')]).toEqual([
    { x: 0, y: 0 },
    { x: 1, y: 0 },
  ]);
});
