import { describe, expect, test } from 'vitest';
import { readCircuit } from '../../src/circuit/file.ts';
import { STEPS } from '../../src/circuit/migrate.ts';

const HEAD = { format: 'spooltable-circuit', version: 1, name: 'Press' };
const file = (fields: object): string =>
  JSON.stringify({
    ...HEAD,
    parts: [
      { id: 'V1', kind: 'directional-valve' },
      { id: 'C1', kind: 'cylinder' },
    ],
    connections: [],
    ...fields,
  });
const part = (fields: object): string => file({ parts: [{ id: 'T1', kind: 'tank', ...fields }] });
const line = (...connections: object[]): string => file({ connections });
const plan = (fields: object, step: object = {}): string =>
  file({ plans: [{ id: 'p', name: 'Cycle', steps: [{ id: 's', ends: { by: 'motion' }, ...step }], ...fields }] });

function refusals(text: string): string[] {
  const result = readCircuit(text);
  if (result.ok) throw new Error('The file was read.');
  for (const problem of result.problems) {
    expect(problem.what).toMatch(/\.$/);
    expect(problem.remedy).toMatch(/\.$/);
  }
  return result.problems.map((p) => `${p.where}: ${p.what} ${p.remedy}`);
}

/** The text, and how the only problem reads. */
const SHAPE: [string, string, RegExp][] = [
  ['a list', '[]', /^file: The file holds no circuit: it is not an object/],
  ['a number', '5', /^file: The file holds no circuit/],
  ['null', 'null', /^file: The file holds no circuit/],
  ['another JSON file', '{"a":1}', /^format: The format is missing.*"format": "spooltable-circuit"/],
  ['a wrong format word', '{"format":"sheet"}', /^format: The format is "sheet"\./],
  ['no version', '{"format":"spooltable-circuit"}', /^version: The version is missing/],
  ['a version that is text', file({ version: '1' }), /^version: The version is not a whole number/],
  ['half a version', file({ version: 1.5 }), /^version: The version is not a whole number/],
  [
    'a newer version',
    file({ version: 2 }),
    /^version: The file has version 2; this program reads up to version 1\. Open it with a newer/,
  ],
  ['a version that never was', file({ version: 0 }), /^version: Version 0 of the file is not known/],
  [
    'no name',
    JSON.stringify({ ...HEAD, name: undefined, parts: [], connections: [] }),
    /^name: This field is missing\. Write a text/,
  ],
  ['no parts', JSON.stringify({ ...HEAD, connections: [] }), /^parts: This field is missing\. Write a list/],
  ['parts as an object', file({ parts: {} }), /^parts: This is an object\. Write a list/],
  ['a part that is null', file({ parts: [null] }), /^parts\[0\]: This is null\. Write an object/],
  ['no kind', file({ parts: [{ id: 'T1' }] }), /^parts\[0\]\.kind: This field is missing/],
  ['an empty kind', part({ kind: '' }), /^parts\[0\]\.kind: The kind is empty/],
  ['a dot in an id', part({ id: 'T.1' }), /^parts\[0\]\.id: This is no id\. Use letters, digits, - and _/],
  ['an empty id', part({ id: '' }), /^parts\[0\]\.id: This is no id/],
  ['an id of machinery', part({ id: '__proto__' }), /^parts\[0\]\.id: This word cannot be an id/],
  ['a long id', part({ id: 'x'.repeat(101) }), /^parts\[0\]\.id: This id is longer than 100/],
  [
    'a taken part id',
    file({
      parts: [
        { id: 'A', kind: 'tank' },
        { id: 'A', kind: 'tank' },
      ],
    }),
    /^parts\[1\]\.id: The id "A" is taken by parts\[0\]/,
  ],
  [
    'a taken label',
    file({
      parts: [
        { id: 'A', kind: 'tank' },
        { id: 'B', kind: 'tank', label: 'A' },
      ],
    }),
    /^parts\[1\]\.label: The part A is shown as "A" too/,
  ],
  [
    'a label id taken',
    file({
      labels: [
        { id: 'a', at: [0, 0], text: 'x' },
        { id: 'a', at: [0, 0], text: 'y' },
      ],
    }),
    /^labels\[1\]\.id: .*taken by labels\[0\]/,
  ],
  ['a point of one number', part({ at: [1] }), /^parts\[0\]\.at: This is no point\. Write two numbers/],
  ['a point of text', part({ at: ['1', 2] }), /^parts\[0\]\.at\[0\]: This is a text\. Write a number/],
  ['a point as an object', part({ at: { x: 1, y: 2 } }), /^parts\[0\]\.at: This is no point/],
  ['a point off the sheet', part({ at: [0, 100_001] }), /^parts\[0\]\.at\[1\]: This point lies off the sheet/],
  [
    'an infinite place',
    part({}).replace('"tank"', '"tank","at":[1e999,0]'),
    /^parts\[0\]\.at\[0\]: This is Infinity, which is not a finite number/,
  ],
  [
    'an infinite setting',
    part({}).replace('"tank"', '"tank","settings":{"flow":-1e999}'),
    /^parts\[0\]\.settings\.flow: This is no setting/,
  ],
  ['a setting that is null', part({ settings: { flow: null } }), /^parts\[0\]\.settings\.flow: This is no setting/],
  ['an eighth of a turn', part({ turn: 45 }), /^parts\[0\]\.turn: This is no quarter turn\. Use 0, 90, 180 or 270/],
  ['a flip of 1', part({ flip: 1 }), /^parts\[0\]\.flip: This is a number\. Write true or false/],
  ['a bell in a label', part({ label: 'a\u0007' }), /^parts\[0\]\.label: This text holds a control character/],
  ['a line break in a label', part({ label: 'a\nb' }), /^parts\[0\]\.label: This text holds a control character/],
  ['a C1 control in a label', part({ label: 'a\u009bb' }), /^parts\[0\]\.label: This text holds a control character/],
  ['a long label', part({ label: 'x'.repeat(201) }), /^parts\[0\]\.label: This text is longer than 200/],
  ['a long code', part({ code: 'x'.repeat(201) }), /^parts\[0\]\.code: This text is longer than 200/],
  [
    'a bell on the sheet',
    file({ labels: [{ id: 'a', at: [0, 0], text: '\u0007' }] }),
    /^labels\[0\]\.text: This text holds a control/,
  ],
  ['a bell in the notes', file({ notes: '\u0007' }), /^notes: The notes hold a control character/],
  [
    'a negative rest position',
    part({ valve: { ports: [], positions: [], left: [], right: [], rest: -1 } }),
    /^parts\[0\]\.valve\.rest: A position cannot be negative/,
  ],
  [
    'half a position',
    part({ valve: { ports: [], positions: [], left: [], right: [], rest: 0.5 } }),
    /^parts\[0\]\.valve\.rest: .*Write a whole number/,
  ],
  [
    'an unknown operator',
    part({ valve: { ports: [], positions: [], left: ['string'], right: [] } }),
    /^parts\[0\]\.valve\.left\[0\]: "string" is not allowed here\. Use "lever", /,
  ],
  ['a plan without a name', plan({ name: undefined }), /^plans\[0\]\.name: This field is missing/],
  [
    'a plan for a part id that is none',
    plan({ start: { 'C 1': 'in' } }),
    /^plans\[0\]\.start\["?C 1"?\]: This is no id\. Use letters/,
  ],
  ['a step without an end', plan({}, { ends: undefined }), /^plans\[0\]\.steps\[0\]\.ends: This field is missing/],
  [
    'a step that ends by chance',
    plan({}, { ends: { by: 'chance' } }),
    /^plans\[0\]\.steps\[0\]\.ends.*: This does not end a step\. Use an object with "by"/,
  ],
  [
    'a switch that turns round',
    plan({}, { ends: { by: 'pressure', switch: 'S1', turns: 'round' } }),
    /^plans\[0\]\.steps\[0\]\.ends\.turns: "round" is not allowed here\. Use "on", "off"/,
  ],
  ['a coil of no valve', plan({}, { coils: ['a'] }), /^plans\[0\]\.steps\[0\]\.coils\[0\]: This is no coil\..*"V1\.a"/],
  [
    'a control character in motions',
    plan({}, { expect: 'C1+\n' }),
    /^plans\[0\]\.steps\[0\]\.expect: This text holds a control character/,
  ],
  [
    'a plan id taken',
    file({
      plans: [
        { id: 'p', name: 'a', steps: [] },
        { id: 'p', name: 'b', steps: [] },
      ],
    }),
    /^plans\[1\]\.id: The id "p" is taken by plans\[0\]/,
  ],
  [
    'a step id taken',
    file({
      plans: [
        {
          id: 'p',
          name: 'a',
          steps: [
            { id: 's', ends: { by: 'motion' } },
            { id: 's', ends: { by: 'motion' } },
          ],
        },
      ],
    }),
    /^plans\[0\]\.steps\[1\]\.id: The id "s" is taken by plans\[0\]\.steps\[0\]/,
  ],
  ['no connections', JSON.stringify({ ...HEAD, parts: [] }), /^connections: This field is missing/],
  [
    'a port without a part',
    line({ id: 'c1', from: 'A', to: 'V1.A' }),
    /^connections\[0\]\.from: This is no port\..*"V1\.A"/,
  ],
  ['a port with two dots', line({ id: 'c1', from: 'C1.A', to: 'V1.A.B' }), /^connections\[0\]\.to: This is no port/],
  [
    'a port of machinery',
    line({ id: 'c1', from: 'C1.A', to: 'constructor.A' }),
    /^connections\[0\]\.to: This word cannot name/,
  ],
  [
    'a dangling connection',
    line({ id: 'c1', from: 'C1.A', to: 'V9.A' }),
    /^connections\[0\]\.to: There is no part "V9"/,
  ],
  [
    'a connection to itself',
    line({ id: 'c1', from: 'C1.A', to: 'C1.A' }),
    /^connections\[0\]: The connection goes from C1\.A to itself/,
  ],
  [
    'a taken connection id',
    line({ id: 'c1', from: 'C1.A', to: 'V1.A' }, { id: 'c1', from: 'C1.B', to: 'V1.B' }),
    /^connections\[1\]\.id: The id "c1" is taken by connections\[0\]/,
  ],
  [
    'an unknown use',
    line({ id: 'c1', from: 'C1.A', to: 'V1.A', use: 'power' }),
    /^connections\[0\]\.use: "power" is not allowed here\. Use "working"/,
  ],
  [
    'a __proto__ key',
    '{"format":"spooltable-circuit","__proto__":{"version":1}}',
    /^__proto__: The name "__proto__" is not allowed/,
  ],
  [
    'a constructor key deep down',
    part({ notes: [{ constructor: { prototype: 1 } }] }),
    /^parts\[0\]\.notes\[0\]\.constructor: The name "constructor"/,
  ],
  ['a prototype key', file({ title: { prototype: 'x' } }), /^title\.prototype: The name "prototype"/],
];

