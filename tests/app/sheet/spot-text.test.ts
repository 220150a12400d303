import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parseSpot, saySpot } from '../../../src/app/sheet/spot-text.ts';

test('a place reads back as it is said', () => {
  const whole = fc.integer({ min: -99_999, max: 99_999 });
  fc.assert(
    fc.property(whole, whole, (x, y) => {
      expect(parseSpot(saySpot({ x, y }))).toEqual({ x, y });
    }),
  );
});

test('blank, semicolon and a true minus do as well; all else is no place', () => {
  expect(parseSpot('20 38')).toEqual({ x: 20, y: 38 });
  expect(parseSpot(' 20;38 ')).toEqual({ x: 20, y: 38 });
  expect(parseSpot('−3, 0')).toEqual({ x: -3, y: 0 });
  for (const text of ['', '20', '20,', '2038', '1.5, 2', '20, 38, 4', 'x, y', '1e3, 2'])
    expect([text, parseSpot(text)]).toEqual([text, undefined]);
});
