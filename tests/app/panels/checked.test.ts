import { expect, test } from 'vitest';
import { newFault } from '../../../src/app/panels/checked.ts';
import { renameCircuit, setSetting, setValve } from '../../../src/circuit/build.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { readyMadeOf } from '../../../src/parts/catalogue.ts';

const valve = readyMadeOf('valve-4/3-shut')?.readyMade.make().valve;
const circuit: Circuit = {
  name: 'lift',
  parts: [
    { id: 'LIFT', kind: 'cylinder', settings: { bore: '63 mm', rod: '45 mm' } },
    { id: 'V1', kind: 'directional-valve', ...(valve && { valve }) },
  ],
  connections: [],
};

test('a value that a file could not hold is a fault: its own limits, and what other values ask of it', () => {
  expect(newFault(circuit, setSetting(circuit, 'LIFT', 'rod', '63 mm'))?.what).toContain('not thinner');
  expect(newFault(circuit, setSetting(circuit, 'LIFT', 'rod', '2 bar'))?.what).toContain('pressure');
  expect(newFault(circuit, setSetting(circuit, 'LIFT', 'loadSense', 'up'))?.what).toContain('cannot be');
  // The default rod of 36 mm does not fit a bore of 30 mm.
  expect(newFault(circuit, setSetting({ ...circuit, parts: [{ id: 'LIFT', kind: 'cylinder' }] }, 'LIFT', 'bore', '30 mm'))).toBeDefined();
});

test('what a file can hold is none', () => {
  expect(newFault(circuit, setSetting(circuit, 'LIFT', 'rod', '36 mm'))).toBeUndefined();
  expect(newFault(circuit, setSetting(circuit, 'LIFT', 'rod', undefined))).toBeUndefined();
  expect(newFault(circuit, renameCircuit('tipper'))).toBeUndefined();
});

test('valve data are looked at too', () => {
  if (!valve) throw new Error('no such form');
  expect(newFault(circuit, setValve(circuit, 'V1', { ...valve, rest: 7 }))).toBeDefined();
});

test('a fault that was there before does not bar its own remedy, nor other edits', () => {
  const bad: Circuit = { ...circuit, parts: [{ id: 'LIFT', kind: 'cylinder', settings: { bore: '20 mm', rod: '45 mm' } }] };
  expect(newFault(bad, renameCircuit('tipper'))).toBeUndefined();
  expect(newFault(bad, setSetting(bad, 'LIFT', 'rod', '12 mm'))).toBeUndefined();
});
