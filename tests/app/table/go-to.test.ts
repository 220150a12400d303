import { expect, test } from 'vitest';
import { readGoTo } from '../../../src/app/table/go-to.ts';

const inputs = [
  { label: 'V1', positions: ['a', '0', 'b'] },
  { label: 'V12', positions: ['a', '0', 'b'] },
  { label: 'Lift, main', positions: ['up', 'up fast', 'down'] },
];
const levers = (text: string): unknown => {
  const found = readGoTo(text, inputs, 27);
  return found.to === 'levers' ? Object.fromEntries(found.positions) : found;
};

test.each(['13', ' row 13 ', 'Row 13', '1,3', '1 3'])('%j is a row number', (text) => {
  expect(readGoTo(text, inputs, 27)).toEqual({ to: 'row', row: 12 });
});

test('a row past the last, or before the first, is refused with how far they go', () => {
  for (const text of ['0', '28', '531,441'])
    expect(readGoTo(text, inputs, 27)).toEqual({ to: 'nowhere', why: 'Rows go from 1 to 27.' });
});

test.each([
  ['V1=a', { 0: 0 }],
  ['V1 = b, V12=0', { 0: 2, 1: 1 }],
  ['V12=b;V1=0', { 0: 1, 1: 2 }],
  ['v1=A lift, main=UP FAST', { 0: 0, 2: 1 }],
  ['Lift, main=up V12=a', { 1: 0, 2: 0 }],
])('%j moves just the levers that it names', (text, wanted) => {
  expect(levers(text)).toEqual(wanted);
});

test.each([
  ['', /row number/],
  ['V3=a', /no lever “V3”; there are V1, V12, Lift, main/],
  ['V1=c', /V1 has no position “c”; it has a, 0, b/],
  ['V1=', /where V1 is to stand: a, 0, b/],
  ['V1', /where V1 is to stand/],
  ['V1=a V9', /no lever “V9”/],
])('%j leads nowhere, and it says why', (text, why) => {
  const found = readGoTo(text, inputs, 27);
  expect(found.to === 'nowhere' && found.why).toMatch(why);
});

test('names that differ by their case alone are told apart', () => {
  const two = [
    { label: 'v', positions: ['a', 'A'] },
    { label: 'V', positions: ['a', 'A'] },
  ];
  const found = readGoTo('V=A', two, 4);
  expect(found.to === 'levers' && [...found.positions]).toEqual([[1, 1]]);
});
