// npm run bench [-- NAME…]: bundles each tests/bench/*.bench.ts as it would ship, and runs it in a process of its own.
// A bench file measures when it is run and prints plain lines.
import './die-with-parent.mjs';
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { bundle } from './build-cli.mjs';

const folder = fileURLToPath(new URL('../bench', import.meta.url));
const wanted = process.argv.slice(2);
const files = (existsSync(folder) ? readdirSync(folder) : [])
  .filter((file) => /\.bench\.(ts|mjs)$/.test(file))
  .filter((file) => wanted.length === 0 || wanted.some((word) => file.includes(word)))
  .sort();
if (files.length === 0) {
  console.error(wanted.length > 0 ? `No bench is named like ${wanted.join(', ')}.` : 'There are no benches.');
  process.exit(1);
}
const work = mkdtempSync(join(tmpdir(), 'spooltable-bench-'));
let failed = false;
try {
  for (const file of files) {
    console.log(`# ${file}`);
    const out = join(work, `${file}.mjs`);
    await bundle(join(folder, file), out);
    failed = spawnSync(process.execPath, ['--expose-gc', out], { stdio: 'inherit' }).status !== 0 || failed;
  }
} finally {
  rmSync(work, { recursive: true, force: true });
}
process.exit(failed ? 1 : 0);
