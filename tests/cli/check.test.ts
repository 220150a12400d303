import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { writeCircuit } from '../../src/circuit/file.ts';
import { family } from '../bench/circuits.ts';
import { circuit } from '../notation.ts';
import { passingFolder, RIG, spooltable, writeRig } from './spooltable.ts';

let folder: ReturnType<typeof passingFolder>;
let rig: string;
beforeEach(() => {
  folder = passingFolder();
  rig = writeRig(folder.path);
});
afterEach(() => folder.remove());

test('a rule that holds ends with 0', async () => {
  const { code, out, err } = await spooltable(['check', rig, '--rule', 'C1 moves only if V1 at a/b']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toContain('1. C1 moves only if V1 at a/b\n   Holds in all 9 combinations.\n');
  expect(out).toMatch(/^1 hold, 0 broken, 0 not decided\.$/m);
  expect(out).toMatch(/Caution: .*qualified people/);
});

test('a broken rule ends with 1 and names the combinations, one row and the file rules too', async () => {
  // Its own rule: V2's bypass centre lets the pump free to tank (practice), V2 off centre does not.
  const withRules = {
    ...circuit(RIG),
    rules: [
      { id: 'r1', text: 'always P1 unloaded when V2 rests' },
      { id: 'r2', text: 'never V1 at a and V2 at b' },
    ],
  };
  writeFileSync(rig, writeCircuit(withRules));
  const { code, out } = await spooltable(['check', rig, '--format', 'json', '--rule', 'never C2 extends']);
  expect(code).toBe(1);
  const report = JSON.parse(out);
  expect(report.rules.map((rule: { id?: string; outcome: string }) => [rule.id, rule.outcome])).toEqual([
    ['r1', 'holds'],
    ['r2', 'broken'],
    [undefined, 'broken'],
  ]);
  expect(report.rules[1]).toMatchObject({
    combinations: 9,
    broken: {
      count: 1,
      terms: ['V1 at a and V2 at b'],
      fewestTerms: true,
      example: { row: 3, state: { V1: 'a', V2: 'b' } },
    },
  });
  const text = await spooltable(['check', rig]);
  expect(text.code).toBe(1);
  expect(text.out).toContain(
    '   Broken in 1 of 9 combinations:\n     V1 at a and V2 at b\n   For example row 3: V1 a, V2 b\n',
  );
});

test('a panel of 40 valves is checked in all its combinations', async () => {
  const file = join(folder.path, 'bank.spool.json');
  writeFileSync(file, writeCircuit(family('SIXWAY', 40)));
  const { code, out } = await spooltable([
    'check',
    file,
    '--rule',
    'always P1 unloaded when every lever rests',
    '--format',
    'json',
  ]);
  expect(code).toBe(0);
  expect(JSON.parse(out)).toMatchObject({
    listed: false,
    rules: [{ outcome: 'holds', combinations: '12157665459056928801' }],
  });
  const trapped = await spooltable(['check', file, '--rule', 'never line V1.A is trapped', '--format', 'json']);
  expect(trapped.code).toBe(1);
  expect(JSON.parse(trapped.out)).toMatchObject({ listed: false, rules: [{ outcome: 'broken' }] });
  const refused = await spooltable(['check', file, '--rule', 'never pressure at V1.A over 100 bar']);
  expect(refused.code).toBe(2);
  expect(refused.err).toMatch(/--rule: .*Check a part of the circuit/);
});

test.each([
  [['--rule', 'never C9 moves'], /rig\.spool\.json: --rule, column 7: There is no "C9"\. .*Use one of V1, V2, C1/],
  [['--rule', 'never C1 moves', '--rule', 'C1 moves'], /--rule 2, column 9: The rule does not say when/],
  [[], /The circuit has no rules/],
  [['--rule', 'never C1 moves', '--format', 'csv'], /text or json/],
])('refuses %j in one line, with exit code 2', async (args, said) => {
  const { code, out, err } = await spooltable(['check', rig, ...args]);
  expect({ code, out }).toEqual({ code: 2, out: '' });
  expect(err).toMatch(/^spooltable: [^\n]+\n$/);
  expect(err).toMatch(said);
});

test('help', async () => {
  const { code, out } = await spooltable(['check', '--help']);
  expect(code).toBe(0);
  expect(out).toMatch(/^Usage: spooltable check FILE/);
});
