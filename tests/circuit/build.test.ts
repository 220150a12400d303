import { describe, expect, test } from 'vitest';
import * as build from '../../src/circuit/build.ts';
import { applyEdit, invertEdit, type Edit } from '../../src/circuit/edit.ts';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import { sayPort, type Circuit, type Part, type PortRef } from '../../src/circuit/model.ts';
import { RefusedEdit } from '../../src/circuit/refused.ts';
import { circuit } from '../notation.ts';

const at = (x: number, y: number): { at: { x: number; y: number } } => ({ at: { x, y } });
const ref = (text: string): PortRef => ({ part: text.split('.')[0] ?? '', port: text.split('.')[1] ?? '' });
const lines = (c: Circuit): string[] =>
  c.connections.map((x) => `${x.id} ${sayPort(x.from)} ${sayPort(x.to)}${x.name ? ` ${x.name}` : ''}`);
const part = (c: Circuit, id: string): Part => {
  const found = c.parts.find((p) => p.id === id);
  if (found === undefined) throw new Error(`no part ${id}`);
  return found;
};

/** Applies, and holds every builder to what holds for all edits. */
function apply(before: Circuit, edit: Edit): Circuit {
  const after = applyEdit(before, edit);
  expect(applyEdit(after, invertEdit(before, edit))).toStrictEqual(before);
  expect(applyEdit(before, JSON.parse(JSON.stringify(edit)) as Edit)).toStrictEqual(after);
  expect(readCircuit(writeCircuit(after))).toMatchObject({ ok: true, value: after });
  return after;
}

const PRESS = circuit(
  'P1 fixed-pump, T1 tank, F1 filter, V1 directional-valve, C1 cylinder | P1.P F1.A | F1.B V1.P | LIFT: V1.A C1.A | V1.B C1.B | V1.T T1.T',
  { P1: at(0, 0), T1: at(0, 20), F1: at(4, 0), V1: at(10, 10), C1: { ...at(10, -10), label: 'RAM' } },
);
const bent: Circuit = {
  ...PRESS,
  connections: PRESS.connections.map((c) =>
    c.id === 'c3'
      ? {
          ...c,
          bends: [
            { x: 8, y: 0 },
            { x: 12, y: -4 },
          ],
        }
      : c,
  ),
};

describe('place', () => {
  test('movePart', () => {
    expect(part(apply(PRESS, build.movePart(PRESS, 'V1', { x: 3, y: 4 })), 'V1').at).toEqual({ x: 3, y: 4 });
  });
  test('moveParts takes the bends between two moved parts along, and no others', () => {
    const both = apply(bent, build.moveParts(bent, ['V1', 'C1'], 5, -1));
    expect([part(both, 'V1').at, part(both, 'C1').at]).toEqual([
      { x: 15, y: 9 },
      { x: 15, y: -11 },
    ]);
    expect(both.connections[2]?.bends).toEqual([
      { x: 13, y: -1 },
      { x: 17, y: -5 },
    ]);
    const one = apply(bent, build.moveParts(bent, ['V1'], 5, -1));
    expect(one.connections[2]?.bends).toEqual(bent.connections[2]?.bends);
  });
  test('a part without a place takes it from the sheet, or is refused', () => {
    const loose = circuit('T1 tank');
    expect(
      part(apply(loose, build.moveParts(loose, ['T1'], 1, 1, new Map([['T1', { x: 6, y: 6 }]]))), 'T1').at,
    ).toEqual({ x: 7, y: 7 });
    expect(() => build.moveParts(loose, ['T1'], 1, 1)).toThrow(/no place on the sheet/);
    expect(part(apply(loose, build.turnParts(loose, ['T1'])), 'T1')).toEqual({ id: 'T1', kind: 'tank', turn: 90 });
  });
  test('turnParts turns clockwise about the first part', () => {
    const turned = apply(bent, build.turnParts(bent, ['C1', 'V1']));
    expect(part(turned, 'V1')).toMatchObject({ at: { x: 10, y: 10 }, turn: 90 });
    // 20 modules above goes to 20 modules right.
    expect(part(turned, 'C1')).toMatchObject({ at: { x: 30, y: 10 }, turn: 90 });
    expect(turned.connections[2]?.bends).toEqual([
      { x: 20, y: 8 },
      { x: 24, y: 12 },
    ]);
  });
  test('four quarter turns, two halves, two flips: as it was', () => {
    const ids = ['P1', 'V1', 'C1'];
    let now = bent;
    for (let i = 0; i < 4; i++) now = apply(now, build.turnParts(now, ids));
    expect(now).toStrictEqual(bent);
    for (let i = 0; i < 2; i++) now = apply(now, build.turnParts(now, ids, 180));
    expect(now).toStrictEqual(bent);
    now = apply(now, build.turnParts(now, ids, 270));
    for (let i = 0; i < 2; i++) now = apply(now, build.flipParts(now, ids));
    expect(apply(now, build.turnParts(now, ids))).toStrictEqual(bent);
  });
  test('flipParts mirrors left to right as seen, also a turned part', () => {
    const turned = apply(PRESS, build.turnParts(PRESS, ['C1']));
    expect(part(apply(turned, build.flipParts(turned, ['C1'])), 'C1')).toMatchObject({ turn: 270, flip: true });
    const pair = apply(PRESS, build.flipParts(PRESS, ['P1', 'V1']));
    expect(part(pair, 'V1').at).toEqual({ x: -10, y: 10 });
  });
  test('a move off the sheet is refused', () => {
    expect(() => applyEdit(PRESS, build.moveParts(PRESS, ['V1'], 1e6, 0))).toThrow(RefusedEdit);
  });
});

