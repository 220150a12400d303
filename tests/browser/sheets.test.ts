import AxeBuilder from '@axe-core/playwright';
import { readFileSync } from 'node:fs';
import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openEditor, shot } from './harness.ts';

const WAIT = { timeout: 30_000, interval: 100 };
const LONG = 180_000;

/** The browser's print dialog would wait for a person. */
const NO_DIALOG = 'window.print = () => {};';

async function openPress(more: { readonly colorScheme?: 'light' | 'dark' } = {}): Promise<Page> {
  const text = readFileSync(new URL('../../examples/tile-press.spool.json', import.meta.url), 'utf8');
  const kept = JSON.stringify({ format: 1, circuit: text, past: [], future: [], saved: 0, levers: {} });
  const page = await openEditor({
    ...more,
    before: `${NO_DIALOG}if (!localStorage.getItem('spooltable.open')) localStorage.setItem('spooltable.open', ${JSON.stringify(kept)})`,
  });
  await page.getByRole('tab', { name: /Stations/ }).waitFor({ timeout: WAIT.timeout });
  await page.locator('[data-reference="c6:from"]').waitFor({ timeout: WAIT.timeout });
  await page.getByRole('grid').waitFor({ timeout: WAIT.timeout });
  return page;
}

const host = (page: Page) => page.getByRole('application', { name: /^Tile press/ });
const parts = (page: Page): Promise<string[]> =>
  page.locator('[data-part]').evaluateAll((all) => all.map((each) => each.getAttribute('data-part') ?? ''));
const references = (page: Page): Promise<string[]> =>
  page
    .locator('[data-reference]')
    .evaluateAll((all) => all.map((each) => each.textContent?.replace(/\s+/g, ' ').trim() ?? ''));
const tabs = (page: Page): Promise<string[]> =>
  page
    .getByRole('tablist', { name: 'Sheets' })
    .getByRole('tab')
    .evaluateAll((all) =>
      all.map((tab) => `${tab.getAttribute('aria-selected') === 'true' ? '*' : ''}${tab.getAttribute('aria-label')}`),
    );
const cursor = (page: Page): Promise<string | null> => host(page).getAttribute('aria-activedescendant');

interface File {
  readonly sheets?: readonly { readonly id: string; readonly name: string }[];
  readonly parts: readonly { readonly id: string; readonly kind: string; readonly sheet?: string }[];
  readonly connections: readonly { readonly id: string; readonly from: string; readonly to: string }[];
}
/** As the browser keeps it. */
const kept = (page: Page): Promise<File> =>
  page.evaluate(() => {
    const { circuit } = JSON.parse(localStorage.getItem('spooltable.open') ?? '{}') as { circuit: string };
    return JSON.parse(circuit) as File;
  });

test(
  'two sheets: tabs, keys, references that lead from one to the other and back, and a search that turns to the sheet',
  async () => {
    const page = await openPress();
    expect(await tabs(page)).toEqual(['*Sheet 1, Power unit', 'Sheet 2, Stations']);
    expect(await parts(page)).toContain('PUMP');
    expect(await parts(page)).not.toContain('V1');
    expect((await references(page)).map((text) => text.slice(0, 1)).sort()).toEqual(['L', 'P', 'T']);
    await shot(page, 'sheets-power-unit');

    await page.getByRole('tab', { name: 'Sheet 1, Power unit' }).focus();
    await page.keyboard.press('ArrowRight');
    await expect.poll(() => tabs(page), WAIT).toEqual(['Sheet 1, Power unit', '*Sheet 2, Stations']);
    expect(await parts(page)).toContain('V1');
    expect(await parts(page)).not.toContain('PUMP');
    await shot(page, 'sheets-stations');
    expect((await new AxeBuilder({ page }).include('[aria-label="Drawing sheet"]').analyze()).violations).toEqual([]);

    // P of the stations leads to P of the power unit, and back.
    await page.locator('[data-reference="c6:to"]').click();
    await expect.poll(() => cursor(page), WAIT).toBe('sheet-reference-c6:from');
    expect(await tabs(page)).toEqual(['*Sheet 1, Power unit', 'Sheet 2, Stations']);
    expect(await page.locator('[data-reference="c6:from"]').getAttribute('aria-label')).toMatch(
      /^Line P from FIL\.B goes on on sheet 2, Stations, zone [A-Z]\d+$/,
    );
    await page.keyboard.press('Enter');
    await expect.poll(() => cursor(page), WAIT).toBe('sheet-reference-c6:to');
    await page.keyboard.press('PageUp');
    await expect.poll(() => parts(page), WAIT).toContain('PUMP');

    await page.keyboard.press('/');
    await page.getByRole('combobox', { name: 'Find on the sheet' }).fill('TABLE');
    await page.keyboard.press('Enter');
    await expect.poll(() => cursor(page), WAIT).toBe('sheet-part-TABLE');
    expect(await tabs(page)).toEqual(['Sheet 1, Power unit', '*Sheet 2, Stations']);
  },
  LONG,
);

