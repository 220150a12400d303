import { describe, expect, test } from 'vitest';
import { omit } from '../../src/circuit/fields.ts';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import {
  all,
  applyEdit,
  changeCircuit,
  changeConnection,
  changeLabel,
  changePart,
  invertEdit,
  type Edit,
} from '../../src/circuit/edit.ts';
import type { Circuit, Part } from '../../src/circuit/model.ts';
import { RefusedEdit } from '../../src/circuit/refused.ts';
import { circuit } from '../notation.ts';

const START: Circuit = {
  ...circuit('P1 fixed-pump, T1 tank, V1 directional-valve, C1 cylinder | P1.P V1.P | LIFT: V1.A C1.A | V1.T T1.T', {
    C1: { label: 'LIFT', at: { x: 10, y: 20 } },
  }),
  labels: [{ id: 't1', at: { x: 0, y: 0 }, text: 'Station 1' }],
  notes: 'First draft',
};
const BARE: Circuit = omit(START, 'labels');

const part = (c: Circuit, id: string): Part | undefined => c.parts.find((p) => p.id === id);

/** The edit, and what is to be seen after it. */
const EDITS: [string, Edit, (after: Circuit) => void][] = [
  [
    'put a part first',
    { type: 'put-part', index: 0, part: { id: 'T2', kind: 'tank' } },
    (c) => expect(c.parts.map((p) => p.id)).toEqual(['T2', 'P1', 'T1', 'V1', 'C1']),
  ],
  [
    'put a part last',
    { type: 'put-part', index: 4, part: { id: 'T2', kind: 'tank', label: 'SUMP' } },
    (c) => expect(c.parts.map((p) => p.id)).toEqual(['P1', 'T1', 'V1', 'C1', 'T2']),
  ],
  [
    'remove a part after its connections',
    all([
      { type: 'remove-connection', id: 'c1' },
      { type: 'remove-part', id: 'P1' },
    ]),
    (c) => expect([c.parts.length, c.connections.map((x) => x.id)]).toEqual([3, ['c2', 'c3']]),
  ],
  [
    'change fields of a part',
    changePart('C1', { at: { x: 1, y: 2 }, turn: 90, code: 'H1' }),
    (c) =>
      expect(part(c, 'C1')).toEqual({
        id: 'C1',
        kind: 'cylinder',
        label: 'LIFT',
        at: { x: 1, y: 2 },
        turn: 90,
        code: 'H1',
      }),
  ],
  [
    'remove fields of a part',
    changePart('C1', { at: undefined, label: undefined }),
    (c) => expect(part(c, 'C1')).toStrictEqual({ id: 'C1', kind: 'cylinder' }),
  ],
  [
    'put a connection between',
    {
      type: 'put-connection',
      index: 1,
      connection: { id: 'c9', from: { part: 'V1', port: 'B' }, to: { part: 'C1', port: 'B' } },
    },
    (c) => expect(c.connections.map((x) => x.id)).toEqual(['c1', 'c9', 'c2', 'c3']),
  ],
  [
    'remove a connection',
    { type: 'remove-connection', id: 'c2' },
    (c) => expect(c.connections.map((x) => x.id)).toEqual(['c1', 'c3']),
  ],
  [
    'change a connection',
    changeConnection('c2', { name: undefined, use: 'pilot', to: { part: 'C1', port: 'B' } }),
    (c) =>
      expect(c.connections[1]).toStrictEqual({
        id: 'c2',
        from: { part: 'V1', port: 'A' },
        to: { part: 'C1', port: 'B' },
        use: 'pilot',
      }),
  ],
  [
    'put a label',
    { type: 'put-label', index: 0, label: { id: 't2', at: { x: 1, y: 1 }, text: '<b>' } },
    (c) => expect(c.labels?.map((l) => l.text)).toEqual(['<b>', 'Station 1']),
  ],
  ['remove a label', { type: 'remove-label', id: 't1' }, (c) => expect(c.labels).toEqual([])],
  [
    'remove the last label and its list',
    { type: 'remove-label', id: 't1', list: true },
    (c) => expect('labels' in c).toBe(false),
  ],
  [
    'change a label',
    changeLabel('t1', { text: 'Station 2' }),
    (c) => expect(c.labels?.[0]).toEqual({ id: 't1', at: { x: 0, y: 0 }, text: 'Station 2' }),
  ],
  [
    'change the circuit',
    changeCircuit({ name: 'Press', notes: undefined, title: { number: '7' } }),
    (c) => expect([c.name, 'notes' in c, c.title]).toEqual(['Press', false, { number: '7' }]),
  ],
  ['nothing at all', all([]), (c) => expect(c).toEqual(START)],
];

