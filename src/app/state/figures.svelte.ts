import { Cancelled } from '../../base/budget.ts';
import type { Analyst, Job, RowNumbers } from '../../worker/client.ts';
import { session } from './session.svelte.ts';

/** Rows in view are asked for once scrolling has paused. */
const PAUSE_MS = 120;
/** Reasons wait on the same thread, so a request is as many rows as take about this long. */
const SHORT_MS = 200;
const BATCH = { first: 6, least: 2, most: 40 } as const;

/** Rows whose figures are kept: scrolling through a million rows must not fill the memory. */
const KEPT = 2000;

type Answer = NonNullable<typeof session.answer>;

/** Pressures, speeds and flows of the rows that are looked at: asked for when needed, kept as long as the table is. */
class Figures {
  /** Rows that the table shows with figures, the first to be seen first. */
  inView = $state.raw<readonly number[]>([]);
  #known = $state.raw<ReadonlyMap<number, RowNumbers>>(new Map());
  #of: Answer | undefined;
  #analyst: Analyst | undefined;
  #job: Job<readonly RowNumbers[]> | undefined;
  #batch: number = BATCH.first;
  #pause: ReturnType<typeof setTimeout> | undefined;
  /** Rows that the analysis failed on: not asked for again. */
  #failed = new Set<number>();

  /** Undefined = not there yet, or of an earlier table. */
  of(row: number): RowNumbers | undefined {
    return this.#known.get(row);
  }

  /** Of the chosen row. */
  current: RowNumbers | undefined = $derived(this.#known.get(session.row));

  start(analyst: Analyst): void {
    this.#analyst = analyst;
  }

  /** Ask for what is missing: `first` at once, the rows in view after a pause. Figures of another table are dropped. */
  ask(answer: Answer | undefined, first: number, others: readonly number[]): void {
    if (answer !== this.#of) {
      this.#job?.cancel();
      this.#job = undefined;
      this.#of = answer;
      this.#known = new Map();
      this.#batch = BATCH.first;
      this.#failed = new Set();
    }
    clearTimeout(this.#pause);
    if (!answer || answer.table.count === 0) return;
    if (this.#missing([first]).length > 0) this.#next([first]);
    this.#pause = setTimeout(() => this.#next(others), PAUSE_MS);
  }

  #missing(rows: readonly number[]): number[] {
    return rows.filter((row) => !this.#known.has(row) && !this.#failed.has(row));
  }

  /** One request at a time; what was wanted meanwhile is looked at again when it is answered. */
  #next(rows: readonly number[]): void {
    const answer = this.#of;
    if (this.#job || !answer || !this.#analyst) return;
    const wanted = this.#missing(rows).slice(0, this.#batch);
    if (wanted.length === 0) return;
    const started = performance.now();
    const job = this.#analyst.numbers(answer.circuit, answer.conditions, wanted);
    this.#job = job;
    const after = (): void => {
      this.#job = undefined;
      this.#next([session.row, ...this.inView]);
    };
    job.answer.then(
      (numbers) => {
        if (this.#job !== job) return;
        const fitting = Math.round((wanted.length * SHORT_MS) / Math.max(1, performance.now() - started));
        this.#batch = Math.min(BATCH.most, Math.max(BATCH.least, fitting));
        const known = new Map(this.#known);
        for (const each of numbers) known.set(each.row, each);
        // The rows longest known go first; they are asked for again when they come into view.
        for (const row of known.keys()) {
          if (known.size <= KEPT) break;
          known.delete(row);
        }
        this.#known = known;
        after();
      },
      (error: unknown) => {
        if (this.#job !== job) return;
        if (!(error instanceof Cancelled)) for (const row of wanted) this.#failed.add(row);
        after();
      },
    );
  }
}

export const figures = new Figures();
