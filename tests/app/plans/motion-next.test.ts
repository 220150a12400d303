import fc from 'fast-check';
import { expect, test } from 'vitest';
import { nextMotions } from '../../../src/app/plans/motion-next.ts';
import { parseMotions } from '../../../src/engine/sequence/notation.ts';

const MOVERS = [
  { label: 'LIFT', rotary: false },
  { label: 'PUSH', rotary: false },
  { label: 'M1', rotary: true },
];
const offered = (text: string): string[] => nextMotions(text, MOVERS).map(({ text: each }) => each);

test('all motions are offered at first, and a parenthesis for those at one time', () => {
  expect(offered('')).toEqual(['LIFT+', 'LIFT-', 'PUSH+', 'PUSH-', 'M1+', 'M1-', 'M10', '(']);
});

test('what was begun is completed, in any case, and nothing else', () => {
  expect(offered('LIFT+ pu')).toEqual(['PUSH+', 'PUSH-']);
  expect(offered('(LIFT+ P')).toEqual(['PUSH+', 'PUSH-']);
  expect(offered('LIFT+ PUSH+')).toEqual([]);
});

test('what stands in the step already is not offered again, and an open parenthesis can be closed', () => {
  expect(offered('LIFT+ ')).not.toContain('LIFT+');
  expect(offered('(LIFT+ ')).toContain(')');
});

test('whatever is taken from the offers can be read', () => {
  const label = fc.constantFrom('A', 'A+', 'B 2', 'Hub "3"', 'klemm-zyl', 'B');
  fc.assert(
    fc.property(fc.uniqueArray(label, { minLength: 1, maxLength: 4 }), (labels) => {
      const movers = labels.map((each) => ({ label: each, rotary: false }));
      for (const { text, kind } of nextMotions('', movers)) {
        if (kind === 'name') expect([text, parseMotions(text, movers).ok]).toEqual([text, true]);
      }
    }),
    { numRuns: 40 },
  );
});
