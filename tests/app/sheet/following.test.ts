import { expect, test } from 'vitest';
import { followed } from '../../../src/app/sheet/following.ts';
import type { Cursor } from '../../../src/app/sheet/reading-order.ts';

const ref = (part: string, port: string) => ({ part, port });
/** A pump port with two lines, one of which goes on to a valve. */
const LINES = [
  { id: 'c1', from: ref('PUMP1', 'P'), to: ref('RV1', 'P') },
  { id: 'c2', from: ref('V1', 'P'), to: ref('PUMP1', 'P') },
];
const pump: Cursor = { type: 'port', part: 'PUMP1', port: 'P' };
const line = (id: string): Cursor => ({ type: 'connection', id });

test('from a port to its line and on to the other end, whichever way the line was drawn', () => {
  expect(followed(LINES, pump, undefined)).toEqual(line('c1'));
  expect(followed(LINES, line('c1'), pump)).toEqual({ type: 'port', part: 'RV1', port: 'P' });
  expect(followed(LINES, line('c2'), pump)).toEqual({ type: 'port', part: 'V1', port: 'P' });
  expect(followed(LINES, line('c2'), { type: 'port', part: 'V1', port: 'P' })).toEqual(pump);
});

test('a port with several lines gives them in turn, one that is open none', () => {
  expect(followed(LINES, pump, line('c1'))).toEqual(line('c2'));
  expect(followed(LINES, pump, line('c2'))).toEqual(line('c1'));
  expect(followed(LINES, { type: 'port', part: 'RV1', port: 'T' }, undefined)).toBeUndefined();
  expect(followed(LINES, undefined, undefined)).toBeUndefined();
});
