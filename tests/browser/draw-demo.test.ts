import { readFileSync } from 'node:fs';
import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { readCircuit } from '../../src/circuit/file.ts';
import type { Circuit, Part, PortRef } from '../../src/circuit/model.ts';
import { placedPorts } from '../../src/drawing/shapes.ts';
import { kindOf } from '../../src/parts/catalogue.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { openEditor, shot } from './harness.ts';

const read = openCircuit(readFileSync(new URL('../../examples/log-deck.spool.json', import.meta.url), 'utf8'));
if (!read.ok) throw new Error('The worked example cannot be read.');
const EXAMPLE: Circuit = read.value;

/** Ready-made valves with the functions of the example; V3 has a box of its own, which is no ready-made one. */
const VALVES: Readonly<Record<string, string>> = {
  V1: 'valve-4/3-float',
  V2: 'valve-4/3-bypass',
  V3: 'valve-4/2-coil',
};
const formOf = (part: Part): string => VALVES[part.id] ?? kindOf(part.kind)?.readyMade[0]?.id ?? '';

const EMPTY = JSON.stringify({
  format: 1,
  circuit: JSON.stringify({
    format: 'spooltable-circuit',
    version: 1,
    name: 'drawn by hand',
    parts: [],
    connections: [],
  }),
  past: [],
  future: [],
  saved: 0,
  levers: {},
});

const host = (page: Page) => page.getByRole('application', { name: 'drawn by hand' });

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

async function kept(page: Page): Promise<Circuit> {
  const text = await page.evaluate(() => localStorage.getItem('spooltable.open'));
  const circuit = readCircuit((JSON.parse(text ?? '{}') as { readonly circuit: string }).circuit);
  if (!circuit.ok) throw new Error('What is kept cannot be read.');
  return circuit.value;
}

/** The whole example fits on the sheet, however the view began. */
async function showAll(page: Page): Promise<void> {
  const box = await host(page).boundingBox();
  if (!box) throw new Error('There is no sheet.');
  const inside = async (x: number, y: number): Promise<boolean> => {
    const [px, py] = await at(page, x, y);
    return px > box.x + 8 && px < box.x + box.width - 8 && py > box.y + 8 && py < box.y + box.height - 8;
  };
  for (let n = 0; n < 12; n++) {
    if ((await inside(0, 0)) && (await inside(106, 70))) return;
    const [x, y] = await at(page, 53, 35);
    await page.mouse.move(
      Math.max(box.x + 9, Math.min(x, box.x + box.width - 9)),
      Math.max(box.y + 9, Math.min(y, box.y + box.height - 9)),
    );
    await page.mouse.wheel(0, 100);
    await page.waitForTimeout(50);
  }
  throw new Error('The example does not fit on the sheet.');
}

async function put(page: Page, part: Part): Promise<void> {
  const search = page.getByRole('searchbox', { name: 'Search parts' });
  if (!(await search.isVisible())) {
    await host(page).focus();
    await page.keyboard.press('a');
  }
  await search.fill(kindOf(part.kind)?.title ?? '');
  await page.locator(`[data-form="${formOf(part)}"]`).click();
  await page.mouse.click(...(await at(page, part.at?.x ?? 0, part.at?.y ?? 0)));
}

function placeOf({ part, port }: PortRef): readonly [number, number] {
  const owner = EXAMPLE.parts.find(({ id }) => id === part);
  const found = owner && placedPorts(owner).find(({ ref }) => ref.port === port);
  if (!found) throw new Error(`The example has no port ${part}.${port}.`);
  return [found.at.x, found.at.y];
}

async function connect(page: Page, from: PortRef, to: PortRef): Promise<void> {
  const [x0, y0] = await at(page, ...placeOf(from));
  const [x1, y1] = await at(page, ...placeOf(to));
  await page.mouse.move(x0, y0);
  await page.mouse.down();
  await page.mouse.move((x0 + x1) / 2, (y0 + y1) / 2, { steps: 3 });
  await page.mouse.move(x1, y1, { steps: 3 });
  await page.mouse.up();
}

