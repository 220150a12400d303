import AxeBuilder from '@axe-core/playwright';
import type { Locator, Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openEditor, shot } from './harness.ts';

async function opened(example: string, options: Parameters<typeof openEditor>[0] = {}): Promise<Page> {
  const page = await openEditor(options);
  await page.getByRole('grid').waitFor();
  await page.getByRole('button', { name: /file/i }).first().click();
  await page.getByRole('menuitem', { name: example, exact: true }).click();
  await page.getByRole('button', { name: 'Step plans', exact: true }).click();
  return page;
}

const band = (page: Page): Locator => page.getByRole('region', { name: 'Step plans' });
const step = (page: Page, number: number): Locator =>
  band(page)
    .locator('tbody[data-step]')
    .nth(number - 1);
const severe = async (page: Page): Promise<unknown[]> =>
  (await new AxeBuilder({ page }).analyze()).violations.map(({ id, nodes }) => [id, nodes[0]?.html]);

/** Where the piston of a cylinder is drawn, px in the window. */
async function pistonAt(page: Page, part: string): Promise<number> {
  const box = await page.locator(`[data-part="${part}"] [data-role="piston"]`).first().boundingBox();
  return box?.x ?? NaN;
}

test(
  'a wrongly wired step is told in words, mended in the chart, and then does what it says',
  { timeout: 120_000 },
  async () => {
    const page = await opened('Crate pusher');
    await band(page).getByText('does not do what it says: 3 faults').waitFor();
    // Step 3 switches both coils of V2 on (the fault that the example is made for).
    await step(page, 3).getByText('Coils a and b of V2 are on together', { exact: false }).waitFor();
    await step(page, 3).getByText('never ends', { exact: true }).waitFor();
    await step(page, 4).getByText('not played', { exact: true }).waitFor();
    expect(await severe(page)).toEqual([]);
    await step(page, 3).getByRole('button', { name: 'Coil V2.a, step 3: on' }).press('Space');
    await band(page).getByText('does what it says', { exact: false }).and(page.locator('.stamp.note')).waitFor();
    await step(page, 4).getByText('as asked').waitFor();
    await page.keyboard.press('Control+z');
    await band(page).getByText('3 faults', { exact: false }).waitFor();
  },
);

test('picking a step takes levers, strokes and pressures on the sheet along, from event to event', async () => {
  const page = await opened('Crate pusher');
  await band(page).getByLabel('Plan', { exact: true }).selectOption('Corrected');
  await step(page, 4).getByText('as asked').waitFor();
  await step(page, 2).getByRole('button', { name: '2 push off' }).click();
  const chip = page.getByRole('group', { name: 'Moment of the step plan on show' });
  await chip.getByText('step 2 push off').waitFor();
  expect(await page.getByRole('radio', { name: /push/ }).first().isChecked()).toBe(true);
  await page.waitForTimeout(400);
  const before = await pistonAt(page, 'PUSH');
  await page.keyboard.press(';');
  await chip.getByText('3.752 s').waitFor();
  await page.waitForTimeout(400);
  // The rod has gone out by its whole stroke: 8 modules are drawn, whatever the scale.
  expect((await pistonAt(page, 'PUSH')) - before).toBeGreaterThan(20);
  await page.getByText('PUSH all the way out', { exact: false }).first().waitFor();
  await page.getByText('PUSH at its outer stop', { exact: false }).first().waitFor();
  // A lever moved by hand is a lasting state again, under the conditions of before.
  await chip.getByRole('button', { name: 'Leave the moment: back to lasting states' }).click();
  await page.getByText('all between their stops').waitFor();
  expect(await chip.count()).toBe(0);
  await page.keyboard.press('j');
  await page.getByRole('grid').waitFor();
  await page.keyboard.press('j');
  await band(page).waitFor();
});

