import type { Locator, Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openEditor } from './harness.ts';

async function opened(options: Parameters<typeof openEditor>[0] = {}): Promise<Page> {
  const page = await openEditor(options);
  await page.getByRole('grid').waitFor();
  return page;
}

const row = (page: Page): Promise<string | null> => page.locator('.where').textContent();

async function panel(page: Page, key: string, name: string): Promise<Locator> {
  await page.getByRole('grid').focus();
  await page.keyboard.press(key);
  const dialog = page.getByRole('dialog', { name });
  await dialog.waitFor();
  return dialog;
}

/** Twice the load on the same bore is twice the pressure: 20 kN less 0.2 kN of friction on 63 mm, 63.5 bar; 40 kN, 127.7 bar. */
test('a load case changes the table, and goes with undo', async () => {
  const page = await opened();
  const held = (text: string): Promise<void> =>
    expect.poll(() => page.locator('.pressures .assumed').allTextContents()).toContain(text);
  await held('64 bar');
  const conditions = await panel(page, 'o', 'Conditions for every row');
  await conditions.getByRole('button', { name: 'Add a load case' }).click();
  const load = conditions.getByRole('group', { name: 'LIFT' }).getByLabel('Load', { exact: true });
  await load.fill('40 bar');
  await load.press('Enter');
  await conditions.getByText('is a pressure').waitFor();
  await load.fill('40');
  await load.press('Enter');
  await held('128 bar');
  const name = conditions.getByLabel('Name of the case');
  await name.fill('Wet logs');
  await name.press('Enter');
  const bench = page.getByRole('region', { name: 'Lever bench' });
  await bench.getByText('Wet logs: LIFT 40 kN in').waitFor();

  await conditions.getByLabel('Loads').selectOption('as drawn');
  await held('64 bar');
  await conditions.getByLabel('Loads').selectOption('Wet logs');
  await held('128 bar');
  await conditions.getByRole('button', { name: 'Remove this load case' }).click();
  await held('64 bar');
  expect(await conditions.getByLabel('Loads').inputValue()).toBe('');
  await page.getByRole('grid').focus();
  await page.keyboard.press('Control+z');
  await bench.getByText('Wet logs: LIFT 40 kN in').waitFor();
  // Name, load and the case itself: it falls back to the loads as drawn.
  for (let i = 0; i < 3; i++) await page.keyboard.press('Control+z');
  await held('64 bar');
  expect(await bench.getByText('Wet logs').count()).toBe(0);
});

test('a rule is read, checked against every combination, and leads to a row that breaks it', async () => {
  const page = await opened();
  const rules = await panel(page, 'u', 'Rules');
  await rules.getByText('No rule yet.').waitFor();
  const field = rules.getByLabel('What must never or must always be');
  await field.fill('never CLAMP dances');
  await field.press('Enter');
  await rules.getByText('Column 13:').waitFor();
  expect(await rules.getByRole('listitem').getByRole('heading').count()).toBe(0);

  await rules.getByRole('button', { name: 'never CLAMP moves in while LIFT moves' }).click();
  // CLAMP opens in 1 of 3 positions of V1, LIFT moves in 2 of 3 of V2, whatever the 2 of V3: 1 × 2 × 2.
  await rules.getByText('Broken in 4 of 18 combinations').waitFor();
  await rules.getByText('V1 at open and V2 at raise/lower').waitFor();
  await rules.getByRole('button', { name: 'row 14' }).click();
  await expect.poll(() => row(page)).toBe('row 14 of 18');

  // V3 is moved by its coil: the interlock can be said in it.
  await field.fill('never V3 at run');
  await field.press('Enter');
  await rules.getByText('Broken in 9 of 18 combinations').waitFor();
  await rules.getByText('Y1 on').waitFor();
  await rules.getByRole('button', { name: 'change the rule never V3 at run' }).click();
  const change = rules.getByLabel('Change this rule');
  await change.fill('never V3 at run and V3 at stop');
  await change.press('Enter');
  await rules.getByText('Holds in all 18 combinations').waitFor();
  await rules.getByRole('button', { name: 'remove the rule never CLAMP' }).click();
  await expect
    .poll(() => rules.getByRole('listitem').getByRole('heading').allTextContents())
    .toEqual(['never V3 at run and V3 at stop']);
  await page.getByRole('grid').focus();
  await page.keyboard.press('Control+z');
  await rules.getByText('Broken in 4 of 18 combinations').waitFor();
});

test('a rule that cannot be read any more is said to be so, and the others are answered', async () => {
  const page = await opened();
  const rules = await panel(page, 'u', 'Rules');
  const field = rules.getByLabel('What must never or must always be');
  for (const text of ['never CLAMP moves in while LIFT moves', 'never LIFT stalled and CLAMP stalled']) {
    await field.fill(text);
    await field.press('Enter');
    await rules.getByRole('heading', { name: text }).waitFor();
  }
  await page.locator('[data-part="LIFT"]').click();
  await page.keyboard.press('Delete');
  await rules.getByText('Cannot be answered').first().waitFor();
  await field.fill('never CLAMP stalled');
  await field.press('Enter');
  await rules.getByText(/^(Holds|Broken|Not decided) in/).waitFor();
  expect(await rules.getByText('Cannot be answered').count()).toBe(2);
});

test('the bleed-down list says what stays, lights its lines, and a move leads to its row', async () => {
  const page = await opened();
  const bleed = await panel(page, 'b', 'Bleed-down');
  await bleed.getByRole('heading', { name: /^Stop in row 10 ?: what stays under pressure/ }).waitFor();
  await bleed.getByText('Pressed on by the load of LIFT').waitFor();
  for (const caution of ['the order of isolation', 'not an isolating device', 'Cracking a fitting', 'qualified people'])
    await bleed.getByText(caution).first().waitFor();
  // The lock check shuts both sides of CLAMP in: nothing but a valve by hand opens them.
  await bleed.getByText('No lever position opens these to tank').waitFor();
  expect(await page.locator('.halo').count()).toBe(0);
  await bleed.getByRole('button', { name: /^V2\.A .*Pressed on by the load/ }).focus();
  await expect.poll(() => page.locator('.halo').count()).toBeGreaterThan(0);

  const [drop] = await bleed.getByText('LIFT comes down').all();
  expect(await drop?.innerText()).toContain('Caution');
  const move = bleed.getByRole('button', { name: /^1 Move V2 from hold to lower/ }).first();
  await move.focus();
  await page.keyboard.press('Enter');
  await expect.poll(() => row(page)).toBe('row 12 of 18');
  expect(await page.getByRole('radio', { name: 'stopped' }).first().isChecked()).toBe(true);
  await bleed.getByRole('heading', { name: /^Stop in row 10/ }).waitFor();
  await bleed.getByRole('button', { name: 'Stop here: row 12' }).click();
  await bleed.getByRole('heading', { name: /^Stop in row 12/ }).waitFor();
  await page.keyboard.press('Escape');
  await expect.poll(() => bleed.count()).toBe(0);
});
