import { Cancelled } from '../../base/budget.ts';
import type { Circuit } from '../../circuit/model.ts';
import type { Analyst, BleedAnswer, Conditions, Job } from '../../worker/client.ts';
import { sayError } from './said.ts';

/** How to let the pressure down from one row: made for the row that is asked for, and kept while its moves are tried. */
class Bleed {
  plan = $state.raw<BleedAnswer | undefined>();
  /** The row that is being worked on or was worked on last, 0-based. */
  row = $state<number | undefined>();
  busy = $state(false);
  stopped = $state(false);
  failure = $state<string | undefined>();

  #analyst: Analyst | undefined;
  #job: Job<BleedAnswer> | undefined;
  #of = $state.raw<{ readonly circuit: Circuit; readonly conditions: Conditions } | undefined>();

  start(analyst: Analyst): void {
    this.#analyst = analyst;
  }

  /** Make the plan for this row. */
  ask(circuit: Circuit, conditions: Conditions, row: number): void {
    this.#job?.cancel();
    this.#job = undefined;
    this.#of = { circuit, conditions };
    this.row = row;
    this.plan = undefined;
    this.failure = undefined;
    this.stopped = false;
    if (!this.#analyst) return;
    this.busy = true;
    const job = this.#analyst.bleed(circuit, conditions, row);
    this.#job = job;
    job.answer.then(
      (plan) => {
        if (this.#job !== job) return;
        this.busy = false;
        this.plan = plan;
      },
      (error: unknown) => {
        if (this.#job !== job) return;
        this.busy = false;
        if (error instanceof Cancelled) this.stopped = true;
        else this.failure = sayError(error);
      },
    );
  }

  /** A plan for another circuit or other conditions is replaced by one for the row on show. The pumps are stopped in any. */
  keepUp(circuit: Circuit, conditions: Conditions, row: number): void {
    if (!this.fits(circuit, conditions)) this.ask(circuit, conditions, row);
  }

  /** Whether the plan is about this circuit, and what holds of it besides the pumps. */
  fits(circuit: Circuit, { loadCase, places }: Conditions): boolean {
    const of = this.#of;
    return of?.circuit === circuit && of.conditions.loadCase === loadCase && samePlaces(of.conditions.places, places);
  }

  stop(): void {
    this.#job?.cancel();
  }

  /** Nobody looks any more; opened again, it is about the row of then. */
  leave(): void {
    const job = this.#job;
    this.#job = undefined;
    job?.cancel();
    this.busy = false;
    this.#of = undefined;
  }
}

function samePlaces(a: Conditions['places'] = {}, b: Conditions['places'] = {}): boolean {
  const keys = Object.keys(a);
  return keys.length === Object.keys(b).length && keys.every((key) => a[key] === b[key]);
}

export const bleed = new Bleed();
