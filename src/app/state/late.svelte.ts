import { BACKGROUND_ROWS } from '../../worker/client.ts';
import type { Analyst, Job, LateRows, StateTable } from '../../worker/client.ts';
import { lateRows } from './late-rows.svelte.ts';
import { session } from './session.svelte.ts';

/** Rows in view are asked for once scrolling has paused. */
const PAUSE_MS = 60;
/** A request is as many rows as take about this long, so that what is scrolled to need not wait. */
const SHORT_MS = 150;
const BATCH = { first: 8, least: 4, most: 64 } as const;

/** Gets the verdicts of the rows that are looked at, while the pressures of the whole table are still to come. */
class Late {
  /** Rows that the table shows, the first to be seen first. */
  inView = $state.raw<readonly number[]>([]);
  #analyst: Analyst | undefined;
  #job: Job<readonly LateRows[]> | undefined;
  #batch: number = BATCH.first;
  #pause: ReturnType<typeof setTimeout> | undefined;
  /** Tables of which nothing is known ahead. */
  #none: unknown;

  start(analyst: Analyst): void {
    this.#analyst = analyst;
  }

  /** Looks anew at what is missing. */
  ask(): void {
    clearTimeout(this.#pause);
    this.#pause = setTimeout(() => this.#next(), PAUSE_MS);
  }

  #next(): void {
    const { answer, table } = session;
    const analyst = this.#analyst;
    if (this.#job || !analyst || !answer || !table || session.stale || answer.conditions.held !== undefined) return;
    const longer = table.count > BACKGROUND_ROWS;
    if ((!answer.early && !longer) || table.data.dependents.length > 0 || this.#none === answer.circuit) return;
    const wanted = [session.row, ...this.inView]
      .filter((row) => row < table.count && !lateRows.has(row) && (!longer || rests(table, row)))
      .slice(0, this.#batch);
    if (wanted.length === 0) return;
    const { turn } = lateRows;
    const started = performance.now();
    const job = analyst.late(answer.circuit, answer.conditions, wanted);
    this.#job = job;
    const after = (go: boolean): void => {
      this.#job = undefined;
      if (go) this.#next();
    };
    job.answer.then(
      (rows) => {
        if (turn === lateRows.turn) lateRows.put(rows);
        if (rows.length === 0) this.#none = answer.circuit;
        const fitting = Math.round((wanted.length * SHORT_MS) / Math.max(1, performance.now() - started));
        this.#batch = Math.min(BATCH.most, Math.max(BATCH.least, fitting));
        after(true);
      },
      () => {
        // The table itself will say what is wrong.
        this.#none = answer.circuit;
        after(false);
      },
    );
  }
}

/** Open paths leave some verdict of the row to the pressures. */
const rests = (table: StateTable, row: number): boolean =>
  table.data.actuators.some((_, i) => table.actuator(i, row) === 'rests on pressure') ||
  table.data.pumps.some((_, i) => table.pump(i, row) === 'rests on pressure');

export const late = new Late();
