import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { chromium } from 'playwright-core';
import type { Browser, BrowserContextOptions, Page } from 'playwright-core';
import { afterAll, afterEach, expect, inject } from 'vitest';
import { CHROMIUM_FLAGS } from './chromium.ts';

/**
 * The built editor in a real Chromium:
 *
 *     test('…', async () => {
 *       const page = await openEditor();
 *       …
 *     });
 *
 * Every page has its own empty profile and is closed after its test. Whatever a page complains about (console
 * errors and warnings, errors nobody caught, requests that failed or left this machine) fails the test, unless the test took
 * it with `complaints(page)`.
 */
export interface OpenOptions extends BrowserContextOptions {
  /** Below the address of the editor, e.g. `?file=…`. */
  readonly path?: string;
  /** Where else the editor is, with a slash at its end: another server, or a folder on disk (`file://…/`). */
  readonly address?: string;
  /** Runs in the page before anything of the editor does. */
  readonly before?: string;
}

let browser: Promise<Browser> | undefined;
const open = new Map<Page, string[]>();

export async function openEditor(options: OpenOptions = {}): Promise<Page> {
  browser ??= chromium.launch({ executablePath: inject('chromium'), args: CHROMIUM_FLAGS });
  const { path = '', before, address = inject('editor'), ...context } = options;
  const page =
    await // Only the tests of it have the program kept by the browser: all others would fetch every file once more.
    (
      await (await browser).newContext({ viewport: { width: 1440, height: 900 }, serviceWorkers: 'block', ...context })
    ).newPage();
  watch(page, address);
  if (before !== undefined) await page.addInitScript(before);
  await page.goto(address + path);
  return page;
}

/** From now on the page's complaints count; also for windows that a test opens by itself, in the context of another. */
export function watch(page: Page, address: string = inject('editor')): void {
  const said: string[] = [];
  open.set(page, said);
  page.on('console', (message) => {
    const text = message.text();
    if (text.includes('Service Worker registration blocked')) return;
    if (message.type() === 'error' || message.type() === 'warning') said.push(`${message.type()}: ${text}`);
  });
  page.on('pageerror', (error) => said.push(`not caught: ${error.message}`));
  page.on('requestfailed', (request) => {
    const text = request.failure()?.errorText ?? '';
    // A reload, or a computation given up, ends threads whose script is still on its way: nothing went wrong there.
    // In the editor of one file that script is a blob.
    if (text === 'net::ERR_ABORTED' && /^blob:|analysis\.worker/.test(request.url())) return;
    said.push(`failed: ${request.url()} ${text}`);
  });
  page.on('request', (request) => {
    const url = request.url();
    if (!url.startsWith(address) && !/^(data|blob):/.test(url)) said.push(`left this machine: ${url}`);
  });
}

/** What the page complained about so far; taking it means that the test expects it. */
export const complaints = (page: Page): string[] => open.get(page)?.splice(0) ?? [];

/** Takes a picture into the folder for screenshots (see SHOTS in DEVELOPERS.md) and returns its path. */
export async function shot(page: Page, name: string): Promise<string> {
  const folder = inject('shots');
  mkdirSync(folder, { recursive: true });
  const path = join(folder, `${name}.png`);
  await page.screenshot({ path });
  return path;
}

afterEach(async () => {
  const said = [...open.values()].flat();
  await Promise.all([...new Set([...open.keys()].map((page) => page.context()))].map((context) => context.close()));
  open.clear();
  expect(said, 'the page complained').toEqual([]);
});

afterAll(async () => {
  await (await browser)?.close();
  browser = undefined;
});
