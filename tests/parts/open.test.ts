import { describe, expect, test } from 'vitest';
import { writeCircuit } from '../../src/circuit/file.ts';
import { ENTRIES } from '../../src/parts/catalogue.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { circuit } from '../notation.ts';

const HEAD = { format: 'spooltable-circuit', version: 1, name: 'Press' };
const PARTS = [
  { id: 'P1', kind: 'fixed-pump' },
  { id: 'T1', kind: 'tank' },
];
const LINES = [{ id: 'c1', from: 'P1.S', to: 'T1.T' }];
const file = (fields: object): string => JSON.stringify({ ...HEAD, parts: PARTS, connections: LINES, ...fields });
const pump = (settings: object): string =>
  file({ parts: [{ id: 'P1', kind: 'fixed-pump', settings }], connections: [] });

const GOOD = writeCircuit(
  circuit(
    'P1 fixed-pump, T1 tank, R1 relief-valve, V1 directional-valve, C1 cylinder | P1.P V1.P R1.P | V1.A C1.A | V1.B C1.B | V1.T R1.T T1.T',
  ),
);

test('a sound file opens without a warning and is written as it was', () => {
  const result = openCircuit(GOOD);
  expect(result.ok && result.warnings).toEqual([]);
  expect(result.ok && writeCircuit(result.value)).toBe(GOOD);
});

/** What no program should take: the text, the place named, and what is said. */
const BAD: [string, string, string, RegExp][] = [
  ['not JSON', 'P1 -> V1', 'line 1, column 1', /not JSON/],
  ['a wrong version', file({ version: 9 }), 'version', /version 9/],
  ['an unknown kind', file({ parts: [{ id: 'P1', kind: 'pmup' }], connections: [] }), 'parts[0].kind', /"pmup"/],
  ['a duplicate id', file({ parts: [...PARTS, { id: 'T1', kind: 'tank' }] }), 'parts[2].id', /"T1"/],
  [
    'a connection to no part',
    file({ connections: [{ id: 'c1', from: 'P1.P', to: 'V1.P' }] }),
    'connections[0].to',
    /"V1"/,
  ],
  [
    'a connection to no port',
    file({ connections: [{ id: 'c1', from: 'P1.P', to: 'T1.Q' }] }),
    'connections[0].to',
    /Q/,
  ],
  ['a line to itself', file({ connections: [{ id: 'c1', from: 'P1.P', to: 'P1.P' }] }), 'connections[0]', /itself/],
  ['NaN as a number', pump({ flow: 'x' }).replace('"x"', 'NaN'), 'line 1, column 118', /NaN is not a number/],
  ['NaN as text', pump({ flow: 'NaN L/min' }), 'parts[0].settings.flow', /P1/],
  ['a negative flow', pump({ flow: '-20 L/min' }), 'parts[0].settings.flow', /P1/],
  ['a number out of range', pump({ flow: 'x' }).replace('"x"', '1e999'), 'parts[0].settings.flow', /setting/],
  [
    'a negative bore',
    file({ parts: [{ id: 'C1', kind: 'cylinder', settings: { bore: '-50 mm' } }], connections: [] }),
    'parts[0].settings.bore',
    /C1/,
  ],
  [
    '10,001 parts',
    file({ parts: Array.from({ length: 10_001 }, (_, i) => ({ id: `T${i}`, kind: 'tank' })) }),
    'parts',
    /10001 parts/,
  ],
  ['a __proto__ key', file({}).replace('"kind"', '"__proto__"'), 'parts[0].__proto__', /__proto__/],
  [
    'a form of another kind',
    file({ parts: [{ id: 'T1', kind: 'tank', readyMade: 'cylinder' }], connections: [] }),
    'parts[0].readyMade',
    /"cylinder" is no ready-made form of tank/,
  ],
  [
    'a form that is no text',
    file({ parts: [{ id: 'T1', kind: 'tank', readyMade: ['tank'] }], connections: [] }),
    'parts[0].readyMade',
    /a list/,
  ],
];
describe('a file is refused whole for', () => {
  test.each(BAD)('%s', (_, text, where, what) => {
    const result = openCircuit(text);
    expect(result.ok).toBe(false);
    expect(result).not.toHaveProperty('value');
    const problems = result.ok ? [] : result.problems;
    expect(problems.map((problem) => problem.where)).toEqual([where]);
    expect(problems[0]?.what).toMatch(what);
    expect(problems[0]?.remedy).not.toBe('');
  });
});

test('10,000 parts open', () => {
  const result = openCircuit(
    file({ parts: Array.from({ length: 10_000 }, (_, i) => ({ id: `T${i}`, kind: 'tank' })), connections: [] }),
  );
  expect(result.ok && result.value.parts.length).toBe(10_000);
});

test('script text in a label opens as text', () => {
  const label = '<img src=x onerror=alert(1)>';
  const result = openCircuit(file({ parts: [{ id: 'T1', kind: 'tank', label }], connections: [] }));
  expect(result.ok && result.value.parts[0]?.label).toBe(label);
});

test('a doubled connection is told once', () => {
  const result = openCircuit(file({ connections: [...LINES, { id: 'c2', from: 'T1.T', to: 'P1.S' }] }));
  expect(result.ok && result.warnings.map((warning) => warning.where)).toEqual(['connections[1]']);
});

describe('ready-made parts', () => {
  test.each(ENTRIES.map((entry) => [entry.readyMade.id, entry] as const))(
    '%s opens from its word alone',
    (id, entry) => {
      const result = openCircuit(
        file({ parts: [{ id: 'X1', kind: entry.kind.kind, readyMade: id }], connections: [] }),
      );
      expect(result).toMatchObject({ ok: true, warnings: [{ where: 'parts[0].readyMade' }] });
      expect(result.ok && result.value.parts).toEqual([{ id: 'X1', kind: entry.kind.kind, ...entry.readyMade.make() }]);
    },
  );

  test('give way to what the part says itself, and other unknown fields stay', () => {
    const own = { id: 'C1', kind: 'cylinder', readyMade: 'cylinder-lifting', settings: { bore: '80 mm' }, mass: 7 };
    const result = openCircuit(file({ parts: [own], connections: [] }));
    const lifting = circuit('C1 cylinder:cylinder-lifting').parts[0];
    expect(result.ok && result.value.parts[0]).toEqual({
      id: 'C1',
      kind: 'cylinder',
      settings: { ...lifting?.settings, bore: '80 mm' },
      extra: { mass: 7 },
    });
    expect(result.ok && result.warnings.map((warning) => warning.where)).toEqual([
      'parts[0].mass',
      'parts[0].readyMade',
    ]);
  });
});
