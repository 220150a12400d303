import { Cancelled } from '../../base/budget.ts';
import type { UnitSystem } from '../../base/units.ts';
import type { Circuit } from '../../circuit/model.ts';
import type { Analyst, Conditions, Job, MovesAnswer, PowerLossAnswer, VentAnswer } from '../../worker/client.ts';
import { sayError } from './said.ts';

/** One question about the state in hand, and its answer. */
class Question<T> {
  value = $state.raw<T | undefined>();
  busy = $state(false);
  stopped = $state(false);
  failure = $state<string | undefined>();
  #job: Job<T> | undefined;

  ask(job: Job<T> | undefined): void {
    this.#job?.cancel();
    this.#job = job;
    this.failure = undefined;
    this.stopped = false;
    this.busy = job !== undefined;
    if (!job) return;
    job.answer.then(
      (value) => {
        if (this.#job !== job) return;
        this.busy = false;
        this.value = value;
      },
      (error: unknown) => {
        if (this.#job !== job) return;
        this.busy = false;
        this.value = undefined;
        if (error instanceof Cancelled) this.stopped = true;
        else this.failure = sayError(error);
      },
    );
  }

  stop(): void {
    this.#job?.cancel();
  }

  /** Nobody looks any more. */
  leave(): void {
    const job = this.#job;
    this.#job = undefined;
    job?.cancel();
    this.busy = false;
    this.value = undefined;
  }
}

/** The circuit and how its levers stand. */
export interface Standing {
  readonly circuit: Circuit;
  readonly conditions: Conditions;
  readonly positions: readonly number[];
  readonly units: UnitSystem;
}

/** What the levers do from where they stand, how a line is vented, and what a loss of power does there. */
class Moves {
  readonly all = new Question<MovesAnswer>();
  readonly venting = new Question<VentAnswer>();
  readonly loss = new Question<PowerLossAnswer>();
  /** Name of the line that is to be vented. */
  line = $state<string | undefined>();

  #analyst: Analyst | undefined;

  start(analyst: Analyst): void {
    this.#analyst = analyst;
  }

  askMoves({ circuit, conditions, positions, units }: Standing): void {
    this.all.ask(this.#analyst?.moves(circuit, conditions, positions, units));
  }

  /** `line`: its index in the table; below 0 for one that is not in it. */
  askVent(standing: Standing, line: number): void {
    const job = line < 0 ? undefined : this.#analyst?.vent({ ...standing, line });
    this.venting.value = undefined;
    this.venting.ask(job && { answer: job.answer.then(valueOf), cancel: job.cancel });
  }

  askLoss(circuit: Circuit, conditions: Conditions, row: number): void {
    this.loss.ask(this.#analyst?.powerLoss(circuit, conditions, row));
  }
}

function valueOf(result: Awaited<ReturnType<Analyst['vent']>['answer']>): VentAnswer {
  if (result.ok) return result.value;
  throw new Error(result.problems.map(({ what, remedy }) => `${what} ${remedy}`).join(' '));
}

export const moves = new Moves();
