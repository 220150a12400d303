import { expect, test } from 'vitest';
import { shot } from './harness.ts';
import { openedEditor, severeIn, smallTargets, STATIONS, WIDE_STATIONS } from './stations.ts';

/** A few seconds for each panel, many more on a machine that is busy. */
const LONG = { timeout: 900_000 };

test.each(['light', 'dark'] as const)(
  'every panel and menu keeps WCAG 2.2 AA as far as a machine can tell, and every control is 24 px to hit (%s)',
  LONG,
  async (colorScheme) => {
    const page = await openedEditor({ colorScheme, reducedMotion: 'reduce' });
    await page.getByRole('grid').waitFor();
    const found: string[] = [];
    for (const { name, open, at, close } of [...STATIONS, ...WIDE_STATIONS]) {
      await open(page);
      // Only contrast depends on the theme.
      const severe = await severeIn(page, at, colorScheme === 'dark' ? 'color-contrast' : undefined);
      found.push(...[...severe, ...(await smallTargets(page))].map((text) => `${name}: ${text}`));
      await shot(page, `comfort-${colorScheme}-${name.replace(/\W+/g, '-')}`);
      await close(page);
    }
    expect(found).toEqual([]);
  },
);

/** WCAG 2.2, 1.4.10: a window of 1280 by 1024 px at 400 % has 320 by 256 CSS px. */
test('at 400 % everything is reached without scrolling sideways, drawing and tables aside', LONG, async () => {
  const page = await openedEditor({ viewport: { width: 320, height: 256 } });
  const sideways = (): Promise<string[]> =>
    page.evaluate(() => {
      const controls = 'button, input, select, textarea, h2, h3, p, [role=tab]';
      const isExempt = (element: Element): boolean => element.closest('[role=grid], table, .host, .strip') !== null;
      return [
        ...(document.documentElement.scrollWidth > innerWidth
          ? [`the page: ${document.documentElement.scrollWidth} px`]
          : []),
        ...[...document.querySelectorAll<HTMLElement>(controls)].flatMap((each) => {
          const { left, right, width } = each.getBoundingClientRect();
          const seen = width > 1 && getComputedStyle(each).visibility !== 'hidden' && !isExempt(each);
          return seen && (right > innerWidth + 1 || left < -1)
            ? [`${left} to ${right}: ${each.outerHTML.slice(0, 100)}`]
            : [];
        }),
      ];
    });
  const found: string[] = [];
  for (const { name, open, close } of STATIONS) {
    await open(page);
    found.push(...(await sideways()).map((text) => `${name}: ${text}`));
    await shot(page, `tight-${name.replace(/\W+/g, '-')}`);
    await close(page);
  }
  for (const tab of ['State table', 'Step plans', 'Sheet']) {
    await page.getByRole('tab', { name: tab }).click();
    found.push(...(await sideways()).map((text) => `${tab}: ${text}`));
    await shot(page, `tight-tab-${tab.replace(/\W+/g, '-')}`);
  }
  expect(found).toEqual([]);
});

/** WCAG 2.2, 2.4.11. */
test('a panel that hides what has the keyboard lets it be seen', async () => {
  const page = await openedEditor();
  await page.getByRole('grid').waitFor();
  await page.keyboard.press('?');
  const keys = page.getByRole('dialog', { name: 'Keys' });
  await keys.waitFor();
  const opacity = (): Promise<number> => keys.evaluate((panel) => Number(getComputedStyle(panel).opacity));
  await expect.poll(opacity).toBe(1);
  await page.keyboard.press('1');
  const lever = page.locator('[data-slot="1"] [aria-checked="true"]');
  await expect.poll(() => lever.evaluate((each) => each === document.activeElement)).toBe(true);
  await expect.poll(opacity).toBeLessThan(0.5);
  await keys.getByRole('button', { name: 'Close Keys' }).focus();
  await expect.poll(opacity).toBe(1);
});

test('nothing moves by itself where the system asks for less motion, and something does elsewhere', async () => {
  const moving = async (reducedMotion: 'reduce' | 'no-preference'): Promise<number> => {
    const page = await openedEditor({ reducedMotion });
    await page.getByRole('grid').waitFor();
    return page.evaluate(
      () =>
        [...document.querySelectorAll('*')].filter((each) => {
          const { animationName, transitionDuration, scrollBehavior } = getComputedStyle(each);
          const turns = transitionDuration.split(', ').some((time) => parseFloat(time) > 0);
          return animationName !== 'none' || turns || scrollBehavior === 'smooth';
        }).length,
    );
  };
  expect(await moving('no-preference')).toBeGreaterThan(0);
  expect(await moving('reduce')).toBe(0);
});

/** The menu button and menu patterns of the WAI-ARIA Authoring Practices. */
test('a menu goes by arrows, ends and first letters, tells what is on, and gives the keyboard back', async () => {
  const page = await openedEditor();
  await page.getByRole('grid').waitFor();
  const button = page.getByRole('button', { name: 'Panels', exact: true });
  const at = (): Promise<string> =>
    page.evaluate(() => document.activeElement?.querySelector('.text')?.textContent ?? '');
  await button.focus();
  await page.keyboard.press('ArrowUp');
  await expect.poll(at).toBe('Keys');
  await page.keyboard.press('ArrowDown');
  const first = await page.getByRole('menu').locator('.text').first().textContent();
  expect(await at()).toBe(first);
  await page.keyboard.press('End');
  expect(await at()).toBe('Keys');
  await page.keyboard.press('Home');
  await page.keyboard.press('r');
  expect(await at()).toBe('Rules');
  await page.keyboard.press('Enter');
  await page.getByRole('dialog', { name: 'Rules' }).waitFor();
  expect(await page.getByRole('menu').count()).toBe(0);
  await button.focus();
  await page.keyboard.press('Enter');
  const rules = page.getByRole('menuitemcheckbox', { name: 'Rules' });
  expect(await rules.getAttribute('aria-checked')).toBe('true');
  expect(await page.getByRole('group', { name: 'The whole table' }).getByRole('menuitemcheckbox').count()).toBe(5);
  await page.keyboard.press('Escape');
  expect(await button.evaluate((each) => each === document.activeElement)).toBe(true);
  expect(await button.getAttribute('aria-expanded')).toBe('false');
});
