import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openEditor, shot } from './harness.ts';

interface File {
  readonly parts: readonly { readonly id: string; readonly kind: string; readonly at?: readonly [number, number]; readonly turn?: number }[];
  readonly connections: readonly { readonly id: string; readonly from: string; readonly to: string }[];
}

/** A first start with nothing in hand: what the browser keeps is an empty circuit. */
const EMPTY = `localStorage.setItem('spooltable.open', JSON.stringify({
  format: 1, circuit: JSON.stringify({ format: 'spooltable-circuit', version: 1, name: 'drawn by hand', parts: [], connections: [] }),
  past: [], future: [], saved: 0, levers: {},
}))`;
/** Runs only at the first load, so that a reload would show what was kept. */
const openEmpty = (): Promise<Page> => openEditor({ before: `if (!localStorage.getItem('spooltable.open')) ${EMPTY}` });

const host = (page: Page) => page.getByRole('application', { name: 'drawn by hand' });

/** Sheet modules to pixels of the page. */
async function at(page: Page, x: number, y: number): Promise<[number, number]> {
  return host(page)
    .locator('svg')
    .first()
    .evaluate((svg, [mx, my]) => {
      const p = new DOMPoint(mx, my).matrixTransform((svg as SVGSVGElement).getScreenCTM() ?? new DOMMatrix());
      return [p.x, p.y] as [number, number];
    }, [x, y] as const);
}

async function drag(page: Page, from: [number, number], to: [number, number]): Promise<void> {
  const [x0, y0] = await at(page, ...from);
  const [x1, y1] = await at(page, ...to);
  await page.mouse.move(x0, y0);
  await page.mouse.down();
  await page.mouse.move((x0 + x1) / 2, (y0 + y1) / 2, { steps: 4 });
  await page.mouse.move(x1, y1, { steps: 4 });
  await page.mouse.up();
}

async function click(page: Page, x: number, y: number): Promise<void> {
  const [px, py] = await at(page, x, y);
  await page.mouse.move(px, py);
  await page.mouse.click(px, py);
}

/** From the tray into the hand, then down on the sheet. */
async function put(page: Page, search: string, x: number, y: number): Promise<void> {
  await host(page).focus();
  await page.keyboard.press('a');
  await page.getByRole('searchbox', { name: 'Search parts' }).fill(search);
  await page.keyboard.press('Enter');
  await click(page, x, y);
}

/** The circuit as the browser keeps it; the app writes it a moment after the last change. */
async function kept(page: Page): Promise<File> {
  const text = await page.evaluate(() => localStorage.getItem('spooltable.open'));
  return JSON.parse((JSON.parse(text ?? '{}') as { circuit: string }).circuit) as File;
}

const lines = (file: File): string[] => file.connections.map(({ from, to }) => `${from} ${to}`);
const status = (page: Page) => page.locator('[aria-live=polite]').last();

/** Pump, tank, relief, 4/3 lever valve, cylinder: the least circuit that does work (common practice). */
async function drawParts(page: Page): Promise<void> {
  await put(page, 'fixed pump', 30, 40);
  await put(page, 'tank', 30, 47);
  await put(page, 'relief', 42, 40);
  await put(page, 'tank', 42, 47);
  await put(page, '4/3 lever', 36, 26);
  await put(page, 'tank', 39, 31);
  await put(page, 'cylinder', 36, 12);
}

async function drawLines(page: Page): Promise<void> {
  await drag(page, [30, 36], [35, 28]);
  await drag(page, [30, 44], [30, 46]);
  await drag(page, [37, 28], [39, 30]);
  await drag(page, [35, 24], [31, 15]);
  await drag(page, [42, 43], [42, 46]);
  // Click and click instead of a drag.
  await click(page, 37, 24);
  await click(page, 41, 15);
}

