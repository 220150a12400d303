import type { Browser, Page } from 'playwright-core';
import { writeCircuit } from '../../src/circuit/file.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { withEditor } from './built-editor.ts';
import { family } from './circuits.ts';
import { sheetOf } from './sheet-circuits.ts';

/**
 * The built editor in Chromium: work of one frame while a part is dragged, the sheet zoomed and panned, the work of
 * putting the part down, and the time from an edit to the painted table.
 *
 * Time on the clock means little on a machine that does other things too, so the processor time of the page's main
 * thread is what counts; both are printed.
 */
const FRAMES = 90;
/** A busy machine may take long to open a large sheet. */
const PATIENCE_MS = 300_000;
const KINDS = ['drag', 'zoom', 'pan'] as const;
type Kind = (typeof KINDS)[number];

const kept = (circuit: Circuit): string =>
  JSON.stringify({ format: 1, circuit: writeCircuit(circuit), past: [], future: [], saved: 0, levers: {} });

/** Notes what the threads of the analysis took for each table, and when a table with so many rows is on the screen. */
const WATCH = `(() => {
  const Real = window.Worker;
  window.benchTook = [];
  window.Worker = class extends Real {
    constructor(...given) {
      super(...given);
      this.addEventListener('message', ({ data }) => {
        const took = data.say === 'table' ? data.took : data.say === 'open-paths' ? data.table?.took : undefined;
        if (took !== undefined) window.benchTook.push(took);
      });
    }
  };
})()`;

async function open(browser: Browser, address: string, circuit: Circuit): Promise<Page> {
  const page = await (await browser.newContext({ viewport: { width: 1440, height: 900 } })).newPage();
  await page.addInitScript(
    `localStorage.setItem('spooltable.open', ${JSON.stringify(kept(circuit))});localStorage.setItem('spooltable.sheetShare', '0.75')`,
  );
  await page.addInitScript(WATCH);
  page.setDefaultTimeout(PATIENCE_MS);
  await page.goto(address);
  await page.locator('.host').waitFor();
  if (circuit.parts.length > 0) await page.locator('[data-part]').first().waitFor({ state: 'attached' });
  return page;
}

/** Waits until the main thread has had next to nothing to do for a second. */
async function settle(page: Page, clock: Clock): Promise<void> {
  for (let i = 0; i < 60; i++) {
    const before = await clock();
    await page.waitForTimeout(1000);
    if ((await clock()) - before < 60) return;
  }
}

/** Milliseconds from the event to the end of the frame that shows it; `kind` tells what the event is. */
function frames(page: Page, kind: Kind, count: number): Promise<number[]> {
  return page.evaluate(
    async ([what, most]) => {
      const host = document.querySelector<HTMLElement>('.host');
      if (!host) return [];
      const box = host.getBoundingClientRect();
      const { x, y } = (window as unknown as { benchAt?: { x: number; y: number } }).benchAt ?? {
        x: box.left + box.width / 2,
        y: box.top + box.height / 2,
      };
      const times: number[] = [];
      for (let i = 0; i < most; i++) {
        await new Promise<void>((done) =>
          requestAnimationFrame(() => {
            const start = performance.now();
            const { port1, port2 } = new MessageChannel();
            port1.onmessage = () => {
              times.push(performance.now() - start);
              done();
            };
            const at = {
              clientX: x + Math.sin(i / 9) * 160,
              clientY: y + Math.sin(i / 6) * 90,
              bubbles: true,
              cancelable: true,
            };
            if (what === 'drag')
              host.dispatchEvent(
                new PointerEvent('pointermove', { ...at, pointerId: 1, pointerType: 'mouse', buttons: 1 }),
              );
            else if (what === 'zoom')
              host.dispatchEvent(new WheelEvent('wheel', { ...at, deltaY: i % 30 < 15 ? 60 : -60 }));
            else
              host.dispatchEvent(new WheelEvent('wheel', { ...at, deltaX: 0.5, deltaY: i % 30 < 15 ? 12.5 : -12.5 }));
            port2.postMessage(0);
          }),
        );
      }
      return times;
    },
    [kind, count] as const,
  );
}

/** Processor time of the page's main thread, ms since it began. */
type Clock = () => Promise<number>;

async function clockOf(page: Page): Promise<Clock> {
  const session = await page.context().newCDPSession(page);
  await session.send('Performance.enable', { timeDomain: 'threadTicks' });
  return async () => {
    const { metrics } = await session.send('Performance.getMetrics');
    return (metrics.find(({ name }) => name === 'TaskDuration')?.value ?? NaN) * 1000;
  };
}