describe.each(EDITS)('%s', (_, edit, look) => {
  const before = structuredClone(START);
  const after = applyEdit(START, edit);

  test('gives the result and leaves the circuit before as it was', () => {
    look(after);
    expect(START).toStrictEqual(before);
  });
  test('is taken back by its inverse, and done again by the inverse of that', () => {
    const inverse = invertEdit(START, edit);
    expect(applyEdit(after, inverse)).toStrictEqual(before);
    expect(applyEdit(START, invertEdit(after, inverse))).toStrictEqual(after);
    expect(writeCircuit(applyEdit(after, inverse))).toBe(writeCircuit(START));
  });
  test('is the same after a way through JSON', () => {
    const again = JSON.parse(JSON.stringify(edit)) as Edit;
    expect(applyEdit(START, again)).toStrictEqual(after);
    const inverse = JSON.parse(JSON.stringify(invertEdit(START, edit))) as Edit;
    expect(applyEdit(after, inverse)).toStrictEqual(before);
  });
  test('leaves a circuit that a file can hold', () => {
    expect(readCircuit(writeCircuit(after))).toMatchObject({ ok: true, value: after });
  });
});

test('the first label brings its list, and takes it away again', () => {
  const put: Edit = { type: 'put-label', index: 0, label: { id: 't', at: { x: 0, y: 0 }, text: 'x' } };
  const after = applyEdit(BARE, put);
  expect(after.labels?.length).toBe(1);
  expect(applyEdit(after, invertEdit(BARE, put))).toStrictEqual(BARE);
});

test('lists that an edit does not touch are the same objects', () => {
  const after = applyEdit(START, changePart('C1', { code: 'H1' }));
  expect(after.connections).toBe(START.connections);
  expect(after.parts[0]).toBe(START.parts[0]);
});

const ref = (text: string): { part: string; port: string } => ({
  part: text.split('.')[0] ?? '',
  port: text.split('.')[1] ?? '',
});
const connection = (id: string, from: string, to: string): Edit => ({
  type: 'put-connection',
  index: 0,
  connection: { id, from: ref(from), to: ref(to) },
});

/** The edit, and why it does not fit. */
const REFUSED: [string, Edit, RegExp][] = [
  ['a taken part id', { type: 'put-part', index: 0, part: { id: 'P1', kind: 'tank' } }, /a part "P1" already/],
  ['a wrong part id', { type: 'put-part', index: 0, part: { id: 'P.1', kind: 'tank' } }, /is no part id/],
  ['an id of machinery', { type: 'put-part', index: 0, part: { id: '__proto__', kind: 'tank' } }, /is no part id/],
  ['a taken shown name', { type: 'put-part', index: 0, part: { id: 'LIFT', kind: 'tank' } }, /C1 is shown as "LIFT"/],
  [
    'a place past the end',
    { type: 'put-part', index: 5, part: { id: 'X', kind: 'tank' } },
    /no place 5 in a list of 4/,
  ],
  ['a negative place', { type: 'put-part', index: -1, part: { id: 'X', kind: 'tank' } }, /no place -1/],
  ['a part that is not there', { type: 'remove-part', id: 'X' }, /no part "X"/],
  ['a part with connections', { type: 'remove-part', id: 'V1' }, /"c1" still ends at this part/],
  ['changing a part that is not there', changePart('X', { turn: 90 }), /no part "X"/],
  ['changing to a taken label', changePart('P1', { label: 'LIFT' }), /C1 is shown as "LIFT"/],
  ['changing an id', { type: 'change-part', id: 'P1', fields: { id: 'P2' } as object }, /An id cannot be changed/],
  ['a place off the sheet', changePart('P1', { at: { x: 1e6, y: 0 } }), /off the sheet/],
  ['a place that is no number', changePart('P1', { at: { x: NaN, y: 0 } }), /off the sheet/],
  ['a bend off the sheet', changeConnection('c1', { bends: [{ x: 0, y: Infinity }] }), /off the sheet/],
  ['a taken connection id', connection('c1', 'V1.B', 'C1.B'), /a connection "c1" already/],
  ['a connection to no part', connection('c9', 'V1.B', 'X.B'), /no part "X"/],
  ['a connection to itself', connection('c9', 'V1.B', 'V1.B'), /from V1.B to itself/],
  ['bending a connection to itself', changeConnection('c2', { to: ref('V1.A') }), /from V1.A to itself/],
  ['a connection that is not there', { type: 'remove-connection', id: 'X' }, /no connection "X"/],
  [
    'a taken label id',
    { type: 'put-label', index: 0, label: { id: 't1', at: { x: 0, y: 0 }, text: '' } },
    /a label "t1" already/,
  ],
  ['a label that is not there', { type: 'remove-label', id: 'X' }, /no label "X"/],
  ['a list as a whole', { type: 'change-circuit', fields: { parts: [] } as object }, /"parts" cannot be changed whole/],
  ['the last of several', all([changePart('P1', { turn: 90 }), { type: 'remove-part', id: 'V1' }]), /still ends/],
];
test.each(REFUSED)('an edit that does not fit is refused: %s', (_, edit, why) => {
  const before = structuredClone(START);
  expect(() => applyEdit(START, edit)).toThrow(RefusedEdit);
  expect(() => applyEdit(START, edit)).toThrow(why);
  expect(START).toStrictEqual(before);
});
