import { Cancelled } from '../../base/budget.ts';
import type { Result } from '../../base/result.ts';
import type { Job } from '../../worker/client.ts';
import { sayError } from './said.ts';

const PATIENCE_MS = 250;

/** One long question at a time: its answer, how far it is, and why there is none. */
export class Inquiry<T> {
  value = $state.raw<T | undefined>();
  busy = $state(false);
  /** Busy for long enough to be worth a word. */
  slow = $state(false);
  /** 0 to 1. */
  share = $state(0);
  stopped = $state(false);
  /** Why there is no answer, in words. */
  failure = $state<string | undefined>();

  #job: Job<Result<T>> | undefined;
  #patience: ReturnType<typeof setTimeout> | undefined;

  /** The last answer stays until the next one is there, unless `afresh`. */
  run(ask: (progress: (share: number) => void) => Job<Result<T>>, afresh = false): void {
    this.#drop();
    if (afresh) this.value = undefined;
    this.failure = undefined;
    this.stopped = false;
    this.busy = true;
    this.share = 0;
    this.#patience = setTimeout(() => (this.slow = true), PATIENCE_MS);
    const job = ask((share) => {
      if (this.#job === job) this.share = share;
    });
    this.#job = job;
    job.answer.then(
      (result) => {
        if (this.#job !== job) return;
        this.#settle();
        this.value = result.ok ? result.value : undefined;
        if (!result.ok)
          this.failure = result.problems.map(({ where, what, remedy }) => `${place(where)}${what} ${remedy}`).join(' ');
      },
      (error: unknown) => {
        if (this.#job !== job) return;
        this.#settle();
        this.value = undefined;
        if (error instanceof Cancelled) this.stopped = true;
        else this.failure = sayError(error);
      },
    );
  }

  /** The person stops it. */
  stop(): void {
    this.#job?.cancel();
  }

  /** Nobody wants it any more. */
  clear(): void {
    this.#drop();
    this.value = undefined;
    this.failure = undefined;
    this.stopped = false;
  }

  #drop(): void {
    const job = this.#job;
    this.#settle();
    job?.cancel();
    job?.answer.catch(() => undefined);
  }

  #settle(): void {
    this.#job = undefined;
    clearTimeout(this.#patience);
    this.busy = false;
    this.slow = false;
  }
}

const place = (where: string): string => (where.startsWith('column') ? `C${where.slice(1)}: ` : '');