describe('parts', () => {
  test('placePart takes the next free number, past shown names too', () => {
    const shown = apply(PRESS, build.renamePart(PRESS, 'T1', 'P2'));
    const edit = build.placePart(shown, 'P', { kind: 'fixed-pump', ...at(1, 1) });
    expect(edit.part).toEqual({ id: 'P3', kind: 'fixed-pump', at: { x: 1, y: 1 } });
    expect(apply(shown, edit).parts.at(-1)?.id).toBe('P3');
  });
  test('removeParts takes the connections in the same edit', () => {
    const after = apply(PRESS, build.removeParts(PRESS, ['V1', 'C1']));
    expect(after.parts.map((p) => p.id)).toEqual(['P1', 'T1', 'F1']);
    expect(lines(after)).toEqual(['c1 P1.P F1.A']);
  });
  test('healing joins what a part in a line stood between, in its place', () => {
    const after = apply(PRESS, build.removeParts(PRESS, ['F1'], { heal: true }));
    expect(lines(after)).toEqual(['c1 P1.P V1.P', 'c3 V1.A C1.A LIFT', 'c4 V1.B C1.B', 'c5 V1.T T1.T']);
  });
  test('healing keeps name and bends in order, whichever way the connections were drawn', () => {
    const drawn: Circuit = {
      ...circuit('A1 filter, B1 filter, D1 filter | B1.A A1.B | FEED: D1.A B1.B'),
    };
    const [first, second] = drawn.connections;
    if (!first || !second) throw new Error('no connections');
    const curved = {
      ...drawn,
      connections: [
        {
          ...first,
          bends: [
            { x: 2, y: 0 },
            { x: 1, y: 0 },
          ],
        },
        {
          ...second,
          bends: [
            { x: 4, y: 0 },
            { x: 3, y: 0 },
          ],
        },
      ],
    };
    const after = apply(curved, build.removeParts(curved, ['B1'], { heal: true }));
    expect(lines(after)).toEqual(['c1 A1.B D1.A FEED']);
    expect(after.connections[0]?.bends?.map((p) => p.x)).toEqual([1, 2, 3, 4]);
  });
  test('healing goes on over neighbours that go too', () => {
    const chain = circuit('A1 filter, B1 filter, D1 filter, E1 filter | A1.B B1.A | B1.B D1.A | D1.B E1.A');
    expect(lines(apply(chain, build.removeParts(chain, ['B1', 'D1'], { heal: true })))).toEqual(['c1 A1.B E1.A']);
  });
  test('a junction between two connections heals, one with three does not', () => {
    const two = circuit('A1 filter, J1 junction, B1 filter | A1.B J1.J | J1.J B1.A');
    expect(lines(apply(two, build.removeParts(two, ['J1'], { heal: true })))).toEqual(['c1 A1.B B1.A']);
    const three = circuit('A1 filter, J1 junction, B1 filter, T1 tank | A1.B J1.J | J1.J B1.A | J1.J T1.T');
    expect(lines(apply(three, build.removeParts(three, ['J1'], { heal: true })))).toEqual([]);
  });
  test('no healing into a line to itself, a second of the same, or over a branch at one port', () => {
    const loop = circuit('A1 filter, B1 filter | A1.A B1.A | A1.A B1.B');
    expect(lines(apply(loop, build.removeParts(loop, ['B1'], { heal: true })))).toEqual([]);
    const double = circuit('A1 filter, B1 filter, D1 filter | A1.B B1.A | B1.B D1.A | A1.B D1.A');
    expect(lines(apply(double, build.removeParts(double, ['B1'], { heal: true })))).toEqual(['c3 A1.B D1.A']);
    const branch = circuit('A1 filter, B1 filter, D1 filter | A1.B B1.A | B1.A D1.A');
    expect(lines(apply(branch, build.removeParts(branch, ['B1'], { heal: true })))).toEqual([]);
  });
  test('renamePart sets, trims, and takes away', () => {
    const named = apply(PRESS, build.renamePart(PRESS, 'V1', '  LIFT '));
    expect(part(named, 'V1').label).toBe('LIFT');
    expect('label' in part(apply(named, build.renamePart(named, 'V1', '')), 'V1')).toBe(false);
    expect('label' in part(apply(named, build.renamePart(named, 'V1', 'V1')), 'V1')).toBe(false);
    expect(() => build.renamePart(PRESS, 'V1', 'RAM')).toThrow(/shown as "RAM"/);
    expect(() => build.renamePart(PRESS, 'V1', 'P1')).toThrow(/shown as "P1"/);
    expect(() => build.renamePart(PRESS, 'V1', 'a\u0007')).toThrow(/control character/);
    // Its own id may have been given away as another's label meanwhile.
    const taken = apply(named, build.renamePart(named, 'T1', 'V1'));
    expect(() => build.renamePart(taken, 'V1', '')).toThrow(/shown as "V1"/);
  });
  test('setSetting and setValve', () => {
    const set = apply(PRESS, build.setSetting(PRESS, 'P1', 'flow', '30 L/min'));
    expect(part(set, 'P1').settings).toEqual({ flow: '30 L/min' });
    expect(apply(set, build.setSetting(set, 'P1', 'flow', undefined))).toStrictEqual(PRESS);
    expect(() => build.setSetting(PRESS, 'P1', 'flow', NaN)).toThrow(/finite/);
    const { valve } = part(circuit('V1 directional-valve:valve-4/3-bypass'), 'V1');
    expect(part(apply(PRESS, build.setValve(PRESS, 'V1', valve)), 'V1').valve).toEqual(valve);
  });
});

