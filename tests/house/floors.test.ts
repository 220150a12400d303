import { execFileSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { checkFloors } from './floors.ts';
import { checkTidiness } from './tidy.ts';

const root = fileURLToPath(new URL('../..', import.meta.url));

function tracked(): Map<string, string> {
  const list = execFileSync('git', ['ls-files', '-z'], { cwd: root, encoding: 'utf8' }).split('\0');
  return new Map(
    list
      .filter((file) => file !== '' && existsSync(join(root, file)))
      .filter((file) => !/\.(png|ico|woff2?|jpg|pdf)$/.test(file))
      .map((file) => [file, readFileSync(join(root, file), 'utf8')]),
  );
}

describe('the project', () => {
  const files = tracked();
  test('there are sources to look at', () => {
    expect([...files.keys()].filter((file) => file.startsWith('src/')).length).toBeGreaterThan(10);
  });
  test('keeps its floors apart', () => {
    expect(checkFloors(files)).toEqual([]);
  });
  test('is tidy', () => {
    expect(checkTidiness(files)).toEqual([]);
  });
});

const floors = (...files: [string, string][]): string[] =>
  checkFloors(new Map(files)).map((b) => `${b.rule} | ${b.what}`);
const tidiness = (file: string, text: string): string[] =>
  checkTidiness(new Map([[file, text]])).map((b) => `${b.rule} | ${b.what}`);

/** One rule, a file that breaks it, and what is said about it. */
const BROKEN: [string, string, string, RegExp][] = [
  ['up', 'src/base/a.ts', `import { x } from '../circuit/model.ts';`, /imports go down.*src\/circuit\/model\.ts/],
  ['up, type-only', 'src/parts/a.ts', `import type { X } from '../app/a.ts';`, /imports go down/],
  ['up, re-export', 'src/base/a.ts', `export * from '../cli/a.ts';`, /imports go down/],
  ['up, dynamic', 'src/network/a.ts', `const m = await import('../analysis/a.ts');`, /imports go down/],
  ['up, import type', 'src/network/a.ts', `type X = import('../report/a.ts').X;`, /imports go down/],
  [
    'engine sees the circuit',
    'src/engine/paths/a.ts',
    `import type { C } from '../../circuit/model.ts';`,
    /engines see only/,
  ],
  ['engine sees parts', 'src/engine/flow/a.ts', `import { p } from '../../parts/catalogue.ts';`, /engines see only/],
  ['flow sees paths', 'src/engine/flow/a.ts', `import { p } from '../paths/a.ts';`, /engines see only/],
  ['sequence sees table', 'src/engine/sequence/a.ts', `import { p } from '../table/a.ts';`, /engines see only/],
  ['app sees the analysis', 'src/app/a.ts', `import type { R } from '../analysis/results.ts';`, /the app asks/],
  ['app sees another worker file', 'src/app/a.ts', `import { w } from '../worker/worker.ts';`, /the app asks/],
  [
    'app starts the worker',
    'src/app/a.ts',
    `new Worker(new URL('../worker/worker.ts', import.meta.url));`,
    /the app asks/,
  ],
  [
    'app, in Svelte',
    'src/app/A.svelte',
    `<script lang="ts">\nimport { t } from '../engine/table/a.ts';\n</script>\n<p>x</p>`,
    /the app asks/,
  ],
  ['app, in markup', 'src/app/A.svelte', `{#await import('../engine/table/a.ts')}x{/await}`, /the app asks/],
  ['report computes', 'src/report/a.ts', `import { tabulate } from '../analysis/analyse.ts';`, /reports read results/],
  ['DOM', 'src/drawing/a.ts', `export const w = () => document.body;`, /no DOM.*document/],
  [
    'DOM through globalThis',
    'src/circuit/a.ts',
    `export const w = () => globalThis.localStorage;`,
    /no DOM.*localStorage/,
  ],
  ['DOM as a type', 'src/drawing/a.ts', `export const f = (e: HTMLElement) => e;`, /no DOM.*HTMLElement/],
  ['DOM in the command line', 'src/cli/a.ts', `navigator.clipboard;`, /no DOM.*navigator/],
  ['Svelte below the app', 'src/report/a.ts', `import { mount } from 'svelte';`, /no view library/],
  ['files', 'src/report/a.ts', `import { writeFileSync } from 'node:fs';`, /no files.*node:fs/],
  ['files, old spelling', 'src/circuit/a.ts', `import fs from 'fs/promises';`, /no files.*fs\/promises/],
  ['Node in the app', 'src/app/a.ts', `process.exit();`, /no files.*process/],
  ['clock', 'src/engine/table/a.ts', `const t = Date.now();`, /no clock.*Date\.now/],
  ['clock, new Date', 'src/circuit/a.ts', `const t = new Date();`, /no clock.*new Date\(\)/],
  ['clock, performance', 'src/analysis/a.ts', `performance.now();`, /no clock.*performance/],
  ['clock, timer', 'src/analysis/a.ts', `setTimeout(() => {}, 1);`, /no clock.*setTimeout/],
  ['printing', 'src/analysis/a.ts', `console.log(1);`, /no printing/],
  ['no floor', 'src/extra/a.ts', ``, /stands on a floor/],
  ['no engine floor', 'src/engine/a.ts', ``, /stands on a floor/],
  ['out of src', 'src/base/a.ts', `import x from '../../tests/a.ts';`, /name a floor/],
  ['computed', 'src/base/a.ts', `const f = (n: string) => import(n);`, /name a floor/],
];

test.each(BROKEN)('is noticed: %s', (_, file, text, said) => {
  expect(floors([file, text])).toEqual([expect.stringMatching(said)]);
});

test('a cycle is noticed, type-only too', () => {
  const found = floors(
    ['src/base/a.ts', `import type { B } from './b.ts';`],
    ['src/base/b.ts', `import { c } from './c.ts';`],
    ['src/base/c.ts', `export type { A } from './a.ts';`],
  );
  expect(found).toEqual([
    expect.stringMatching(/no cycles.*a\.ts → src\/base\/b\.ts → src\/base\/c\.ts → src\/base\/a\.ts/),
  ]);
});

test.each([
  ['down', 'src/analysis/a.ts', `import { x } from '../engine/table/state-table.ts';`],
  ['own floor', 'src/engine/paths/a.ts', `import { x } from './b.ts';`],
  [
    'table uses paths and flow',
    'src/engine/table/a.ts',
    `import '../paths/a.ts'; import '../flow/a.ts'; import '../../network/a.ts';`,
  ],
  ['the one door', 'src/app/a.ts', `import { StateTable } from '../worker/client.ts';`],
  ['app reads reports', 'src/app/a.ts', `import { csv } from '../report/csv.ts';`],
  ['results', 'src/report/a.ts', `import type { Finding } from '../analysis/results.ts';`],
  ['files in the command line', 'src/cli/a.ts', `import { readFile } from 'node:fs/promises'; process.exit(0);`],
  [
    'own names',
    'src/circuit/a.ts',
    `export function f(history: number, o: { location: number }) { return history + o.location; }`,
  ],
  ['DOM in the app', 'src/app/a.ts', `document.title = String(Date.now());`],
  ['a component in itself', 'src/app/Tree.svelte', `<script>import Tree from './Tree.svelte';</script>`],
  ['a date that is given', 'src/circuit/a.ts', `export const d = (t: number) => new Date(t);`],
])('is allowed: %s', (_, file, text) => {
  expect(floors([file, text])).toEqual([]);
});

test.each([
  ['too long', 'src/base/a.ts', 'x\n'.repeat(451), /read in a sitting/],
  ['a new folder at the top', 'notes/a.md', '', /top level/],
  ['a machine path', 'src/base/a.ts', `const p = '/${'tmp'}/x';`, /path of one machine/],
  ['somebody’s home', 'README.md', `see /${'home'}/ann/x`, /path of one machine/],
  ['a host', 'README.md', `${'https'}://packages.somewhere.dev/x`, /no host names/],
  ['a host in the lock', 'package-lock.json', `"resolved": "${'https'}://x"`, /the lock names no host/],
  ['a switch', 'src/base/a.ts', `// ${'eslint'}-disable-next-line`, /switches a check off/],
  ['a test left out', 'tests/base/a.test.ts', `${'test'}.skip('x', () => {});`, /left out/],
])('is noticed: %s', (_, file, text, said) => {
  expect(tidiness(file, text)).toEqual([expect.stringMatching(said)]);
});

test.each([
  ['a long file of the right size', 'src/base/a.ts', 'x\n'.repeat(450)],
  ['a name space', 'src/report/svg.ts', `'http://www.w3.org/2000/svg'`],
  ['an address of this machine', 'README.md', 'http://127.0.0.1:4173/'],
  ['a relative path with the same letters', 'src/base/a.ts', `import '../${'home'}/x.ts';`],
])('is allowed: %s', (_, file, text) => {
  expect(tidiness(file, text)).toEqual([]);
});
