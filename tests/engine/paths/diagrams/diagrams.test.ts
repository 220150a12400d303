import fc from 'fast-check';
import { expect, test } from 'vitest';
import { add, countBits, emptySet, fullSet, has } from '../../../../src/base/bits.ts';
import { Diagrams, NONE, ALL, TooManyNodes } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import type { Diagram } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { planeToDiagram } from '../../../../src/engine/paths/diagrams/plane.ts';

type Formula =
  | { readonly op: 'literal'; readonly input: number; readonly positions: number }
  | { readonly op: 'and' | 'or' | 'minus'; readonly a: Formula; readonly b: Formula }
  | { readonly op: 'not'; readonly a: Formula }
  | { readonly op: 'ite'; readonly a: Formula; readonly b: Formula; readonly c: Formula };

const formula = fc.letrec<{ any: Formula }>((tie) => ({
  any: fc.oneof(
    { depthSize: 'medium', withCrossShrink: true },
    fc.record({ op: fc.constant('literal' as const), input: fc.nat(3), positions: fc.nat(15) }),
    fc.record({ op: fc.constantFrom('and' as const, 'or' as const, 'minus' as const), a: tie('any'), b: tie('any') }),
    fc.record({ op: fc.constant('not' as const), a: tie('any') }),
    fc.record({ op: fc.constant('ite' as const), a: tie('any'), b: tie('any'), c: tie('any') }),
  ),
})).any;

function build(sets: Diagrams, f: Formula): Diagram {
  switch (f.op) {
    case 'literal':
      return sets.literal(f.input, f.positions);
    case 'not':
      return sets.not(build(sets, f.a));
    case 'ite':
      return sets.ite(build(sets, f.a), build(sets, f.b), build(sets, f.c));
    default:
      return sets[f.op](build(sets, f.a), build(sets, f.b));
  }
}

function holds(f: Formula, at: readonly number[]): boolean {
  switch (f.op) {
    case 'literal':
      return ((f.positions >> (at[f.input] ?? 0)) & 1) === 1;
    case 'not':
      return !holds(f.a, at);
    case 'ite':
      return holds(f.a, at) ? holds(f.b, at) : holds(f.c, at);
    case 'and':
      return holds(f.a, at) && holds(f.b, at);
    case 'or':
      return holds(f.a, at) || holds(f.b, at);
    case 'minus':
      return holds(f.a, at) && !holds(f.b, at);
  }
}

const RADICES = [3, 2, 4, 3];
const ROWS = Array.from({ length: 72 }, (_, row) => [
  Math.floor(row / 24),
  Math.floor(row / 12) % 2,
  Math.floor(row / 3) % 4,
  row % 3,
]);

test('operations, counts, membership and examples agree with brute force, in any order', () => {
  fc.assert(
    fc.property(
      formula,
      fc.shuffledSubarray([0, 1, 2, 3], { minLength: 4 }),
      fc.array(fc.nat(1), { minLength: 4, maxLength: 4 }),
      (f, order, usual) => {
        const sets = new Diagrams(RADICES, { order });
        const set = build(sets, f);
        const rows = ROWS.filter((at) => holds(f, at));
        expect(sets.count(set)).toBe(BigInt(rows.length));
        for (const at of ROWS) expect(sets.has(set, at)).toBe(holds(f, at));
        const example = sets.example(set, usual);
        if (rows.length === 0) expect([set, example]).toEqual([NONE, undefined]);
        else expect(holds(f, example ?? [])).toBe(true);
        if (rows.length === ROWS.length) expect(set).toBe(ALL);
      },
    ),
    { numRuns: 500, seed: 5 },
  );
});

test('equal sets are equal numbers, and planes come back as they were', () => {
  fc.assert(
    fc.property(formula, formula, (f, g) => {
      const sets = new Diagrams(RADICES);
      const plane = emptySet(72);
      ROWS.forEach((at, row) => {
        if (holds(f, at)) plane[row >>> 5] = (plane[row >>> 5] as number) | (1 << (row & 31));
      });
      const a = build(sets, f);
      expect(planeToDiagram(sets, plane)).toBe(a);
      expect(sets.count(a)).toBe(BigInt(countBits(plane)));
      const b = build(sets, g);
      expect(a === b).toBe(ROWS.every((at) => holds(f, at) === holds(g, at)));
      expect(sets.not(sets.and(a, b))).toBe(sets.or(sets.not(a), sets.not(b)));
    }),
    { numRuns: 300, seed: 6 },
  );
  const sets = new Diagrams(RADICES);
  expect(planeToDiagram(sets, undefined)).toBe(NONE);
  expect(planeToDiagram(sets, fullSet(72))).toBe(ALL);
  expect(has(fullSet(72), 71)).toBe(true);
});

test('planes longer than a word become the sets of their rows', () => {
  const radices = [2, 3, 1, 3, 4, 2, 3];
  const rows = radices.reduce((n, radix) => n * radix, 1);
  const strides = radices.map((_, i) => radices.slice(i + 1).reduce((n, radix) => n * radix, 1));
  const positionsOf = (row: number): number[] =>
    radices.map((radix, i) => Math.floor(row / (strides[i] as number)) % radix);
  // Some inputs matter, and some rows are different by themselves.
  const drawn = fc.record({
    matter: fc.array(fc.nat({ max: radices.length - 1 }), { maxLength: 4 }),
    seed: fc.integer({ min: 1, max: 1000 }),
    apart: fc.array(fc.nat({ max: rows - 1 }), { maxLength: 3 }),
  });
  fc.assert(
    fc.property(drawn, ({ matter, seed, apart }) => {
      const plane = emptySet(rows);
      for (let row = 0; row < rows; row++) {
        const at = positionsOf(row);
        const key = matter.reduce((n, input) => n * 7 + (at[input] as number), seed);
        if ((Math.imul(key, 0x9e3779b1) >>> 29) % 2 === 1 || apart.includes(row)) add(plane, row);
      }
      const sets = new Diagrams(radices);
      const found = planeToDiagram(sets, plane);
      expect(sets.count(found)).toBe(BigInt(countBits(plane)));
      for (let row = 0; row < rows; row++) expect(sets.has(found, positionsOf(row))).toBe(has(plane, row));
    }),
    { numRuns: 60, seed: 8 },
  );
});

test('counts stay exact past 2⁵³', () => {
  const sets = new Diagrams(new Array<number>(40).fill(3));
  // Any of 40 valves off centre: all combinations but one.
  const any = Array.from({ length: 40 }, (_, i) => i).reduce((set, i) => sets.or(set, sets.literal(i, 0b101)), NONE);
  expect(sets.count(any)).toBe(3n ** 40n - 1n);
  expect(sets.size(any)).toBe(40);
});

test('no inputs, inputs of one position, and a limit on the nodes', () => {
  const none = new Diagrams([]);
  expect(none.count(ALL)).toBe(1n);
  expect(none.example(ALL)).toEqual([]);
  const one = new Diagrams([1, 3]);
  expect(one.literal(0, 1)).toBe(ALL);
  expect(one.literal(0, 0)).toBe(NONE);
  const small = new Diagrams(new Array<number>(12).fill(2), { mostNodes: 20 });
  const parity = (): Diagram =>
    Array.from({ length: 12 }, (_, i) => small.literal(i, 2)).reduce(
      (set, x) => small.or(small.minus(set, x), small.minus(x, set)),
      NONE,
    );
  expect(parity).toThrow(TooManyNodes);
  expect(() => new Diagrams([2, 2], { order: [0, 0] })).toThrow(RangeError);
});