describe('a file is refused whole for', () => {
  test.each(SHAPE)('%s', (_, text, wanted) => {
    const told = refusals(text);
    expect(told).toHaveLength(1);
    expect(told[0]).toMatch(wanted);
  });

  test('a __proto__ key, which reaches nothing', () => {
    refusals('{"format":"spooltable-circuit","version":1,"parts":[{"__proto__":{"polluted":1}}]}');
    expect(({} as { polluted?: number }).polluted).toBeUndefined();
  });

  test('every fault at once, so that one pass mends all', () => {
    const told = refusals(
      file({ parts: [{ id: 'a b', kind: 3 }], connections: [{ id: 'c', from: 'x', to: 'a.b.c' }] }),
    );
    expect(told.map((one) => one.split(':')[0])).toEqual([
      'parts[0].id',
      'parts[0].kind',
      'connections[0].from',
      'connections[0].to',
    ]);
  });
});

/** The text, and where it stops being JSON. */
const BROKEN: [string, string][] = [
  ['', 'line 1, column 1: The file is not JSON: it is empty.'],
  ['{', 'line 1, column 2: The file is not JSON: it ends too early.'],
  [
    '{\n  "parts": [1,\n    2 3]}',
    'line 3, column 7: The file is not JSON: unexpected "3". A "," or "]" should stand here.',
  ],
  ['{"a": [NaN, 0]}', 'line 1, column 8: The file is not JSON: NaN is not a number. Write a finite number.'],
  ['{"a": -Infinity}', 'line 1, column 7: The file is not JSON: -Infinity is not a number. Write a finite number.'],
  [
    '{"a" 1}',
    'line 1, column 6: The file is not JSON: unexpected "1". A ":" should stand here, after the name of a field.',
  ],
  [
    '{"a": 1,}',
    'line 1, column 9: The file is not JSON: unexpected "}". The name of a field in double quotes should stand here.',
  ],
  ['[1,]', 'line 1, column 4: The file is not JSON: unexpected "]". A value should stand here.'],
  ['{"a": 1}}', 'line 1, column 9: The file is not JSON: unexpected "}". Nothing should follow the end of the data.'],
  ['{"a": 01}', 'line 1, column 7: The file is not JSON: unexpected "0". A value should stand here.'],
  ['{"a": [}', 'line 1, column 8: The file is not JSON: unexpected "}". A value should stand here.'],
  [
    '{"a": "b\n"}',
    'line 1, column 7: The file is not JSON: this text is not closed, or holds a bare line break or a wrong "\\".',
  ],
  ['<html>', 'line 1, column 1: The file is not JSON: unexpected "<". A value should stand here.'],
];

