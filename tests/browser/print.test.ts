import AxeBuilder from '@axe-core/playwright';
import { readFileSync } from 'node:fs';
import type { Download, Locator, Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openEditor, shot } from './harness.ts';

/** The browser's print dialog would wait for a person. */
const NO_DIALOG = 'window.print = () => { window.printed = (window.printed ?? 0) + 1; };';

async function opened(): Promise<{ page: Page; panel: Locator }> {
  const page = await openEditor({ before: NO_DIALOG, acceptDownloads: true });
  await page.getByRole('grid').waitFor();
  await page.keyboard.press('Control+p');
  const panel = page.getByRole('dialog', { name: 'Drawing and print' });
  await panel.waitFor();
  return { page, panel };
}

async function downloaded(page: Page, act: () => Promise<void>): Promise<Download> {
  const [file] = await Promise.all([page.waitForEvent('download'), act()]);
  return file;
}

test('the title block is filled in, undone, and printed on every sheet with its number', async () => {
  const { page, panel } = await opened();
  const number = panel.getByLabel('Drawing number', { exact: true });
  await number.fill('HY-2207');
  await number.press('Enter');
  await panel.getByRole('button', { name: /^Print \d+ sheets/ }).click();
  const sheets = page.locator('.printed > svg');
  const count = await sheets.count();
  expect(count).toBeGreaterThan(1);
  for (let i = 0; i < count; i++) {
    const text = (await sheets.nth(i).textContent()) ?? '';
    expect(text).toContain(`${i + 1} of ${count}`);
    expect(text).toContain('HY-2207');
  }
  // One page of paper for each sheet, and nothing else.
  const pdf = await page.pdf({ preferCSSPageSize: true });
  expect(pdf.toString('latin1').match(/\/Type\s*\/Page\b/g)).toHaveLength(count);
  // A3 in points of 1/72 inch: 420 mm by 297 mm.
  expect(pdf.toString('latin1')).toMatch(/MediaBox \[0 0 119\d(\.\d+)? 84\d(\.\d+)?\]/);
  await page.evaluate(() => window.dispatchEvent(new Event('afterprint')));
  expect(await sheets.count()).toBe(0);
  await page.getByRole('grid').focus();
  await page.keyboard.press('Control+z');
  expect(await number.inputValue()).toBe('');
  expect((await new AxeBuilder({ page }).include('[aria-label="Drawing and print"]').analyze()).violations).toEqual([]);
  await shot(page, 'print-panel');
});

test('a sheet is saved as a PNG of the chosen resolution and as an SVG that carries its typeface', async () => {
  const { page, panel } = await opened();
  for (const name of ['Operating chart', 'Findings', 'Notes']) await panel.getByLabel(name).uncheck();
  await panel.getByText('on the drawing').click();
  await panel.getByText('sheet 1 of 1', { exact: true }).waitFor();
  await panel.getByText('150', { exact: true }).click();
  const png = await downloaded(page, () => panel.getByRole('button', { name: 'PNG' }).click());
  const bytes = readFileSync(await png.path());
  // PNG (ISO/IEC 15948): width and height stand at bytes 16 and 20. 420 mm at 150 dpi: 420 / 25.4 · 150 = 2480.
  expect([bytes.readUInt32BE(16), bytes.readUInt32BE(20)]).toEqual([2480, 1754]);
  const svg = await downloaded(page, () => panel.getByRole('button', { name: 'SVG' }).click());
  const text = readFileSync(await svg.path(), 'utf8');
  expect(text).toContain('width="420mm"');
  expect(text).toContain('font/woff2;base64,');
});

test('codes of the demo stay, and the bleed-down list prints as a sheet of its own', async () => {
  const { page, panel } = await opened();
  const none = panel.getByRole('button', { name: 'Every part has its code' });
  expect(await none.isDisabled()).toBe(true);
  await page.getByRole('button', { name: 'Close Drawing and print' }).click();
  await page.keyboard.press('b');
  const bleed = page.getByRole('dialog', { name: 'Bleed-down' });
  await bleed.getByRole('button', { name: 'Print this list…' }).click();
  await page.locator('.printed > svg').first().waitFor({ state: 'attached' });
  expect(await page.locator('.printed').textContent()).toContain('Order of isolation (29 CFR 1910.147(d))');
});
