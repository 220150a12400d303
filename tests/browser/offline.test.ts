import { pathToFileURL, fileURLToPath } from 'node:url';
import type { Page } from 'playwright-core';
import { preview } from 'vite';
import { expect, inject, test } from 'vitest';
import { complaints, openEditor } from './harness.ts';

const configFile = fileURLToPath(new URL('../../vite.config.ts', import.meta.url));
const DISK = pathToFileURL(fileURLToPath(new URL('../../dist/app/', import.meta.url))).href;

const row = (page: Page): Promise<string | null> => page.locator('.where').textContent();
const cells = async (page: Page): Promise<string[]> =>
  (await page.locator('[aria-current="true"] [role="gridcell"]').allInnerTexts()).map((text) => text.trim());

/** The worked circuit has 3 × 3 × 2 combinations, and starts in its rest positions: hold, hold, stop. */
async function works(page: Page): Promise<string[]> {
  await page.getByRole('grid').waitFor();
  await expect.poll(() => row(page)).toBe('row 10 of 18');
  // Figures come from the thread, one row after another: the analysis runs.
  await expect.poll(() => page.locator('.pressures .assumed').allTextContents()).toContain('64 bar');
  await page.keyboard.press('1');
  await page.keyboard.press('ArrowLeft');
  await expect.poll(() => row(page)).toBe('row 4 of 18');
  await expect.poll(async () => (await cells(page)).join(' ')).toContain('51');
  return cells(page);
}

test('one file opens from disk, without a server, and computes the same as the served editor', async () => {
  const served = await works(await openEditor());
  const page = await openEditor({ address: DISK, path: 'spooltable.html' });
  expect(await page.evaluate(() => location.protocol)).toBe('file:');
  expect(await works(page)).toEqual(served);
  const inter = await page.evaluate(async () => {
    await document.fonts.load('16px "Inter Variable"');
    return [...document.fonts].filter(({ status }) => status === 'loaded').map(({ family }) => family);
  });
  expect(inter).toContain('Inter Variable');
  await page.reload();
  await page.getByRole('grid').waitFor();
  // The lever stands where it was left: what is kept in the browser is kept here too.
  await expect.poll(() => row(page)).toBe('row 4 of 18');
});

test('once opened, the editor starts and computes with its server gone', async () => {
  const server = await preview({
    configFile,
    logLevel: 'silent',
    preview: { host: '127.0.0.1', port: 0, open: false },
  });
  const where = server.httpServer.address();
  if (where === null || typeof where === 'string') throw new Error('The editor is not served on a port.');
  const page = await openEditor({ address: `http://127.0.0.1:${where.port}/`, serviceWorkers: 'allow' });
  await page.evaluate(async () => {
    const { active } = await navigator.serviceWorker.ready;
    while (active?.state !== 'activated' || !navigator.serviceWorker.controller)
      await new Promise((r) => setTimeout(r, 20));
  });
  const closed = server.close();
  // The browser keeps a connection open for the next request, and closing waits for it.
  if ('closeAllConnections' in server.httpServer) server.httpServer.closeAllConnections();
  await closed;
  await page.reload();
  await works(page);
  // What cannot be reached is the very point, and the browser says so once for each try.
  for (const said of complaints(page)) expect(said).toMatch(/ERR_CONNECTION_REFUSED|ERR_FAILED/);
});

test('the browser finds nothing that would keep the editor from being installed', async () => {
  const page = await openEditor({ serviceWorkers: 'allow' });
  await page.getByRole('grid').waitFor();
  const session = await page.context().newCDPSession(page);
  const { errors: manifest } = await session.send('Page.getAppManifest');
  expect(manifest).toEqual([]);
  const { installabilityErrors } = await session.send('Page.getInstallabilityErrors');
  // A profile of a test counts as a private window, which is the only thing left to object to.
  expect(installabilityErrors.map(({ errorId }) => errorId).filter((id) => id !== 'in-incognito')).toEqual([]);
  const icons = (await (await fetch(`${inject('editor')}manifest.webmanifest`)).json()) as {
    readonly icons: readonly { readonly src: string; readonly type: string }[];
  };
  for (const { src, type } of icons.icons) {
    const answer = await fetch(inject('editor') + src);
    expect(answer.headers.get('content-type'), src).toContain(type);
  }
});
