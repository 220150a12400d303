import type { Page } from 'playwright-core';
import { expect, inject, test } from 'vitest';
import { openEditor, watch } from './harness.ts';

const KEY = 'spooltable.open';
const circuitOf = (name: string) => ({
  format: 'spooltable-circuit',
  version: 1,
  name,
  parts: [
    { id: 'F1', kind: 'filter', at: [20, 40] },
    { id: 'F2', kind: 'filter', at: [40, 20] },
  ],
  connections: [],
});
const keptAs = (name: string, more: object = {}): string =>
  JSON.stringify({
    format: 1,
    circuit: JSON.stringify(circuitOf(name)),
    past: [],
    future: [],
    saved: 0,
    levers: {},
    ...more,
  });

/** A window with this circuit, kept from last time: only if nothing is kept yet, so that a reload shows what was. */
const start = (before = '', more: object = {}): Promise<Page> =>
  openEditor({
    before: `if (!localStorage.getItem('${KEY}')) localStorage.setItem('${KEY}', ${JSON.stringify(keptAs('rig', more))});
      localStorage.setItem('spooltable.legendOpen', 'false'); ${before}`,
  });
/** One more window of the same browser. */
async function another(page: Page): Promise<Page> {
  const next = await page.context().newPage();
  watch(next);
  await next.goto(inject('editor'));
  await next.getByRole('application').first().waitFor();
  return next;
}
const host = (page: Page) => page.getByRole('application', { name: /rig|untitled/ });
const name = (page: Page) => page.locator('.file .name').textContent();
const places = async (page: Page, slot = KEY): Promise<string[]> => {
  const text = await page.evaluate((key) => localStorage.getItem(key), slot);
  const { circuit } = JSON.parse(text ?? '{"circuit":"{}"}') as { readonly circuit: string };
  const { parts = [] } = JSON.parse(circuit) as {
    readonly parts?: readonly { readonly id: string; readonly at: unknown }[];
  };
  return parts.map(({ id, at }) => `${id} ${String(at)}`);
};

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
const rename = async (page: Page, to: string): Promise<void> => {
  const settings = page.getByRole('dialog', { name: 'Settings of the circuit' });
  if ((await settings.count()) === 0) await page.keyboard.press('e');
  const field = settings.getByLabel('Name', { exact: true });
  await field.fill(to);
  await field.press('Enter');
  await expect.poll(() => name(page)).toBe(to);
};

test('a window that dies in the middle of a drag loses that drag and nothing else', async () => {
  const page = await start();
  await host(page).waitFor();
  const [x, y] = await at(page, 20, 40);
  await page.mouse.click(x, y);
  await page.keyboard.press('Shift+ArrowRight');
  await page.mouse.move(...(await at(page, 24, 40)));
  await page.mouse.down();
  await page.mouse.move(x + 150, y + 60, { steps: 4 });
  const died = page.waitForEvent('crash');
  const session = await page.context().newCDPSession(page);
  void session.send('Page.crash').catch(() => undefined);
  await died;
  const next = await another(page);
  await expect.poll(() => name(next)).toBe('rig');
  expect(await places(next)).toEqual(['F1 24,40', 'F2 40,20']);
  await host(next).focus();
  await next.keyboard.press('Control+z');
  await expect.poll(() => places(next)).toEqual(['F1 20,40', 'F2 40,20']);
});

test('each window keeps its own work, and that of a closed one is offered', async () => {
  const page = await start();
  await host(page).waitFor();
  const next = await another(page);
  await expect.poll(() => name(next)).toBe('untitled');
  await rename(next, 'rig two');
  await rename(page, 'rig one');
  await next.reload();
  await expect.poll(() => name(next)).toBe('rig two');
  await next.close();
  await page.reload();
  await expect.poll(() => name(page)).toBe('rig one');
  // An empty sheet is not worth a word; with something on it, it is.
  expect(await page.getByText('still kept from a window').count()).toBe(0);
  await page.evaluate((text) => localStorage.setItem('spooltable.open.3', text), keptAs('rig three', { saved: 1 }));
  await page.reload();
  await page.getByRole('button', { name: 'Open “rig three”' }).click();
  await expect.poll(() => name(page)).toBe('rig three');
  expect(await page.evaluate(() => localStorage.getItem('spooltable.open.3'))).toBeNull();
  await page.getByRole('button', { name: 'Go back to “rig one”' }).click();
  await expect.poll(() => name(page)).toBe('rig one');
});

