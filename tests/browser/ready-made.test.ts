import { readFileSync } from 'node:fs';
import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openedEditor } from './stations.ts';

const NO_PICKERS = 'delete window.showOpenFilePicker; delete window.showSaveFilePicker;';
const EMPTY = { format: 'spooltable-circuit', version: 1, name: 'Bare', parts: [], connections: [] };

interface KeptPart {
  readonly id: string;
  readonly at?: readonly [number, number];
  readonly turn?: number;
  readonly flip?: boolean;
}

/** An empty sheet with the Lever section in hand, taken by keys. */
async function inHand(): Promise<Page> {
  const page = await openedEditor({ before: NO_PICKERS });
  await load(page, 'Open…', { name: 'bare.json', text: JSON.stringify(EMPTY) });
  await expect.poll(() => page.locator('.file .name').textContent()).toBe('Bare');
  await page.locator('.host').focus();
  await take(page, 'lever-section');
  return page;
}

async function take(page: Page, form: string): Promise<void> {
  await page.keyboard.press('a');
  await page.locator(`[data-form="${form}"]`).focus();
  await page.keyboard.press('Enter');
}

async function load(page: Page, item: string, file: { readonly name: string; readonly text: string }): Promise<void> {
  await page.getByRole('button', { name: 'File', exact: true }).click();
  const chooser = page.waitForEvent('filechooser');
  await page.getByRole('menuitem', { name: item }).click();
  await (await chooser).setFiles({ name: file.name, mimeType: 'application/json', buffer: Buffer.from(file.text) });
}

const parts = (page: Page): Promise<readonly KeptPart[]> =>
  page.evaluate(() => {
    const kept = JSON.parse(localStorage.getItem('spooltable.open') ?? '{}') as { circuit?: string };
    return (JSON.parse(kept.circuit ?? '{"parts":[]}') as { parts: KeptPart[] }).parts;
  });

/** Where the cylinder stands as seen from its valve. */
async function apart(page: Page): Promise<number[]> {
  const all = await parts(page);
  const [valve, cylinder] = ['V1', 'CYL1'].map((id) => all.find((part) => part.id === id)?.at ?? [NaN, NaN]);
  return [0, 1].map((i) => (cylinder?.[i] ?? NaN) - (valve?.[i] ?? NaN) + 0);
}

test(
  'a ready-made circuit is turned and flipped in the hand, and put down as one step',
  { timeout: 120_000 },
  async () => {
    const page = await inHand();
    await page.keyboard.press('Enter');
    await expect.poll(async () => (await parts(page)).length).toBe(2);
    const [x = NaN, y = NaN] = await apart(page);
    await page.keyboard.press('Control+z');
    await expect.poll(async () => (await parts(page)).length).toBe(0);
    await take(page, 'lever-section');
    await page.keyboard.press('t');
    await page.keyboard.press('f');
    await page.keyboard.press('Enter');
    await expect.poll(async () => (await parts(page)).length).toBe(2);
    // Clockwise with y down (x, y) → (−y, x), then left to right (−x, y).
    expect(await apart(page)).toEqual([y, x]);
    expect((await parts(page)).map(({ flip }) => flip)).toEqual([true, true]);
    await page.keyboard.press('Control+z');
    await expect.poll(async () => (await parts(page)).length).toBe(0);
  },
);

test(
  'own ready-made circuits go to a file and come back from one; a bad file is refused in words',
  { timeout: 120_000 },
  async () => {
    const page = await inHand();
    await page.keyboard.press('Enter');
    await expect.poll(async () => (await parts(page)).length).toBe(2);
    await page.keyboard.press('Shift+s');
    await page.getByRole('button', { name: 'File', exact: true }).click();
    const download = page.waitForEvent('download');
    await page.getByRole('menuitem', { name: 'Save them to a file' }).click();
    const text = readFileSync(await (await download).path(), 'utf8');
    expect(JSON.parse(text)).toMatchObject({
      format: 'spooltable-ready-made',
      version: 1,
      circuits: [{ name: 'Selection 1' }],
    });
    const messages = page.getByRole('region', { name: 'Messages' });
    await messages.getByRole('status').getByText('1 ready-made circuit saved').waitFor();

    const wrong = text.replace('"directional-valve"', '"vavle"');
    await load(page, 'Load them from a file', { name: 'wrong.json', text: wrong });
    const alert = messages.getByRole('alert');
    await alert.getByText('Nothing was taken from wrong.json').waitFor();
    expect(await alert.innerText()).toContain('circuits[0] parts[0].kind');

    // The same under another name, by the usual way to open a file: it is no circuit, and the open one stays.
    await load(page, 'Open…', { name: 'parts.json', text: text.replace('Selection 1', 'Boom section') });
    await messages.getByText('Under Your own: Boom section.').waitFor();
    expect(await page.locator('.file .name').textContent()).toBe('Bare');
    await page.locator('.host').focus();
    await page.keyboard.press('a');
    await page.locator('[data-form="own Boom section"]').waitFor();
    await messages.getByRole('button', { name: 'Take them out again' }).click();
    await expect.poll(() => page.locator('[data-form="own Boom section"]').count()).toBe(0);
    await page.getByRole('button', { name: 'Remove Selection 1 from the tray' }).click();
    await expect.poll(() => page.locator('[data-form="own Selection 1"]').count()).toBe(0);
    await messages.getByRole('button', { name: 'Put it back' }).click();
    await page.locator('[data-form="own Selection 1"]').waitFor();
  },
);
