import { Ajv2020 } from 'ajv/dist/2020.js';
import fc from 'fast-check';
import { readFileSync } from 'node:fs';
import { format } from 'prettier';
import { describe, expect, test } from 'vitest';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import { jsonSchema } from '../../src/circuit/schema.ts';
import { anyCircuit } from './generate.ts';

const PUBLISHED = '../../static/spool-circuit.schema.json';
const HEAD = { format: 'spooltable-circuit', version: 1, name: 'Press' };

test('the published file schema is the one that reading uses; `vitest -u` writes it anew', async () => {
  const text = await format(JSON.stringify(jsonSchema()), { parser: 'json', printWidth: 120 });
  await expect(text).toMatchFileSnapshot(PUBLISHED);
});

describe('a second validator, on the published schema', () => {
  const published: unknown = JSON.parse(readFileSync(new URL(PUBLISHED, import.meta.url), 'utf8'));
  const valid = new Ajv2020({ strict: true, strictTypes: false, strictTuples: false }).compile(published as object);

  test('accepts what is written', () => {
    fc.assert(fc.property(anyCircuit, (circuit) => valid(JSON.parse(writeCircuit(circuit)))));
  });

  const tank = (fields: object): object => ({
    ...HEAD,
    parts: [{ id: 'T1', kind: 'tank', ...fields }],
    connections: [],
  });
  const plan = (ends: object, fields: object = {}): object => ({
    id: 'p',
    name: 'Cycle',
    steps: [{ id: 's', ends, ...fields }],
  });
  const GOOD: [string, object][] = [
    ['a bare part', tank({})],
    ['a placed, turned part', tank({ at: [-3, 4.5], turn: 270, flip: true })],
    ['settings of each sort', tank({ settings: { volume: '40 L', heated: false, baffles: 2 } })],
    ['rules', { ...tank({}), rules: [{ id: 'r1', text: 'never C1 moves' }] }],
    ['step plans', { ...tank({}), plans: [plan({ by: 'time', after: '2 s' }), { id: 'q', name: '', steps: [] }] }],
    ['unknown fields', { ...tank({ mass: 3 }), budget: [] }],
  ];
  const BAD: [string, object][] = [
    ['an empty rule', { ...tank({}), rules: [{ id: 'r1', text: '' }] }],
    ['a rule of two lines', { ...tank({}), rules: [{ id: 'r1', text: 'never\nT1' }] }],
    ['a plan without steps', { ...tank({}), plans: [{ id: 'p', name: 'Cycle' }] }],
    ['a step that ends by chance', { ...tank({}), plans: [plan({ by: 'chance' })] }],
    ['a step that ends by a sensor nowhere', { ...tank({}), plans: [plan({ by: 'sensor', actuator: 'C1' })] }],
    ['a coil without its valve', { ...tank({}), plans: [plan({ by: 'motion' }, { coils: ['a'] })] }],
    ['another format', { ...tank({}), format: 'x' }],
    ['another version', { ...tank({}), version: 2 }],
    ['no name', { ...tank({}), name: undefined }],
    ['no parts', { ...HEAD, connections: [] }],
    ['a dot in an id', tank({ id: 'T.1' })],
    ['a third coordinate', tank({ at: [1, 2, 3] })],
    ['a place off the sheet', tank({ at: [1e6, 0] })],
    ['an eighth of a turn', tank({ turn: 45 })],
    ['a control character in a label', tank({ label: '\u0007' })],
    ['a label of 201 characters', tank({ label: 'x'.repeat(201) })],
    ['a setting that is a list', tank({ settings: { a: [] } })],
    ['a port without a dot', { ...tank({}), connections: [{ id: 'c', from: 'T1', to: 'T1.T' }] }],
    ['a valve without positions', tank({ valve: { ports: [], left: [], right: [] } })],
  ];
  test.each(GOOD)('agrees with reading: takes %s', (_, circuit) => {
    expect(valid(JSON.parse(JSON.stringify(circuit)))).toBe(true);
    expect(readCircuit(JSON.stringify(circuit)).ok).toBe(true);
  });
  test.each(BAD)('agrees with reading: refuses %s', (_, circuit) => {
    expect(valid(JSON.parse(JSON.stringify(circuit)))).toBe(false);
    expect(readCircuit(JSON.stringify(circuit)).ok).toBe(false);
  });
});
