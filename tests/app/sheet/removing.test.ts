import { expect, test } from 'vitest';
import { joinEnds } from '../../../src/app/sheet/connecting.ts';
import { flowWays } from '../../../src/app/sheet/flow-ways.ts';
import { removal } from '../../../src/app/sheet/removing.ts';
import { applyEdit } from '../../../src/circuit/edit.ts';
import type { Circuit } from '../../../src/circuit/model.ts';

const ref = (text: string) => ({ part: text.split('.')[0] ?? '', port: text.split('.')[1] ?? '' });
const connection = (id: string, from: string, to: string) => ({ id, from: ref(from), to: ref(to) });

/** Pump to tank through a throttle; a gauge on a tee before it. */
const TEED: Circuit = {
  name: 'teed',
  parts: [
    { id: 'P1', kind: 'fixed-pump', at: { x: 0, y: 0 } },
    { id: 'J1', kind: 'junction', at: { x: 0, y: -10 } },
    { id: 'M1', kind: 'gauge', at: { x: 20, y: -10 } },
    { id: 'R1', kind: 'throttle', at: { x: 0, y: -20 } },
    { id: 'T1', kind: 'tank', at: { x: 0, y: -40 } },
  ],
  connections: [connection('c1', 'P1.P', 'J1.J'), connection('c2', 'J1.J', 'M1.M'), connection('c3', 'R1.A', 'J1.J'), connection('c4', 'R1.B', 'T1.T')],
};
const said = (circuit: Circuit): string[] => circuit.connections.map(({ from, to }) => `${from.part}.${from.port} ${to.part}.${to.port}`);
const NOTHING = { parts: [], connections: [], labels: [] };

test('a branch that goes takes its junction along, and the line runs on', () => {
  const after = applyEdit(TEED, removal(TEED, { ...NOTHING, connections: ['c2'] }, false));
  expect(after.parts.map(({ id }) => id)).toEqual(['P1', 'M1', 'R1', 'T1']);
  expect(said(after).map((line) => line.split(' ').sort().join(' ')).sort()).toEqual(['P1.P R1.A', 'R1.B T1.T']);
});

test('healing joins what a part stood between', () => {
  const after = applyEdit(TEED, removal(TEED, { ...NOTHING, parts: ['R1'] }, true));
  expect(after.parts.map(({ id }) => id)).toEqual(['P1', 'J1', 'M1', 'T1']);
  expect(after.connections).toHaveLength(3);
});

test('a line between two lines puts a junction on each; on one line it is refused', () => {
  const two: Circuit = {
    ...TEED,
    parts: [...TEED.parts, { id: 'P2', kind: 'fixed-pump', at: { x: 40, y: 0 } }, { id: 'T2', kind: 'tank', at: { x: 40, y: 20 } }],
    connections: [...TEED.connections, connection('c5', 'P2.S', 'T2.T')],
  };
  const edit = joinEnds(two, { type: 'line', connection: 'c4', at: { x: 0, y: -30 } }, { type: 'line', connection: 'c5', at: { x: 40, y: 10 } });
  const after = applyEdit(two, edit);
  const added = after.parts.filter(({ id }) => !two.parts.some((part) => part.id === id));
  expect(added.map(({ kind }) => kind)).toEqual(['junction', 'junction']);
  const [a, b] = added.map(({ id }) => id);
  expect(said(after).some((line) => [`${a}.J ${b}.J`, `${b}.J ${a}.J`].includes(line))).toBe(true);
  expect(after.connections).toHaveLength(two.connections.length + 3);
  const ends = [{ type: 'line', connection: 'c1', at: { x: 0, y: -6 } }, { type: 'line', connection: 'c2', at: { x: 9, y: -10 } }] as const;
  expect(() => joinEnds(two, ends[0], ends[1])).toThrow('one line already');
});

test('flow runs from the pump to the tank; the gauge branch stands still', () => {
  const ways = flowWays(TEED, () => 0, true);
  expect(Object.fromEntries(ways)).toEqual({ c1: 'forward', c3: 'backward', c4: 'forward' });
  expect(flowWays(TEED, () => 0, false).size).toBe(0);
});
