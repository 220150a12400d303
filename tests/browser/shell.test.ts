import AxeBuilder from '@axe-core/playwright';
import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openEditor } from './harness.ts';

const NO_PICKERS = 'delete window.showOpenFilePicker; delete window.showSaveFilePicker;';

async function opened(options: Parameters<typeof openEditor>[0] = {}): Promise<Page> {
  const page = await openEditor({ before: NO_PICKERS, ...options });
  await page.getByRole('grid').waitFor();
  return page;
}
const row = (page: Page): Promise<string | null> => page.locator('.where').textContent();
const currentCells = (page: Page): Promise<string[]> =>
  page.locator('[aria-current="true"] [role="gridcell"]').allInnerTexts();

test('the first start shows the worked circuit, its table and a hint at one lever', async () => {
  const page = await opened();
  await page.getByText('Try it.').waitFor();
  expect(await row(page)).toBe('row 10 of 18');
  await page.keyboard.press('2');
  await page.keyboard.press('ArrowRight');
  await expect.poll(() => row(page)).toBe('row 12 of 18');
  expect(await page.getByText('Try it.').count()).toBe(0);
});

test('lever, row and table show one state', async () => {
  const page = await opened();
  await page.keyboard.press('1');
  await page.keyboard.press('ArrowLeft');
  await expect.poll(() => row(page)).toBe('row 4 of 18');
  expect((await currentCells(page)).slice(0, 4).map((text) => text.trim())).toEqual(['4', 'shut', 'hold', 'stop']);
  await page.getByRole('grid').focus();
  await page.keyboard.press('ArrowUp');
  await expect
    .poll(() => page.getByRole('radio', { name: 'run', exact: true }).getAttribute('aria-checked'))
    .toBe('true');
  await page.keyboard.press('r');
  await expect.poll(() => row(page)).toBe('row 10 of 18');
});

test('Enter on a verdict says why in numbered steps', async () => {
  const page = await opened();
  await page.keyboard.press('1');
  await page.keyboard.press('ArrowLeft');
  await page.getByRole('grid').focus();
  for (let i = 0; i < 5; i++) await page.keyboard.press('ArrowRight');
  await page.keyboard.press('Enter');
  const why = page.getByRole('dialog', { name: 'Why' });
  await why.getByRole('heading', { name: 'CLAMP extends' }).waitFor();
  expect(await why.getByRole('listitem').count()).toBeGreaterThan(1);
  await why.locator('.grip').focus();
  const before = await why.boundingBox();
  await page.keyboard.press('ArrowLeft');
  await expect.poll(async () => (await why.boundingBox())?.x).toBe((before?.x ?? 0) - 16);
  await page.keyboard.press('Escape');
  await expect.poll(() => why.count()).toBe(0);
});

test('a filter keeps its rows, says how many, and can be cleared', async () => {
  const page = await opened();
  await page.getByRole('grid').focus();
  await page.keyboard.press('Control+Home');
  await page.keyboard.press('ArrowUp');
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('f');
  await page.getByRole('dialog', { name: 'Filter by V1' }).getByLabel('shut').uncheck();
  await page.getByText('12 shown').waitFor();
  await page.getByText('row 1 is not among them').waitFor();
  await page.keyboard.press('Escape');
  expect(await page.evaluate(() => document.activeElement?.getAttribute('role'))).toBe('grid');
  await page.getByRole('button', { name: 'clear filters' }).click();
  await expect.poll(() => page.getByText('12 shown').count()).toBe(0);
});

/** Log deck, row 4: 20 L/min unloaded, CLAMP takes 6 L/min on 50 mm bore: 6e-3/60 / (π/4·0.05²) = 51 mm/s. */
test('speeds and pressures stand beside the verdicts, in the chosen units, until they are switched off', async () => {
  const page = await opened();
  await page.keyboard.press('1');
  await page.keyboard.press('ArrowLeft');
  await expect.poll(() => row(page)).toBe('row 4 of 18');
  const clamp = page.locator('[aria-current="true"] [role="gridcell"]').nth(5);
  await expect.poll(() => clamp.locator('.figure').textContent()).toBe('51');
  await page.getByRole('columnheader', { name: 'CLAMP mm/s' }).waitFor();
  // 20 kN less 0.2 kN of assumed friction on 63 mm bore: 19.8e3 / (π/4·0.063²) = 63.5 bar, 921 psi.
  await expect.poll(() => page.locator('.pressures .assumed').allTextContents()).toContain('64 bar');
  // Nothing but its assumed friction is against CLAMP.
  await expect.poll(() => page.locator('.label text').allTextContents()).toContain('51 mm/s · 0.2 kN');
  await page.getByRole('button', { name: 'Units' }).click();
  await page.getByRole('menuitemradio', { name: /psi/ }).click();
  // 51 mm/s is 2.0 in/s.
  await expect.poll(() => clamp.locator('.figure').textContent()).toBe('2');
  await expect.poll(() => page.locator('.pressures .assumed').allTextContents()).toContain('921 psi');
  await page.getByRole('checkbox', { name: 'figures' }).uncheck();
  await expect.poll(() => page.locator('.figure').count()).toBe(0);
  await page.reload();
  await page.getByRole('grid').waitFor();
  expect(await page.getByRole('checkbox', { name: 'figures' }).isChecked()).toBe(false);
});

