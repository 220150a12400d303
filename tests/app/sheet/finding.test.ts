import { expect, test } from 'vitest';
import { findOnSheet } from '../../../src/app/sheet/finding.ts';
import type { Circuit } from '../../../src/circuit/model.ts';

const CIRCUIT: Circuit = {
  name: 'ports by name',
  parts: [
    { id: 'PUMP1', kind: 'fixed-pump', label: 'Main pump' },
    { id: 'RV1', kind: 'relief-valve' },
    { id: 'RV12', kind: 'relief-valve' },
  ],
  connections: [{ id: 'c1', from: { part: 'PUMP1', port: 'P' }, to: { part: 'RV1', port: 'P' }, name: 'supply' }],
};
const names = (query: string, ends = false): string[] =>
  findOnSheet(CIRCUIT, query, () => undefined, ends).map(({ name }) => name);

test('a port is found by its full name, with a dot or a blank, and by no less: a part is meant then', () => {
  expect(names('rv1')).toEqual(['RV1', 'RV12']);
  expect(names('rv1.t')).toEqual(['RV1.T']);
  expect(names('RV12 p')).toEqual(['RV12.P']);
  expect(names('main pump.s')).toEqual(['Main pump.S']);
  expect(names('rv1.')).toEqual(['RV1.P', 'RV1.T']);
});

test('while a line is drawn only ports and lines are found, ports by any part of their names', () => {
  expect(names('rv1', true)).toEqual(['RV1.P', 'RV1.T', 'RV12.P', 'RV12.T']);
  expect(names('supply', true)).toEqual(['supply']);
  expect(names('relief', true)).toEqual([]);
});
