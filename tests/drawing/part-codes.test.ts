import fc from 'fast-check';
import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { readCircuit } from '../../src/circuit/file.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { partCodes } from '../../src/drawing/part-codes.ts';
import { byCode, partList } from '../../src/drawing/part-list.ts';
import { writePartListCsv } from '../../src/report/part-list.ts';

function example(name: string): Circuit {
  const read = readCircuit(readFileSync(`examples/${name}.spool.json`, 'utf8'));
  if (!read.ok) throw new Error(`${name} cannot be read`);
  return read.value;
}

const bare = (circuit: Circuit): Circuit => ({ ...circuit, parts: circuit.parts.map(({ code: _, ...part }) => part) });

/** The codes of these examples were given by hand, in the manner of ISO 1219-2 (from memory). */
test.each(['bale-gate', 'stage-lift', 'stone-saw', 'tub-tipper', 'net-winch', 'stacker-bank', 'crate-pusher'])(
  'codes of %s come out as they were given by hand',
  (name) => {
    const circuit = example(name);
    const given = circuit.parts.flatMap(({ id, code }): [string, string][] => (code === undefined ? [] : [[id, code]]));
    expect(Object.fromEntries(partCodes(bare(circuit)))).toEqual(Object.fromEntries(given));
  },
);

test('own codes stay, their numbers are not used again, and a circuit keeps the number of its own codes', () => {
  const circuit = bare(example('log-deck'));
  const own: Readonly<Record<string, string>> = { LIFT: 'H7.1', PUMP1: 'H0.2', FEED: 'motor' };
  const some = {
    ...circuit,
    parts: circuit.parts.map((part) => (own[part.id] === undefined ? part : { ...part, code: own[part.id] as string })),
  };
  const codes = partCodes(some);
  expect([codes.get('LIFT'), codes.get('PUMP1'), codes.get('FEED')]).toEqual([undefined, undefined, undefined]);
  expect(codes.get('V2')).toBe('H7.2');
  expect([...codes.values()]).not.toContain('H0.2');
  expect(codes.get('V1')).toBe('H1.1');
  expect(codes.get('V3')).toMatch(/^H2\./);
});

test('a system goes in front, tanks and points of lines get no code, and codes are unique', () => {
  const codes = partCodes(bare(example('log-deck')), '1');
  expect(codes.get('V2')).toBe('1-H2.1');
  expect([...codes.keys()].filter((id) => id.startsWith('TANK'))).toEqual([]);
  for (const name of readdirSync('examples').filter((file) => file.endsWith('.spool.json'))) {
    const values = [...partCodes(bare(example(name.replace('.spool.json', '')))).values()];
    expect(new Set(values).size).toBe(values.length);
  }
});

test('giving codes once leaves nothing to give', () => {
  const circuit = bare(example('log-deck'));
  const codes = partCodes(circuit);
  const coded = {
    ...circuit,
    parts: circuit.parts.map((part) => ({
      ...part,
      ...(codes.has(part.id) && { code: codes.get(part.id) as string }),
    })),
  };
  expect(partCodes(coded).size).toBe(0);
});

test('codes are in order by their numbers, and the order is one', () => {
  expect(['H2.10', 'H10.1', 'H2.9', '1-H2.1'].sort(byCode)).toEqual(['1-H2.1', 'H2.9', 'H2.10', 'H10.1']);
  fc.assert(
    fc.property(fc.string(), fc.string(), (a, b) => {
      expect(Math.sign(byCode(a, b))).toBe(-Math.sign(byCode(b, a)) + 0);
    }),
  );
});

test('parts alike in kind and size are one entry, all tank symbols one tank, and only entered data stand in it', () => {
  const pump = (id: string, flow?: string) => ({
    id,
    kind: 'fixed-pump',
    ...(flow === undefined ? {} : { settings: { flow } }),
  });
  const circuit: Circuit = {
    name: 'List',
    parts: [
      { ...pump('P1', '6 L/min'), code: 'H0.2' },
      { ...pump('P2', '6 L/min'), code: 'H0.1' },
      pump('P3'),
      { id: 'T1', kind: 'tank' },
      { id: 'T2', kind: 'tank' },
      { id: 'J1', kind: 'junction' },
      { id: 'C1', kind: 'cylinder', settings: { bore: '63 mm', load: '20 kN', loadSense: 'pushes in' } },
    ],
    connections: [],
  };
  expect(partList(circuit)).toEqual([
    {
      item: 1,
      codes: ['H0.1', 'H0.2'],
      labels: ['P1', 'P2'],
      kind: 'Fixed pump',
      data: 'flow 6 L/min',
      sheets: [1],
      count: 2,
    },
    { item: 2, codes: [], labels: ['P3'], kind: 'Fixed pump', data: '', sheets: [1], count: 1 },
    { item: 3, codes: [], labels: ['T1'], kind: 'Tank', data: 'drawn 2 times', sheets: [1], count: 1 },
    { item: 4, codes: [], labels: ['C1'], kind: 'Cylinder', data: 'bore 63 mm', sheets: [1], count: 1 },
  ]);
});

/** RFC 4180: CRLF, quotes round fields with commas; a formula gets an apostrophe in front. */
test('the part list as CSV has a head and defuses formulas', () => {
  const circuit: Circuit = {
    name: 'L',
    parts: [{ id: 'P1', kind: 'gauge', label: '=1+1', code: 'a,b' }],
    connections: [],
  };
  expect([...writePartListCsv(circuit)].join('')).toBe(
    `Item,Code,Label,Part,Data,Count\r\n1,"a,b",'=1+1,Pressure gauge,,1\r\n`,
  );
});