test(
  'a line is drawn from one sheet to another by keys, and undo shows the sheet where it was',
  async () => {
    const page = await openPress();
    const before = (await kept(page)).connections.length;
    await host(page).focus();
    // A gauge of its own for the stations, joined to the line behind the filter.
    await page.keyboard.press('/');
    await page.getByRole('combobox', { name: 'Find on the sheet' }).fill('FIL.A');
    await page.keyboard.press('Enter');
    await expect.poll(() => cursor(page), WAIT).toBe('sheet-port-FIL.A');
    await page.keyboard.press('Enter');
    await page.keyboard.press('PageDown');
    await expect.poll(() => parts(page), WAIT).toContain('V1');
    await page.keyboard.press('/');
    await page.getByRole('combobox', { name: 'Find the end of the line' }).fill('V2.T');
    await page.keyboard.press('Enter');
    await expect.poll(async () => (await kept(page)).connections.length, WAIT).toBe(before + 1);
    expect((await kept(page)).connections.at(-1)).toMatchObject({ from: 'FIL.A', to: 'V2.T' });
    await expect.poll(async () => (await references(page)).length, WAIT).toBe(4);

    // Undone from the other sheet, all that it concerns lies on both, so the view stays.
    await page.keyboard.press('Control+z');
    await expect.poll(async () => (await kept(page)).connections.length, WAIT).toBe(before);
    // A part that only the other sheet has is brought back there.
    await page.keyboard.press('PageUp');
    await expect.poll(() => parts(page), WAIT).toContain('RV');
    await page.locator('[data-part="RV"]').click();
    await page.keyboard.press('Delete');
    await expect.poll(() => parts(page), WAIT).not.toContain('RV');
    await page.keyboard.press('PageDown');
    await expect.poll(() => parts(page), WAIT).toContain('V1');
    await page.keyboard.press('Control+z');
    await expect.poll(() => parts(page), WAIT).toContain('RV');
    expect(await tabs(page)).toEqual(['*Sheet 1, Power unit', 'Sheet 2, Stations']);
  },
  LONG,
);

test(
  'sheets are added, named, moved and deleted, parts go from sheet to sheet, and all of it is undone',
  async () => {
    const page = await openPress();
    const before = await kept(page);
    await host(page).focus();
    await page.keyboard.press('Shift+P');
    await page.getByRole('menuitem', { name: 'Add a sheet' }).click();
    const name = page.getByRole('textbox', { name: 'Name of sheet 2' });
    await name.fill('Gauges');
    await name.press('Enter');
    await expect.poll(() => tabs(page), WAIT).toEqual(['Sheet 1, Power unit', '*Sheet 2, Gauges', 'Sheet 3, Stations']);
    expect(await parts(page)).toEqual([]);

    await page.keyboard.press('ArrowLeft');
    await expect.poll(() => parts(page), WAIT).toContain('PG');
    await page.locator('[data-part="PG"]').click();
    await page.keyboard.press('Shift+PageDown');
    await page.getByRole('menuitem', { name: '2 Gauges' }).click();
    await expect.poll(() => parts(page), WAIT).toEqual(['PG']);
    expect((await references(page)).map((text) => text.slice(0, 3))).toEqual(['P1/']);
    expect((await kept(page)).parts.find(({ id }) => id === 'PG')?.sheet).toBe(
      (await kept(page)).sheets?.find((sheet) => sheet.name === 'Gauges')?.id,
    );

    await page.getByRole('tab', { name: 'Sheet 2, Gauges' }).focus();
    await page.keyboard.press('Alt+ArrowRight');
    await expect.poll(() => tabs(page), WAIT).toEqual(['Sheet 1, Power unit', 'Sheet 2, Stations', '*Sheet 3, Gauges']);
    await page.keyboard.press('Delete');
    await expect.poll(() => tabs(page), WAIT).toEqual(['Sheet 1, Power unit', '*Sheet 2, Stations']);
    expect((await kept(page)).parts.map(({ id }) => id)).not.toContain('PG');

    for (let i = 0; i < 5; i++) await page.keyboard.press('Control+z');
    await expect.poll(() => kept(page), WAIT).toEqual(before);
    expect(await tabs(page)).toHaveLength(2);
  },
  LONG,
);

test(
  'each sheet is printed on paper of its own, named, with references to the fields of the other',
  async () => {
    const page = await openPress({ colorScheme: 'dark' });
    await shot(page, 'sheets-dark');
    await page.keyboard.press('Control+p');
    const panel = page.getByRole('dialog', { name: 'Drawing and print' });
    await panel.getByRole('button', { name: /^Print \d+ sheets/ }).click();
    const sheets = page.locator('.printed > svg');
    await sheets.first().waitFor({ state: 'attached', timeout: WAIT.timeout });
    const [first = '', second = ''] = await sheets.allTextContents();
    expect(first).toContain('Power unit. Row');
    expect(first).toMatch(/P\s*2\/[A-Z]\d/);
    expect(first).not.toContain('CLAMP');
    expect(second).toContain('Stations. Row');
    expect(second).toMatch(/P\s*1\/[A-Z]\d/);
    expect(second).toContain('CLAMP');
  },
  LONG,
);

test(
  'a circuit of one sheet has no tabs until another one is added',
  async () => {
    const page = await openEditor();
    await page.getByRole('grid').waitFor({ timeout: WAIT.timeout });
    expect(await page.getByRole('tablist', { name: 'Sheets' }).count()).toBe(0);
    await page.getByRole('application', { name: /^Log deck/ }).focus();
    await page.keyboard.press('Shift+P');
    await page.getByRole('menuitem', { name: 'Add a sheet' }).click();
    await expect.poll(() => page.getByRole('textbox', { name: 'Name of sheet 2' }).count(), WAIT).toBe(1);
    await page.keyboard.press('Escape');
    await expect.poll(() => tabs(page), WAIT).toEqual(['Sheet 1', '*Sheet 2']);
    await page.keyboard.press('Control+z');
    await expect.poll(() => page.getByRole('tablist', { name: 'Sheets' }).count(), WAIT).toBe(0);
    expect(await parts(page)).toContain('PUMP1');
  },
  LONG,
);
