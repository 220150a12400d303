import type { Locator, Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openEditor } from './harness.ts';

async function panel(page: Page, key: string, name: string): Promise<Locator> {
  await page.getByRole('grid').focus();
  await page.keyboard.press(key);
  const dialog = page.getByRole('dialog', { name });
  await dialog.waitFor();
  return dialog;
}

async function opened(options: Parameters<typeof openEditor>[0] = {}): Promise<Page> {
  const page = await openEditor(options);
  await page.getByRole('grid').waitFor();
  return page;
}

const row = (page: Page): Promise<string | null> => page.locator('.where').textContent();

test('every move of one lever, with what it changes; picking one goes there', async () => {
  const page = await opened();
  const moves = await panel(page, 'm', 'Moves');
  const raise = moves.getByRole('button', { name: /V2 hold to raise/ });
  await raise.waitFor();
  await moves.getByText('LIFT extends (held before).').waitFor();
  await moves.getByText('It belongs to the move, not to a state.').waitFor();
  const before = await row(page);
  await raise.focus();
  await page.keyboard.press('Enter');
  await moves.getByRole('button', { name: /V2 raise to hold/ }).waitFor();
  expect(await row(page)).not.toBe(before);
  // Back in the centre the load side stays shut in.
  await moves.getByText(/V2\.A is shut in with pressure, up to/).waitFor();
});

test('a line says which moves vent it', async () => {
  const page = await opened();
  const moves = await panel(page, 'm', 'Moves');
  await moves.getByLabel('Vent').selectOption('V2.A');
  const vent = moves.getByRole('region', { name: 'Moves that vent V2.A' });
  await vent.getByText('One move opens V2.A to tank; no shorter list does.').waitFor();
  await vent.getByRole('button', { name: /V2 hold to lower/ }).waitFor();
  await vent.getByText('local codes and qualified people').waitFor();
});

test('a loss of power in the row, in its three kinds', async () => {
  const page = await opened();
  const loss = await panel(page, 'y', 'Loss of power');
  for (const title of ['Coils off, pumps running on', 'Coils off, pumps stopped', 'Pumps stopped, coils on'])
    await loss.getByRole('heading', { name: title }).waitFor();
  await loss.getByText('support every load before anyone goes under or beside it').waitFor();
});
