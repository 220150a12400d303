import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { writeCircuit } from '../../src/circuit/file.ts';
import { family } from '../bench/circuits.ts';
import { passingFolder, spooltable, writeRig } from './spooltable.ts';

let folder: ReturnType<typeof passingFolder>;
let rig: string;
beforeEach(() => {
  folder = passingFolder();
  rig = writeRig(folder.path);
});
afterEach(() => folder.remove());

test('fold: each actuator and pump, then those that share valves', async () => {
  const { code, out, err } = await spooltable(['fold', rig]);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toMatch(/^C1: \d+ rows? and the rest for 9 combinations, checked equal to all of them$/m);
  expect(out).toMatch(/^P1: /m);
  // V2's bypass centre takes the pump's oil from C1 (practice): both valves matter to it, and C1 and C2 hang together.
  expect(out).toMatch(/^C1 \+ C2: /m);
  expect(out).toMatch(/^ +else +\S+.*$/m);
});

test('fold --by as JSON: rows and rest make up all combinations', async () => {
  const { code, out } = await spooltable(['fold', rig, '--by', 'C2', '--format', 'json']);
  expect(code).toBe(0);
  const [fold] = JSON.parse(out).folds;
  expect(fold).toMatchObject({ by: [{ of: 'actuator', label: 'C2' }], listed: true, combinations: 9 });
  expect(fold.rows.every((row: { outcome: { C2: string } }) => typeof row.outcome.C2 === 'string')).toBe(true);
  expect(fold.else.combinations).toBeGreaterThan(0);
});

test('influence: a mark for each lever that matters, and the product of independent parts', async () => {
  const { code, out } = await spooltable(['influence', rig]);
  expect(code).toBe(0);
  expect(out).toMatch(/^ +V1 {2}V2$/m);
  // C2 hangs on its own valve, and over the pump they share on the other one or not; its own one is certain.
  expect(out).toMatch(/^C2 +[x.] {3}x/m);
  expect(out).toContain('No part of the circuit is independent of the rest.');
  const json = await spooltable(['influence', rig, '--format', 'json']);
  expect(JSON.parse(json.out)).toMatchObject({ combinations: 9, parts: [{ levers: ['V1', 'V2'], combinations: 9 }] });
});

test('ask: counts and lists; exit code 1 when it holds nowhere', async () => {
  const found = await spooltable(['ask', rig, 'V1 at a/b and V2 rests']);
  expect(found.code).toBe(0);
  expect(found.out).toContain('in 2 of 9 combinations');
  expect(found.out).toMatch(/^row {2}V1 {2}V2\n2 {4}a {3}0\n8 {4}b {3}0$/m);
  const one = await spooltable(['ask', rig, 'V1 at a/b', '--limit', '1', '--format', 'json']);
  expect(JSON.parse(one.out)).toMatchObject({ matches: 6, rows: [{ row: 1, state: { V1: 'a', V2: 'a' } }] });
  const none = await spooltable(['ask', rig, 'V1 at a and V1 at b']);
  expect({ code: none.code, err: none.err }).toEqual({ code: 1, err: '' });
  expect(none.out).toContain('in 0 of 9 combinations');
});

test('panels too large to list are answered from open paths, and say so', async () => {
  const file = join(folder.path, 'bank.spool.json');
  writeFileSync(file, writeCircuit(family('BANK', 20)));
  const fold = await spooltable(['fold', file, '--by', 'C3']);
  expect(fold.out).toContain('open paths alone have answered');
  expect(fold.out).toContain('3,486,784,401 combinations');
  const asked = await spooltable(['ask', file, 'C3 held and V4 rests']);
  expect(asked.out).toContain('open paths alone have answered');
  expect(asked.code).toBe(0);
});

test.each<[string[], RegExp]>([
  [['fold', '--by', 'C9'], /--by: There is no actuator, pump or line "C9".*C1, C2, P1/],
  [['ask'], /No question is given\./],
  [['ask', 'never C1 moves'], /question, column 1: "never" begins a rule/],
  [['ask', 'C1 flies'], /question, column 4: "flies" cannot be said of C1/],
  [['ask', 'C1 moves', '--limit', 'x'], /--limit takes a number/],
])('refuses %j in one line, with exit code 2', async ([command = '', ...rest], what) => {
  const { code, out, err } = await spooltable([command, rig, ...rest]);
  expect({ code, out }).toEqual({ code: 2, out: '' });
  expect(err).toMatch(what);
  expect(err.trim().split('\n')).toHaveLength(1);
});
