import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Box } from '../../src/base/points.ts';
import { Near } from '../../src/drawing/near.ts';

const box = fc.record({
  x: fc.integer({ min: -400, max: 400 }),
  y: fc.integer({ min: -400, max: 400 }),
  width: fc.oneof(fc.constant(0), fc.nat(120)),
  height: fc.oneof(fc.constant(0), fc.nat(120)),
});
const touch = (a: Box, b: Box): boolean =>
  a.x <= b.x + b.width && b.x <= a.x + a.width && a.y <= b.y + b.height && b.y <= a.y + a.height;

test('finds each thing that touches the box, once, and nothing else', () => {
  fc.assert(
    fc.property(fc.array(box, { maxLength: 60 }), fc.array(box, { minLength: 1, maxLength: 8 }), (things, asked) => {
      const near = new Near<number>();
      things.forEach((thing, i) => near.add(thing, i));
      for (const zone of asked) {
        const expected = things.flatMap((thing, i) => (touch(thing, zone) ? [i] : []));
        expect(near.touching(zone).sort((a, b) => a - b)).toEqual(expected);
      }
    }),
    { numRuns: 200 },
  );
});