test('a circuit is drawn by mouse from nothing, and undone and redone step by step', async () => {
  const page = await openEmpty();
  await page.getByRole('heading', { name: 'An empty sheet' }).waitFor();
  await drawParts(page);
  await drawLines(page);
  // From the relief valve's inlet onto the pump line: a junction goes in.
  await drag(page, [42, 36], [33, 32]);
  await page.mouse.move(600, 200);
  await shot(page, 'sheet-drawn');

  const PARTS = ['PUMP1 30,40', 'TANK1 30,47', 'RV1 42,40', 'TANK2 42,47', 'V1 36,26', 'TANK3 39,31', 'CYL1 36,12', 'J1 33,32'];
  const said = (file: File): string[] => file.parts.map(({ id, at: where }) => `${id} ${String(where)}`);
  await expect.poll(async () => said(await kept(page))).toEqual(PARTS);
  const drawn = lines(await kept(page));
  expect([...drawn].sort()).toEqual(
    ['PUMP1.P J1.J', 'J1.J V1.P', 'PUMP1.S TANK1.T', 'V1.T TANK3.T', 'V1.A CYL1.A', 'RV1.T TANK2.T', 'V1.B CYL1.B', 'RV1.P J1.J'].sort(),
  );
  // It is computed at once: the lever has three positions, so the table has three rows.
  await expect.poll(() => page.getByText('row 2 of 3').count()).toBeGreaterThan(0);

  // 7 parts, 6 lines and 1 tee were one step each.
  for (let i = 0; i < 14; i++) await page.keyboard.press('Control+z');
  await expect.poll(async () => (await kept(page)).parts).toEqual([]);
  for (let i = 0; i < 14; i++) await page.keyboard.press('Control+Shift+z');
  await expect.poll(async () => said(await kept(page))).toEqual(PARTS);
  expect(lines(await kept(page))).toEqual(drawn);
});

test('a drag is one undo step, the lines follow, and Escape leaves the part where it was', async () => {
  const page = await openEmpty();
  await drawParts(page);
  await drawLines(page);
  const places = async (): Promise<(string | undefined)[]> => (await kept(page)).parts.filter(({ id }) => id === 'V1').map((p) => String(p.at));
  await drag(page, [34, 26], [41, 24]);
  await expect.poll(places).toEqual(['43,24']);
  const route = page.locator('[data-line=c4] path.core');
  // The line from A begins at the port's new place, 1 M left of the middle and 2 M above it.
  await expect.poll(() => route.getAttribute('d')).toMatch(/^M42 2[123]/);
  await page.keyboard.press('Control+z');
  await expect.poll(places).toEqual(['36,26']);

  const [x, y] = await at(page, 34, 26);
  await page.mouse.move(x, y);
  await page.mouse.down();
  await page.mouse.move(x + 80, y + 40, { steps: 5 });
  await page.keyboard.press('Escape');
  await page.mouse.up();
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('Shift+ArrowDown');
  // 1 M and 4 M from the old place: the given-up drag counted for nothing.
  await expect.poll(places).toEqual(['37,30']);
  await page.keyboard.press('Control+z');
  await expect.poll(places).toEqual(['36,26']);
});

test('refused lines say why, and nothing changes', async () => {
  const page = await openEmpty();
  await put(page, 'fixed pump', 30, 30);
  await put(page, 'tank', 30, 40);
  await drag(page, [30, 34], [30, 39]);
  await drag(page, [30, 34], [30, 39]);
  await expect.poll(() => status(page).textContent()).toContain('connected to TANK1.T already');
  await drag(page, [30, 26], [50, 26]);
  await expect.poll(() => status(page).textContent()).toContain('bare paper');
  await expect.poll(async () => lines(await kept(page))).toEqual(['PUMP1.S TANK1.T']);
});

