import type { Locator, Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { openEditor, shot } from './harness.ts';

interface Valve {
  readonly ports: readonly { readonly id: string; readonly side: string }[];
  readonly positions: readonly { readonly name: string; readonly paths: readonly string[] }[];
}
interface File {
  readonly parts: readonly { readonly id: string; readonly kind: string; readonly valve?: Valve }[];
  readonly connections: readonly { readonly id: string }[];
  readonly readyMadeValves?: readonly { readonly title: string; readonly valve: Valve }[];
}

/** The file is kept a while after each change. */
const SOON = { timeout: 10_000 };

const CIRCUIT = {
  format: 'spooltable-circuit',
  version: 1,
  name: 'to make',
  parts: [
    {
      id: 'V1',
      kind: 'directional-valve',
      at: [40, 30],
      valve: {
        ports: [
          { id: 'A', side: 'top' },
          { id: 'P', side: 'bottom' },
        ],
        positions: [
          { name: 'a', paths: ['P-A'] },
          { name: '0', paths: [] },
        ],
        rest: 1,
        left: ['coil'],
        right: ['spring'],
        coils: [{ name: 'a', position: 0 }],
      },
    },
    { id: 'X1', kind: 'plug', at: [40, 40] },
  ],
  connections: [{ id: 'c1', from: 'V1.P', to: 'X1.A' }],
};

/** A 4/3 valve with restricted float centre, drawn out of a 2/2 valve. */
const WANTED = {
  ports: [
    { id: 'A', side: 'top' },
    { id: 'P', side: 'bottom' },
    { id: 'B', side: 'top' },
    { id: 'T', side: 'bottom' },
  ],
  positions: [
    { name: 'a', paths: ['P-A', 'B-T'] },
    { name: '0', paths: ['A~T', 'B~T'] },
    { name: 'b', paths: ['P-B', 'A-T'] },
  ],
  crossovers: [['A~T', 'B~T'], ['P>T']],
  rest: 1,
  left: ['coil', 'spring'],
  right: ['spring', 'coil'],
  coils: [
    { name: 'a', position: 0 },
    { name: 'b', position: 2 },
  ],
};

/** Box and ports of what is drawn, each in turn: drawn twice, a path is one way. */
const DRAWN: readonly (readonly [string, string, string])[] = [
  ['position a', 'B', 'T'],
  ['position b', 'P', 'B'],
  ['position b', 'A', 'T'],
  ['crossover 0–b', 'P', 'T'],
  ['crossover 0–b', 'P', 'T'],
];
const THROTTLED: readonly (readonly [string, string, string])[] = [
  ['position 0', 'A', 'T'],
  ['position 0', 'B', 'T'],
  ['crossover a–0', 'A', 'T'],
  ['crossover a–0', 'B', 'T'],
];

const open = (circuit: object = CIRCUIT): Promise<Page> =>
  openEditor({
    before: `if (!localStorage.getItem('spooltable.open')) localStorage.setItem('spooltable.open', ${JSON.stringify(
      JSON.stringify({ format: 1, circuit: JSON.stringify(circuit), past: [], future: [], saved: 0, levers: {} }),
    )}); localStorage.setItem('spooltable.legendOpen', 'false')`,
  });
const maker = (page: Page): Locator => page.getByRole('dialog', { name: /^Valve maker/ });
const box = (page: Page, name: string): Locator => maker(page).getByRole('group', { name, exact: false });
const port = (page: Page, name: string, id: string): Locator => box(page, name).locator(`[data-port="${id}"]`);

async function kept(page: Page): Promise<File> {
  const text = await page.evaluate(() => localStorage.getItem('spooltable.open'));
  return JSON.parse((JSON.parse(text ?? '{}') as { circuit: string }).circuit) as File;
}
const valveOf = async (page: Page): Promise<Valve | undefined> => (await kept(page)).parts[0]?.valve;

async function openMaker(page: Page): Promise<void> {
  await page.getByRole('application', { name: 'to make' }).focus();
  await page.keyboard.press('Tab');
  await page.keyboard.press('Shift+E');
  await maker(page).waitFor();
}

async function byMouse(page: Page): Promise<void> {
  const panel = maker(page);
  const button = (name: string): Promise<void> => panel.getByRole('button', { name, exact: true }).click();
  const draw = async (list: typeof DRAWN): Promise<void> => {
    for (const [name, from, to] of list) {
      await port(page, name, from).click();
      await port(page, name, to).click();
    }
  };
  await button('Add port on top');
  await button('Add port below');
  await button('Add position');
  await panel.getByLabel('While shifting').selectOption('drawn');
  await draw(DRAWN);
  await panel.getByText('throttled', { exact: true }).first().click();
  await draw(THROTTLED);
  await panel.getByLabel('Add to the left end').selectOption('spring');
  await panel.getByLabel('Add to the right end').selectOption('coil');
}

/** Tab or Shift Tab, until it is reached: nothing here touches the page in another way than by keys. */
async function tabTo(page: Page, target: Locator): Promise<void> {
  for (let i = 0; i < 90; i++) {
    const way = await target.evaluate((node) => {
      const here = document.activeElement ?? document.body;
      if (here === node) return 'here';
      return (here.compareDocumentPosition(node) & Node.DOCUMENT_POSITION_PRECEDING) !== 0 ? 'Shift+Tab' : 'Tab';
    });
    if (way === 'here') return;
    await page.keyboard.press(way);
  }
  throw new Error(`Tab does not lead to ${target}`);
}

async function byKeys(page: Page): Promise<void> {
  const panel = maker(page);
  const press = (key: string): Promise<void> => page.keyboard.press(key);
  // A and B stand on top, P and T below.
  const stand = async (id: string): Promise<void> => {
    await press(id === 'A' || id === 'B' ? 'ArrowUp' : 'ArrowDown');
    await press(id === 'A' || id === 'P' ? 'Home' : 'End');
    expect(await page.evaluate(() => document.activeElement?.getAttribute('data-port'))).toBe(id);
  };
  const draw = async (list: typeof DRAWN): Promise<void> => {
    for (const [name, from, to] of list) {
      await tabTo(page, box(page, name).locator('[tabindex="0"]'));
      await stand(from);
      await press('Enter');
      await stand(to);
      await press('Enter');
    }
  };
  const button = async (name: string): Promise<void> => {
    await tabTo(page, panel.getByRole('button', { name, exact: true }));
    await press('Enter');
  };
  await button('Add port on top');
  await button('Add port below');
  await button('Add position');
  await tabTo(page, panel.getByLabel('While shifting'));
  await press('d');
  await draw(DRAWN);
  await tabTo(page, panel.locator('input[type=radio]:checked').first());
  for (let i = 0; i < 3; i++) await press('ArrowRight');
  await draw(THROTTLED);
  await tabTo(page, panel.getByLabel('Add to the left end'));
  await press('s');
  await tabTo(page, panel.getByLabel('Add to the right end'));
  await press('c');
}

test('a valve is built by mouse and by the keyboard alone, and both come out the same', async () => {
  const first = await open();
  await openMaker(first);
  await byMouse(first);
  await expect.poll(() => valveOf(first), SOON).toEqual(WANTED);
  expect(await maker(first).getByRole('region', { name: 'Check' }).textContent()).toContain('Nothing left to do');
  await shot(first, 'valve-maker');

  const second = await open();
  await openMaker(second);
  await byKeys(second);
  await expect.poll(() => valveOf(second), SOON).toEqual(WANTED);
  expect((await kept(second)).parts).toEqual((await kept(first)).parts);
  // The status line has said what was drawn last.
  expect(await maker(second).getByRole('status').textContent()).toContain('Right end: coil added.');
}, 120_000);

test('a port with a line is removed only after a question, together with its line, in one step', async () => {
  const page = await open();
  await openMaker(page);
  const panel = maker(page);
  await panel.getByRole('button', { name: 'Add port below' }).click();
  await panel.getByRole('button', { name: 'Remove port P' }).click();
  const question = panel.getByRole('group', { name: 'Question' });
  expect(await question.textContent()).toContain('V1.P to X1.A');
  await page.keyboard.press('Enter');
  await question.waitFor({ state: 'detached' });
  await expect.poll(async () => (await kept(page)).connections, SOON).toHaveLength(1);
  await panel.getByRole('button', { name: 'Remove port P' }).click();
  await question.getByRole('button', { name: 'Remove with lines' }).click();
  await expect.poll(async () => (await kept(page)).connections, SOON).toHaveLength(0);
  expect((await valveOf(page))?.positions.map(({ paths }) => paths)).toEqual([[], []]);
  await page.keyboard.press('Control+z');
  await expect.poll(async () => (await kept(page)).connections, SOON).toHaveLength(1);
  expect((await valveOf(page))?.ports.map(({ id }) => id)).toEqual(['A', 'P', 'T']);
});

test('a valve is kept in the file, placed from the tray, changed, and placed ones are updated on request', async () => {
  const page = await open();
  await openMaker(page);
  const panel = maker(page);
  await panel.getByLabel('Name of the ready-made valve').fill('Vent valve');
  await panel.getByRole('button', { name: 'Keep as ready-made' }).click();
  await expect
    .poll(async () => (await kept(page)).readyMadeValves?.map(({ title }) => title), SOON)
    .toEqual(['Vent valve']);
  await port(page, 'position 0', 'A').click();
  await port(page, 'position 0', 'P').click();
  await expect
    .poll(async () => (await kept(page)).readyMadeValves?.[0]?.valve.positions[1]?.paths, SOON)
    .toEqual(['A-P']);
  // The placed one stays until somebody says so.
  expect((await valveOf(page))?.positions[1]?.paths).toEqual([]);
  expect(await panel.textContent()).toContain('Placed as it was: V1.');
  await panel.getByRole('button', { name: 'Update it' }).click();
  await expect.poll(async () => (await valveOf(page))?.positions[1]?.paths, SOON).toEqual(['A-P']);
  await panel.getByRole('button', { name: /^Close/ }).click();
  await page.getByRole('application', { name: 'to make' }).focus();
  await page.keyboard.press('a');
  const section = page.getByRole('region', { name: 'Valves of this circuit' });
  await section.getByRole('button', { name: 'Vent valve', exact: true }).press('Enter');
  await page.keyboard.press('Enter');
  await expect.poll(async () => (await kept(page)).parts.map(({ id }) => id), SOON).toEqual(['V1', 'X1', 'V2']);
  expect((await kept(page)).parts[2]?.valve).toEqual((await kept(page)).readyMadeValves?.[0]?.valve);
});
