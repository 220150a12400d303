import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { writeCircuit } from '../../src/circuit/file.ts';
import { family } from '../bench/circuits.ts';
import { passingFolder, spooltable } from './spooltable.ts';

/** Twenty bypass centres in series: 3²⁰ combinations. */
let folder: ReturnType<typeof passingFolder>;
let file: string;
beforeAll(() => {
  folder = passingFolder();
  file = join(folder.path, 'series.spool.json');
  writeFileSync(file, writeCircuit(family('SERIES', 20)));
});
afterAll(() => folder.remove());

test('a table that cannot be listed is refused, and it is said what answers', { timeout: 60_000 }, async () => {
  const { code, out, err } = await spooltable(['table', file]);
  expect({ code, out }).toEqual({ code: 2, out: '' });
  expect(err).toContain('3,486,784,401 combinations');
  expect(err).toContain('For all of it there are explain, moves, fold, ask, influence and check;');
});

test('one state of it is explained', { timeout: 60_000 }, async () => {
  const { code, out, err } = await spooltable(['explain', file, '--state', 'V7=a']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toContain('20 levers held');
  // By hand: with V7 alone shifted, the pump's oil goes through six centres into C7.
  expect(out).toContain('C7: extends\n  1. P1 presses on P1.P.');
  expect(out.match(/: held$/gm)).toHaveLength(19);
});

test('a pump is folded by its verdicts', { timeout: 60_000 }, async () => {
  const { code, out, err } = await spooltable(['fold', file, '--by', 'P1']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  // Unloaded with every lever at rest, and in no other combination.
  expect(out).toMatch(/unloaded +1$/m);
  expect(out).toMatch(/else +working +3,486,784,400$/m);
});
