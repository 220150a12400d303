import { expect, test } from 'vitest';
import { readState } from '../../src/cli/state.ts';

const V1 = { label: 'V1', positions: ['a', '0', 'b'], rest: 1 };
const DETENT = { label: 'V2', positions: ['raise', 'lower'] };
const ODD = { label: 'Lift, main', positions: ['up, slow', 'x=y'], rest: 0 };

test.each([
  ['V1=a,V2=lower', [0, 1], {}],
  [' V1 = b , V2=raise ', [2, 0], {}],
  ['V2=lower', [1, 1], { V1: '0' }],
  ['V1=a', [0, 0], { V2: 'raise' }],
  ['', [1, 0], { V1: '0', V2: 'raise' }],
])('%j', (text, positions, assumed) => {
  expect(readState([text], [V1, DETENT])).toMatchObject({ ok: true, value: { positions, assumed } });
});

test('it may come in several pieces', () => {
  expect(readState(['V1=a', 'V2=lower'], [V1, DETENT])).toMatchObject({ value: { positions: [0, 1] } });
});

test('commas and equal signs may stand in names', () => {
  expect(readState(['Lift, main=up, slow,V1=b'], [V1, ODD])).toMatchObject({
    value: { positions: [2, 0], assumed: {} },
  });
  expect(readState(['V1=b,Lift, main=x=y'], [V1, ODD])).toMatchObject({ value: { positions: [2, 1] } });
});

test('a label that begins like another is told apart', () => {
  const V10 = { ...V1, label: 'V10' };
  expect(readState(['V10=a,V1=b'], [V1, V10])).toMatchObject({ value: { positions: [2, 0] } });
});

test('a circuit without valves has nothing to set', () => {
  expect(readState([], [])).toMatchObject({ ok: true, value: { positions: [] } });
  expect(readState(['V1=a'], [])).toMatchObject({ ok: false });
});
