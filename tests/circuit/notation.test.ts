import { expect, test } from 'vitest';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import { circuit } from '../notation.ts';

const PRESS =
  'P1 fixed-pump{flow=20 L/min}, T1 tank, V1 directional-valve:valve-4/3-shut-lever, C1 cylinder | P1.P V1.P | LIFT: V1.A C1.A | V1.B C1.B | V1.T T1.T';

test('one line makes the whole circuit', () => {
  const press = circuit(PRESS);
  expect(press.parts.map((part) => `${part.id} ${part.kind}`)).toEqual([
    'P1 fixed-pump',
    'T1 tank',
    'V1 directional-valve',
    'C1 cylinder',
  ]);
  expect(press.parts[0]?.settings).toEqual({ flow: '20 L/min' });
  expect(press.parts[2]?.valve?.positions.map((position) => position.paths)).toEqual([
    ['P-A', 'B-T'],
    [],
    ['P-B', 'A-T'],
  ]);
  expect(press.connections[1]).toEqual({
    id: 'c2',
    from: { part: 'V1', port: 'A' },
    to: { part: 'C1', port: 'A' },
    name: 'LIFT',
  });
  const back = readCircuit(writeCircuit(press));
  expect(back).toEqual({ ok: true, value: press, warnings: [] });
});

test('a line of several ports is a chain', () => {
  const { connections } = circuit('T1 tank, T2 tank, T3 tank | T1.T T2.T T3.T');
  expect(connections.map(({ from, to }) => `${from.part}-${to.part}`)).toEqual(['T1-T2', 'T2-T3']);
});

test('parts take further fields by id', () => {
  expect(circuit('T1 tank', { T1: { label: 'SUMP' } }).parts[0]?.label).toBe('SUMP');
});

const TYPOS: [string, RegExp][] = [
  ['P1', /a part is written/],
  ['P1 pmup', /no part kind "pmup"/],
  ['T1 tank, T1 tank', /the id T1 is taken/],
  ['V1 directional-valve:valve-4/3-shot', /no form "valve-4\/3-shot"; it has valve-4/],
  ['T1 tank:cylinder', /tank has no form "cylinder"/],
  ['P1 fixed-pump{flaw=2}', /no setting "flaw"; it has flow/],
  ['P1 fixed-pump{flow}', /a setting is written/],
  ['C1 cylinder{loadSense=up}', /loadSense is one of/],
  ['T1 tank | T1.T', /two ports or more/],
  ['T1 tank | T1.T T1.T', /twice/],
  ['T1 tank | T1.T T2.T', /no part T2/],
  ['T1 tank, T2 tank | T1.T T2.X', /T2 has no port "X"; it has T/],
];
test.each(TYPOS)('a typo throws: %s', (text, why) => {
  expect(() => circuit(text)).toThrow(why);
});
test('fields for a part that is not there throw', () => {
  expect(() => circuit('T1 tank', { T2: {} })).toThrow(/not there/);
});
