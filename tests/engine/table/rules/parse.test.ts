import { expect, test } from 'vitest';
import { parseCondition, parseRule } from '../../../../src/engine/table/rules/parse.ts';
import type { Names } from '../../../../src/engine/table/rules/names.ts';

const NAMES: Names = {
  inputs: [
    {
      label: 'V1',
      positions: ['raise', 'hold', 'lower'],
      rest: 1,
      coils: [
        { name: 'Y1', position: 0 },
        { name: 'Y2', position: 2 },
      ],
    },
    { label: 'V 2', positions: ['a', '0', 'b', 'rest'], coils: [] },
    { label: 'S1', positions: ['open', 'shut'], rest: 0, coils: [{ name: 'Y3', position: 1 }] },
  ],
  actuators: [
    { label: 'CLAMP', motion: 'linear' },
    { label: 'DRILL', motion: 'linear' },
    { label: 'SPIN', motion: 'rotary' },
  ],
  pumps: [{ label: 'PUMP' }],
  lines: [{ name: 'supply' }, { name: 'V1.A' }, { name: 'never again' }],
};

const breaks = (text: string): unknown => {
  const read = parseRule(text, NAMES);
  return read.ok ? read.value.breaks : read.problems;
};
const says = (text: string): unknown => {
  const read = parseCondition(text, NAMES);
  return read.ok ? read.value : read.problems;
};

test('the forms of a rule', () => {
  const [a, b] = [says('CLAMP retracts'), says('DRILL extends')];
  const not = (of: unknown): unknown => ({ type: 'not', of });
  const both = (...of: unknown[]): unknown => ({ type: 'every', of });
  expect(breaks('never CLAMP retracts')).toEqual(a);
  expect(breaks('never CLAMP retracts while DRILL extends')).toEqual(both(a, b));
  expect(breaks('Never CLAMP retracts, when DRILL extends.')).toEqual(both(a, b));
  expect(breaks('never CLAMP retracts unless DRILL extends')).toEqual(both(a, not(b)));
  expect(breaks('always CLAMP retracts')).toEqual(not(a));
  expect(breaks('always CLAMP retracts when DRILL extends')).toEqual(both(not(a), b));
  expect(breaks('always CLAMP retracts unless DRILL extends')).toEqual(both(not(a), not(b)));
  expect(breaks('CLAMP retracts only if DRILL extends')).toEqual(both(a, not(b)));
  expect(breaks('CLAMP retracts whenever DRILL extends')).toEqual(both(not(a), b));
});

test.each([
  ['V1 at raise', { type: 'position', input: 0, positions: 1 }],
  ['V1 is at raise/lower', { type: 'position', input: 0, positions: 5 }],
  ['V1 rests', { type: 'position', input: 0, positions: 2 }],
  ['V1 is at rest', { type: 'position', input: 0, positions: 2 }],
  ['v1 AT Raise', { type: 'position', input: 0, positions: 1 }],
  ['V 2 at rest', { type: 'position', input: 1, positions: 8 }],
  ['"V 2" at "0"', { type: 'position', input: 1, positions: 2 }],
  ['Y2 on', { type: 'position', input: 0, positions: 4 }],
  ['coil Y2 is off', { type: 'not', of: { type: 'position', input: 0, positions: 4 } }],
  ['CLAMP is not held', { type: 'not', of: { type: 'actuator', actuator: 0, verdicts: ['held'] } }],
  ['CLAMP is held one way', { type: 'actuator', actuator: 0, verdicts: ['held one way'] }],
  ['SPIN turns A->B', { type: 'actuator', actuator: 2, verdicts: ['turns A→B'] }],
  ['PUMP unloaded', { type: 'pump', pump: 0, verdicts: ['unloaded'] }],
  ['PUMP is working, part over relief', { type: 'pump', pump: 0, verdicts: ['working, part over relief'] }],
  ['line supply is fed', { type: 'line', line: 0, classes: ['fed'] }],
  ['V1.A is vented', { type: 'line', line: 1, classes: ['vented'] }],
  ['line never again flows to tank', { type: 'line', line: 2, classes: ['flows to tank'] }],
  ['line supply is blocked under pressure', { type: 'blocked', line: 0, kinds: ['under pressure'] }],
  ['line supply is trapped', { type: 'trapped', line: 0, reasons: ['load', 'left behind', 'stopped', 'stored'] }],
  ['line supply is trapped by heat', { type: 'trapped', line: 0, reasons: ['heat'] }],
])('%s', (text, condition) => {
  expect(says(text)).toEqual(condition);
});

