import AxeBuilder from '@axe-core/playwright';
import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { writeCircuit } from '../../src/circuit/file.ts';
import { family } from '../bench/circuits.ts';
import { openEditor } from './harness.ts';

/** Ten valves, half in parallel and half in series: 3¹⁰ rows, whose pressures take tens of seconds. */
async function openPanel(): Promise<Page> {
  const page = await openEditor({ colorScheme: 'dark' });
  await page.getByRole('grid').waitFor();
  const data = await page.evaluateHandle(
    (text) => {
      const transfer = new DataTransfer();
      transfer.items.add(new File([text], 'panel.spool.json', { type: 'application/json' }));
      return transfer;
    },
    writeCircuit(family('MIX', 10)),
  );
  await page.dispatchEvent('body', 'drop', { dataTransfer: data });
  await expect.poll(() => page.locator('.where').textContent(), { timeout: 90_000 }).toMatch(/of 59,049$/);
  return page;
}

test(
  'a panel of 59,049 rows: go to a row by number and by levers, its verdicts first, and along the columns',
  { timeout: 180_000 },
  async () => {
    const page = await openPanel();
    const grid = page.getByRole('grid');
    const where = page.locator('.where');
    const poll = (what: () => Promise<unknown>) => expect.poll(what, { timeout: 60_000 });

    await page.keyboard.press('g');
    const field = page.getByRole('dialog', { name: 'Go to row' }).getByRole('textbox');
    await field.fill('60,000');
    await field.press('Enter');
    await poll(() => page.getByRole('dialog', { name: 'Go to row' }).getByRole('status').textContent()).toBe(
      'Rows go from 1 to 59,049.',
    );
    await field.fill('1,774');
    await field.press('Enter');
    await poll(() => where.textContent()).toBe('row 1,774 of 59,049');
    // The keyboard goes on in the table, and the row is in view.
    await poll(() => page.evaluate(() => document.activeElement?.getAttribute('role'))).toBe('grid');
    const row = grid.locator('[data-place="1773"]');
    await poll(() => row.count()).toBe(1);
    // Several cylinders share the pump's flow there: an answer that only pressures give, marked by its asterisk.
    await poll(() => row.innerText()).toMatch(/stalled\s*\*/);

    await where.click();
    await field.fill('V1=b v10 = 0');
    await field.press('Enter');
    await poll(() => where.textContent()).not.toBe('row 1,774 of 59,049');
    await poll(async () => {
      const cells = await grid.locator('[aria-current="true"] [role="gridcell"]').allInnerTexts();
      return [cells[1], cells[10]].map((cell) => cell?.trim());
    }).toEqual(['b', '0']);

    // Columns out of the window come in with the keyboard.
    await page.keyboard.press('End');
    await poll(() => grid.locator('[aria-current="true"] .notes').count()).toBeGreaterThan(0);
    const order = await page.evaluate(() => {
      const owned = document.querySelector('[role="grid"] .rows')?.getAttribute('aria-owns')?.split(' ') ?? [];
      return owned.map((id) => Number(document.getElementById(id)?.dataset['place']));
    });
    expect(order).toEqual([...order].sort((a, b) => a - b));
    expect(order.length).toBeGreaterThan(5);
    const found = await new AxeBuilder({ page }).include('section[aria-label="State table"]').analyze();
    expect(found.violations.map(({ id, nodes }) => [id, nodes[0]?.html])).toEqual([]);
  },
);