test('everything is done by keys too: place, go to a port, connect, turn, name, copy, delete', async () => {
  const page = await openEmpty();
  const key = (name: string) => page.keyboard.press(name);
  await host(page).focus();
  for (const [search, moves] of [['fixed pump', ['Shift+ArrowUp', 'Shift+ArrowUp']], ['tank', ['Shift+ArrowDown']]] as const) {
    await key('a');
    await page.keyboard.type(search);
    await key('ArrowDown');
    await key('Enter');
    for (const move of moves) await key(move);
    await key('Enter');
  }
  await expect.poll(async () => (await kept(page)).parts.map(({ kind }) => kind)).toEqual(['fixed-pump', 'tank']);
  const [pump, tank] = (await kept(page)).parts;
  expect((tank?.at?.[1] ?? 0) - (pump?.at?.[1] ?? 0)).toBe(12);

  // Reading order: the pump, its ports P and S, the tank, its port.
  await key('Escape');
  await key('Tab');
  await expect.poll(() => host(page).getAttribute('aria-activedescendant')).toBe('sheet-part-PUMP1');
  await key('Tab');
  await key('Tab');
  await expect.poll(() => host(page).getAttribute('aria-activedescendant')).toBe('sheet-port-PUMP1.S');
  await key('Enter');
  await key('ArrowDown');
  await expect.poll(() => host(page).getAttribute('aria-activedescendant')).toBe('sheet-port-TANK1.T');
  await key('Enter');
  await expect.poll(async () => lines(await kept(page))).toEqual(['PUMP1.S TANK1.T']);

  await key('Escape');
  await key('Tab');
  await key('t');
  await expect.poll(async () => (await kept(page)).parts[0]?.turn).toBe(90);
  await key('F2');
  await page.getByRole('textbox', { name: 'Name of PUMP1' }).fill('MAIN');
  await key('Enter');
  await expect.poll(async () => JSON.stringify((await kept(page)).parts[0])).toContain('"label":"MAIN"');
  await key('Control+d');
  await expect.poll(async () => (await kept(page)).parts.map(({ id }) => id)).toEqual(['PUMP1', 'TANK1', 'PUMP2']);
  await key('Delete');
  await expect.poll(async () => (await kept(page)).parts.length).toBe(2);
  await key('Control+a');
  await key('Delete');
  await expect.poll(async () => (await kept(page)).parts.length).toBe(0);
  await key('Control+z');
  await expect.poll(async () => lines(await kept(page))).toEqual(['PUMP1.S TANK1.T']);
});

test('a deleted branch takes its junction along, so that the line runs on', async () => {
  const page = await openEmpty();
  await put(page, 'fixed pump', 30, 40);
  await put(page, '4/3 lever', 36, 26);
  await put(page, 'gauge', 44, 30);
  await drag(page, [30, 36], [35, 28]);
  const gauge = (await page.locator('[data-part]').last().getAttribute('data-part')) ?? '';
  await drag(page, await portOf(page, gauge), [33, 32]);
  await expect.poll(async () => (await kept(page)).connections.length).toBe(3);
  await click(page, 44, 30);
  await page.keyboard.press('Delete');
  await expect.poll(async () => lines(await kept(page))).toEqual(['PUMP1.P V1.P']);
  expect((await kept(page)).parts.map(({ kind }) => kind)).toEqual(['fixed-pump', 'directional-valve']);
});

/** Where the only port of the gauge stands: pointed at, the part shows it. */
async function portOf(page: Page, part: string): Promise<[number, number]> {
  const [x, y] = await at(page, 44, 30);
  await page.mouse.move(x, y);
  const circle = page.locator(`[id^="sheet-port-${part}."] circle`).first();
  return [Number(await circle.getAttribute('cx')), Number(await circle.getAttribute('cy'))];
}

test('the wheel zooms at the pointer, and the fit brings the circuit back', async () => {
  const page = await openEmpty();
  await put(page, 'cylinder', 60, 20);
  const [x, y] = await at(page, 60, 20);
  await page.mouse.move(x, y);
  await page.mouse.wheel(0, -200);
  await expect.poll(async () => Math.hypot((await at(page, 60, 20))[0] - x, (await at(page, 60, 20))[1] - y)).toBeLessThan(1);
  await expect.poll(() => page.getByRole('group', { name: 'Zoom' }).textContent()).not.toContain('100 %');
  await page.keyboard.press('.');
  const box = await host(page).boundingBox();
  const [cx, cy] = await at(page, 60, 20);
  expect(cx).toBeGreaterThan(box?.x ?? 0);
  expect(cy).toBeGreaterThan(box?.y ?? 0);
});