test('every, any and no; not binds closest, then and, then or', () => {
  // V 2 has no rest position, so it is not asked to rest.
  expect(says('every lever rests')).toEqual({ type: 'every', of: [says('V1 rests'), says('S1 rests')] });
  expect(says('coil V1.Y2 is off')).toEqual(says('coil Y2 is off'));
  expect(says('all coils are off')).toEqual({ type: 'every', of: [says('Y1 off'), says('Y2 off'), says('Y3 off')] });
  expect(says('any cylinder moves')).toEqual({ type: 'any', of: [says('CLAMP moves'), says('DRILL moves')] });
  expect(says('no motor turns A>B')).toEqual({ type: 'not', of: { type: 'any', of: [says('SPIN turns A→B')] } });
  const [a, b, c] = [says('Y1 on'), says('Y2 on'), says('Y3 on')];
  expect(says('Y1 on or not Y2 on and Y3 on')).toEqual({
    type: 'any',
    of: [a, { type: 'every', of: [{ type: 'not', of: b }, c] }],
  });
  expect(says('(Y1 on or Y2 on) and Y3 on')).toEqual({ type: 'every', of: [{ type: 'any', of: [a, b] }, c] });
});

test.each<[string, number, RegExp, RegExp]>([
  ['', 1, /empty/, /never/],
  ['never', 6, /Nothing follows/, /Write for example/],
  ['never CLAP retracts', 7, /no "CLAP"/, /Did you mean CLAMP/],
  ['never XYZ retracts', 7, /no "XYZ"/, /Use one of V1, V 2, S1, CLAMP.* and 1 more/],
  ['never CLAMP flies', 13, /"flies" cannot be said of CLAMP/, /extends/],
  ['never CLAMP', 12, /Nothing is said of CLAMP/, /moves/],
  ['never V1 at up', 13, /V1 has no position "up"/, /raise, hold, lower/],
  ['never V1 at', 12, /A position should stand here/, /raise/],
  ['never line sup is fed', 12, /no line "sup"/, /supply/],
  ['never (Y1 on or Y2 on', 22, /parenthesis of column 7/, /"\)"/],
  ['never Y1 on)', 12, /closes nothing/, /End the rule/],
  ['never Y1 on then Y2 on', 13, /"then" does not go on/, /"when"/],
  ['never Y1 on while Y2 on while Y3 on', 25, /"while" does not go on/, /End the rule/],
  ['CLAMP moves', 12, /does not say when/, /only if/],
  ['CLAMP moves if Y1 on', 13, /"if" does not go on/, /only if/],
  ['never "CLAMP moves', 7, /not closed/, /double quote/],
  ['never V 2 rests', 11, /no rest position/, /Name one of its positions/],
  [`never ${'('.repeat(200)}Y1 on`, 108, /too deeply/, /several rules/],
  ['every lever at raise only if Y1 on', 16, /no position "raise"/, /only "rests"/],
])('refuses %s', (text, column, what, remedy) => {
  const read = parseRule(text, NAMES);
  if (read.ok) throw new Error('it was read');
  expect(read.problems).toHaveLength(1);
  expect(read.problems[0]?.where).toBe(`column ${column}`);
  expect(read.problems[0]?.what).toMatch(what);
  expect(read.problems[0]?.remedy).toMatch(remedy);
});
