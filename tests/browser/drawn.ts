import type { Locator, Page } from 'playwright-core';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { openEditor } from './harness.ts';
import type { OpenOptions } from './harness.ts';

/** What tests that draw share: a page with a circuit under the pen, places on its sheet, and what the browser keeps. */
export interface Drawn {
  readonly page: Page;
  readonly host: Locator;
  /** Sheet modules to pixels of the page. */
  readonly at: (x: number, y: number) => Promise<[number, number]>;
  /** The file as the browser keeps it, to the letter; written when nothing is left to be kept. */
  readonly text: () => Promise<string>;
  readonly circuit: () => Promise<Circuit>;
  /** What was last said in the status line. */
  readonly said: () => Promise<string>;
}

const KEY = 'spooltable.open';

export async function openDrawn(circuit: Partial<Circuit> = {}, options: OpenOptions = {}): Promise<Drawn> {
  const file = writeCircuit({ name: 'drawn by hand', parts: [], connections: [], ...circuit });
  const kept = JSON.stringify({ format: 1, circuit: file, past: [], future: [], saved: 0, levers: {} });
  // Only at the first load, so that a reload shows what was kept.
  const page = await openEditor({
    ...options,
    before: `if (!localStorage.getItem('${KEY}')) localStorage.setItem('${KEY}', ${JSON.stringify(kept)});
      if (!localStorage.getItem('spooltable.legendOpen')) localStorage.setItem('spooltable.legendOpen', 'false');
      ${options.before ?? ''}`,
  });
  const host = page.locator('.host[role=application]');
  await host.locator('svg').first().waitFor();
  const text = (): Promise<string> =>
    page.evaluate((key) => (JSON.parse(localStorage.getItem(key) ?? '{}') as { circuit: string }).circuit, KEY);
  return {
    page,
    host,
    text,
    at: (x, y) =>
      host
        .locator('svg')
        .first()
        .evaluate(
          (svg, [mx, my]) => {
            const p = new DOMPoint(mx, my).matrixTransform((svg as SVGSVGElement).getScreenCTM() ?? new DOMMatrix());
            return [p.x, p.y] as [number, number];
          },
          [x, y] as const,
        ),
    circuit: async () => {
      const read = readCircuit(await text());
      if (!read.ok) throw new Error('What is kept cannot be read.');
      return read.value;
    },
    said: async () => (await page.locator('[aria-live=polite]').last().textContent())?.trim() ?? '',
  };
}

/** The middle of some numbers. */
export function median(numbers: readonly number[]): number {
  const sorted = [...numbers].sort((a, b) => a - b);
  const [a = 0, b = a] = [sorted[Math.floor((sorted.length - 1) / 2)], sorted[Math.ceil((sorted.length - 1) / 2)]];
  return (a + b) / 2;
}
