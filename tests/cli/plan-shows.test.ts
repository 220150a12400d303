import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { StMachine } from '../engine/sequence/st-machine.ts';
import { passingFolder, spooltable } from './spooltable.ts';

const DRILL = fileURLToPath(new URL('../../examples/peg-drill.spool.json', import.meta.url));
let folder: ReturnType<typeof passingFolder>;
beforeEach(() => {
  folder = passingFolder();
});
afterEach(() => folder.remove());

test('--coils: the conditions as a table, and as JSON', async () => {
  const { code, out, err } = await spooltable(['plan', DRILL, '--coils']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toMatch(/^Coil +Steps +By sensors/m);
  expect(out).toMatch(/^\d signal groups: /m);
  expect(out).toMatch(/qualified person/);
  const json = JSON.parse((await spooltable(['plan', DRILL, '--coils', '--format', 'json'])).out);
  expect(json.plans[0].coils.length).toBeGreaterThan(0);
});

test('--st: a program that can be read', async () => {
  const { code, out } = await spooltable(['plan', DRILL, '--st']);
  expect(code).toBe(0);
  expect(out).toContain('It replaces no safety function');
  expect(new StMachine(out).outputs.length).toBeGreaterThan(0);
});

test('--diagram: SVG into a file, with the pressures that are named', async () => {
  const file = join(folder.path, 'drill.svg');
  const { err } = await spooltable(['plan', DRILL, '--diagram', 'time', '--out', file]);
  expect(err).toBe('');
  expect(readFileSync(file, 'utf8')).toMatch(/^<\?xml[^]*<svg[^]*Time in s[^]*<\/svg>\n$/);
});

test.each([
  [['--coils', '--st'], 'one is taken at a time'],
  [['--diagram', 'pie'], '--diagram takes step or time, not "pie".'],
  [['--line', 'supply'], '--line chooses pressures of a --diagram.'],
  [['--diagram', 'step', '--line', 'no such line'], 'There is no line "no such line".'],
])('%j is refused', async (args, words) => {
  const { code, err } = await spooltable(['plan', DRILL, ...args]);
  expect(code).toBe(2);
  expect(err).toContain(words);
});
