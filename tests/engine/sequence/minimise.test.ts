import fc from 'fast-check';
import { expect, test } from 'vitest';
import { literals, minimise } from '../../../src/engine/sequence/minimise.ts';
import type { Term } from '../../../src/engine/sequence/minimise.ts';

const holds = (terms: readonly Term[], vector: number): boolean =>
  terms.some(({ mask, value }) => (vector & mask) === value);

test('one variable that tells, and the two constants', () => {
  expect(minimise([0b01, 0b11], [0b10])).toEqual({ terms: [{ mask: 0b01, value: 0b01 }], least: true });
  expect(minimise([], [0])).toEqual({ terms: [], least: true });
  expect(minimise([0, 3], [])).toEqual({ terms: [{ mask: 0, value: 0 }], least: true });
  expect(() => minimise([1], [1])).toThrow(RangeError);
});

test('parity of three has no shorter sum than its four full terms', () => {
  // Every prime of a parity function is a full term (textbook, from memory).
  const found = minimise([1, 2, 4, 7], [0, 3, 5, 6]);
  expect(found.least).toBe(true);
  expect(found.terms.map(literals)).toEqual([3, 3, 3, 3]);
});

test('the cyclic table of six, in which no prime is needed by itself', () => {
  // On = 0 1 2 5 6 7, off = 3 4: three terms of two literals, by brute force.
  const found = minimise([0, 1, 2, 5, 6, 7], [3, 4]);
  expect(found.terms.map(literals)).toEqual([2, 2, 2]);
});

/** Terms before literals before negated literals. */
const costOf = ({ mask, value }: Term): number =>
  10_000 + 100 * literals({ mask, value }) + literals({ mask: mask & ~value, value: 0 });

/** Fewest terms, then fewest literals: every set of vectors, every term. */
function leastCost(on: readonly number[], off: readonly number[], variables: number): number {
  const full = (1 << on.length) - 1;
  const terms: { covers: number; cost: number }[] = [];
  for (let mask = 0; mask < 1 << variables; mask++) {
    for (let value = mask; ; value = (value - 1) & mask) {
      if (off.every((vector) => (vector & mask) !== value)) {
        const covers = on.reduce((bits, vector, i) => ((vector & mask) === value ? bits | (1 << i) : bits), 0);
        if (covers !== 0) terms.push({ covers, cost: costOf({ mask, value }) });
      }
      if (value === 0) break;
    }
  }
  const least = new Array<number>(full + 1).fill(Infinity);
  least[0] = 0;
  for (let set = 0; set <= full; set++) {
    for (const { covers, cost } of terms) {
      const next = set | covers;
      least[next] = Math.min(least[next] as number, (least[set] as number) + cost);
    }
  }
  return least[full] as number;
}

test('against every sum of terms: true where it must be, false where it must not, and none is shorter', () => {
  const choice = fc.constantFrom('on', 'off', 'free');
  fc.assert(
    fc.property(fc.array(choice, { minLength: 16, maxLength: 16 }), (table) => {
      const on = table.flatMap((word, i) => (word === 'on' ? [i] : [])).slice(0, 9);
      const off = table.flatMap((word, i) => (word === 'off' ? [i] : []));
      const { terms, least } = minimise(on, off);
      expect(on.every((vector) => holds(terms, vector))).toBe(true);
      expect(off.some((vector) => holds(terms, vector))).toBe(false);
      expect(least).toBe(true);
      expect(terms.reduce((sum, term) => sum + costOf(term), 0)).toBe(leastCost(on, off, 4));
    }),
    { numRuns: 300 },
  );
});

test('twelve variables, all of them told apart', () => {
  const vector = fc.nat({ max: 4095 });
  fc.assert(
    fc.property(fc.uniqueArray(vector, { minLength: 2, maxLength: 60 }), fc.nat({ max: 59 }), (vectors, cut) => {
      const [on, off] = [vectors.slice(0, cut), vectors.slice(cut)];
      const { terms } = minimise(on, off);
      expect(on.every((v) => holds(terms, v))).toBe(true);
      expect(off.some((v) => holds(terms, v))).toBe(false);
    }),
    { numRuns: 25 },
  );
});