describe('what is not JSON', () => {
  test.each(BROKEN)('%j', (text, wanted) => {
    expect(refusals(text)[0]).toContain(wanted);
  });

  test('the place is found in every text that cannot be parsed, wherever it is cut', () => {
    const whole = file({
      title: { by: 'a"b\\c\u00e9' },
      parts: [{ id: 'T1', kind: 'tank', at: [-1.5e3, 0], flip: true }],
    });
    for (let cut = 0; cut < whole.length; cut++) {
      const [told] = refusals(whole.slice(0, cut));
      expect(told).toMatch(
        /^line 1, column \d+: The file is not JSON: (it is empty|it ends too early|this text is not closed|unexpected)/,
      );
    }
  });

  test('deep nesting is refused and does no harm', () => {
    const deep = 1_000_000;
    expect(refusals('['.repeat(deep))[0]).toMatch(/ends too early/);
    expect(refusals('['.repeat(deep) + ']'.repeat(deep))[0]).toMatch(/more than 64 deep/);
    expect(refusals(file({}).replace('"Press"', `"Press","x":${'{"a":'.repeat(deep)}1${'}'.repeat(deep)}`))[0]).toMatch(
      /^x\.a\.a\.a.*64 deep/,
    );
  });
});

describe('warnings', () => {
  test('a second connection of the same two ports, either way round', () => {
    const result = readCircuit(line({ id: 'c1', from: 'C1.A', to: 'V1.A' }, { id: 'c2', from: 'V1.A', to: 'C1.A' }));
    expect(result.ok && result.value.connections.length).toBe(2);
    expect(result.ok && result.warnings).toEqual([
      {
        where: 'connections[1]',
        what: 'The connection "c1" joins C1.A and V1.A already.',
        remedy: 'Remove one of the two.',
      },
    ]);
  });
});

describe('older versions', () => {
  // There never was a version 0: this one says "components" where version 1 says "parts".
  const steps = new Map([...STEPS]).set(0, ({ components, ...rest }) => ({ ...rest, version: 1, parts: components }));
  const old = JSON.stringify({ ...HEAD, version: 0, components: [{ id: 'T1', kind: 'tank' }], connections: [] });

  test('are raised step by step', () => {
    const result = readCircuit(old, steps);
    expect(result).toMatchObject({ ok: true, value: { parts: [{ id: 'T1', kind: 'tank' }] }, warnings: [] });
  });
  test('are refused without a step for them', () => {
    expect(readCircuit(old)).toMatchObject({ ok: false, problems: [{ where: 'version' }] });
    expect(readCircuit(JSON.stringify({ ...HEAD, version: -1 }), steps)).toMatchObject({ ok: false });
  });
});
