import fc from 'fast-check';
import { expect, test } from 'vitest';
import { has } from '../../../../src/base/bits.ts';
import type { Diagram } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { ALL, NONE, TooManyNodes } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { PackedSets } from '../../../../src/engine/paths/diagrams/packed-sets.ts';

/** A set with the rows that are in it, worked out one by one. */
interface Checked {
  readonly set: Diagram;
  readonly rows: readonly boolean[];
}

const radicesOf = fc.array(fc.integer({ min: 1, max: 5 }), { minLength: 0, maxLength: 7 });

/** Sets made by random operations. */
function grow(sets: PackedSets, radices: readonly number[], seeds: readonly number[]): Checked[] {
  const all = Array.from({ length: sets.rows }, (_, row) => row);
  const strides = radices.map((_, i) => radices.slice(i + 1).reduce((n, r) => n * r, 1));
  const made: Checked[] = [
    { set: NONE, rows: all.map(() => false) },
    { set: ALL, rows: all.map(() => true) },
  ];
  for (const seed of seeds) {
    const a = made[(seed >>> 3) % made.length] as Checked;
    const b = made[(seed >>> 9) % made.length] as Checked;
    const each = (of: (x: boolean, y: boolean) => boolean): boolean[] =>
      a.rows.map((x, row) => of(x, b.rows[row] as boolean));
    switch (seed % 6) {
      case 0:
        made.push({ set: sets.and(a.set, b.set), rows: each((x, y) => x && y) });
        break;
      case 1:
        made.push({ set: sets.or(a.set, b.set), rows: each((x, y) => x || y) });
        break;
      case 2:
        made.push({ set: sets.minus(a.set, b.set), rows: each((x, y) => x && !y) });
        break;
      default: {
        if (radices.length === 0) break;
        const input = (seed >>> 3) % radices.length;
        const positions = (seed >>> 6) % (1 << (radices[input] as number));
        const at = (row: number): number => Math.floor(row / (strides[input] as number)) % (radices[input] as number);
        made.push({
          set: sets.literal(input, positions),
          rows: all.map((row) => ((positions >>> at(row)) & 1) === 1),
        });
      }
    }
  }
  return made;
}

const grown = fc.tuple(radicesOf, fc.array(fc.nat({ max: 1 << 24 }), { minLength: 4, maxLength: 40 }));

test('operations, planes and equality are those of the rows themselves', () => {
  fc.assert(
    fc.property(grown, ([radices, seeds]) => {
      const sets = new PackedSets(radices, 100_000);
      const known = new Map<string, Diagram>();
      for (const { set, rows } of grow(sets, radices, seeds)) {
        const plane = sets.plane(set);
        expect(rows.map((_, row) => has(plane, row))).toEqual(rows);
        // Nothing past the last row, and one number for equal sets.
        if (sets.rows % 32 !== 0) expect((plane.at(-1) as number) >>> (sets.rows % 32)).toBe(0);
        const key = plane.join();
        expect(known.get(key) ?? set).toBe(set);
        known.set(key, set);
      }
    }),
    { numRuns: 200, seed: 7 },
  );
});

test('one move of one input leads where moving every input in turn does', () => {
  fc.assert(
    fc.property(grown, ([radices, seeds]) => {
      const sets = new PackedSets(radices, 100_000);
      const strides = radices.map((_, i) => radices.slice(i + 1).reduce((n, r) => n * r, 1));
      for (const { set, rows } of grow(sets, radices, seeds)) {
        const reached = rows.map(() => false);
        rows.forEach((inside, row) => {
          if (!inside) return;
          radices.forEach((radix, input) => {
            const stride = strides[input] as number;
            const at = Math.floor(row / stride) % radix;
            for (let p = 0; p < radix; p++) if (p !== at) reached[row + (p - at) * stride] = true;
          });
        });
        const plane = sets.plane(sets.oneMoveFrom(set));
        expect(rows.map((_, row) => has(plane, row))).toEqual(reached);
      }
    }),
    { numRuns: 100, seed: 8 },
  );
});

test('sets that do not fit are refused', () => {
  const sets = new PackedSets([3, 3, 3, 3, 3, 3, 3, 3], 12);
  expect(() => {
    let all: Diagram = NONE;
    for (let input = 0; input < 7; input++)
      all = sets.or(sets.minus(sets.literal(input, 1), all), sets.literal(7 - input, 2));
  }).toThrow(TooManyNodes);
});
