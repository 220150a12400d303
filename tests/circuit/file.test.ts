import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Result } from '../../src/base/result.ts';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { anyCircuit } from './generate.ts';

const HEAD = { format: 'spooltable-circuit', version: 1, name: 'Press' };
const PARTS = [
  { id: 'V1', kind: 'directional-valve' },
  { id: 'C1', kind: 'cylinder' },
];
const file = (fields: object): string => JSON.stringify({ ...HEAD, parts: PARTS, connections: [], ...fields });
const read = (text: string): Circuit => {
  const result = readCircuit(text);
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return result.value;
};
const said = <T>(result: Result<T>): string[] =>
  (result.ok ? result.warnings : result.problems).map((p) => `${p.where}: ${p.what} ${p.remedy}`);

describe('round trip', () => {
  test('any circuit comes back from its file as it was', () => {
    fc.assert(
      fc.property(anyCircuit, (circuit) => {
        const text = writeCircuit(circuit);
        const back = read(text);
        expect(back).toStrictEqual(circuit);
        expect(writeCircuit(back)).toBe(text);
      }),
      { numRuns: 300 },
    );
  });

  test('the text of another writer settles at once', () => {
    fc.assert(
      fc.property(anyCircuit, (circuit) => {
        const dense = JSON.stringify(JSON.parse(writeCircuit(circuit)));
        const once = writeCircuit(read(dense));
        expect(writeCircuit(read(once))).toBe(once);
      }),
    );
  });

  test('unknown fields of every object are kept, told and written back', () => {
    const valve = {
      ports: [{ id: 'P', side: 'bottom', thread: 'G1/2' }],
      positions: [{ name: '0', paths: [], colour: 'red' }],
      left: ['coil'],
      right: ['spring'],
      coils: [{ name: 'a', position: 0, volts: 24 }],
      mass: 2,
    };
    const text = file({
      parts: [{ id: 'V1', kind: 'directional-valve', valve, row: 1 }],
      connections: [{ id: 'c1', from: 'V1.P', to: 'V1.T', hose: true }],
      labels: [{ id: 't1', at: [0, 0], text: 'x', font: 'y' }],
      rules: [{ id: 'r1', text: 'never V1 at a', why: 'both' }],
      plans: [
        {
          id: 'p1',
          name: 'Cycle',
          steps: [{ id: 's1', ends: { by: 'sensor', actuator: 'C1', at: 'out', make: 'x' }, lamp: 1 }],
          shift: 2,
        },
      ],
      budget: 3,
    });
    const result = readCircuit(text);
    expect(said(result).map((line) => line.split(':')[0])).toEqual([
      'parts[0].valve.ports[0].thread',
      'parts[0].valve.positions[0].colour',
      'parts[0].valve.coils[0].volts',
      'parts[0].valve.mass',
      'parts[0].row',
      'connections[0].hose',
      'labels[0].font',
      'rules[0].why',
      'plans[0].steps[0].ends.make',
      'plans[0].steps[0].lamp',
      'plans[0].shift',
      'budget',
    ]);
    expect(JSON.parse(writeCircuit(read(text)))).toEqual(JSON.parse(text));
  });

  test('a field that is really called "extra" is an unknown field like others', () => {
    const circuit = read(file({ extra: { a: 1 } }));
    expect(circuit.extra).toEqual({ extra: { a: 1 } });
    expect(JSON.parse(writeCircuit(circuit))).toHaveProperty('extra', { a: 1 });
  });

  test('a plan is read whatever it speaks of, since parts may be drawn later', () => {
    const plans = [
      {
        id: 'p1',
        name: 'Cycle',
        start: { C9: 'half way' },
        standing: { V9: 'nowhere' },
        loadCase: 'none',
        steps: [
          { id: 's1', coils: ['V9.far left'], expect: 'NOBODY+', ends: { by: 'motion' }, within: 'soon' },
          { id: 's2', levers: { V9: 'x' }, stopped: ['P9'], ends: { by: 'pressure', switch: 'S9', turns: 'on' } },
        ],
      },
    ];
    expect(read(file({ plans })).plans).toEqual(plans);
  });

  test('script text in labels is text', () => {
    const label = '<script>alert("x")</script>';
    const circuit = read(
      file({ parts: [{ id: 'T1', kind: 'tank', label }], labels: [{ id: 't', at: [0, 0], text: label }] }),
    );
    expect(circuit.parts[0]?.label).toBe(label);
    expect(read(writeCircuit(circuit)).labels?.[0]?.text).toBe(label);
  });

  test('minus nought is nought, so that equal places are equal', () => {
    const text = file({ parts: [{ id: 'T1', kind: 'tank', at: ['-0', 5] }] }).replace('"-0"', '-0');
    expect(read(text).parts[0]?.at).toStrictEqual({ x: 0, y: 5 });
  });

  test('a byte order mark at the start is passed over', () => {
    expect(read('\ufeff' + file({})).parts.length).toBe(2);
  });
});