test('steps come, go and move by the keyboard, and all of it can be undone', async () => {
  const page = await opened('Crate pusher');
  const heads = band(page).locator('[data-field="head"]');
  await heads.first().waitFor();
  await heads.nth(1).focus();
  await page.keyboard.press('Control+Enter');
  await expect.poll(() => heads.count()).toBe(5);
  await expect.poll(() => page.evaluate(() => document.activeElement?.textContent)).toBe('3');
  await page.keyboard.press('Alt+ArrowUp');
  await expect
    .poll(async () => (await heads.allTextContents()).join(' '))
    .toBe('1lift 2 3push off 4pusher back 5lower');
  await page.keyboard.press('Delete');
  await expect.poll(() => heads.count()).toBe(4);
  for (let i = 0; i < 3; i++) await page.keyboard.press('Control+z');
  await expect.poll(async () => (await heads.allTextContents()).join(' ')).toBe('1lift 2push off 3pusher back 4lower');
  const cell = step(page, 1).locator('[data-cell="0"]');
  await cell.focus();
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('ArrowDown');
  await expect
    .poll(() => page.evaluate(() => document.activeElement?.getAttribute('aria-label')))
    .toBe('Coil V1.b, step 2: off');
});

test('a motion that cannot be read says so at once, and is offered as it is typed', async () => {
  const page = await opened('Crate pusher');
  const field = band(page).getByLabel('Asked motions of step 2');
  await field.fill('PUSH');
  await page.getByRole('option', { name: 'PUSH-', exact: true }).waitFor();
  await page.keyboard.press('Escape');
  await field.press('Enter');
  await step(page, 2).getByText('the sign is missing', { exact: false }).first().waitFor();
  expect(await field.getAttribute('aria-invalid')).toBe('true');
});

test('without a plan one is drafted from a motion sequence, and it plays', async () => {
  const page = await opened('Crate pusher');
  const menu = band(page).getByRole('button', { name: 'Plans: new, duplicate, move, delete' });
  for (let i = 0; i < 2; i++) {
    await menu.click();
    await page.getByRole('menuitem', { name: /Delete this plan/ }).click();
  }
  const motions = band(page).getByLabel(/^Motions:/);
  await motions.fill('LIFT+ PUSH+ PUSH- LIFT-');
  await page.keyboard.press('Escape');
  await band(page).getByRole('button', { name: 'Draft the steps' }).click();
  await step(page, 4).getByText('as asked').waitFor();
  // One coil for each motion, by the drawing.
  expect(await step(page, 3).getByRole('button', { name: 'Coil V2.b, step 3: on' }).count()).toBe(1);
  expect(await band(page).locator('[aria-pressed="true"][aria-label^="Coil"]').count()).toBe(4);
});

test.each(['light', 'dark'] as const)(
  'stop, coil conditions and diagram, %s',
  { timeout: 180_000 },
  async (colorScheme) => {
    const page = await opened('Peg drill', { colorScheme });
    await step(page, 1).getByText('as asked', { exact: false }).first().waitFor();
    expect(await severe(page)).toEqual([]);
    await band(page).getByText('Stop and power loss').click();
    await band(page).getByRole('columnheader', { name: 'Goes on afterwards' }).waitFor();
    await band(page).getByText('follow its documents', { exact: false }).waitFor();
    expect(await severe(page)).toEqual([]);
    await shot(page, `plans-loss-${colorScheme}`);
    await band(page).getByText('Coil conditions').click();
    await expect.poll(() => band(page).getByLabel('Structured text').inputValue()).toContain('FUNCTION_BLOCK');
    expect(await severe(page)).toEqual([]);
    await shot(page, `plans-conditions-${colorScheme}`);
    await band(page).getByText('Diagram alone').click();
    const slider = band(page).getByRole('slider');
    await slider.focus();
    await page.keyboard.press('End');
    await expect.poll(() => slider.getAttribute('aria-valuetext')).toMatch(/^3\.901 s, step 3 wait/);
    expect(await severe(page)).toEqual([]);
    await shot(page, `plans-diagram-${colorScheme}`);
  },
);

test('on a small screen plans are a page of their own', async () => {
  const page = await openEditor({ viewport: { width: 800, height: 900 } });
  await page.getByRole('tab', { name: 'Step plans' }).click();
  await band(page).waitFor();
  // The first circuit has no plans: the page says what to do next.
  await band(page).getByRole('button', { name: 'Draft the steps' }).waitFor();
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'])
    .analyze();
  expect(violations.map(({ id, nodes }) => [id, nodes[0]?.html])).toEqual([]);
  await shot(page, 'plans-small');
});
