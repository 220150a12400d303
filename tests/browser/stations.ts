import AxeBuilder from '@axe-core/playwright';
import type { Page } from 'playwright-core';
import { openEditor } from './harness.ts';

/** A panel, menu or other thing that comes up over the editor: what opens it, and where it is then. */
export interface Station {
  readonly name: string;
  readonly open: (page: Page) => Promise<void>;
  readonly at: string;
  readonly close: (page: Page) => Promise<void>;
}

export async function openedEditor(options: Parameters<typeof openEditor>[0] = {}): Promise<Page> {
  const page = await openEditor(options);
  await page.getByRole('region', { name: 'Lever bench' }).waitFor();
  return page;
}

/** Keys of the page itself, whatever had the keyboard before. */
async function press(page: Page, key: string): Promise<void> {
  await page.evaluate(() => (document.activeElement as HTMLElement | null)?.blur());
  await page.keyboard.press(key);
}

const closePanels = async (page: Page): Promise<void> => {
  for (const button of await page.locator('.panel .close').all()) await button.click();
};

const panel = (name: string, key: string, more?: (page: Page) => Promise<void>): Station => ({
  name,
  at: '.panel[role="dialog"][data-region]',
  open: async (page) => {
    await closePanels(page);
    await press(page, key);
    await page.locator('.panel[data-region]').waitFor();
    await more?.(page);
  },
  close: closePanels,
});

const menu = (name: string): Station => ({
  name: `menu ${name}`,
  at: '[role="menu"]',
  open: async (page) => {
    await closePanels(page);
    await page.getByRole('button', { name, exact: true }).click();
    await page.getByRole('menu').waitFor();
  },
  close: (page) => page.keyboard.press('Escape'),
});

const part = (id: string) => (page: Page) => page.locator(`[data-part="${id}"]`).first().click({ force: true });

/** Everything that comes up over the worked circuit. Those that need the table or the sheet beside it say so. */
export const STATIONS: readonly Station[] = [
  ...['File', 'Panels', 'View', 'Export'].map(menu),
  panel('lines', 'l'),
  panel('why', 'w'),
  panel('findings', 'f'),
  panel('settings of the circuit', 'e'),
  panel('conditions', 'o', async (page) => {
    await page.getByRole('button', { name: 'Add a load case' }).click();
    await page.getByLabel('Name of the case').waitFor();
  }),
  panel('rules', 'u', async (page) => {
    await page.getByRole('button', { name: 'never CLAMP moves in while LIFT moves' }).click();
    await page.getByText('Broken in 4').waitFor();
  }),
  panel('influence', 'v', (page) => page.getByText('Positions that change nothing').waitFor()),
  panel('moves', 'm', (page) => page.getByRole('heading', { name: /^Moves of one lever from/ }).waitFor()),
  panel('loss of power', 'y', (page) => page.getByText('Coils off').first().waitFor()),
  panel('bleed-down', 'b', (page) => page.getByText('Moves, in this order').waitFor()),
  panel('drawing and print', 'Control+p', (page) => page.locator('.panel svg').first().waitFor()),
  panel('valve maker', 'Shift+E', (page) => page.getByLabel('Add to the left end').waitFor()),
  panel('keys', '?'),
  {
    name: 'parts tray',
    at: '[role="dialog"][aria-label="Parts"]',
    open: async (page) => {
      await closePanels(page);
      await page.getByRole('button', { name: 'Circuits', exact: true }).click();
      await page.getByRole('dialog', { name: 'Parts' }).waitFor();
    },
    close: (page) => page.getByRole('button', { name: 'Close the parts tray' }).click(),
  },
];

/** What stands beside them on a screen with room for sheet and table. */
export const WIDE_STATIONS: readonly Station[] = [
  ...(['CLAMP', 'V3'] as const).map((id): Station => ({
    ...panel(`settings of ${id}`, 'e'),
    open: async (page) => {
      await closePanels(page);
      await part(id)(page);
      await page.keyboard.press('e');
      await page.locator('.panel[data-region]').waitFor();
    },
  })),
  {
    name: 'menu of a part',
    at: '[role="menu"]',
    open: async (page) => {
      await part('CLAMP')(page);
      await page.keyboard.press('Shift+F10');
      await page.getByRole('menu').waitFor();
    },
    close: (page) => page.keyboard.press('Escape'),
  },
  {
    name: 'find box',
    at: '[data-region="sheet"]',
    open: async (page) => {
      await part('CLAMP')(page);
      await page.keyboard.press('/');
      await page.getByRole('combobox').first().waitFor();
    },
    close: (page) => page.keyboard.press('Escape'),
  },
  {
    name: 'question',
    at: '[data-region="table"]',
    open: async (page) => {
      await press(page, 'q');
      await page.getByRole('button', { name: 'close', exact: true }).waitFor();
    },
    close: (page) => page.getByRole('button', { name: 'close', exact: true }).click(),
  },
  {
    name: 'folded table',
    at: '[data-region="table"]',
    open: async (page) => {
      await page.getByText('folded', { exact: true }).click();
      await page
        .locator('[data-region="table"] [role="treegrid"], [data-region="table"] [role="grid"]')
        .first()
        .waitFor();
    },
    close: (page) => page.getByText('all rows', { exact: true }).click(),
  },
];

const RULES = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** What a machine can tell of WCAG 2.2 AA, in a part of the page; `only`: by one rule. */
export async function severeIn(page: Page, at: string, only?: string): Promise<string[]> {
  // There are no frames, so that a window of its own for each answer is time lost. Drawings have tests of their own.
  const axe = new AxeBuilder({ page }).setLegacyMode(true).include(at).exclude('svg');
  const { violations } = await (only === undefined ? axe.withTags(RULES) : axe.withRules(only)).analyze();
  return violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 200)).join(' ')}`);
}

/** Controls that are less than 24 by 24 CSS px to hit (WCAG 2.2, 2.5.8), splitters aside, which the View menu stands in for. */
export const smallTargets = (page: Page): Promise<string[]> =>
  page.evaluate(() => {
    const controls =
      'button, a[href], input, select, textarea, [role=tab], [role=radio], [role^=menuitem], [role=option]';
    const isSmall = ({ width, height }: DOMRect): boolean => width < 23.9 || height < 23.9;
    return [...document.querySelectorAll<HTMLElement>(controls)].flatMap((control) => {
      const box = control.getBoundingClientRect();
      const { visibility, pointerEvents } = getComputedStyle(control);
      const label = control.closest('label')?.getBoundingClientRect();
      const hidden = box.width * box.height === 0 || visibility === 'hidden' || pointerEvents === 'none';
      if (hidden || !isSmall(box) || (label && !isSmall(label))) return [];
      return [`${Math.round(box.width)} × ${Math.round(box.height)} px: ${control.outerHTML.slice(0, 120)}`];
    });
  });