test('the Settings panel refuses what a saved file could not be opened with', async () => {
  const page = await opened();
  await page.locator('[data-part="CLAMP"]').click();
  await page.keyboard.press('e');
  const settings = page.getByRole('dialog', { name: 'Settings of CLAMP' });
  const rod = settings.getByLabel('Rod', { exact: true });
  for (const [typed, said] of [
    ['60 mm', 'not thinner than the bore'],
    ['9000 mm', 'above 3000 mm'],
    ['28 bar', 'is a pressure'],
  ] as const) {
    await rod.fill(typed);
    await rod.press('Enter');
    await settings.getByText(said).waitFor();
  }
  await rod.press('Escape');
  expect(await rod.inputValue()).toBe('28 mm');
  const kept = await page.evaluate(() => localStorage.getItem('spooltable.open') ?? '');
  expect(kept).not.toMatch(/60 mm|9000 mm|28 bar/);
});

test('undo survives a reload', async () => {
  const page = await opened();
  await page.keyboard.press('e');
  const name = page.getByRole('dialog', { name: 'Settings of the circuit' }).getByLabel('Name');
  await name.fill('Deck two');
  await name.press('Enter');
  await expect.poll(() => page.locator('.file .name').textContent()).toBe('Deck two');
  await page.reload();
  await page.getByRole('grid').waitFor();
  expect(await page.locator('.file .name').textContent()).toBe('Deck two');
  await page.getByRole('grid').focus();
  await page.keyboard.press('Control+z');
  await expect.poll(() => page.locator('.file .name').textContent()).toBe('Log deck');
});

test('a bad file is refused in words and leaves the open circuit alone', async () => {
  const page = await opened();
  const chooser = page.waitForEvent('filechooser');
  // The wish to hear of the window must have reached the browser before the key does.
  await page.evaluate(() => document.readyState);
  await page.keyboard.press('Control+o');
  const bad = {
    format: 'spooltable-circuit',
    version: 1,
    name: 'x',
    parts: [{ id: 'P1', kind: 'pmup' }],
    connections: [],
  };
  await (
    await chooser
  ).setFiles({ name: 'bad.spool.json', mimeType: 'application/json', buffer: Buffer.from(JSON.stringify(bad)) });
  const said = page.getByRole('alert');
  await said.waitFor();
  expect(await said.innerText()).toContain('bad.spool.json was not opened');
  expect(await said.innerText()).toContain('parts[0].kind');
  expect(await page.locator('.file .name').textContent()).toBe('Log deck');
});

test('the split between the bands moves by keys and is remembered', async () => {
  const page = await opened();
  const split = page.getByRole('separator', { name: 'Sheet and lever bench' });
  const before = Number(await split.getAttribute('aria-valuenow'));
  await split.focus();
  await page.keyboard.press('ArrowUp');
  await expect.poll(async () => Number(await split.getAttribute('aria-valuenow'))).toBe(before - 16);
  await page.reload();
  await page.getByRole('grid').waitFor();
  expect(Number(await split.getAttribute('aria-valuenow'))).toBe(before - 16);
});

test('on a small screen the bands are pages and the bench stays', async () => {
  const page = await openEditor({ viewport: { width: 480, height: 800 } });
  const bench = page.getByRole('region', { name: 'Lever bench' });
  await bench.waitFor();
  expect(await page.getByRole('grid').count()).toBe(0);
  await page.getByRole('tab', { name: 'State table' }).click();
  await page.getByRole('grid').waitFor();
  expect(await bench.isVisible()).toBe(true);
});

test.each(['light', 'dark'] as const)(
  'the editor keeps WCAG 2.2 AA as far as a machine can tell (%s)',
  async (colorScheme) => {
    const page = await opened({ colorScheme });
    for (const key of ['w', 'f', 'e', '?']) await page.keyboard.press(key);
    await page.getByRole('dialog', { name: 'Keys' }).waitFor();
    const { violations } = await new AxeBuilder({ page })
      .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'])
      .analyze();
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(' ')}`)).toEqual([]);
  },
  180_000,
);
