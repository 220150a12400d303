import { expect, test } from 'vitest';
import { applyEdit, invertEdit } from '../../src/circuit/edit.ts';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import { groupOf, groupParts, pruneGroups, renameGroup, ungroup, withGroups } from '../../src/circuit/groups.ts';
import type { Circuit } from '../../src/circuit/model.ts';

const SHEET: Circuit = {
  name: 'four',
  parts: ['A', 'B', 'C', 'D'].map((id) => ({ id, kind: 'tank', at: { x: 0, y: 0 } })),
  connections: [],
};
const grouped = (sheet: Circuit, ...ids: string[]): Circuit => applyEdit(sheet, groupParts(sheet, ids).edit);

test('a block is made, named, moved out of and taken away, each of it undone in one step', () => {
  const one = grouped(SHEET, 'B', 'A');
  expect(one.groups).toEqual([{ id: 'g1', name: 'Block 1', parts: ['A', 'B'] }]);
  expect(applyEdit(one, invertEdit(SHEET, groupParts(SHEET, ['B', 'A']).edit))).toEqual(SHEET);
  const two = grouped(one, 'B', 'C');
  expect(two.groups).toEqual([
    { id: 'g1', name: 'Block 1', parts: ['A'] },
    { id: 'g2', name: 'Block 2', parts: ['B', 'C'] },
  ]);
  const named = applyEdit(two, renameGroup(two, 'g2', ' Lift block '));
  expect(groupOf(named, 'C')?.name).toBe('Lift block');
  expect(applyEdit(named, ungroup(named, ['A', 'B']))).toEqual(SHEET);
});

test('parts of one block move together; ids of parts that are gone mean nothing and are dropped', () => {
  const sheet = grouped(SHEET, 'A', 'B');
  expect(withGroups(sheet, ['D', 'A'])).toEqual(['D', 'A', 'B']);
  expect(withGroups(sheet, ['D'])).toEqual(['D']);
  const gone: Circuit = { ...sheet, parts: sheet.parts.filter(({ id }) => id !== 'A') };
  expect(withGroups(gone, ['B'])).toEqual(['B']);
  const edit = pruneGroups(gone);
  expect(edit && applyEdit(gone, edit).groups).toEqual([{ id: 'g1', name: 'Block 1', parts: ['B'] }]);
  expect(pruneGroups(sheet)).toBeUndefined();
});

test('what cannot be a block is refused', () => {
  expect(() => groupParts(SHEET, ['A'])).toThrow('two parts');
  expect(() => ungroup(SHEET, ['A'])).toThrow('No block');
  expect(() => renameGroup(grouped(SHEET, 'A', 'B'), 'g1', ' ')).toThrow('needs a name');
});

test('blocks and sizes stand in the file with the fields of others', () => {
  const sheet: Circuit = {
    ...SHEET,
    connections: [{ id: 'c1', from: { part: 'A', port: 'T' }, to: { part: 'B', port: 'T' }, size: '12x1.5' }],
    groups: [{ id: 'g1', name: 'Lift block', parts: ['A', 'B'], extra: { drawing: 'M-12' } }],
  };
  const read = readCircuit(writeCircuit(sheet));
  expect(read.ok && read.value).toEqual(sheet);
});

test('of a block on two sheets, what stands on one sheet moves together', () => {
  const circuit: Circuit = {
    name: 'Two',
    sheets: [
      { id: 's1', name: 'One' },
      { id: 's2', name: 'Two' },
    ],
    parts: [
      { id: 'A', kind: 'gauge' },
      { id: 'B', kind: 'gauge' },
      { id: 'C', kind: 'gauge', sheet: 's2' },
    ],
    connections: [],
    groups: [{ id: 'g1', name: 'Block', parts: ['A', 'B', 'C'] }],
  };
  expect(withGroups(circuit, ['A'])).toEqual(['A', 'B']);
  expect(withGroups(circuit, ['C'])).toEqual(['C']);
});
