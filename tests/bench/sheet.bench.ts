import { spawnSync } from 'node:child_process';
import { createReadStream, existsSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { extname, join, normalize } from 'node:path';
import type { Browser, BrowserType, Page } from 'playwright-core';
import { writeCircuit } from '../../src/circuit/file.ts';
import type { Circuit, Part } from '../../src/circuit/model.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { CHROMIUM_FLAGS, findChromium } from '../browser/chromium.ts';
import { family } from './circuits.ts';

/** The built editor in Chromium: work of one frame while a part is dragged, the sheet zoomed and panned; edit to table. */
const FRAMES = 90;
const TYPES: Readonly<Record<string, string>> = {
  '.html': 'text/html',
  '.js': 'text/javascript',
  '.css': 'text/css',
  '.json': 'application/json',
  '.woff2': 'font/woff2',
};

function sheetOf(count: number): Circuit {
  const parts = Array.from({ length: count }, (_, i): Part => ({
    id: `p${i}`,
    kind: i % 3 === 0 ? 'double-lock-check' : 'check-valve',
    at: { x: (i % 20) * 22, y: Math.floor(i / 20) * 18 },
  }));
  const connections = parts.flatMap((_, i) =>
    i % 3 === 0 || (i + 21) % 3 === 0 || i + 21 >= count
      ? []
      : [{ id: `c${i}`, from: { part: `p${i}`, port: 'A' }, to: { part: `p${i + 21}`, port: 'B' } }],
  );
  return { name: 'bench', parts, connections };
}

const kept = (circuit: Circuit): string =>
  JSON.stringify({ format: 1, circuit: writeCircuit(circuit), past: [], future: [], saved: 0, levers: {} });

async function open(browser: Browser, address: string, circuit: Circuit): Promise<Page> {
  const page = await (await browser.newContext({ viewport: { width: 1440, height: 900 } })).newPage();
  await page.addInitScript(
    `localStorage.setItem('spooltable.open', ${JSON.stringify(kept(circuit))});localStorage.setItem('spooltable.sheetShare', '0.75')`,
  );
  await page.goto(address);
  await page.locator('[data-part]').first().waitFor({ state: 'attached' });
  await page.waitForTimeout(1500);
  return page;
}

/** Milliseconds from the event to the end of the frame that shows it; `kind` tells what the event is. */
function frames(page: Page, kind: 'drag' | 'zoom' | 'pan', count: number): Promise<number[]> {
  return page.evaluate(
    async ([what, most]) => {
      const host = document.querySelector<HTMLElement>('.host');
      if (!host) return [];
      const box = host.getBoundingClientRect();
      const { x, y } = (window as unknown as { benchAt?: { x: number; y: number } }).benchAt ?? {
        x: box.left + box.width / 2,
        y: box.top + box.height / 2,
      };
      const times: number[] = [];
      for (let i = 0; i < most; i++) {
        await new Promise<void>((done) =>
          requestAnimationFrame(() => {
            const start = performance.now();
            const { port1, port2 } = new MessageChannel();
            port1.onmessage = () => {
              times.push(performance.now() - start);
              done();
            };
            const at = {
              clientX: x + Math.sin(i / 9) * 160,
              clientY: y + Math.sin(i / 6) * 90,
              bubbles: true,
              cancelable: true,
            };
            if (what === 'drag')
              host.dispatchEvent(
                new PointerEvent('pointermove', { ...at, pointerId: 1, pointerType: 'mouse', buttons: 1 }),
              );
            else if (what === 'zoom')
              host.dispatchEvent(new WheelEvent('wheel', { ...at, deltaY: i % 30 < 15 ? 60 : -60 }));
            else
              host.dispatchEvent(new WheelEvent('wheel', { ...at, deltaX: 0.5, deltaY: i % 30 < 15 ? 12.5 : -12.5 }));
            port2.postMessage(0);
          }),
        );
      }
      return times;
    },
    [kind, count] as const,
  );
}

async function drag(page: Page): Promise<number[]> {
  const at = await page.evaluate(() => {
    const host = document.querySelector('.host')?.getBoundingClientRect();
    const middle = { x: (host?.left ?? 0) + (host?.width ?? 0) * 0.4, y: (host?.top ?? 0) + (host?.height ?? 0) / 2 };
    const boxes = [...document.querySelectorAll('[data-part]')].map((part) => part.getBoundingClientRect());
    const away = (b: DOMRect): number => Math.hypot(b.x + b.width / 2 - middle.x, b.y + b.height / 2 - middle.y);
    const [near] = boxes.sort((a, b) => away(a) - away(b));
    const found = { x: (near?.x ?? 0) + (near?.width ?? 0) / 2, y: (near?.y ?? 0) + (near?.height ?? 0) / 2 };
    Object.assign(window, { benchAt: found });
    return found;
  });
  await page.mouse.move(at.x, at.y);
  await page.mouse.down();
  const times = await frames(page, 'drag', FRAMES);
  await page.mouse.up();
  return times;
}

const share = (times: readonly number[], part: number): number =>
  [...times].sort((a, b) => a - b)[Math.floor((times.length - 1) * part)] ?? NaN;
const said = (times: readonly number[]): string =>
  `${share(times, 0.5).toFixed(1).padStart(6)} ${share(times, 0.95).toFixed(1).padStart(6)}`;

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

async function run(print: (line: string) => void): Promise<void> {
  const require = createRequire(join(process.cwd(), 'package.json'));
  const { chromium } = require('playwright-core') as { readonly chromium: BrowserType };
  const folder = mkdtempSync(join(tmpdir(), 'spooltable-sheet-'));
  const built = spawnSync(
    process.execPath,
    ['node_modules/vite/bin/vite.js', 'build', '--outDir', folder, '--emptyOutDir', '--logLevel', 'error'],
    { stdio: ['ignore', 'ignore', 'inherit'] },
  );
  if (built.status !== 0) throw new Error('The editor could not be built.');
  const server = await serve(folder);
  const browser = await chromium.launch({ executablePath: findChromium(), args: CHROMIUM_FLAGS });
  try {
    print('Work of one frame, ms: median and 95 of 100; ratio of medians to a sheet of one part');
    print('parts      drag    p95  ratio      zoom    p95  ratio       pan    p95  ratio');
    let one: number[] = [];
    for (const count of [1, 100, 300, 1000]) {
      const page = await open(browser, server.address, sheetOf(count));
      const all = [await drag(page), await frames(page, 'zoom', FRAMES), await frames(page, 'pan', FRAMES)];
      const medians = all.map((times) => share(times, 0.5));
      if (count === 1) one = medians;
      print(
        `${String(count).padStart(5)}${all.map((times, i) => `  ${said(times)} ${((medians[i] ?? NaN) / (one[i] ?? NaN)).toFixed(1).padStart(6)}`).join('')}`,
      );
      await page.context().close();
    }
    const page = await open(browser, server.address, placeMissing(family('BANK', 8)));
    await page.locator('.where', { hasText: 'of 6,561' }).first().waitFor();
    await page.getByRole('application').first().focus();
    const times: number[] = [];
    for (let i = 0; i < 5; i++) {
      // A valve less has a third of the rows; taking it back has all of them again.
      await page.evaluate(() => document.querySelector<HTMLElement>('.host')?.focus());
      await page.keyboard.press('/');
      await page.keyboard.type('V8');
      await page.keyboard.press('Enter');
      await page.keyboard.press('Delete');
      await page.locator('.where', { hasText: 'of 2,187' }).first().waitFor();
      const start = performance.now();
      await page.keyboard.press('Control+z');
      await page.locator('.where', { hasText: 'of 6,561' }).first().waitFor();
      times.push(performance.now() - start);
    }
    print(
      `edit to table, 8 valves, 6561 rows: ${share(times, 0.5).toFixed(0)} ms, at most ${Math.max(...times).toFixed(0)} ms`,
    );
  } finally {
    await browser.close();
    server.stop();
    rmSync(folder, { recursive: true, force: true });
  }
}

await run((line) => console.log(line));
