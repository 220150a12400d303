import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import type { Circuit } from '../../src/circuit/model.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { openDrawn } from './drawn.ts';
import type { Drawn } from './drawn.ts';
import { act, nextStep, numbers } from './hands.ts';
import type { Act } from './hands.ts';
import { shot } from './harness.ts';

const read = openCircuit(readFileSync(new URL('../../examples/log-deck.spool.json', import.meta.url), 'utf8'));
if (!read.ok) throw new Error('The worked example cannot be read.');
const EXAMPLE: Circuit = read.value;

/** What each seed starts from: nothing, a drawn circuit, and one of which every third part has no place yet. */
const STARTS: readonly Partial<Circuit>[] = [
  {},
  EXAMPLE,
  { ...EXAMPLE, parts: EXAMPLE.parts.map(({ at, ...part }, i) => (at && i % 3 > 0 ? { ...part, at } : part)) },
];
/** `SEEDS=17,18` tries others. */
const SEEDS = (process.env['SEEDS'] ?? '1,2,3').split(',').map(Number);
const STEPS = Number(process.env['STEPS'] ?? 24);

/** Something at the end that can be waited for: what is kept then holds all that was done before. */
async function mark(drawn: Drawn, done: Act[], words: string): Promise<string> {
  for (const each of [
    ['key', 'Escape'],
    ['key', 'Escape'],
    ['key', 'x'],
    ['key', 'Enter'],
    ['type', words],
    ['key', 'Enter'],
  ] as const) {
    done.push(each);
    await act(drawn, each);
  }
  await expect.poll(drawn.text, { timeout: 20_000 }).toContain(words);
  return drawn.text();
}

/** Presses `keys` until the button of that name says there is no more. */
async function all({ page, host }: Drawn, button: string, keys: string): Promise<void> {
  await host.focus();
  const more = page.getByRole('button', { name: button, exact: true });
  while (await more.isEnabled()) for (let i = 0; i < 8; i++) await page.keyboard.press(keys);
}

for (const seed of SEEDS) {
  test(`edits by hand are undone to the letter and done again to the letter, seed ${seed}`, async () => {
    const drawn = await openDrawn(STARTS[seed % STARTS.length], {
      viewport: { width: 1440, height: 1100 },
      // Pressures and speeds are of no matter here, and computing them after each edit takes most of the time.
      before: `localStorage.setItem('spooltable.sheetFigures', 'false'); localStorage.setItem('spooltable.tableFigures', 'false');`,
    });
    const { page, host, text, circuit } = drawn;
    const random = numbers(seed);
    const done: Act[] = [];
    try {
      const start = await text();
      for (let i = 0; i < STEPS; i++) {
        await host.focus();
        const step = nextStep(await circuit(), random);
        // Whatever is still in hand is put away.
        for (const each of [['key', '.'], ...step, ['key', 'Escape'], ['key', 'Escape']] as const) {
          done.push(each);
          await act(drawn, each);
        }
        if (i !== Math.floor(STEPS / 2)) continue;
        await mark(drawn, done, 'half-way');
        done.push(['reload']);
        await act(drawn, ['reload']);
      }
      const end = await mark(drawn, done, 'at the end');
      const opened = openCircuit(end);
      expect(opened.ok ? [] : opened.problems, 'the file opens again').toEqual([]);
      await shot(page, `random-${seed}`);
      await all(drawn, 'Undo', 'Control+z');
      await expect.poll(text, { timeout: 20_000 }).toBe(start);
      await all(drawn, 'Redo', 'Control+Shift+z');
      await expect.poll(text, { timeout: 20_000 }).toBe(end);
    } catch (error) {
      console.log(`seed ${seed}, steps:\n${done.map((each) => JSON.stringify(each)).join('\n')}`);
      throw error;
    }
  }, 240_000);
}
