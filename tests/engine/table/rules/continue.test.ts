import { expect, test } from 'vitest';
import { continuations } from '../../../../src/engine/table/rules/continue.ts';
import type { Names } from '../../../../src/engine/table/rules/names.ts';
import { parseCondition, parseRule } from '../../../../src/engine/table/rules/parse.ts';

const NAMES: Names = {
  inputs: [{ label: 'V1', positions: ['raise', 'hold'], rest: 1, coils: [{ name: 'Y1', position: 0 }] }],
  actuators: [
    { label: 'LIFT', motion: 'linear' },
    { label: 'SPIN', motion: 'rotary' },
  ],
  pumps: [{ label: 'PUMP' }],
  lines: [{ name: 'at rest', ports: ['V1.A', 'LIFT.A'] }],
};
const next = (text: string, as: 'rule' | 'condition' = 'condition'): string[] =>
  continuations(text, NAMES, as).map((option) => option.text);

test('an empty question begins with names, quantities and "not"', () => {
  expect(next('')).toEqual(
    expect.arrayContaining(['not', '(', 'pressure at', 'every', 'V1', 'Y1', 'LIFT', 'PUMP', '"at rest"']),
  );
  expect(next('')).not.toContain('never');
  expect(next('', 'rule')).toEqual(expect.arrayContaining(['never', 'always', 'LIFT']));
});

test('after a name come its sayings, after a saying the words that go on', () => {
  expect(next('V1 ')).toEqual(expect.arrayContaining(['at', 'rests', 'is']));
  expect(next('V1 at ')).toEqual(expect.arrayContaining(['raise', 'hold']));
  expect(next('LIFT ')).toEqual(expect.arrayContaining(['moves', 'extends', 'held', 'faster than']));
  expect(next('PUMP ')).toEqual(expect.arrayContaining(['unloaded', 'over relief']));
  expect(next('LIFT moves ')).toEqual(expect.arrayContaining(['and', 'or', 'faster than']));
  expect(next('never LIFT moves ', 'rule')).toEqual(expect.arrayContaining(['when', 'unless', 'and']));
});

test('what is begun is finished, and says where it begins', () => {
  expect(continuations('LIFT mov', NAMES, 'condition')).toContainEqual({ kind: 'word', text: 'moves', from: 5 });
  expect(next('LIFT mov')).toEqual(expect.arrayContaining(['moves', 'moves out', 'moves in']));
  expect(next('not li')).toEqual(['line', 'LIFT']);
  expect(next('LIFT moves o')).toEqual(['or', 'moves out']);
});

test('figures come with examples of their units', () => {
  expect(next('pressure at ')).toEqual(expect.arrayContaining(['"at rest"', 'PUMP', 'V1.A', 'any']));
  expect(next('pressure at V1.A ')).toEqual(expect.arrayContaining(['over', 'under', 'at least', 'at most']));
  expect(next('pressure at V1.A over ')).toEqual(['160 bar', '2300 psi']);
  expect(next('SPIN faster than ')).toEqual(['100 rpm']);
});

test('nothing is offered after what cannot be read', () => {
  expect(next('LIFT flies ')).toEqual([]);
});

test.each<[string, unknown]>([
  ['pressure at V1.A over 160 bar', { type: 'pressure', of: 'line', index: 0, is: 'over', than: 160e5 }],
  ['pressure at PUMP is below 10 bar', { type: 'pressure', of: 'pump', index: 0, is: 'under', than: 10e5 }],
  ['pressure at "at rest" at most 1 MPa', { type: 'pressure', of: 'line', index: 0, is: 'at most', than: 1e6 }],
  ['LIFT slower than 0.12 m/s', { type: 'speed', actuator: 0, is: 'under', than: 0.12 }],
  ['not SPIN faster than 60 rpm', { type: 'not', of: { type: 'speed', actuator: 1, is: 'over', than: 2 * Math.PI } }],
])('%s', (text, condition) => {
  const read = parseCondition(text, NAMES);
  expect(read.ok ? read.value : read.problems).toEqual(condition);
});

test.each<[string, number, RegExp, RegExp]>([
  ['pressure at V9 over 1 bar', 13, /no line, port or pump "V9"/, /V1\.A/],
  ['pressure at V1.A 160 bar', 18, /"160" cannot be said of a pressure/, /over; under/],
  ['pressure at V1.A over 160', 23, /no unit/, /bar/],
  ['pressure at V1.A over 16,5 bar', 23, /comma/, /decimal point/],
  ['LIFT faster than 20 bar', 18, /pressure, where a speed is wanted/, /mm\/s/],
  ['every actuator faster than 20 mm/s', 28, /different units/, /apart/],
  ['never LIFT moves', 1, /begins a rule/, /rules/],
])('refuses %s', (text, column, what, remedy) => {
  const read = parseCondition(text, NAMES);
  if (read.ok) throw new Error('it was read');
  expect(read.problems[0]?.where).toBe(`column ${column}`);
  expect(read.problems[0]?.what).toMatch(what);
  expect(read.problems[0]?.remedy).toMatch(remedy);
});

test('figures end where the sentence ends', () => {
  expect(parseRule('never pressure at V1.A over 160 bar while LIFT faster than 20 mm/s.', NAMES).ok).toBe(true);
  expect(parseCondition('(pressure at V1.A over 1.5 bar) and LIFT moves', NAMES).ok).toBe(true);
});
