// npm test: every check in order, all of them even when one fails, and one line of sums at the end.
import './die-with-parent.mjs';
import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildCli } from './build-cli.mjs';
import { ensureNgspice } from './ngspice.mjs';
import { tally } from './tally.mjs';

const root = fileURLToPath(new URL('../..', import.meta.url));
const guard = new URL('./die-with-parent.mjs', import.meta.url).href;
const work = mkdtempSync(join(tmpdir(), 'spooltable-test-'));
const running = new Set();
process.on('exit', () => {
  for (const child of running) child.kill('SIGTERM');
  rmSync(work, { recursive: true, force: true });
});
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => process.exit(130));

/** Runs a tool of this project; resolves to its exit code. */
function run(script, args) {
  return new Promise((resolve) => {
    const options = [process.env.NODE_OPTIONS, `--import=${guard}`].filter(Boolean).join(' ');
    const child = spawn(process.execPath, [join(root, 'node_modules', script), ...args], {
      cwd: root,
      stdio: ['ignore', 'inherit', 'inherit'],
      env: { ...process.env, NODE_OPTIONS: options, SPOOLTABLE_BUILT: '1' },
    });
    running.add(child);
    const done = (code) => {
      running.delete(child);
      resolve(code ?? 1);
    };
    child.on('error', () => done(1));
    child.on('exit', done);
  });
}

const step = (name, passed) => ({ name, passed: passed ? 1 : 0, failed: passed ? 0 : 1 });

async function vitest(name) {
  const report = join(work, `${name}.json`);
  const code = await run('vitest/vitest.mjs', [
    'run',
    ...['--project', name, '--reporter', 'default', '--reporter', 'json', `--outputFile.json=${report}`],
  ]);
  return { name, ...tally(report, code) };
}

const steps = [
  [
    'types',
    async () => {
      const svelte = await run('svelte-check/bin/svelte-check', [
        '--tsconfig',
        './tsconfig.json',
        '--fail-on-warnings',
      ]);
      return step('types', (await run('typescript/bin/tsc', ['--noEmit', '-p', '.'])) === 0 && svelte === 0);
    },
  ],
  ['lint', async () => step('lint', (await run('eslint/bin/eslint.js', ['.', '--max-warnings', '0'])) === 0)],
  ['unit', () => vitest('unit')],
  [
    'build',
    async () => {
      const app = await run('vite/bin/vite.js', ['build', '--logLevel', 'warn']);
      const cli = await buildCli().then(
        () => true,
        (error) => console.error(error.message),
      );
      return step('build', app === 0 && cli === true);
    },
  ],
  ['browser', () => vitest('browser')],
];

const ngspice = ensureNgspice();
const sums = [];
for (const [name, check] of steps) {
  console.log(`\n== ${name}`);
  sums.push(await check());
}
const passed = sums.reduce((sum, s) => sum + s.passed, 0);
const failed = sums.reduce((sum, s) => sum + s.failed, 0);
console.log('');
for (const s of sums) if (s.failed > 0) console.log(`failed in ${s.name}: ${s.failed}`);
if (!ngspice)
  console.log(
    'not run: the comparison of pressures with ngspice, which is not installed here and is not needed otherwise',
  );
console.log(`tests: ${passed} passed, ${failed} failed`);
process.exitCode = failed === 0 ? 0 : 1;
