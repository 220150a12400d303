import AxeBuilder from '@axe-core/playwright';
import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { writeCircuit } from '../../src/circuit/file.ts';
import { family } from '../bench/circuits.ts';
import { openEditor } from './harness.ts';

/** Twenty bypass centres in series: 3²⁰ combinations. Opened after the demo, whose table must not stay on show. */
async function openLarge(): Promise<Page> {
  const page = await openEditor();
  await page.getByRole('grid').waitFor();
  const data = await page.evaluateHandle(
    (text) => {
      const transfer = new DataTransfer();
      transfer.items.add(new File([text], 'series.spool.json', { type: 'application/json' }));
      return transfer;
    },
    writeCircuit(family('SERIES', 20)),
  );
  await page.dispatchEvent('body', 'drop', { dataTransfer: data });
  await expect.poll(() => page.locator('.where').textContent(), { timeout: 60_000 }).toBe('one of 3,486,784,401');
  return page;
}

const cells = async (page: Page, place: number): Promise<string[]> =>
  (await page.getByRole('grid').locator(`[data-place="${place}"]`).getByRole('gridcell').allInnerTexts()).map((cell) =>
    cell.replace(/\s+/g, ' ').trim(),
  );
/** Of the table: the sheet of so many parts takes long, and is looked at elsewhere. */
const severe = async (page: Page): Promise<unknown[]> =>
  (await new AxeBuilder({ page }).include('section[aria-label="State table"]').analyze()).violations.map(
    ({ id, nodes }) => [id, nodes[0]?.html],
  );

test(
  'a panel too large to list: the row follows the levers, picked levers have rows, folds say the rest',
  { timeout: 150_000 },
  async () => {
    const page = await openLarge();
    const grid = page.getByRole('grid');
    await expect.poll(() => grid.locator('[data-place]').count()).toBe(1);
    // By hand: at rest all centres let the pump down and hold their cylinders; V1 at a extends C1 alone.
    await expect.poll(async () => (await cells(page, 0)).filter((cell) => cell.startsWith('held')).length).toBe(20);
    await page.keyboard.press('1');
    await page.keyboard.press('ArrowLeft');
    await expect.poll(async () => (await cells(page, 0)).filter((cell) => cell.startsWith('extends')).length).toBe(1);
    expect(await severe(page)).toEqual([]);

    const levers = page.getByRole('group', { name: 'Levers with rows of their own' });
    await levers.getByRole('button', { name: 'V2', exact: true }).click();
    await levers.getByRole('button', { name: 'V3', exact: true }).click();
    await expect.poll(() => page.locator('.where').textContent()).toMatch(/^row \d of 9$/);
    await grid.locator('[data-place="0"]').click();
    await expect.poll(() => page.locator('.where').textContent()).toBe('row 1 of 9');
    // V1 stays at a, where it was put; V2 and V3 went there with the row.
    await expect.poll(async () => (await cells(page, 0)).slice(1, 5)).toEqual(['a', 'a', 'a', '0']);
    await expect.poll(async () => (await cells(page, 0)).filter((cell) => cell.startsWith('extends')).length).toBe(3);

    await page.getByText('folded', { exact: true }).first().click();
    await page.getByLabel('Fold by').selectOption({ label: 'C7' });
    // 3¹⁹ combinations each way, and as many in which it is held.
    await expect
      .poll(() => page.getByRole('treegrid').innerText(), { timeout: 60_000 })
      .toMatch(/extends\s+1,162,261,467/);
    // Lines can be picked too.
    await page.getByLabel('Fold by').selectOption({ label: 'V1.A' });
    await expect.poll(() => page.getByRole('treegrid').innerText(), { timeout: 60_000 }).toMatch(/fed/);
    expect(await severe(page)).toEqual([]);
  },
);
