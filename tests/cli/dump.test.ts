import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { loadProblem } from '../../src/engine/flow/dump.ts';
import { solveFlow } from '../../src/engine/flow/result.ts';
import { spooltable } from './spooltable.ts';

const FILE = 'examples/crate-pusher.spool.json';

test('explain --dump writes the equations of the row, which solve to the pump pressure that is explained', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'spooltable-dump-'));
  try {
    const dump = join(folder, 'row.json');
    const { code, out } = await spooltable(['explain', FILE, '--dump', dump]);
    expect(code).toBe(0);
    expect(out.length).toBeGreaterThan(0);
    const problem = loadProblem(readFileSync(dump, 'utf8'));
    if (!problem.ok) throw new Error(problem.problems[0]?.what);
    const result = solveFlow(problem.value);
    if (result.status !== 'solved') throw new Error(result.words);
    // The text gives whole bars; the pump is there with the pressure of its line.
    for (const { pressure } of result.pumps) expect(out).toContain(`${Math.round(pressure / 1e5)} bar`);
    const refused = await spooltable(['explain', FILE, '--dump', '']);
    expect(refused.code).not.toBe(0);
    expect(refused.err).toContain('--dump needs the name of a file.');
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
});
