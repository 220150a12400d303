import { spawnSync } from 'node:child_process';
import { createReadStream, existsSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { extname, join, normalize } from 'node:path';
import type { Browser, BrowserType } from 'playwright-core';
import { CHROMIUM_FLAGS, findChromium } from '../browser/chromium.ts';

const TYPES: Readonly<Record<string, string>> = {
  '.html': 'text/html',
  '.js': 'text/javascript',
  '.css': 'text/css',
  '.json': 'application/json',
  '.woff2': 'font/woff2',
};

/** Builds the editor into a folder of its own, so that nothing else replaces it meanwhile, and opens a browser. */
export async function withEditor(measure: (browser: Browser, address: string) => Promise<void>): Promise<void> {
  const require = createRequire(join(process.cwd(), 'package.json'));
  const { chromium } = require('playwright-core') as { readonly chromium: BrowserType };
  const folder = mkdtempSync(join(tmpdir(), 'spooltable-bench-'));
  const built = spawnSync(
    process.execPath,
    ['node_modules/vite/bin/vite.js', 'build', '--outDir', folder, '--emptyOutDir', '--logLevel', 'error'],
    { stdio: ['ignore', 'ignore', 'inherit'] },
  );
  if (built.status !== 0) throw new Error('The editor could not be built.');
  const server = await serve(folder);
  const browser = await chromium.launch({ executablePath: findChromium(), args: CHROMIUM_FLAGS });
  try {
    await measure(browser, server.address);
  } finally {
    await browser.close();
    server.stop();
    rmSync(folder, { recursive: true, force: true });
  }
}

function serve(folder: string): Promise<{ address: string; stop: () => void }> {
  const server = createServer((request, response) => {
    const path = normalize(decodeURIComponent((request.url ?? '/').split('?')[0] ?? '/'));
    const file = join(folder, path === '/' ? 'index.html' : path);
    if (!file.startsWith(folder) || !existsSync(file)) return void response.writeHead(404).end();
    response.writeHead(200, { 'content-type': TYPES[extname(file)] ?? 'application/octet-stream' });
    createReadStream(file).pipe(response);
  });
  return new Promise((ready) =>
    server.listen(0, '127.0.0.1', () => {
      const address = server.address();
      const port = typeof address === 'object' ? address?.port : 0;
      ready({ address: `http://127.0.0.1:${port}/`, stop: () => server.close() });
    }),
  );
}
