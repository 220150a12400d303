import fc from 'fast-check';
import { expect, test } from 'vitest';
import { Diagrams, NONE } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import type { Diagram } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { coverOf } from '../../../../src/engine/table/fold/cover.ts';
import { compareCubes, cubeCount, cubeSet } from '../../../../src/engine/table/fold/cube.ts';
import type { Cube } from '../../../../src/engine/table/fold/cube.ts';

const OFF = 0b101;

/** Three 3-position valves, and which of the 27 combinations belong. */
function folded(belongs: (at: readonly number[]) => boolean): { count: bigint; terms: number; least: boolean } {
  const sets = new Diagrams([3, 3, 3]);
  const set = setOf(sets, belongs);
  const { cubes, least } = coverOf(sets, set);
  return { count: sets.count(set), terms: cubes.length, least };
}

function rowsOf(radices: readonly number[]): number[][] {
  return radices.reduce<number[][]>(
    (rows, radix) => rows.flatMap((row) => Array.from({ length: radix }, (_, p) => [...row, p])),
    [[]],
  );
}

function setOf(sets: Diagrams, belongs: (at: readonly number[]) => boolean): Diagram {
  return rowsOf(sets.radices)
    .filter(belongs)
    .reduce(
      (set, at) =>
        sets.or(
          set,
          cubeSet(
            sets,
            at.map((p) => 1 << p),
          ),
        ),
      NONE,
    );
}

const offCentre = (at: readonly number[]): number => at.filter((p) => p !== 1).length;

// Counts and least covers brute-forced by hand of the check cases: "Counting and covers".
test.each<[string, (at: readonly number[]) => boolean, number, number]>([
  ['any off centre', (at) => offCentre(at) >= 1, 26, 3],
  ['exactly one off centre', (at) => offCentre(at) === 1, 6, 3],
  ['at least two off centre', (at) => offCentre(at) >= 2, 20, 3],
  ['not all alike', (at) => new Set(at).size > 1, 24, 5],
])('three valves, %s', (_, belongs, count, terms) => {
  expect(folded(belongs)).toEqual({ count: BigInt(count), terms, least: true });
});

test('the terms of "any off centre" are the valves one by one', () => {
  const sets = new Diagrams([3, 3, 3]);
  expect(
    coverOf(
      sets,
      setOf(sets, (at) => offCentre(at) >= 1),
    ).cubes,
  ).toEqual([
    [OFF, 7, 7],
    [7, OFF, 7],
    [7, 7, OFF],
  ]);
});

const RADICES = [2, 3, 3];
const CUBES: Cube[] = rowsOf([3, 7, 7]).map((row) => row.map((p) => p + 1));

/** The fewest cubes by trying all choices of one, two, … cubes. */
function bruteForce(rows: readonly number[][], inSet: ReadonlySet<number>): number {
  const inside = (cube: Cube, row: readonly number[]): boolean =>
    cube.every((mask, i) => ((mask >> (row[i] ?? 0)) & 1) === 1);
  const masks = CUBES.map((cube) => rows.reduce((mask, row, i) => (inside(cube, row) ? mask | (1 << i) : mask), 0));
  const want = [...inSet].reduce((mask, i) => mask | (1 << i), 0);
  const usable = masks.filter((mask) => (mask & ~want) === 0);
  let reached = new Set([0]);
  for (let n = 0; ; n++) {
    if (reached.has(want)) return n;
    reached = new Set([...reached].flatMap((have) => usable.map((mask) => have | mask)));
  }
}

test('covers are equal to their set, sorted, without superfluous cubes, and as short as brute force says', () => {
  const rows = rowsOf(RADICES);
  fc.assert(
    fc.property(fc.uniqueArray(fc.nat(17), { maxLength: 18 }), (picked) => {
      const chosen = new Set(picked);
      const sets = new Diagrams(RADICES);
      const set = setOf(sets, (at) => chosen.has(rows.findIndex((row) => row.every((p, i) => p === at[i]))));
      const { cubes, least } = coverOf(sets, set);
      expect(cubes.reduce((all, cube) => sets.or(all, cubeSet(sets, cube)), NONE)).toBe(set);
      expect([...cubes].sort(compareCubes)).toEqual(cubes);
      expect(least).toBe(true);
      expect(cubes.length).toBe(bruteForce(rows, chosen));
    }),
    { numRuns: 60, seed: 9 },
  );
});

test('large sets: every cube lies in the set, none can grow and none can be left out, in any order of inputs', () => {
  fc.assert(
    fc.property(
      fc.array(fc.array(fc.nat(2), { minLength: 12, maxLength: 12 }), { minLength: 1, maxLength: 12 }),
      fc.shuffledSubarray(
        Array.from({ length: 12 }, (_, i) => i),
        { minLength: 12 },
      ),
      (picks, order) => {
        const sets = new Diagrams(new Array<number>(12).fill(3), { order });
        // Wide terms that overlap: two thirds of the inputs are free.
        const set = picks.reduce(
          (all, pick) =>
            sets.or(
              all,
              cubeSet(
                sets,
                pick.map((p, i) => (i % 3 === 0 ? 1 << p : i % 3 === 1 ? 7 & ~(1 << p) : 7)),
              ),
            ),
          NONE,
        );
        const { cubes } = coverOf(sets, set);
        const made = cubes.map((cube) => cubeSet(sets, cube));
        expect(made.reduce((all, one) => sets.or(all, one), NONE)).toBe(set);
        cubes.forEach((cube, c) => {
          expect(sets.count(made[c] as Diagram)).toBe(cubeCount(cube));
          const others = made.reduce((all, one, i) => (i === c ? all : sets.or(all, one)), NONE);
          expect(others).not.toBe(set);
          cube.forEach((mask, input) => {
            for (const p of [0, 1, 2].filter((q) => ((mask >> q) & 1) === 0)) {
              const larger = cube.map((m, i) => (i === input ? m | (1 << p) : m));
              expect(sets.minus(cubeSet(sets, larger), set)).not.toBe(NONE);
            }
          });
        });
      },
    ),
    { numRuns: 40, seed: 4 },
  );
});
