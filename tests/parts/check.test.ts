import { expect, test } from 'vitest';
import type { Circuit, Connection, Part } from '../../src/circuit/model.ts';
import { CATALOGUE } from '../../src/parts/catalogue.ts';
import { checkParts, nearestKinds } from '../../src/parts/check.ts';
import { need } from './need.ts';

const PUMP: Part = { id: 'P1', kind: 'fixed-pump' };
const TANK: Part = { id: 'T1', kind: 'tank' };
const line = (id: string, from: string, to: string): Connection => {
  const ref = (text: string): { part: string; port: string } => {
    const [part = '', port = ''] = text.split('.');
    return { part, port };
  };
  return { id, from: ref(from), to: ref(to) };
};
const circuit = (parts: readonly Part[], connections: readonly Connection[] = []): Circuit => ({
  name: 'test',
  parts,
  connections,
});
const only = (given: Circuit) => {
  const found = checkParts(given);
  expect(found).toHaveLength(1);
  return need(found[0]);
};

test('a sound circuit has nothing to report', () => {
  expect(checkParts(circuit([PUMP, TANK], [line('c1', 'P1.S', 'T1.T')]))).toEqual([]);
});

test('an unknown kind names the nearest ones', () => {
  const problem = only(
    circuit([PUMP, { id: 'P2', kind: 'fixed-pmup', label: 'SECOND' }], [line('c1', 'P2.P', 'P1.P')]),
  );
  expect(problem).toMatchObject({ level: 'error', where: 'parts[1].kind', parts: ['P2'] });
  expect(problem.what).toBe('SECOND: there is no kind of part "fixed-pmup".');
  expect(problem.remedy).toMatch(/^Did you mean fixed-pump/);
});

test.each([
  ['pump', 'fixed-pump'],
  ['relief', 'relief-valve'],
  ['accumulater', 'accumulator'],
  ['Cylinder', 'cylinder'],
  ['checkvalve', 'check-valve'],
])('"%s" is near to %s', (name, kind) => {
  expect(nearestKinds(name)).toContain(kind);
});

test('a kind that is like none gets the whole list', () => {
  expect(nearestKinds('zzzzzzzzzzzzz')).toEqual([]);
  const problem = only(circuit([{ id: 'Z', kind: 'zzzzzzzzzzzzz' }]));
  for (const kind of CATALOGUE) expect(problem.remedy).toContain(kind.kind);
});

test.each([
  ['a part that is not there', line('c1', 'P1.S', 'T9.T'), 'connections[0].to', /no part "T9"/],
  ['a port that is not there', line('c1', 'P1.Q', 'T1.T'), 'connections[0].from', /P1 has no port Q/],
  ['the port it comes from', line('c1', 'P1.S', 'P1.S'), 'connections[0]', /to itself/],
])('a connection to %s', (_, connection, where, what) => {
  const problem = only(circuit([PUMP, TANK], [connection]));
  expect(problem).toMatchObject({ level: 'error', where });
  expect(problem.what).toMatch(what);
});

test('a connection drawn twice is a warning, two of one id an error', () => {
  const twice = [line('c1', 'P1.S', 'T1.T'), line('c2', 'T1.T', 'P1.S')];
  expect(only(circuit([PUMP, TANK], twice))).toMatchObject({ level: 'warning', where: 'connections[1]' });
  const sameId = [line('c1', 'P1.S', 'T1.T'), line('c1', 'P1.P', 'T1.T')];
  expect(only(circuit([PUMP, TANK], sameId))).toMatchObject({ level: 'error', where: 'connections[1].id' });
});

test('settings are reported where they stand, with the part in words', () => {
  const problem = only(circuit([TANK, { ...PUMP, label: 'MAIN PUMP', settings: { flow: '-3 L/min' } }]));
  expect(problem).toMatchObject({ level: 'error', where: 'parts[1].settings.flow', parts: ['P1'] });
  expect(problem.what).toMatch(/^MAIN PUMP: Flow is -3 L\/min, below/);
});

test('an unknown setting is only a warning', () => {
  expect(only(circuit([{ ...PUMP, settings: { colour: 'red' } }]))).toMatchObject({
    level: 'warning',
    where: 'parts[0].settings.colour',
  });
});

test('valve data are checked, and are out of place elsewhere', () => {
  const valve = {
    ports: [
      { id: 'A', side: 'top' },
      { id: 'P', side: 'bottom' },
    ],
    positions: [
      { name: 'a', paths: ['P-X'] },
      { name: 'b', paths: [] },
    ],
    left: ['lever'],
    right: ['detent'],
  } as const;
  expect(only(circuit([{ id: 'V1', kind: 'directional-valve', valve }]))).toMatchObject({
    where: 'parts[0].valve.positions[0].paths[0]',
    level: 'error',
  });
  expect(only(circuit([{ ...PUMP, valve }]))).toMatchObject({ where: 'parts[0].valve', level: 'warning' });
  expect(only(circuit([{ id: 'V1', kind: 'directional-valve' }]))).toMatchObject({
    where: 'parts[0].valve',
    level: 'warning',
  });
});

test('labels and ids are unique, and a label does not take the id of another part', () => {
  expect(
    only(
      circuit([
        { ...PUMP, label: 'MAIN' },
        { ...TANK, label: 'MAIN' },
      ]),
    ),
  ).toMatchObject({ where: 'parts[1].label', parts: ['P1', 'T1'] });
  expect(only(circuit([PUMP, { ...TANK, label: 'P1' }]))).toMatchObject({ where: 'parts[1].label' });
  expect(only(circuit([PUMP, PUMP]))).toMatchObject({ where: 'parts[1].id' });
});

test('load cases: a part that is gone is a warning, a load that cannot be read an error with its place', () => {
  const base = { name: 'x', parts: [{ id: 'C1', kind: 'cylinder' }], connections: [] };
  const problems = (loads: Record<string, Record<string, string>>) =>
    checkParts({ ...base, loadCases: [{ id: 'full', name: 'Full', loads }] }).map(({ level, where }) => [level, where]);
  expect(problems({ C9: { load: '3 kN' } })).toEqual([['warning', 'loadCases[0].loads.C9']]);
  expect(problems({ C1: { load: '3 bar', loadSense: 'pushes in' } })).toContainEqual([
    'error',
    'loadCases[0].loads.C1.load',
  ]);
  expect(problems({ C1: { load: '3 kN', loadSense: 'pushes in' } })).toEqual([]);
});