/** Takes hold of the part nearest to the middle of the sheet. */
async function take(page: Page): Promise<void> {
  const at = await page.evaluate(() => {
    const host = document.querySelector('.host')?.getBoundingClientRect();
    const middle = { x: (host?.left ?? 0) + (host?.width ?? 0) * 0.4, y: (host?.top ?? 0) + (host?.height ?? 0) / 2 };
    const boxes = [...document.querySelectorAll('[data-part]')].map((part) => part.getBoundingClientRect());
    if (boxes.length === 0) boxes.push(new DOMRect(middle.x, middle.y, 0, 0));
    const away = (b: DOMRect): number => Math.hypot(b.x + b.width / 2 - middle.x, b.y + b.height / 2 - middle.y);
    const [near] = boxes.sort((a, b) => away(a) - away(b));
    const found = { x: (near?.x ?? 0) + (near?.width ?? 0) / 2, y: (near?.y ?? 0) + (near?.height ?? 0) / 2 };
    Object.assign(window, { benchAt: found });
    return found;
  });
  await page.mouse.move(at.x, at.y);
  await page.mouse.down();
}

interface Measured {
  /** Of the main thread, ms a frame. */
  readonly work: number;
  /** On the clock, ms from the event to its frame, sorted. */
  readonly wall: readonly number[];
}

async function measure(page: Page, clock: Clock, kind: Kind): Promise<Measured> {
  if (kind === 'drag') await take(page);
  const before = await clock();
  const times = await frames(page, kind, FRAMES);
  return { work: ((await clock()) - before) / FRAMES, wall: times.sort((a, b) => a - b) };
}

/** Work of the main thread, ms, until the dropped part's lines are laid and the new table is shown. */
async function drop(page: Page, clock: Clock): Promise<number> {
  const before = await clock();
  await page.mouse.up();
  await settle(page, clock);
  return (await clock()) - before;
}

/** From the key to the frame after the one with the table of so many rows: on the clock, and of it the threads' own work. */
async function edit(page: Page, key: string, rows: string): Promise<{ wall: number; took: number }> {
  const painted = page.evaluate(
    (text) =>
      new Promise<{ wall: number; took: number }>((done) => {
        let began = 0;
        addEventListener('keydown', (event) => (began ||= event.timeStamp), { capture: true });
        Object.assign(window, { benchTook: [] });
        const look = (): void => {
          const shown = [...document.querySelectorAll('.where')].some((each) => each.textContent.includes(text));
          if (began === 0 || !shown) return void requestAnimationFrame(look);
          requestAnimationFrame(() => {
            const { benchTook } = window as unknown as { readonly benchTook: readonly number[] };
            done({ wall: performance.now() - began, took: benchTook[0] ?? NaN });
          });
        };
        look();
      }),
    rows,
  );
  await page.keyboard.press(key);
  return painted;
}

const share = (times: readonly number[], part: number): number =>
  [...times].sort((a, b) => a - b)[Math.floor((times.length - 1) * part)] ?? NaN;
const figure = (value: number): string => value.toFixed(1).padStart(7);

async function run(print: (line: string) => void): Promise<void> {
  await withEditor(async (browser, address) => {
    print('ms a frame: work of the main thread, its ratio to an empty sheet; on the clock median and 95 of 100');
    print(`parts  ${KINDS.map((kind) => `${kind}: work  ratio   clock    p95`.padStart(32)).join('')}    drop, ms`);
    const empty: Partial<Record<Kind, number>> = {};
    for (const count of [0, 1, 100, 300, 1000]) {
      const page = await open(browser, address, sheetOf(count));
      const clock = await clockOf(page);
      await settle(page, clock);
      const cells: string[] = [];
      let put = NaN;
      for (const kind of KINDS) {
        // An empty sheet has nothing to drag: there the pointer draws a rubber band.
        const { work, wall } = await measure(page, clock, kind);
        if (kind === 'drag') put = await drop(page, clock);
        if (count === 0) empty[kind] = work;
        const ratio = work / (empty[kind] ?? NaN);
        cells.push([work, ratio, share(wall, 0.5), share(wall, 0.95)].map(figure).join('').padStart(32));
      }
      print(`${String(count).padStart(5)}  ${cells.join('')}    ${put.toFixed(0).padStart(8)}`);
      await page.context().close();
    }
    const page = await open(browser, address, placeMissing(family('BANK', 8)));
    await page.locator('.where', { hasText: 'of 6,561' }).first().waitFor();
    await page.getByRole('application').first().focus();
    const clock = await clockOf(page);
    const edits: { wall: number; took: number; work: number }[] = [];
    for (let i = 0; i < 7; i++) {
      // A valve less has a third of the rows; taking it back has all of them again.
      await page.evaluate(() => document.querySelector<HTMLElement>('.host')?.focus());
      await page.keyboard.press('/');
      await page.keyboard.type('V8');
      await page.keyboard.press('Enter');
      await page.keyboard.press('Delete');
      await page.locator('.where', { hasText: 'of 2,187' }).first().waitFor();
      await settle(page, clock);
      const before = await clock();
      const measured = await edit(page, 'Control+z', 'of 6,561');
      edits.push({ ...measured, work: (await clock()) - before });
    }
    const of = (which: 'wall' | 'took' | 'work'): string =>
      share(
        edits.map((each) => each[which]),
        0.5,
      ).toFixed(0);
    print(
      `edit to table, 8 valves, 6561 rows: ${of('wall')} ms on the clock (median), of it ${of('took')} ms of the analysis on its thread; work of the main thread ${of('work')} ms`,
    );
  });
}

await run((line) => console.log(line));
