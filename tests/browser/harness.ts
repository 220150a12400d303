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
  /** Runs in the page before anything of the editor does. */
  readonly before?: string;
}

let browser: Promise<Browser> | undefined;
const open = new Map<Page, string[]>();

export async function openEditor(options: OpenOptions = {}): Promise<Page> {
  browser ??= chromium.launch({ executablePath: inject('chromium'), args: CHROMIUM_FLAGS });
  const { path = '', before, ...context } = options;
  const page = await (
    await (await browser).newContext({ viewport: { width: 1440, height: 900 }, ...context })
  ).newPage();
  const said: string[] = [];
  open.set(page, said);
  page.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warning') said.push(`${message.type()}: ${message.text()}`);
  });
  page.on('pageerror', (error) => said.push(`not caught: ${error.message}`));
  page.on('requestfailed', (request) => {
    const text = request.failure()?.errorText ?? '';
    // A reload, or a computation given up, ends threads whose script is still on its way: nothing went wrong there.
    if (text === 'net::ERR_ABORTED' && request.url().includes('analysis.worker')) return;
    said.push(`failed: ${request.url()} ${text}`);
  });
  page.on('request', (request) => {
    const url = request.url();
    if (!url.startsWith(inject('editor')) && !/^(data|blob):/.test(url)) said.push(`left this machine: ${url}`);
  });
  if (before !== undefined) await page.addInitScript(before);
  await page.goto(inject('editor') + path);
  return page;
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
  await Promise.all([...open.keys()].map((page) => page.context().close()));
  open.clear();
  expect(said, 'the page complained').toEqual([]);
});

afterAll(async () => {
  await (await browser)?.close();
  browser = undefined;
});
