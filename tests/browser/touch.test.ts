import type { CDPSession } from 'playwright-core';
import { expect, test } from 'vitest';
import { placedPorts } from '../../src/drawing/shapes.ts';
import { openDrawn } from './drawn.ts';
import type { Drawn } from './drawn.ts';
import { shot } from './harness.ts';

type Spot = readonly [number, number];

/** Real fingers, as the browser gets them from a touch screen. */
class Fingers {
  readonly #cdp: CDPSession;

  private constructor(cdp: CDPSession) {
    this.#cdp = cdp;
  }

  static async on({ page }: Drawn): Promise<Fingers> {
    return new Fingers(await page.context().newCDPSession(page));
  }

  async #send(type: 'touchStart' | 'touchMove' | 'touchEnd', ...at: readonly Spot[]): Promise<void> {
    const touchPoints = at.map(([x, y], id) => ({ x, y, id }));
    await this.#cdp.send('Input.dispatchTouchEvent', { type, touchPoints });
  }

  down = (...at: readonly Spot[]): Promise<void> => this.#send('touchStart', ...at);
  lift = (): Promise<void> => this.#send('touchEnd');

  async tap(at: Spot): Promise<void> {
    await Promise.all([this.down(at), this.lift()]);
  }

  /** From their places to others, in steps, and up again; sent in one go, or a busy machine would press long. */
  async move(from: readonly Spot[], to: readonly Spot[], steps = 6): Promise<void> {
    const sent = [this.down(...from)];
    for (let i = 1; i <= steps; i++) {
      const between = from.map(([x, y], k): Spot => {
        const [tx, ty] = to[k] ?? [x, y];
        return [x + ((tx - x) * i) / steps, y + ((ty - y) * i) / steps];
      });
      sent.push(this.#send('touchMove', ...between));
    }
    await Promise.all([...sent, this.lift()]);
  }
}

/** Pump, relief valve and tank, with one line. */
const CIRCUIT = {
  name: 'by finger',
  parts: [
    { id: 'PUMP1', kind: 'fixed-pump', at: { x: 20, y: 30 } },
    { id: 'RV1', kind: 'relief-valve', at: { x: 40, y: 30 } },
    { id: 'TANK1', kind: 'tank', at: { x: 40, y: 44 } },
  ],
  connections: [{ id: 'c1', from: { part: 'PUMP1', port: 'P' }, to: { part: 'RV1', port: 'P' } }],
};
const openOne = async (): Promise<Drawn & { readonly fingers: Fingers }> => {
  const drawn = await openDrawn(CIRCUIT, { hasTouch: true, viewport: { width: 1180, height: 820 } });
  return { ...drawn, fingers: await Fingers.on(drawn) };
};
const places = async ({ circuit }: Drawn): Promise<readonly string[]> =>
  (await circuit()).parts.map(({ id, at }) => `${id} ${at?.x},${at?.y}`);

test('two fingers zoom about their middle and pan; one on bare paper pans', async () => {
  const drawn = await openOne();
  const { at, fingers, host } = drawn;
  const [x, y] = await at(30, 30);
  const [left] = await at(20, 30);
  await fingers.move(
    [
      [x - 60, y],
      [x + 60, y],
    ],
    [
      [x - 120, y],
      [x + 120, y],
    ],
  );
  // Twice as far apart: the middle stays, and what was so far left of it is twice as far.
  await expect.poll(async () => Math.abs((await at(30, 30))[0] - x)).toBeLessThan(3);
  expect((x - (await at(20, 30))[0]) / (x - left)).toBeCloseTo(2, 1);
  // Both to the right and up: the sheet goes along.
  await fingers.move(
    [
      [x - 40, y],
      [x + 40, y],
    ],
    [
      [x + 10, y - 50],
      [x + 90, y - 50],
    ],
  );
  const off = async (dx: number, dy: number): Promise<number> => {
    const [nx, ny] = await at(30, 30);
    return Math.hypot(nx - x - dx, ny - y - dy);
  };
  await expect.poll(() => off(50, -50)).toBeLessThan(3);
  const box = await host.boundingBox();
  const paper: Spot = [(box?.x ?? 0) + 60, (box?.y ?? 0) + (box?.height ?? 0) - 80];
  await fingers.move([paper], [[paper[0] - 50, paper[1] + 50]]);
  await expect.poll(() => off(0, 0)).toBeLessThan(3);
  expect(await places(drawn)).toEqual(['PUMP1 20,30', 'RV1 40,30', 'TANK1 40,44']);
});

test('a tap selects, a drag moves, and a tap on bare paper lets go', async () => {
  const drawn = await openOne();
  const { at, fingers, page } = drawn;
  const pump = await at(20, 30);
  await fingers.tap(pump);
  await page.keyboard.press('ArrowLeft');
  await expect.poll(() => places(drawn)).toContain('PUMP1 19,30');
  await fingers.move([await at(19, 30)], [await at(23, 36)]);
  await expect.poll(() => places(drawn)).toContain('PUMP1 23,36');
  await fingers.tap(await at(60, 20));
  await page.keyboard.press('Delete');
  await expect.poll(drawn.said).toContain('Nothing is selected');
  await page.keyboard.press('Control+z');
  await expect.poll(() => places(drawn)).toContain('PUMP1 19,30');
});

