import { expect, test } from 'vitest';
import { layBands, SLOT_HEIGHT } from '../../src/app/bands.ts';

test.each([400, 600, 860, 1400])('the bands fit a height of %i px and none vanishes', (height) => {
  for (const share of [0, 0.3, 0.56, 1]) {
    for (const bench of [0, 64, 200, 4000]) {
      const bands = layBands(height, share, bench);
      expect(bands.sheet).toBeGreaterThanOrEqual(bands.minSheet);
      expect(bands.bench).toBeGreaterThanOrEqual(bands.minBench);
      // Two hairlines between them, and room for the head and two rows of the table.
      expect(height - bands.sheet - bands.bench - 2).toBeGreaterThanOrEqual(98);
    }
  }
});

test('a bench that nobody dragged is as tall as one row of slots', () => {
  expect(layBands(860, 0.56, 0).bench).toBe(SLOT_HEIGHT);
});
