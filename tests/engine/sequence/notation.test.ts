import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parseMotions, parseStepMotions, sayMotions } from '../../../src/engine/sequence/notation.ts';
import type { MotionStep, NotedActuator } from '../../../src/engine/sequence/notation.ts';

const RIG: readonly NotedActuator[] = [
  { label: 'A', rotary: false },
  { label: 'B', rotary: false },
  { label: 'CLAMP', rotary: false },
  { label: 'LIFT 2', rotary: false },
  { label: 'C-2', rotary: false },
  { label: 'C', rotary: false },
  { label: 'M', rotary: true },
];

const read = (text: string): string => {
  const found = parseMotions(text, RIG);
  return found.ok ? sayMotions(found.value, RIG) : found.problems.map((p) => `${p.where}: ${p.what}`).join(' ');
};

// The way sequences of cylinders are written in the trade: common practice.
test.each([
  ['A+ B+ B- A-', 'A+ B+ B- A-'],
  ['A+B+B\u2212A\u2212', 'A+ B+ B- A-'],
  ['a+, clamp+; clamp\u2013 \u2192 a\u2014', 'A+ CLAMP+ CLAMP- A-'],
  ['A+ (B+ CLAMP-) A-', 'A+ (B+ CLAMP-) A-'],
  ['(A+)', 'A+'],
  ['A + lift  2 -', 'A+ LIFT 2-'],
  ['"LIFT 2"+ A+', 'LIFT 2+ A+'],
  ['M+ M0 (M- A+)', 'M+ M0 (M- A+)'],
])('%s', (text, said) => expect(read(text)).toBe(said));

test('of several labels the longest that has a sign is taken, and says back what cannot be mistaken', () => {
  expect(parseMotions('C-2+ C- C+', RIG)).toMatchObject({
    value: [[{ actuator: 4, way: '+' }], [{ actuator: 5, way: '-' }], [{ actuator: 5, way: '+' }]],
  });
  expect(read('C-2+ C- C+')).toBe('"C-2"+ "C"- "C"+');
});

test.each([
  ['', 'column 1: No motion is given.'],
  ['A+ X-', 'column 4: There is no actuator "X".'],
  ['A+ B', 'column 5: After "B" the sign is missing.'],
  ['A+ AB-', 'column 4: There is no actuator "AB".'],
  ['A0', 'column 2: "A" is no motor, so 0 says nothing of it.'],
  ['A+ (B+ CLAMP-', 'column 4: This parenthesis is not closed.'],
  ['A+ B-)', 'column 6: This parenthesis was not opened.'],
  ['(A+ (B+))', 'column 5: Parentheses stand in parentheses.'],
  ['( )', 'column 1: There is nothing between the parentheses.'],
  ['(A+ A-)', 'column 5: "A" is to move twice at one time.'],
  ['"A+ B-', 'column 1: This quote is not closed.'],
  ['"Z"+', 'column 1: There is no actuator "Z".'],
  ['A++', 'column 3: The sign "+" has no label before it.'],
])('%s is refused with its place', (text, said) => expect(read(text)).toBe(said));

test('motions of one step', () => {
  expect(parseStepMotions('  ', RIG)).toMatchObject({ ok: true, value: [] });
  expect(parseStepMotions('A+ B-', RIG)).toMatchObject({
    value: [
      { actuator: 0, way: '+' },
      { actuator: 1, way: '-' },
    ],
  });
  expect(parseStepMotions('A+ B- A-', RIG)).toMatchObject({ ok: false, problems: [{ where: 'motions' }] });
});

const label = fc.oneof(
  fc.constantFrom(
    'A',
    'B',
    'A B',
    'A-B',
    'A+',
    'B0',
    'b',
    'LIFT 2',
    'A "x"',
    '2',
    '0',
    '(A)',
    'A,B',
    'A- B',
    'A  B',
    'Ä1',
  ),
  fc.string({ minLength: 1, maxLength: 4 }).filter((text) => text.trim() !== ''),
);
const noted = fc
  .uniqueArray(fc.record({ label, rotary: fc.boolean() }), {
    minLength: 1,
    maxLength: 6,
    selector: (a) => a.label,
  })
  .chain((actuators) => {
    const motion = fc.nat({ max: actuators.length - 1 }).chain((actuator) =>
      fc.record({
        actuator: fc.constant(actuator),
        way: fc.constantFrom(
          ...(actuators[actuator]?.rotary === true ? (['+', '-', '0'] as const) : (['+', '-'] as const)),
        ),
      }),
    );
    const step = fc.uniqueArray(motion, { minLength: 1, maxLength: 3, selector: (m) => m.actuator });
    return fc.record({ actuators: fc.constant(actuators), steps: fc.array(step, { minLength: 1, maxLength: 6 }) });
  });

test('whatever the labels, the text said back is read as the same motions', () => {
  fc.assert(
    fc.property(noted, ({ actuators, steps }: { actuators: NotedActuator[]; steps: MotionStep[] }) => {
      const said = sayMotions(steps, actuators);
      expect(parseMotions(said, actuators), said).toEqual({ ok: true, value: steps, warnings: [] });
    }),
    { numRuns: 2000 },
  );
});
