import { readFileSync } from 'node:fs';
import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { lineOf } from '../../src/circuit/lines.ts';
import { labelOf } from '../../src/circuit/model.ts';
import type { Circuit, Part, PortRef, ValveData } from '../../src/circuit/model.ts';
import { kindOf, readyMadeOf, searchCatalogue } from '../../src/parts/catalogue.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { median, openDrawn } from './drawn.ts';
import { shot } from './harness.ts';

const read = openCircuit(readFileSync(new URL('../../examples/log-deck.spool.json', import.meta.url), 'utf8'));
if (!read.ok) throw new Error('The worked example cannot be read.');
const EXAMPLE: Circuit = read.value;

/** Ready-made valves to begin with; that of V3 is then changed in the valve maker. */
const VALVES: Readonly<Record<string, string>> = {
  V1: 'valve-4/3-float',
  V2: 'valve-4/3-bypass',
  V3: 'valve-4/2-coil',
};
const formOf = (part: Part): string => VALVES[part.id] ?? kindOf(part.kind)?.readyMade[0]?.id ?? '';

/** A keyboard that counts; nothing else touches the page. */
class Keys {
  count = 0;
  readonly #page: Page;

  constructor(page: Page) {
    this.#page = page;
  }

  async press(...keys: readonly string[]): Promise<void> {
    for (const key of keys) {
      this.count++;
      await this.#page.keyboard.press(key);
    }
  }

  /** Into a field, all at once, which counts as so many presses: a busy machine takes its time over each. */
  async type(text: string): Promise<void> {
    this.count += [...text].length;
    await this.#page.keyboard.insertText(text);
  }

  /** What has the keyboard: by its label, or else by its name. */
  focus(): Promise<string> {
    return this.#page.evaluate(() => {
      const now = document.activeElement;
      const labels = now instanceof HTMLInputElement || now instanceof HTMLSelectElement ? now.labels : null;
      return (now?.getAttribute('aria-label') ?? labels?.[0]?.textContent ?? now?.textContent ?? '').trim();
    });
  }

  /** Tab by Tab to what is called so; fails when it is not there. */
  async tabTo(name: string | RegExp, key = 'Tab'): Promise<void> {
    const passed: string[] = [];
    for (let i = 0; i < 60; i++) {
      const now = await this.focus();
      passed.push(now);
      if (typeof name === 'string' ? now === name : name.test(now)) return;
      await this.press(key);
    }
    throw new Error(`Tab does not come to ${String(name)}: ${passed.join(', ')}.`);
  }
}

/** Typed until what is looked for comes first, as anybody would who watches the list. */
function searchFor(form: string): string {
  const title = readyMadeOf(form)?.readyMade.title.toLowerCase() ?? '';
  const enough = [...title].findIndex((_, i) => searchCatalogue(title.slice(0, i + 1))[0]?.readyMade.id === form);
  if (enough < 0) throw new Error(`${title} never comes first.`);
  return title.slice(0, enough + 1);
}

async function put(keys: Keys, part: Part): Promise<void> {
  await keys.press('a');
  await keys.type(searchFor(formOf(part)));
  const [first = '', ...rest] = `${part.at?.x} ${part.at?.y}`;
  await keys.press('Enter', first);
  await keys.type(rest.join(''));
  await keys.press('Enter');
}

/** Label, code, names of positions and settings, in the order of the panel. */
async function set(keys: Keys, part: Part, drawn: Part): Promise<void> {
  await keys.press('e');
  const field = async (name: string, text: string): Promise<void> => {
    await keys.tabTo(name);
    await keys.type(text);
  };
  if (labelOf(part) !== drawn.id) await field('Label', labelOf(part));
  if (part.code !== undefined) await field('Code', part.code);
  const same = (i: number): boolean => part.valve?.positions[i]?.name === drawn.valve?.positions[i]?.name;
  for (const [i, { name }] of (part.valve?.positions ?? []).entries())
    if (!same(i)) await field(`Position ${i + 1}`, name);
  const settings = Object.entries(part.settings ?? {});
  const specs = (kindOf(part.kind)?.settings ?? []).filter(({ id }) => settings.some(([each]) => each === id));
  for (const { id, title, value } of specs) {
    const text = String(part.settings?.[id]);
    if (value.type !== 'choice') await field(title, text);
    else {
      await keys.tabTo(title);
      await keys.press(...text);
    }
  }
  // Enter takes what stands in the last field; a choice is taken as it is made.
  await keys.press(...(specs.at(-1)?.value.type === 'choice' ? [] : ['Enter']), 'Escape');
}

