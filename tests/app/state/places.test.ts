import { expect, test } from 'vitest';
import { withPlaces } from '../../../src/app/state/places.ts';
import { placePart, renamePart } from '../../../src/circuit/build.ts';
import { applyEdit, invertEdit } from '../../../src/circuit/edit.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { placeMissing } from '../../../src/drawing/place.ts';

const bare: Circuit = {
  name: 'without places',
  parts: [
    { id: 'PUMP1', kind: 'fixed-pump' },
    { id: 'RV1', kind: 'relief-valve' },
    { id: 'CYL1', kind: 'cylinder' },
  ],
  connections: [
    { id: 'c1', from: { part: 'PUMP1', port: 'P' }, to: { part: 'RV1', port: 'P' } },
    { id: 'c2', from: { part: 'PUMP1', port: 'P' }, to: { part: 'CYL1', port: 'A' } },
  ],
};
const spots = (circuit: Circuit): Map<string, unknown> => new Map(circuit.parts.map(({ id, at }) => [id, at]));

test('a part that is added leaves all others where the sheet showed them', () => {
  const shown = spots(placeMissing(bare));
  const edit = placePart(bare, 'CYL', { kind: 'cylinder', at: { x: 2, y: 3 } });
  const after = applyEdit(bare, withPlaces(bare, edit));
  for (const [id, at] of shown) expect(spots(after).get(id)).toEqual(at);
  expect(after.parts.every(({ at }) => at !== undefined)).toBe(true);
  expect(placeMissing(after)).toBe(after);
});

test('undoing the first change takes the places back', () => {
  const edit = withPlaces(bare, renamePart(bare, 'CYL1', 'LIFT'));
  expect(applyEdit(applyEdit(bare, edit), invertEdit(bare, edit))).toEqual(bare);
});

test('where every part has its place, the edit stays as it is', () => {
  const placed = placeMissing(bare);
  const edit = renamePart(placed, 'CYL1', 'LIFT');
  expect(withPlaces(placed, edit)).toBe(edit);
});
