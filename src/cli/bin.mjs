#!/usr/bin/env node
// Starts the built command line. In a checkout it builds it first when it is missing or older than its sources;
// an installed package has it built and has no sources.
import { existsSync, readdirSync, statSync } from 'fs';
import { dirname, join } from 'path';
import { fileURLToPath, pathToFileURL } from 'url';

const root = fileURLToPath(new URL('../..', import.meta.url));
const built = join(root, 'dist', 'cli', 'spooltable.js');
const source = join(root, 'src', 'cli', 'main.ts');
const builder = join(root, 'tests', 'tools', 'build-cli.mjs');

function fail(message) {
  console.error('spooltable: ' + message);
  process.exit(2);
}

/** When anything below a folder last changed, the app left out: it is no part of the command line. */
function newest(folder) {
  let latest = 0;
  for (const entry of readdirSync(folder, { withFileTypes: true })) {
    if (entry.name === 'app') continue;
    const path = join(folder, entry.name);
    const time = entry.isDirectory() ? newest(path) : statSync(path).mtimeMs;
    if (time > latest) latest = time;
  }
  return latest;
}

const [major, minor] = process.versions.node.split('.').map(Number);
if (major < 20 || (major === 20 && minor < 19)) {
  fail('Node.js 20.19 or newer is needed; this is ' + process.version + '. Install a newer one.');
}
if (existsSync(source)) {
  const changed = Math.max(newest(dirname(dirname(source))), statSync(join(root, 'package.json')).mtimeMs);
  if (!existsSync(built) || statSync(built).mtimeMs < changed) {
    if (!existsSync(join(root, 'node_modules', 'vite')))
      fail('The packages are not installed yet. Run npm ci in the project first.');
    try {
      const { buildCli } = await import(pathToFileURL(builder));
      await buildCli();
    } catch (error) {
      const said = String(error.message)
        .replace(/\u001b\[[\d;]*m/g, '')
        .split('\n')
        .filter(Boolean);
      fail('The command line could not be built: ' + said.slice(0, 2).join(' '));
    }
  }
}
await import(pathToFileURL(built));
