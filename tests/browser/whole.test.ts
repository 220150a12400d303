import AxeBuilder from '@axe-core/playwright';
import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { writeCircuit } from '../../src/circuit/file.ts';
import { family } from '../bench/circuits.ts';
import { openEditor } from './harness.ts';

async function opened(options: Parameters<typeof openEditor>[0] = {}): Promise<Page> {
  const page = await openEditor(options);
  await page.getByRole('grid').waitFor();
  return page;
}

const where = (page: Page): Promise<string | null> => page.locator('.where').textContent();
const severe = async (page: Page): Promise<unknown[]> =>
  (await new AxeBuilder({ page }).analyze()).violations.map(({ id, nodes }) => [id, nodes[0]?.html]);

/** Lines of the folded table, cell by cell. */
async function lines(page: Page): Promise<string[]> {
  const rows = await page.getByRole('treegrid').locator('[data-place]').all();
  return Promise.all(
    rows.map(async (row) =>
      (await row.getByRole('gridcell').allInnerTexts()).map((cell) => cell.replace(/\s+/g, ' ').trim()).join('|'),
    ),
  );
}

test('the table folds by what is picked, a fold opens into its rows, and a row moves the levers', async () => {
  const page = await opened();
  await page.getByText('folded', { exact: true }).click();
  await page.getByLabel('Fold by').selectOption({ label: 'LIFT' });
  // LIFT answers to V2 alone (worked out by hand from the drawing): raise, lower, and held in the rest.
  const folded = [
    '▸ 1 2 7 …|any|raise|any|extends|6',
    '▸ 5 6 11 …|any|lower|any|retracts|6',
    '▸ the rest|any other|held|6',
  ];
  await expect.poll(() => lines(page)).toEqual(folded);
  await page.getByText('2 rows and the rest for 18 combinations').waitFor();
  const grid = page.getByRole('treegrid');
  await grid.focus();
  await page.keyboard.press('ArrowRight');
  await expect.poll(async () => (await lines(page)).length).toBe(9);
  expect((await lines(page))[3]).toBe('7|hold|raise|run|extends|');
  for (let i = 0; i < 3; i++) await page.keyboard.press('ArrowDown');
  await page.keyboard.press('Enter');
  await expect.poll(() => where(page)).toBe('row 7 of 18');
  expect(await severe(page)).toEqual([]);
  await page.keyboard.press('ArrowLeft');
  await page.keyboard.press('ArrowLeft');
  await expect.poll(() => lines(page)).toEqual(folded);
  // The rest opens too: its rows are those that no fold names.
  await page.keyboard.press('End');
  await page.keyboard.press('ArrowRight');
  await expect
    .poll(async () => (await lines(page)).slice(3, 5))
    .toEqual(['3|shut|hold|run|held|', '4|shut|hold|stop|held|']);
  await page.getByText('all rows', { exact: true }).click();
  await page.getByRole('grid').waitFor();
});

test('a question keeps its rows, is built from menus, and leads from one match to the next', async () => {
  const page = await opened();
  await page.getByRole('grid').focus();
  await page.keyboard.press('q');
  const field = page.getByLabel('Rows in which');
  await field.waitFor();
  await page.keyboard.type('LI');
  await page.getByRole('option', { name: 'LIFT', exact: true }).waitFor();
  await page.keyboard.press('ArrowDown');
  for (let i = 0; i < 4; i++) {
    const active = await field.getAttribute('aria-activedescendant');
    if (active && (await page.locator(`[id="${active}"]`).innerText()) === 'LIFT') break;
    await page.keyboard.press('ArrowDown');
  }
  await page.keyboard.press('Enter');
  expect(await field.inputValue()).toBe('LIFT ');
  await page.getByRole('option', { name: 'moves out', exact: true }).click();
  expect(await field.inputValue()).toBe('LIFT moves out ');
  await page.keyboard.press('Escape');
  await page.keyboard.press('Enter');
  // V2 at raise, whatever the three and two positions of V1 and V3: 6 of 18.
  await page.getByText('6 of 18').waitFor();
  await page.getByText('6 shown').waitFor();
  await page.getByRole('button', { name: 'Next match' }).click();
  await expect.poll(() => where(page)).toBe('row 1 of 18');
  await page.getByRole('button', { name: 'Match before' }).click();
  await expect.poll(() => where(page)).toBe('row 14 of 18');
  await field.fill('LIFT dances');
  await field.press('Enter');
  await page.getByText('Column 6: "dances" cannot be said of LIFT').waitFor();
  await field.fill('pressure at LIFT.A over 60 bar and LIFT held');
  await field.press('Enter');
  // The load of LIFT presses 64 bar while it is held: 6 of 18.
  await page.getByText('6 of 18').waitFor();
  expect(await severe(page)).toEqual([]);
  await page.getByRole('button', { name: 'clear', exact: true }).click();
  await page.getByText('18 rows').waitFor();
});

test('influence: marks, independent parts with the product of their counts, and the table of one of them', async () => {
  const page = await opened();
  await page.getByRole('grid').focus();
  await page.keyboard.press('v');
  const panel = page.getByRole('dialog', { name: 'Influence' });
  // Two pumps that share nothing (by the drawing): V1 with CLAMP, V2 and V3 with LIFT and FEED.
  await panel.getByText('3 × 6 = 18 combinations').waitFor();
  const marks = await panel.getByRole('row', { name: /^LIFT/ }).getByRole('cell').allTextContents();
  expect(marks.slice(0, 3).map((text) => text.includes('can change it'))).toEqual([false, true, false]);
  expect(await severe(page)).toEqual([]);
  await panel.getByRole('button', { name: 'table of its 6 rows' }).click();
  await page.getByText('6 shown').waitFor();
});

test('1.6 million rows: the ends are reached, and a question is answered', { timeout: 120_000 }, async () => {
  const bank = JSON.stringify({ text: writeCircuit(family('BANK', 13)) });
  const page = await openEditor();
  await page.getByRole('grid').waitFor();
  const data = await page.evaluateHandle((json) => {
    const { text } = JSON.parse(json) as { text: string };
    const transfer = new DataTransfer();
    transfer.items.add(new File([text], 'bank.spool.json', { type: 'application/json' }));
    return transfer;
  }, bank);
  await page.dispatchEvent('body', 'drop', { dataTransfer: data });
  await expect.poll(() => where(page), { timeout: 60_000 }).toMatch(/of 1,594,323$/);
  const grid = page.getByRole('grid');
  await grid.focus();
  await page.keyboard.press('Control+End');
  await expect.poll(() => where(page)).toBe('row 1,594,323 of 1,594,323');
  await grid.locator('[data-place="1594322"]').waitFor();
  await page.keyboard.press('PageUp');
  await expect.poll(() => where(page)).not.toBe('row 1,594,323 of 1,594,323');
  await page.keyboard.press('Control+Home');
  await grid.locator('[data-place="0"]').waitFor();
  // Half way down the scroll bar stands the middle of the table.
  await grid.evaluate((element) => (element.scrollTop = element.scrollHeight / 2));
  await expect
    .poll(async () => Number(await grid.locator('[data-place]').first().getAttribute('data-place')))
    .toBeGreaterThan(700_000);
  await page.keyboard.press('q');
  await page.getByLabel('Rows in which').fill('C1 extends and V13 rests');
  await page.keyboard.press('Enter');
  await expect.poll(() => page.locator('.ask').innerText(), { timeout: 60_000 }).toMatch(/of 1,594,323/);
});
