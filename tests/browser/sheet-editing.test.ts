import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openEditor, shot } from './harness.ts';

interface File {
  readonly parts: readonly {
    readonly id: string;
    readonly kind: string;
    readonly at?: readonly [number, number];
    readonly turn?: number;
  }[];
  readonly connections: readonly {
    readonly id: string;
    readonly from: string;
    readonly to: string;
    readonly use?: string;
    readonly size?: string;
    readonly bends?: readonly (readonly [number, number])[];
  }[];
  readonly groups?: readonly { readonly name: string; readonly parts: readonly string[] }[];
  readonly labels?: readonly { readonly text: string; readonly at: readonly [number, number] }[];
}

/** Three parts in no order, with one line: what is arranged, cut, bent and swapped here. */
const CIRCUIT = {
  format: 'spooltable-circuit',
  version: 1,
  name: 'to arrange',
  parts: [
    { id: 'F1', kind: 'filter', at: [20, 40] },
    { id: 'F2', kind: 'filter', at: [33, 20] },
    { id: 'R1', kind: 'throttle', at: [60, 44], settings: { ratedFlow: '33 L/min' } },
  ],
  connections: [{ id: 'c1', from: 'F1.B', to: 'F2.A' }],
};

const open = (circuit: object = CIRCUIT): Promise<Page> =>
  openEditor({
    before: `if (!localStorage.getItem('spooltable.open')) localStorage.setItem('spooltable.open', ${JSON.stringify(
      JSON.stringify({ format: 1, circuit: JSON.stringify(circuit), past: [], future: [], saved: 0, levers: {} }),
    )}); localStorage.setItem('spooltable.legendOpen', 'false')`,
  });
const host = (page: Page) => page.getByRole('application', { name: 'to arrange' });
const status = (page: Page) => page.locator('[aria-live=polite]').last();

async function at(page: Page, x: number, y: number): Promise<[number, number]> {
  return host(page)
    .locator('svg')
    .first()
    .evaluate(
      (svg, [mx, my]) => {
        const p = new DOMPoint(mx, my).matrixTransform((svg as SVGSVGElement).getScreenCTM() ?? new DOMMatrix());
        return [p.x, p.y] as [number, number];
      },
      [x, y] as const,
    );
}

async function drag(page: Page, from: [number, number], to: [number, number]): Promise<void> {
  const [x0, y0] = await at(page, ...from);
  const [x1, y1] = await at(page, ...to);
  await page.mouse.move(x0, y0);
  await page.mouse.down();
  await page.mouse.move((x0 + x1) / 2, (y0 + y1) / 2, { steps: 3 });
  await page.mouse.move(x1, y1, { steps: 3 });
  await page.mouse.up();
}

async function kept(page: Page): Promise<File> {
  const text = await page.evaluate(() => localStorage.getItem('spooltable.open'));
  return JSON.parse((JSON.parse(text ?? '{}') as { circuit: string }).circuit) as File;
}
const places = async (page: Page): Promise<string[]> =>
  (await kept(page)).parts.map((part) => `${part.id} ${String(part.at)}`);
const lines = async (page: Page): Promise<string[]> =>
  (await kept(page)).connections.map(({ from, to }) => `${from} ${to}`);

async function find(page: Page, name: string): Promise<void> {
  await host(page).focus();
  await page.keyboard.press('/');
  await page.getByRole('combobox', { name: 'Find on the sheet' }).fill(name);
  await page.keyboard.press('Enter');
  await expect.poll(() => status(page).textContent()).toContain('selected');
}

test('parts line up by their ports, are spaced, drawn as a block and moved together, each in one step', async () => {
  const page = await open();
  await host(page).focus();
  const key = (name: string) => page.keyboard.press(name);
  await find(page, 'F1');
  await key('k');
  await expect.poll(() => status(page).textContent()).toContain('2 parts of this kind');
  await key('v');
  // By the ports of their line: the filters' ports are on their axis, so F2 comes to stand over F1.
  await expect.poll(() => places(page)).toEqual(['F1 20,40', 'F2 20,20', 'R1 60,44']);
  await expect.poll(() => page.locator('[data-line=c1] path.core').getAttribute('d')).toMatch(/^M20 [\d.]+L20 [\d.]+$/);
  await key('g');
  await page.getByRole('textbox', { name: 'Name of the block' }).fill('Filter block');
  await key('Enter');
  await expect
    .poll(async () => (await kept(page)).groups)
    .toEqual([{ id: 'g1', name: 'Filter block', parts: ['F1', 'F2'] }]);
  expect(await page.getByRole('img', { name: 'Block Filter block' }).count()).toBe(1);
  await find(page, 'F2');
  await key('Shift+ArrowRight');
  await expect.poll(() => places(page)).toEqual(['F1 24,40', 'F2 24,20', 'R1 60,44']);
  await shot(page, 'sheet-block');
  await key('Shift+g');
  await expect.poll(async () => (await kept(page)).groups).toBeUndefined();
  for (let i = 0; i < 5; i++) await key('Control+z');
  await expect.poll(() => places(page)).toEqual(['F1 20,40', 'F2 33,20', 'R1 60,44']);
});