describe('the written text', () => {
  const parts = Array.from({ length: 20 }, (_, i) => ({ id: `P${i}`, kind: 'tank', at: { x: i * 8, y: 4 } }));
  const connections = Array.from({ length: 19 }, (_, i) => ({
    id: `c${i}`,
    from: { part: `P${i}`, port: 'T' },
    to: { part: `P${i + 1}`, port: 'T' },
  }));
  const circuit: Circuit = { name: 'Row', parts, connections };

  test('moving one part changes exactly one line', () => {
    const moved = { ...circuit, parts: parts.map((part, i) => (i === 7 ? { ...part, at: { x: 58, y: 12 } } : part)) };
    const before = writeCircuit(circuit).split('\n');
    const after = writeCircuit(moved).split('\n');
    expect(after.length).toBe(before.length);
    expect(after.filter((line, i) => line !== before[i])).toEqual([
      '    { "id": "P7", "kind": "tank", "at": [58, 12] },',
    ]);
  });

  test('one more connection adds one line, and a comma to the one before', () => {
    const more = {
      ...circuit,
      connections: [...connections, { id: 'c99', from: { part: 'P0', port: 'T' }, to: { part: 'P9', port: 'T' } }],
    };
    const before = new Set(writeCircuit(circuit).split('\n'));
    const added = writeCircuit(more)
      .split('\n')
      .filter((line) => !before.has(line));
    expect(added).toEqual([
      '    { "id": "c18", "from": "P18.T", "to": "P19.T" },',
      '    { "id": "c99", "from": "P0.T", "to": "P9.T" }',
    ]);
  });

  test('parts keep the order of the document and fields have a fixed one', () => {
    const text = writeCircuit({
      connections: [],
      parts: [
        { turn: 90, kind: 'tank', id: 'Z' },
        { kind: 'tank', id: 'A' },
      ],
      notes: 'n',
      name: 'Order',
    });
    expect(text).toBe(`{
  "format": "spooltable-circuit",
  "version": 1,
  "name": "Order",
  "notes": "n",
  "parts": [
    { "id": "Z", "kind": "tank", "turn": 90 },
    { "id": "A", "kind": "tank" }
  ],
  "connections": []
}
`);
  });

  test('a plan has a line for each step', () => {
    const steps = Array.from({ length: 3 }, (_, i) => ({
      id: `s${i}`,
      coils: ['V1.a'],
      expect: 'C1+',
      ends: { by: 'sensor', actuator: 'C1', at: 'out' } as const,
    }));
    const text = writeCircuit({ ...circuit, plans: [{ id: 'p1', name: 'Cycle', steps }] });
    expect(text).toContain(
      '\n        { "id": "s1", "coils": ["V1.a"], "expect": "C1+", "ends": { "by": "sensor", "actuator": "C1", "at": "out" } },\n',
    );
  });

  test('no line is over 160 characters while it can be broken', () => {
    const settings = Object.fromEntries(Array.from({ length: 12 }, (_, i) => [`setting-${i}`, `${i} L/min of oil`]));
    const text = writeCircuit({
      name: 'Long',
      parts: [{ id: 'P1', kind: 'fixed-pump', at: { x: 1, y: 2 }, settings }],
      connections: [],
    });
    expect(Math.max(...text.split('\n').map((line) => line.length))).toBeLessThanOrEqual(160);
    expect(text).toContain('\n      "at": [1, 2],\n');
    expect(text).toContain('\n        "setting-3": "3 L/min of oil",\n');
  });

  test('no unknown field can overrule a known one', () => {
    const text = writeCircuit({
      name: 'Real',
      parts: [],
      connections: [],
      extra: { name: 'False', version: 9, more: 1 },
    });
    expect(JSON.parse(text)).toEqual({ ...HEAD, name: 'Real', parts: [], connections: [], more: 1 });
  });
});

describe('size', () => {
  const many = (n: number, of: (i: number) => object): object[] => Array.from({ length: n }, (_, i) => of(i));
  test('10,000 parts are read, one more is refused', () => {
    const text = (n: number): string => file({ parts: many(n, (i) => ({ id: `p${i}`, kind: 'tank' })) });
    expect(read(text(10_000)).parts.length).toBe(10_000);
    expect(said(readCircuit(text(10_001)))).toEqual([
      'parts: The circuit has 10001 parts; at most 10000 can be read. Split it into several circuits.',
    ]);
  });
  test('more than 100 plans, or 500 steps in one, are refused', () => {
    const plan = (i: number, steps: number): object => ({
      id: `p${i}`,
      name: 'Cycle',
      steps: many(steps, (n) => ({ id: `s${n}`, ends: { by: 'motion' } })),
    });
    expect(read(file({ plans: many(100, (i) => plan(i, 1)) })).plans?.length).toBe(100);
    expect(said(readCircuit(file({ plans: many(101, (i) => plan(i, 1)) })))[0]).toMatch(/^plans: The circuit has 101/);
    expect(read(file({ plans: [plan(0, 500)] })).plans?.[0]?.steps.length).toBe(500);
    expect(said(readCircuit(file({ plans: [plan(0, 501)] })))).toEqual([
      'plans[0].steps: Too many steps. Use at most 500.',
    ]);
  });
  test('more than 40,000 connections are refused', () => {
    const text = file({ connections: many(40_001, (i) => ({ id: `c${i}`, from: 'V1.A', to: 'C1.A' })) });
    expect(said(readCircuit(text))[0]).toMatch(/^connections: The circuit has 40001 connections/);
  });
  test('more than 20 MB are refused unread', () => {
    expect(said(readCircuit(' '.repeat(20_000_001)))[0]).toMatch(/^file: The file is too large: 20000001 characters/);
  });
  test('thousands of problems are told as the first fifty and a count', () => {
    const told = said(readCircuit(file({ parts: many(1000, () => ({ id: 'a b', kind: 'tank' })) })));
    expect(told.length).toBe(51);
    expect(told.at(-1)).toMatch(/950 more/);
  });
});
