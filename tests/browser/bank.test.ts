import { expect, test } from 'vitest';
import type { Circuit } from '../../src/circuit/model.ts';
import { overlaps } from '../../src/drawing/geometry.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { partReach, placedPorts } from '../../src/drawing/shapes.ts';
import { sheetFaults } from '../drawing/sheet-faults.ts';
import { openDrawn } from './drawn.ts';
import type { Drawn } from './drawn.ts';
import { shot } from './harness.ts';

const VALVES = 10;

/** Hands that count: a key, a word typed into a field, a click or a drag is one gesture each. */
class Hands {
  gestures = 0;
  readonly #on: Drawn;

  constructor(on: Drawn) {
    this.#on = on;
  }

  async key(...keys: readonly string[]): Promise<void> {
    for (const key of keys) {
      this.gestures++;
      await this.#on.page.keyboard.press(key);
    }
  }

  async type(text: string): Promise<void> {
    this.gestures++;
    await this.#on.page.keyboard.insertText(text);
  }

  /** From the tray to a place that is typed. */
  async put(words: string, x: number, y: number): Promise<void> {
    await this.key('a');
    await this.type(words);
    // The place is typed on; its first digit opens the field for it.
    const [first = '', ...rest] = `${x} ${y}`;
    await this.key('Enter', first);
    await this.#on.page.keyboard.insertText(rest.join(''));
    await this.key('Enter');
  }

  async drag(from: string, to: string): Promise<void> {
    const { page, at, circuit } = this.#on;
    const place = async (name: string): Promise<[number, number]> => {
      const [part, port] = name.split('.');
      const ports = (await circuit()).parts.filter(({ id }) => id === part).flatMap((each) => placedPorts(each));
      const found = ports.find(({ ref }) => ref.port === port);
      if (!found) throw new Error(`There is no port ${name}.`);
      return at(found.at.x, found.at.y);
    };
    const [[x0, y0], [x1, y1]] = [await place(from), await place(to)];
    this.gestures++;
    await page.mouse.move(x0, y0);
    await page.mouse.down();
    await page.mouse.move((x0 + x1) / 2, (y0 + y1) / 2, { steps: 2 });
    await page.mouse.move(x1, y1, { steps: 2 });
    await page.mouse.up();
  }
}

/** What a fitter would call untidy: parts on parts, names on anything, lines through symbols. */
function untidy(drawn: Circuit): readonly string[] {
  const circuit = placeMissing(drawn);
  const parts = circuit.parts.flatMap((a, i) =>
    circuit.parts.slice(i + 1).flatMap((b) => (overlaps(partReach(a), partReach(b)) ? [`${a.id} on ${b.id}`] : [])),
  );
  const { labels, labelsOnLines, lines, letters, doubled } = sheetFaults(circuit, routeAll(circuit));
  return [...parts, ...labels, ...labelsOnLines, ...lines, ...letters, ...doubled];
}

test('a bank of ten valves is drawn in some thirty gestures, tidy, and its 59,049 states are there', async () => {
  const drawn = await openDrawn(
    { name: 'Bank' },
    {
      viewport: { width: 1600, height: 1000 },
      before: `localStorage.setItem('spooltable.sheetFigures', 'false'); localStorage.setItem('spooltable.tableFigures', 'false');`,
    },
  );
  const { page, host, circuit } = drawn;
  const hands = new Hands(drawn);
  await host.focus();
  await hands.put('power unit', 14, 42);
  await hands.put('bank section', 36, 18);
  await hands.put('tank', 52, 38);
  // The section just placed, by its name: Shift+A puts another one beside it, and then beside that.
  await expect.poll(async () => (await circuit()).parts.length).toBe(8);
  await hands.drag('J1.J', 'V1.C1');
  await hands.drag('J1.J', 'V1.P');
  await hands.drag('V1.T', 'TANK3.T');
  await hands.drag('V1.C2', 'TANK3.T');
  await expect.poll(async () => (await circuit()).connections.length).toBe(10);
  await hands.key('/');
  await hands.type('v1');
  await hands.key('Enter');
  for (let n = 1; n < VALVES; n++) await hands.key('Shift+A');
  await hands.key('.');
  const valves = async (): Promise<number> =>
    (await circuit()).parts.filter(({ kind }) => kind === 'directional-valve').length;
  await expect.poll(valves, { timeout: 20_000 }).toBe(VALVES);
  // 3¹⁰ combinations, all of them computed.
  await page
    .getByText(/row [\d,. ]+ of 59[,. ]?049/)
    .first()
    .waitFor({ timeout: 60_000 });
  await shot(page, 'bank');
  console.log(`ten valves in ${hands.gestures} gestures`);
  expect(untidy(await circuit())).toEqual([]);
  expect(hands.gestures).toBeLessThanOrEqual(36);
}, 180_000);