/** Of the second position of V3 only P–T is left: two paths are taken away, one is drawn. */
async function makeBox(keys: Keys): Promise<void> {
  await keys.press('/');
  await keys.type('v3');
  await keys.press('Enter', 'Shift+E');
  await keys.tabTo('each in turn');
  // From the first way of drawing back to the last one: none. Then into the box beside.
  await keys.press('ArrowLeft', 'Shift+Tab');
  await keys.tabTo(/^A: A–T open/, 'ArrowLeft');
  await keys.press('Enter', 'ArrowDown', 'ArrowRight', 'Enter', 'ArrowLeft', 'Enter', 'ArrowUp', 'ArrowRight', 'Enter');
  await keys.press('Tab', 'ArrowRight', 'Shift+Tab', 'ArrowDown', 'Enter', 'ArrowLeft', 'Enter');
  await keys.tabTo(/^Name of coil/);
  await keys.type('Y1');
  await keys.press('Enter', 'Escape');
}

async function connect(keys: Keys, from: string, to: string, cursor: string | undefined): Promise<void> {
  if (cursor !== from) {
    await keys.press('/');
    await keys.type(from.toLowerCase());
    await keys.press('Enter');
  }
  await keys.press('Enter', '/');
  await keys.type(to.toLowerCase());
  await keys.press('Enter');
}

const boxes = (valve: ValveData | undefined): string =>
  (valve?.positions ?? [])
    .map(
      ({ name, paths }) =>
        `${name}: ${paths
          .map((path) => path.split('-').sort().join('-'))
          .sort()
          .join(' ')}`,
    )
    .concat((valve?.ports ?? []).map(({ id, side }) => `${id} ${side}`).sort())
    .concat([...(valve?.left ?? []), '|', ...(valve?.right ?? []), `rest ${valve?.rest}`])
    .concat((valve?.coils ?? []).map(({ name, position }) => `${name} ${position}`))
    .join('; ');

/** By labels, since ids are given by the editor. */
function shapeOf(circuit: Circuit): object {
  const labels = new Map(circuit.parts.map((part) => [part.id, labelOf(part)]));
  const end = ({ part, port }: PortRef): string => `${labels.get(part)}.${port}`;
  return {
    parts: Object.fromEntries(
      circuit.parts.map((part) => [
        labelOf(part),
        { kind: part.kind, at: part.at, code: part.code, settings: { ...part.settings }, valve: boxes(part.valve) },
      ]),
    ),
    lines: circuit.connections.map(({ from, to }) => [end(from), end(to)].sort().join(' – ')).sort(),
    names: Object.fromEntries(
      circuit.connections.flatMap(({ id, name }) => {
        const line = circuit.connections.filter((each) => lineOf(circuit, id).has(each.id));
        return name === undefined ? [] : [[name, line.flatMap(({ from, to }) => [end(from), end(to)]).sort()]];
      }),
    ),
  };
}

test('the worked circuit is drawn by the keyboard alone: parts, settings, names, places and lines of the example', async () => {
  const drawn = await openDrawn({ name: EXAMPLE.name });
  const { page, circuit } = drawn;
  const keys = new Keys(page);
  await keys.tabTo(/^Log deck, 0 parts/);
  const counts = { parts: [] as number[], settings: [] as number[], lines: [] as number[] };
  const counted = async (into: number[], run: () => Promise<void>): Promise<void> => {
    const before = keys.count;
    await run();
    into.push(keys.count - before);
  };
  for (const part of EXAMPLE.parts) await counted(counts.parts, () => put(keys, part));
  await expect.poll(async () => (await circuit()).parts.map(({ at }) => at)).toEqual(EXAMPLE.parts.map(({ at }) => at));
  const ids = (await circuit()).parts;
  for (const [i, part] of EXAMPLE.parts.entries()) {
    const own = ids[i];
    if (!own || (labelOf(part) === own.id && part.code === undefined && !part.settings)) continue;
    await counted(counts.settings, async () => {
      await keys.press('/');
      await keys.type(own.id.toLowerCase());
      await keys.press('Enter');
      await set(keys, part, own);
    });
  }
  await shot(page, 'keys-parts');
  let cursor: string | undefined;
  for (const { from, to, name } of EXAMPLE.connections) {
    await counted(counts.lines, () => connect(keys, `${from.part}.${from.port}`, `${to.part}.${to.port}`, cursor));
    cursor = `${to.part}.${to.port}`;
    if (name === undefined) continue;
    await keys.press('Shift+Enter', 'F2');
    await keys.type(name);
    await keys.press('Enter');
    cursor = undefined;
  }
  await shot(page, 'keys-drawn');
  await makeBox(keys);
  await expect.poll(async () => shapeOf(await circuit()), { timeout: 10_000 }).toEqual(shapeOf(EXAMPLE));
  console.log(
    `presses: ${median(counts.parts)} a part, ${median(counts.settings)} for its settings, ${median(counts.lines)} a line, ${keys.count} in all`,
  );
}, 240_000);