test('a part dropped on a line goes into it, by mouse and by keys, and is swapped for another kind', async () => {
  const page = await open();
  await host(page).focus();
  const key = (name: string) => page.keyboard.press(name);
  await find(page, 'F1');
  await key('k');
  await key('v');
  await drag(page, [60, 44], [20, 30]);
  await expect.poll(() => status(page).textContent()).toContain('put into the line');
  await expect.poll(() => lines(page)).toEqual(['F1.B R1.A', 'R1.B F2.A']);
  await key('Control+z');
  await expect.poll(() => lines(page)).toEqual(['F1.B F2.A']);
  // The same by keys: the line, then a part from the tray.
  // The port of that name is found first; from there along its line.
  await key('/');
  await page.getByRole('combobox', { name: 'Find on the sheet' }).fill('F1.B');
  await key('Enter');
  await expect.poll(() => status(page).textContent()).toContain('Enter starts a line');
  await key('Shift+Enter');
  await key('i');
  await page.getByRole('searchbox', { name: 'Search parts' }).fill('shut-off');
  await key('ArrowDown');
  await key('Enter');
  await expect.poll(() => status(page).textContent()).toContain('Goes into the line');
  await key('Enter');
  await expect.poll(async () => (await lines(page)).length).toBe(2);
  await find(page, 'R1');
  await key('s');
  await page.getByRole('searchbox', { name: 'Search parts' }).fill('one-way throttle');
  await key('ArrowDown');
  await key('Enter');
  await expect.poll(() => status(page).textContent()).toContain('R1 is now');
  await expect.poll(async () => (await kept(page)).parts.find(({ id }) => id === 'R1')?.kind).toBe('one-way-throttle');
});

test('a stretch of a line is dragged and nudged, its bends stay, go one by one, and are tidied away', async () => {
  const page = await open();
  await host(page).focus();
  const key = (name: string) => page.keyboard.press(name);
  const bends = async (): Promise<string> => JSON.stringify((await kept(page)).connections[0]?.bends ?? []);
  // F1.B at (20, 36) up to F2.A at (33, 24): across at half height, 30.
  await drag(page, [27, 30], [27, 33]);
  await expect.poll(bends).toBe('[[20,33],[33,33]]');
  await key('m');
  await expect.poll(() => status(page).textContent()).toContain('Stretch 2 of 3');
  await key('ArrowUp');
  await expect.poll(bends).toBe('[[20,32],[33,32]]');
  await key('Tab');
  await expect.poll(() => status(page).textContent()).toContain('Stretch 3 of 3');
  await key('Shift+Tab');
  await key('Delete');
  await expect.poll(bends).toBe('[]');
  await key('Control+z');
  await expect.poll(bends).toBe('[[20,32],[33,32]]');
  await key('Escape');
  await key('Shift+m');
  await expect.poll(bends).toBe('[]');
  await key('d');
  await key('n');
  await page.getByRole('textbox', { name: 'Size of the line' }).fill('12x1.5');
  await key('Enter');
  await expect.poll(async () => (await kept(page)).connections[0]).toMatchObject({ use: 'pilot', size: '12x1.5' });
  await page.getByText('12x1.5').first().waitFor();
});

test('menus open at the thing, by the right button and by keys; texts are written, found and deleted', async () => {
  const page = await open();
  await host(page).focus();
  const [x, y] = await at(page, 60, 44);
  await page.mouse.click(x, y, { button: 'right' });
  await page.getByRole('menu', { name: 'Menu: R1' }).waitFor();
  await page.getByRole('menuitem', { name: 'Turn clockwise' }).click();
  await expect.poll(async () => (await kept(page)).parts.find(({ id }) => id === 'R1')?.turn).toBe(90);
  await page.keyboard.press('Shift+F10');
  await page.getByRole('menu', { name: 'Menu: R1' }).waitFor();
  await shot(page, 'sheet-menu');
  await page.keyboard.press('Escape');
  await page.keyboard.press('Escape');
  await page.keyboard.press('x');
  await page.keyboard.press('Enter');
  await page.getByRole('textbox', { name: 'New text' }).fill('Bleed first');
  await page.keyboard.press('Enter');
  await expect.poll(async () => (await kept(page)).labels?.map(({ text }) => text)).toEqual(['Bleed first']);
  await find(page, 'bleed');
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('Delete');
  await expect.poll(async () => (await kept(page)).labels ?? []).toEqual([]);
});

test('a ready-made circuit is placed in one go, a section added beside it, and a selection kept in the tray', async () => {
  const page = await open({ ...CIRCUIT, parts: [], connections: [] });
  await host(page).focus();
  const key = (name: string) => page.keyboard.press(name);
  await key('a');
  await page.getByRole('searchbox', { name: 'Search parts' }).fill('lever section');
  await page.locator('[data-form=lever-section]').focus();
  await key('Enter');
  await key('Enter');
  await expect.poll(async () => (await kept(page)).parts.map(({ id }) => id)).toEqual(['V1', 'CYL1']);
  await find(page, 'V1');
  await key('Shift+a');
  await expect.poll(() => lines(page)).toEqual(['V1.A CYL1.A', 'V1.B CYL1.B', 'V2.A CYL2.A', 'V2.B CYL2.B']);
  await key('Shift+s');
  await expect.poll(() => status(page).textContent()).toContain('Selection 1');
  await key('a');
  await page.locator('[data-form="own Selection 1"]').focus();
  await key('Enter');
  await key('Enter');
  await expect.poll(async () => (await kept(page)).parts.length).toBe(6);
  await key('Control+z');
  await key('z');
  const overview = page.getByRole('application', { name: 'Overview of the sheet' });
  await overview.focus();
  const [before] = await at(page, 0, 0);
  await key('ArrowRight');
  await expect.poll(async () => (await at(page, 0, 0))[0]).toBeLessThan(before);
  await key('Escape');
  expect(await overview.count()).toBe(0);
});