test('a long press opens the menu of what is there, and lifting the finger leaves it open', async () => {
  const drawn = await openOne();
  const { at, fingers, page, circuit } = drawn;
  await fingers.down(await at(40, 30));
  const menu = page.getByRole('menu', { name: 'Menu: RV1' });
  await menu.waitFor();
  await fingers.lift();
  await shot(page, 'touch-menu');
  await menu.getByRole('menuitem', { name: 'Turn clockwise' }).tap();
  await expect.poll(async () => (await circuit()).parts.find(({ id }) => id === 'RV1')?.turn).toBe(90);
  await fingers.down(await at(70, 20));
  await page.getByRole('menu', { name: 'Menu: Sheet' }).waitFor();
  await fingers.lift();
  await fingers.tap(await at(24, 40));
  await expect.poll(() => page.getByRole('menu').count()).toBe(0);
});

test('a line is drawn by finger, dragged or tapped, and waits while two fingers look for its end', async () => {
  const drawn = await openOne();
  const { at, fingers, circuit, page } = drawn;
  const end = async (part: string, port: string): Promise<Spot> => {
    const placed = (await circuit()).parts.filter(({ id }) => id === part).flatMap((each) => placedPorts(each));
    const { x, y } = placed.find(({ ref }) => ref.port === port)?.at ?? { x: 0, y: 0 };
    return at(x, y);
  };
  const lines = async (): Promise<readonly string[]> =>
    (await circuit()).connections.map(({ from, to }) => `${from.part}.${from.port} ${to.part}.${to.port}`);
  await fingers.move([await end('RV1', 'T')], [await end('TANK1', 'T')]);
  await shot(page, 'touch-line');
  await expect.poll(lines).toContain('RV1.T TANK1.T');
  await page.keyboard.press('Control+z');
  await expect.poll(lines).not.toContain('RV1.T TANK1.T');
  await fingers.tap(await end('RV1', 'T'));
  await expect.poll(drawn.said).toContain('Line from RV1.T');
  const [x, y] = await at(40, 38);
  await fingers.move(
    [
      [x - 50, y],
      [x + 50, y],
    ],
    [
      [x - 80, y],
      [x + 80, y],
    ],
  );
  await fingers.tap(await end('TANK1', 'T'));
  await expect.poll(lines).toContain('RV1.T TANK1.T');
});

test('a part is carried from the tray by finger, the list scrolls, and what is in hand outlasts a pinch', async () => {
  const drawn = await openOne();
  const { at, fingers, page, circuit } = drawn;
  const kinds = async (): Promise<readonly string[]> => (await circuit()).parts.map(({ kind }) => kind);
  const middle = async (name: string): Promise<Spot> => {
    const box = await page.locator('.strip').getByRole('button', { name, exact: true }).boundingBox();
    return [(box?.x ?? 0) + (box?.width ?? 0) / 2, (box?.y ?? 0) + (box?.height ?? 0) / 2];
  };
  await fingers.move([await middle('Cylinder')], [await at(60, 30)], 10);
  await expect.poll(() => places(drawn)).toContain('CYL1 60,30');
  const list = page.getByRole('dialog', { name: 'Parts' });
  // A tap close behind a swipe may only stop what the browser takes for a fling of the strip; people tap again.
  const opened = async (): Promise<boolean> => {
    if (await list.isVisible()) return true;
    await page.getByRole('button', { name: 'Motion', exact: true }).tap();
    const shown = list.waitFor({ timeout: 2000 });
    return shown.then(
      () => true,
      () => false,
    );
  };
  await expect.poll(opened, { timeout: 20_000 }).toBe(true);
  const box = await list.boundingBox();
  const [lx, ly] = [(box?.x ?? 0) + 120, (box?.y ?? 0) + (box?.height ?? 0) - 60];
  const top = (): Promise<number> => list.locator('.list').evaluate((each) => each.scrollTop);
  await expect.poll(top).toBeGreaterThan(0);
  const before = await top();
  await fingers.move([[lx, ly]], [[lx, ly - 200]], 10);
  await expect.poll(top).toBeGreaterThan(before);
  await page.getByRole('searchbox', { name: 'Search parts' }).fill('throttle');
  await list.locator('[data-form]').first().tap();
  await expect.poll(drawn.said).toContain('in hand');
  const [x, y] = await at(55, 20);
  await fingers.move(
    [
      [x - 50, y],
      [x + 50, y],
    ],
    [
      [x - 70, y],
      [x + 70, y],
    ],
  );
  await fingers.tap(await at(58, 18));
  await expect.poll(kinds).toEqual(['fixed-pump', 'relief-valve', 'tank', 'cylinder', 'throttle']);
  expect((await places(drawn)).at(-1)).toMatch(/ 58,18$/);
});