describe('connections', () => {
  test('connect', () => {
    const edit = build.connect(PRESS, ref('V1.P'), ref('C1.B'), { name: 'CROSS', use: 'pilot' });
    expect(edit.connection.id).toBe('c6');
    expect(lines(apply(PRESS, edit)).at(-1)).toBe('c6 V1.P C1.B CROSS');
  });
  test('connect refuses a port with itself, a second time either way, and parts that are not there', () => {
    expect(() => build.connect(PRESS, ref('V1.P'), ref('V1.P'))).toThrow(/to itself/);
    expect(() => build.connect(PRESS, ref('C1.A'), ref('V1.A'))).toThrow(/connected to V1.A already/);
    expect(() => build.connect(PRESS, ref('C1.A'), ref('X1.A'))).toThrow(/no part "X1"/);
  });
  test('connectToConnection puts a junction in and keeps name, id and bends', () => {
    const edit = build.connectToConnection(bent, ref('P1.P'), 'c3', { x: 10, y: -2 });
    const after = apply(bent, edit);
    expect(part(after, 'J1')).toEqual({ id: 'J1', kind: 'junction', at: { x: 10, y: -2 } });
    expect(lines(after)).toEqual([
      'c1 P1.P F1.A',
      'c2 F1.B V1.P',
      'c3 V1.A J1.J LIFT',
      'c6 J1.J C1.A',
      'c4 V1.B C1.B',
      'c5 V1.T T1.T',
      'c7 P1.P J1.J',
    ]);
    expect(after.connections[2]?.bends).toEqual([{ x: 8, y: 0 }]);
    expect(after.connections[3]?.bends).toEqual([{ x: 12, y: -4 }]);
  });
  test('connectToConnection takes the cut from the caller, who knows the drawn line', () => {
    const after = apply(
      bent,
      build.connectToConnection(bent, ref('P1.P'), 'c3', { x: 10, y: -2 }, { bendsBefore: 2, use: 'pilot' }),
    );
    expect(after.connections[2]?.bends?.length).toBe(2);
    expect('bends' in (after.connections[3] ?? {})).toBe(false);
    expect(after.connections.at(-1)?.use).toBe('pilot');
  });
  test('connectToConnection refuses an end of that very connection', () => {
    expect(() => build.connectToConnection(PRESS, ref('C1.A'), 'c3', { x: 0, y: 0 })).toThrow(
      /an end of that connection/,
    );
  });
  test('renameLine names the line once, wherever it was named', () => {
    const tee = apply(PRESS, build.connectToConnection(PRESS, ref('P1.P'), 'c3', { x: 10, y: 0 }));
    const named = apply(tee, build.renameLine(tee, 'c6', 'HOIST'));
    expect(named.connections.filter((c) => c.name).map((c) => `${c.id} ${c.name}`)).toEqual(['c3 HOIST']);
    const none = apply(named, build.renameLine(named, 'c7', ' '));
    expect(none.connections.some((c) => 'name' in c)).toBe(false);
    expect(() => build.renameLine(PRESS, 'c4', 'LIFT')).toThrow(/called "LIFT" already/);
    expect(build.renameLine(PRESS, 'c3', 'LIFT')).toEqual({ type: 'all', edits: [] });
  });
});

