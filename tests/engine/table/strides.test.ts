import { expect, test } from 'vitest';
import { reflectedRank, strides } from '../../../src/engine/table/strides.ts';

test.each([[[3, 3, 3]], [[2, 3, 4]], [[4, 3, 2, 5]], [[2, 2, 2, 2]], [[6]]])(
  'in reflected order every row of %j comes once and differs from the one before by one step of one input',
  (radices) => {
    const weights = strides(radices);
    const count = radices.reduce((n, radix) => n * radix, 1);
    const rows = Array.from({ length: count }, (_, row) => row);
    const ranks = rows.map((row) => reflectedRank(row, radices, weights));
    expect([...ranks].sort((a, b) => a - b)).toEqual(rows);
    const digits = (row: number): number[] => weights.map((w, i) => Math.floor(row / w) % (radices[i] as number));
    const order = rows.toSorted((a, b) => (ranks[a] as number) - (ranks[b] as number));
    for (let i = 1; i < count; i++) {
      const before = digits(order[i - 1] as number);
      const steps = digits(order[i] as number).map((digit, k) => Math.abs(digit - (before[k] as number)));
      expect(steps.reduce((sum, step) => sum + step, 0)).toBe(1);
    }
  },
);
