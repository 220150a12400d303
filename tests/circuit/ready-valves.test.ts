import { expect, test } from 'vitest';
import { duplicate } from '../../src/circuit/build.ts';
import { applyEdit, invertEdit } from '../../src/circuit/edit.ts';
import { changeValve, linesLost } from '../../src/circuit/edit-valve.ts';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import type { Circuit, ValveData } from '../../src/circuit/model.ts';
import {
  addReadyValve,
  alikeValves,
  changeReadyValve,
  linesLostOf,
  removeReadyValve,
  renameReadyValve,
  updateAlike,
} from '../../src/circuit/ready-valves.ts';
import { changeCoil } from '../../src/circuit/valve-ends.ts';
import { addPosition, removePort, renamePort, renamePosition } from '../../src/circuit/valve-shape.ts';

const VALVE: ValveData = {
  ports: [
    { id: 'A', side: 'top' },
    { id: 'P', side: 'bottom' },
    { id: 'T', side: 'bottom' },
  ],
  positions: [
    { name: 'a', paths: ['P-A'] },
    { name: '0', paths: ['A-T'] },
  ],
  rest: 1,
  left: ['coil'],
  right: ['spring'],
  coils: [{ name: 'a', position: 0 }],
};
const NAMED = renamePosition(VALVE, 0, 'raise');
const SHEET: Circuit = {
  name: 'two valves',
  parts: [
    { id: 'V1', kind: 'directional-valve', valve: VALVE },
    { id: 'V2', kind: 'directional-valve', valve: NAMED },
    { id: 'V3', kind: 'pilot-valve', valve: VALVE },
    { id: 'T1', kind: 'tank' },
  ],
  connections: [
    { id: 'c1', from: { part: 'V1', port: 'T' }, to: { part: 'T1', port: 'T' } },
    { id: 'c2', from: { part: 'V1', port: 'A' }, to: { part: 'V2', port: 'T' } },
    { id: 'c3', from: { part: 'V1', port: 'T' }, to: { part: 'V2', port: 'T' } },
  ],
  plans: [
    {
      id: 'p',
      name: 'cycle',
      standing: { V1: 'a', V2: 'raise' },
      steps: [{ id: 's', coils: ['V1.a', 'V2.a'], levers: { V1: 'a' }, ends: { by: 'motion' } }],
    },
  ],
};

test('lines at a port that goes are told before and removed, with nothing joined in their place; one step takes it back', () => {
  const valve = removePort(VALVE, 'T');
  expect(linesLost(SHEET, 'V1', VALVE, valve).map(({ id }) => id)).toEqual(['c1', 'c3']);
  const edit = changeValve(SHEET, 'V1', VALVE, valve);
  const after = applyEdit(SHEET, edit);
  expect(after.connections.map(({ id }) => id)).toEqual(['c2']);
  expect(after.parts[0]?.valve).toEqual(valve);
  expect(applyEdit(after, invertEdit(SHEET, edit))).toEqual(SHEET);
});

test('lines follow a port that gets another letter, and step plans the names of coils and positions', () => {
  const port = applyEdit(SHEET, changeValve(SHEET, 'V1', VALVE, renamePort(VALVE, 'T', 'R'), { port: ['T', 'R'] }));
  expect(port.connections.map(({ from }) => from.port)).toEqual(['R', 'A', 'R']);
  expect(port.plans).toBe(SHEET.plans);
  const coil = changeValve(SHEET, 'V1', VALVE, changeCoil(VALVE, 0, { name: 'Y1' }), { coil: ['a', 'Y1'] });
  expect(applyEdit(SHEET, coil).plans?.[0]?.steps[0]?.coils).toEqual(['V1.Y1', 'V2.a']);
  const position = changeValve(SHEET, 'V1', VALVE, renamePosition(VALVE, 0, 'up'), { position: ['a', 'up'] });
  expect(applyEdit(SHEET, position).plans?.[0]).toMatchObject({
    standing: { V1: 'up', V2: 'raise' },
    steps: [{ levers: { V1: 'up' } }],
  });
});

test("a coil is not given the tag of another valve's, but any letter; a pasted tag gets the next free number", () => {
  const tagged = (name: string): ValveData => changeCoil(VALVE, 0, { name });
  const other = { ...SHEET, parts: [...SHEET.parts, { id: 'V9', kind: 'directional-valve', valve: tagged('Y1') }] };
  const give = (name: string) => changeValve(other, 'V1', VALVE, tagged(name), { coil: ['a', name] });
  expect(() => give('Y1')).toThrow('V9 has a coil tagged "Y1"');
  expect(applyEdit(other, give('Y3')).parts[0]?.valve?.coils?.[0]?.name).toBe('Y3');
  expect(applyEdit(other, give('c')).parts[0]?.valve?.coils?.[0]?.name).toBe('c');
  const { edit } = duplicate(other, ['V9'], 20, 0, () => []);
  expect(applyEdit(other, edit).parts.at(-1)?.valve?.coils).toEqual([
    { ...tagged('Y2').coils?.[0] },
    ...(VALVE.coils ?? []).slice(1),
  ]);
});

test('a ready-made valve is added, named, changed and removed; the last one leaves the file as it was', () => {
  const added = addReadyValve(SHEET, ' Vent valve ', VALVE);
  const one = applyEdit(SHEET, added.edit);
  expect(one.readyMadeValves).toEqual([{ id: 'valve1', title: 'Vent valve', valve: VALVE }]);
  const second = addReadyValve(one, 'Vent valve', VALVE, 'pilot-valve');
  const two = applyEdit(one, second.edit);
  expect([second.id, second.title]).toEqual(['valve2', 'Vent valve 2']);
  expect(() => renameReadyValve(two, 'valve2', 'Vent valve')).toThrow('called "Vent valve"');
  expect(() => addReadyValve(two, ' ', VALVE)).toThrow('needs a name');
  const four = addPosition(VALVE);
  expect(applyEdit(two, changeReadyValve(two, 'valve1', four)).readyMadeValves?.[0]?.valve).toEqual(four);
  const read = readCircuit(writeCircuit(two));
  expect(read.ok && read.value).toEqual(two);
  const left = applyEdit(two, removeReadyValve(two, 'valve1'));
  expect(applyEdit(left, removeReadyValve(left, 'valve2'))).toEqual(SHEET);
});

test('placed valves of the same shape are found and changed on request, keeping their names', () => {
  expect(alikeValves(SHEET, 'directional-valve', VALVE)).toEqual(['V1', 'V2']);
  const throttled: ValveData = {
    ...VALVE,
    positions: [{ name: 'a', paths: ['P~A'] }, VALVE.positions[1] ?? { name: '', paths: [] }],
  };
  const after = applyEdit(SHEET, updateAlike(SHEET, ['V1', 'V2'], throttled));
  expect(after.parts[1]?.valve?.positions[0]).toEqual({ name: 'raise', paths: ['P~A'] });
  expect(after.parts[2]).toBe(SHEET.parts[2]);
  // c3 ends at both valves and goes once.
  const two = removePort(VALVE, 'T');
  expect(linesLostOf(SHEET, ['V1', 'V2'], two).map(({ id }) => id)).toEqual(['c1', 'c3', 'c2']);
  expect(applyEdit(SHEET, updateAlike(SHEET, ['V1', 'V2'], two)).connections).toEqual([]);
});