describe('copies', () => {
  test('duplicate gives fresh ids, labels and line names, and the connections between the copies only', () => {
    const { edit, parts } = build.duplicate(bent, ['V1', 'C1'], 40, 0, () => []);
    const after = apply(bent, edit);
    expect(parts).toEqual(['V2', 'C2']);
    expect(part(after, 'C2')).toMatchObject({ label: 'RAM 2', at: { x: 50, y: -10 } });
    expect(lines(after).slice(5)).toEqual(['c6 V2.A C2.A LIFT 2', 'c7 V2.B C2.B']);
    expect(after.connections[5]?.bends).toEqual([
      { x: 48, y: 0 },
      { x: 52, y: -4 },
    ]);
    const third = apply(after, build.duplicate(after, ['C2'], 1, 1, () => []).edit);
    expect(third.parts.at(-1)).toMatchObject({ id: 'C3', label: 'RAM 3' });
  });
  test('a copy goes through a file, labels too, and into an empty circuit', () => {
    const labelled = apply(PRESS, build.placeLabel(PRESS, { x: 1, y: 2 }, 'Station 1'));
    const text = writeCircuit(build.copyOut(labelled, ['V1', 'C1'], ['t1']));
    const read = readCircuit(text);
    if (!read.ok) throw new Error(text);
    const empty: Circuit = { name: 'New', parts: [], connections: [] };
    const { edit, labels } = build.paste(empty, read.value, 2, 2, () => []);
    const after = apply(empty, edit);
    expect(labels).toEqual(['t1']);
    expect(after.labels?.[0]).toEqual({ id: 't1', at: { x: 3, y: 4 }, text: 'Station 1' });
    expect(after.parts.map((p) => p.label ?? p.id)).toEqual(['V1', 'RAM']);
  });
});

test('removeConnections and removeLabels', () => {
  expect(lines(apply(PRESS, build.removeConnections(['c1', 'c3']))).map((line) => line.split(' ')[0])).toEqual([
    'c2',
    'c4',
    'c5',
  ]);
  const labelled = apply(PRESS, build.placeLabel(PRESS, { x: 1, y: 2 }, 'x'));
  expect(apply(labelled, build.removeLabels(['t1'])).labels).toEqual([]);
  expect(() => build.placeLabel(PRESS, { x: 1, y: 2 }, 'a\nb')).toThrow(/control character/);
});

// A search through all parts for each of them would run into the time limit of a test.
test('thousands of parts are copied and removed as one edit each', () => {
  const parts = Array.from({ length: 4000 }, (_, i): Part => ({ id: `T${i + 1}`, kind: 'tank', ...at(i, 0) }));
  const connections = parts
    .slice(1)
    .map((p, i) => ({ id: `c${i + 1}`, from: ref(`T${i + 1}.T`), to: { part: p.id, port: 'T' } }));
  const row: Circuit = { name: 'Row', parts, connections };
  const ids = parts.map((p) => p.id);
  const double = applyEdit(row, build.duplicate(row, ids, 0, 9, () => []).edit);
  expect([double.parts.length, double.connections.length]).toEqual([8000, 7998]);
  const copies = double.parts.slice(4000).map((p) => p.id);
  expect(applyEdit(double, build.removeParts(double, copies))).toStrictEqual(row);
});
