import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build, preview } from 'vite';
import type { TestProject } from 'vitest/node';
import { findChromium } from './chromium.ts';

declare module 'vitest' {
  interface ProvidedContext {
    /** Address of the built editor, with a slash at its end. */
    readonly editor: string;
    readonly chromium: string;
    /** Folder for screenshots: SHOTS if set (and then kept), else a passing one. */
    readonly shots: string;
  }
}

/** The test runner's own NODE_ENV would make another build than the one that ships. */
async function buildToShip(configFile: string): Promise<void> {
  const before = process.env['NODE_ENV'];
  process.env['NODE_ENV'] = 'production';
  await build({ configFile, logLevel: 'warn' });
  process.env['NODE_ENV'] = before;
}

/** Builds the editor unless that has just been done, and serves it once for all browser tests. */
export default async function setUp(project: TestProject): Promise<() => Promise<void>> {
  const configFile = fileURLToPath(new URL('../../vite.config.ts', import.meta.url));
  if (!process.env['SPOOLTABLE_BUILT']) await buildToShip(configFile);
  const server = await preview({ configFile, logLevel: 'error', preview: { host: '127.0.0.1', port: 0, open: false } });
  const address = server.httpServer.address();
  if (address === null || typeof address === 'string') throw new Error('The editor is not served on a port.');

  const kept = process.env['SHOTS'];
  const shots = kept ?? mkdtempSync(join(tmpdir(), 'spooltable-shots-'));
  project.provide('editor', `http://127.0.0.1:${address.port}/`);
  project.provide('chromium', findChromium());
  project.provide('shots', shots);
  return async () => {
    await server.close();
    if (!kept) rmSync(shots, { recursive: true, force: true });
  };
}
