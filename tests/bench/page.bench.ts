import type { Browser } from 'playwright-core';
import { writeCircuit } from '../../src/circuit/file.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { withEditor } from './built-editor.ts';
import { family } from './circuits.ts';

/**
 * From a cold page to a table in view, in the built editor with the circuit that was open last: an
 * empty profile each time, so that nothing is fetched or compiled before. Milliseconds from the start of navigation.
 */
const RUNS = 3;

interface Times {
  /** The first text or line on the screen. */
  readonly paint: number;
  /** The first thread started; the first table handed over; the frame after its first rows stood in the page. */
  readonly thread: number;
  readonly table: number;
  readonly rows: number;
}

/** Notes when the first thread starts, when a table comes from it, and when a row of it has been painted. */
const WATCH = `
  const times = (window.benchTimes = {});
  const Plain = Worker;
  window.Worker = class extends Plain {
    constructor(...given) {
      super(...given);
      times.thread ??= performance.now();
      this.addEventListener('message', ({ data }) => {
        if (JSON.stringify(data, (_, value) => (ArrayBuffer.isView(value) ? 0 : value)).includes('linePlanes')) times.table ??= performance.now();
      });
    }
  };
  new MutationObserver(() => {
    if (times.seen || !document.querySelector('[role="row"][data-place]')) return;
    times.seen = performance.now();
    requestAnimationFrame(() => setTimeout(() => (times.rows = performance.now())));
  }).observe(document, { childList: true, subtree: true });
`;

const kept = (circuit: Circuit): string =>
  JSON.stringify({ format: 1, circuit: writeCircuit(circuit), past: [], future: [], saved: 0, levers: {} });

async function once(browser: Browser, address: string, circuit: Circuit): Promise<Times> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 }, serviceWorkers: 'block' });
  const page = await context.newPage();
  await page.addInitScript(`localStorage.setItem('spooltable.open', ${JSON.stringify(kept(circuit))});${WATCH}`);
  await page.goto(address);
  await page.waitForFunction('window.benchTimes.rows !== undefined', undefined, { timeout: 120_000 });
  const times = await page.evaluate<Times>(
    `({ ...window.benchTimes, paint: performance.getEntriesByName('first-contentful-paint')[0]?.startTime ?? NaN })`,
  );
  await context.close();
  return times;
}

async function run(print: (line: string) => void): Promise<void> {
  await withEditor(async (browser, address) => {
    print(`cold page to table, ms: middle of ${RUNS} (quickest)`);
    print('circuit       rows        first paint   thread started    table there    rows in view');
    for (const name of ['BANK', 'SERIES'] as const) {
      for (const valves of [8, 12]) {
        const circuit = placeMissing(family(name, valves));
        const runs: Times[] = [];
        for (let i = 0; i < RUNS; i++) runs.push(await once(browser, address, circuit));
        const cell = (key: keyof Times): string => {
          const list = runs.map((times) => times[key]).sort((a, b) => a - b);
          return `${(list[RUNS >> 1] ?? NaN).toFixed(0)} (${(list[0] ?? NaN).toFixed(0)})`.padStart(15);
        };
        print(
          `${`${name} ${valves}`.padEnd(10)} ${String(3 ** valves).padStart(7)} ${(['paint', 'thread', 'table', 'rows'] as const).map(cell).join(' ')}`,
        );
      }
    }
  });
}

await run((line) => console.log(line));
