import { expect, test } from 'vitest';
import { addCase, loadRemark, loadSpecs, removeCase, renameCase, setLoad, wrongLoad, wrongName } from '../../../src/app/panels/load-cases.ts';
import { conditionsIn, loaded, withCase, withPlace } from '../../../src/app/state/conditions.ts';
import { applyEdit, invertEdit } from '../../../src/circuit/edit.ts';
import type { Circuit, Part } from '../../../src/circuit/model.ts';
import { writeCircuit } from '../../../src/circuit/write.ts';
import { openCircuit } from '../../../src/parts/open.ts';

const LIFT: Part = { id: 'LIFT', kind: 'cylinder', settings: { load: '20 kN', loadSense: 'pushes in' } };
const circuit: Circuit = {
  name: 'lift',
  parts: [LIFT, { id: 'FEED', kind: 'motor' }, { id: 'M1', kind: 'gauge' }],
  connections: [],
};
const withOne = applyEdit(circuit, addCase(circuit).edit);

test('a new case holds the loads of every actuator as they stand, and a file with it opens again', () => {
  expect(withOne.loadCases).toEqual([
    {
      id: 'case1',
      name: 'Case 1',
      loads: { LIFT: { load: '20 kN', loadSense: 'pushes in' }, FEED: { load: '0 N·m', loadSense: 'none' } },
    },
  ]);
  const read = openCircuit(writeCircuit(withOne));
  expect(read.ok && read.value.loadCases).toEqual(withOne.loadCases);
});

test('a case added while another holds starts from that one, under a name of its own', () => {
  const heavier = applyEdit(withOne, setLoad(withOne, 'case1', 'LIFT', 'load', '30 kN'));
  const { edit, id } = addCase(heavier, 'case1');
  const two = applyEdit(heavier, edit);
  expect(id).toBe('case2');
  expect(two.loadCases?.[1]).toMatchObject({ name: 'Case 2', loads: { LIFT: { load: '30 kN' } } });
});

test('loads change in the case alone, and go back to those drawn when emptied', () => {
  const heavier = applyEdit(withOne, setLoad(withOne, 'case1', 'LIFT', 'load', '30 kN'));
  expect(heavier.parts).toEqual(circuit.parts);
  expect(loaded(heavier, { pumps: 'running', loadCase: 'case1' }).parts[0]?.settings?.['load']).toBe('30 kN');
  let bare = applyEdit(heavier, setLoad(heavier, 'case1', 'LIFT', 'load', undefined));
  expect(loaded(bare, { pumps: 'running', loadCase: 'case1' }).parts[0]?.settings?.['load']).toBe('20 kN');
  bare = applyEdit(bare, setLoad(bare, 'case1', 'LIFT', 'loadSense', undefined));
  expect(Object.keys(bare.loadCases?.[0]?.loads ?? {})).toEqual(['FEED']);
});

test('every edit can be taken back; the last case takes the list with it', () => {
  for (const edit of [renameCase(withOne, 'case1', 'full'), removeCase(withOne, 'case1'), addCase(withOne).edit])
    expect(applyEdit(applyEdit(withOne, edit), invertEdit(withOne, edit))).toEqual(withOne);
  expect(applyEdit(withOne, removeCase(withOne, 'case1'))).toEqual(circuit);
  expect('loadCases' in applyEdit(withOne, removeCase(withOne, 'case1'))).toBe(false);
});

test('what a load cannot be is said; so is a load without a way it acts', () => {
  const [size, sense] = loadSpecs(LIFT);
  if (!size || !sense) throw new Error('a cylinder has a load');
  expect(wrongLoad(LIFT, size, '20 bar')).toContain('pressure');
  expect(wrongLoad(LIFT, size, '25 kN')).toBeUndefined();
  expect(wrongLoad(LIFT, sense, 'up')).toContain('cannot be');
  expect(loadRemark(LIFT)).toBeUndefined();
  expect(loadRemark({ ...LIFT, settings: { load: '20 kN' } })).toContain('counts as none');
  expect(loadSpecs({ id: 'M1', kind: 'gauge' })).toEqual([]);
});

test('a case has a name of its own', () => {
  const two = applyEdit(withOne, addCase(withOne).edit);
  expect(wrongName(two, 'case2', 'Case 1')).toContain('Another');
  expect(wrongName(two, 'case2', '')).toContain('needs a name');
  expect(wrongName(two, 'case2', 'Case 2')).toBeUndefined();
});

test('conditions forget a load case that is not there, and keep the rest', () => {
  const conditions = withCase({ pumps: 'stopped', places: { LIFT: 'in' } }, 'case1');
  expect(conditionsIn(withOne, conditions)).toBe(conditions);
  expect(conditionsIn(circuit, conditions)).toEqual({ pumps: 'stopped', places: { LIFT: 'in' } });
  expect(withPlace(conditions, 'LIFT', 'between')).toEqual({ pumps: 'stopped', places: {}, loadCase: 'case1' });
});