/** Files in the browser's own folder stand for files on disk: they give out the same handles, without a dialog. */
const DISK = `
  const file = async (create) => (await navigator.storage.getDirectory()).getFileHandle('rig.spool.json', { create });
  window.showSaveFilePicker = () => file(true);
  window.showOpenFilePicker = async () => [await file(false)];
`;
const onDisk = (page: Page): Promise<string> =>
  page.evaluate(async () => {
    const handle = await (await navigator.storage.getDirectory()).getFileHandle('rig.spool.json');
    return (JSON.parse(await (await handle.getFile()).text()) as { name: string }).name;
  });

test('two windows on one file warn each other, and the second to save is asked', async () => {
  const page = await start(DISK);
  await host(page).waitFor();
  await page.keyboard.press('Control+Shift+s');
  await page.locator('.file .state', { hasText: /^saved$/ }).waitFor();
  const next = await another(page);
  await next.evaluate(DISK);
  await next.keyboard.press('Control+o');
  await next.getByText('rig.spool.json is open in another window too').waitFor();
  await page.getByText('rig.spool.json has been opened in another window as well').waitFor();
  await next.locator('.file .state', { hasText: 'saved, also open in another window' }).waitFor();

  await rename(page, 'rig here');
  await rename(next, 'rig there');
  await next.keyboard.press('Control+s');
  await expect.poll(() => onDisk(page)).toBe('rig there');
  await page.keyboard.press('Control+s');
  const said = page.getByRole('alert').filter({ hasText: 'was not saved: it has changed on disk' });
  await said.waitFor();
  expect(await onDisk(page)).toBe('rig there');
  await said.getByRole('button', { name: 'Write over it' }).click();
  await expect.poll(() => onDisk(page)).toBe('rig here');

  await next.close();
  await page.locator('.file .state', { hasText: /^saved$/ }).waitFor();
  // The place of the file outlives a reload: Save asks for none.
  await page.reload();
  await expect.poll(() => name(page)).toBe('rig here');
  await page.evaluate(() => delete window.showSaveFilePicker);
  await rename(page, 'rig again');
  await page.keyboard.press('Control+s');
  await expect.poll(() => onDisk(page)).toBe('rig again');
  // And it is among the recent files.
  await page.getByRole('button', { name: 'File' }).click();
  await page.getByRole('menuitem', { name: 'New', exact: false }).first().click();
  await expect.poll(() => name(page)).toBe('untitled');
  await page.getByRole('button', { name: 'File' }).click();
  await page.getByRole('menuitem', { name: /^rig\.spool\.json/ }).click();
  await expect.poll(() => name(page)).toBe('rig again');
});

/** The storage takes texts up to a length that the test sets, and refuses as a full one does. */
const FULL = `
  const put = Storage.prototype.setItem;
  Storage.prototype.setItem = function (key, value) {
    if (String(value).length > (window.roomLeft ?? Infinity)) throw new DOMException('full', 'QuotaExceededError');
    put.call(this, key, value);
  };`;

test('full storage is said, nothing is lost, and the work can be saved', async () => {
  const page = await start(`${FULL} delete window.showSaveFilePicker;`);
  await host(page).waitFor();
  await page.evaluate(() => Object.assign(window, { roomLeft: 100 }));
  await rename(page, 'rig unkept');
  const said = page.getByRole('alert').filter({ hasText: 'no room to keep this circuit' });
  await said.waitFor();
  // What was kept before is still there, and leaving would be asked about.
  expect(await places(page)).toEqual(['F1 20,40', 'F2 40,20']);
  const asked = page.waitForEvent('dialog');
  void page.reload().catch(() => undefined);
  await (await asked).dismiss();
  expect(await name(page)).toBe('rig unkept');
  const saved = page.waitForEvent('download');
  await said.getByRole('button', { name: 'Save it to a file…' }).click();
  expect((await saved).suggestedFilename()).toBe('rig-unkept.spool.json');
  // Room for the circuit, not for its undo steps: said once, as a note.
  const room = await page.evaluate((key) => (localStorage.getItem(key) ?? '').length + 160, KEY);
  await page.evaluate((roomLeft) => Object.assign(window, { roomLeft }), room);
  await rename(page, 'rig kept');
  await page.getByText('The browser has no room for all undo steps').waitFor();
  expect(await said.count()).toBe(0);
  await page.reload();
  await expect.poll(() => name(page)).toBe('rig kept');
});

test('undo steps that do not fit the circuit any more are left, and the circuit is whole', async () => {
  const step = { edit: { type: 'remove-part', id: 'X9' }, inverse: { type: 'remove-part', id: 'X9' } };
  const page = await start('', { past: [step], saved: 1 });
  await page.getByText('The undo steps of last time are lost').waitFor();
  expect(await name(page)).toBe('rig');
  expect(await page.getByRole('button', { name: 'Undo' }).isDisabled()).toBe(true);
});
