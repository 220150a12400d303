import { Ajv2020 } from 'ajv/dist/2020.js';
import { readFileSync } from 'node:fs';
import { format } from 'prettier';
import { expect, test } from 'vitest';
import { writeCircuit } from '../../src/circuit/file.ts';
import { isReadyMadeFile, readReadyMade, readyMadeSchema, writeReadyMade } from '../../src/circuit/ready-made-file.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { circuit } from '../notation.ts';

const PUBLISHED = '../../static/spool-ready-made.schema.json';
const POWER = { ...circuit('P1 fixed-pump, T1 tank | P1.S T1.T'), name: 'Power unit' };
const ARM = { ...circuit('V1 directional-valve:valve-4/3-shut, C1 cylinder | V1.A C1.A | V1.B C1.B'), name: 'Arm' };
const read = (text: string) => readReadyMade(text, openCircuit);
const said = (text: string): string => {
  const found = read(text);
  return found.ok ? 'read' : found.problems.map(({ where, what }) => `${where}: ${what}`).join(' | ');
};
/** The file with one of its fields changed. */
const having = (fields: object): string =>
  JSON.stringify({ ...(JSON.parse(writeReadyMade([POWER, ARM])) as object), ...fields });

test('the published schema is the one that is written; `vitest -u` writes it anew', async () => {
  const text = await format(JSON.stringify(readyMadeSchema()), { parser: 'json', printWidth: 120 });
  await expect(text).toMatchFileSnapshot(PUBLISHED);
});

test('what is written reads back as it was, and holds to the schema', () => {
  const text = writeReadyMade([POWER, ARM]);
  expect(isReadyMadeFile(text)).toBe(true);
  const back = read(text);
  expect(back.ok && back.value).toEqual([POWER, ARM]);
  const published = JSON.parse(readFileSync(new URL(PUBLISHED, import.meta.url), 'utf8')) as object;
  const valid = new Ajv2020({ strict: true, strictTypes: false, strictTuples: false }).compile(published);
  expect(valid(JSON.parse(text))).toBe(true);
  expect(valid(JSON.parse(having({ circuits: [{ name: 'x' }] })))).toBe(false);
});

test('one circuit file is a list of one', () => {
  const text = writeCircuit(ARM);
  expect(isReadyMadeFile(text)).toBe(false);
  const back = read(text);
  expect(back.ok && back.value).toEqual([ARM]);
});

test('a file with a fault is refused whole, with the circuit and the place in it', () => {
  const wrong = JSON.parse(writeCircuit({ ...ARM, parts: [{ id: 'V1', kind: 'vavle' }], connections: [] })) as unknown;
  const good = JSON.parse(writeCircuit(POWER)) as unknown;
  expect(said(having({ circuits: [good, wrong] }))).toMatch(/^circuits\[1\] parts\[0\]\.kind: /);
  expect(said(having({ version: 2 }))).toMatch(/^version: The version is 2/);
  expect(said(having({ circuits: 'all' }))).toMatch(/^circuits: The list of circuits is missing/);
  expect(said(having({ circuits: [] }))).toMatch(/^circuits: The file holds no circuit/);
  expect(said(having({ circuits: Array.from({ length: 61 }, () => good) }))).toMatch(/61 circuits; at most 60/);
  expect(said(having({ circuits: [5] }))).toMatch(/^circuits\[0\] file: /);
  expect(said(writeCircuit({ name: 'Nothing', parts: [], connections: [] }))).toMatch(/no part and no text/);
  expect(said('{"format":"other"}')).toMatch(/^format: /);
  expect(said('{"format":')).toMatch(/^line 1, column \d+: /);
});