/** Every setting of the example, typed into the Settings panel of the drawn part. */
async function set(page: Page, part: Part): Promise<void> {
  await page.mouse.click(...(await at(page, part.at?.x ?? 0, part.at?.y ?? 0)));
  const panel = page.getByRole('dialog', { name: /^Settings of/ });
  if (!(await panel.isVisible())) await page.keyboard.press('e');
  for (const [id, value] of Object.entries(part.settings ?? {})) {
    const spec = kindOf(part.kind)?.settings.find((each) => each.id === id);
    const field = panel.getByLabel(spec?.title ?? id, { exact: true });
    if (spec?.value.type === 'choice') await field.selectOption(String(value));
    else {
      await field.fill(String(value));
      await field.press('Enter');
    }
  }
  // Out of the way of what comes next on the sheet.
  await page.keyboard.press('Escape');
}

/** Parts by where they stand, since ids are given by the editor; nets as the sets of ports that lines join. */
function shapeOf(circuit: Circuit): { readonly parts: readonly string[]; readonly lines: readonly string[] } {
  const where = new Map(circuit.parts.map((part) => [part.id, `${part.kind} at ${part.at?.x},${part.at?.y}`]));
  const end = ({ part, port }: PortRef): string => `${where.get(part)} ${port}`;
  const boxes = (part: Part): string =>
    part.valve && part.id !== 'V3' ? part.valve.positions.map(({ paths }) => paths.join(' ')).join(' | ') : '';
  return {
    parts: circuit.parts
      .map((part) => {
        const settings = Object.entries(part.settings ?? {}).sort(([a], [b]) => a.localeCompare(b));
        return `${where.get(part.id)} ${JSON.stringify(settings)} ${boxes(part)}`;
      })
      .sort(),
    lines: circuit.connections.map(({ from, to }) => [end(from), end(to)].sort().join(' – ')).sort(),
  };
}

test('the worked circuit is drawn by mouse from nothing: same parts, settings and lines as the example', async () => {
  const page = await openEditor({
    viewport: { width: 1600, height: 1200 },
    before: `localStorage.setItem('spooltable.open', ${JSON.stringify(EMPTY)});
      localStorage.setItem('spooltable.legendOpen', 'false');`,
  });
  await host(page).waitFor();
  await host(page).focus();
  await showAll(page);
  for (const part of EXAMPLE.parts) await put(page, part);
  await expect.poll(async () => (await kept(page)).parts.length).toBe(EXAMPLE.parts.length);
  for (const { from, to } of EXAMPLE.connections) await connect(page, from, to);
  await shot(page, 'demo-drawn');
  for (const part of EXAMPLE.parts) if (part.settings) await set(page, part);
  await expect.poll(async () => shapeOf(await kept(page)), { timeout: 10_000 }).toEqual(shapeOf(EXAMPLE));
  // 3 × 3 × 2 positions, as in the example.
  await page
    .getByText(/row \d+ of 18/)
    .first()
    .waitFor();

  // Undone to the start and redone to the end, the file is the same to the letter.
  const text = (): Promise<string> =>
    page.evaluate(() => (JSON.parse(localStorage.getItem('spooltable.open') ?? '{}') as { circuit: string }).circuit);
  const drawn = await text();
  await host(page).focus();
  const button = (name: string) => page.getByRole('button', { name, exact: true });
  while (await button('Undo').isEnabled()) await page.keyboard.press('Control+z');
  await expect.poll(async () => (await kept(page)).parts.length, { timeout: 10_000 }).toBe(0);
  while (await button('Redo').isEnabled()) await page.keyboard.press('Control+Shift+z');
  // Keeping waits a moment where the machine is busy.
  await expect.poll(text, { timeout: 10_000 }).toBe(drawn);
}, 180_000);
