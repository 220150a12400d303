import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { expect, test } from 'vitest';

const { tally } = (await import(pathToFileURL(fileURLToPath(new URL('./tally.mjs', import.meta.url))).href)) as {
  tally: (file: string, exitCode: number) => { passed: number; failed: number };
};

function tallyOf(files: [string, string[]][], exitCode: number): { passed: number; failed: number } {
  const folder = mkdtempSync(join(tmpdir(), 'spooltable-tally-'));
  try {
    const file = join(folder, 'report.json');
    const testResults = files.map(([status, tests]) => ({
      status,
      assertionResults: tests.map((t) => ({ status: t })),
    }));
    writeFileSync(file, JSON.stringify({ testResults }));
    return tally(file, exitCode);
  } finally {
    rmSync(folder, { recursive: true });
  }
}

test.each<[string, [string, string[]][], number, number, number]>([
  ['all well', [['passed', ['passed', 'passed']]], 0, 2, 0],
  ['one fails', [['failed', ['passed', 'failed']]], 1, 1, 1],
  ['a test left out', [['passed', ['passed', 'pending']]], 0, 1, 1],
  [
    'a file that does not load',
    [
      ['failed', []],
      ['passed', ['passed']],
    ],
    1,
    1,
    1,
  ],
  ['a file whose clean-up fails', [['failed', ['passed']]], 1, 1, 1],
  ['an error outside all tests', [['passed', ['passed']]], 1, 1, 1],
  ['nothing ran', [], 0, 0, 1],
])('%s', (_, files, exitCode, passed, failed) => {
  expect(tallyOf(files, exitCode)).toEqual({ passed, failed });
});

test('no report at all is a failure', () => {
  expect(tally('/nowhere/report.json', 0)).toEqual({ passed: 0, failed: 1 });
});
