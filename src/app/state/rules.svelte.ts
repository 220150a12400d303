import { Cancelled } from '../../base/budget.ts';
import type { Problem } from '../../base/result.ts';
import type { Circuit } from '../../circuit/model.ts';
import type { Analyst, Check, CheckedRule, Conditions, Job, StateTable } from '../../worker/client.ts';
import { sayError } from './said.ts';
import { sameMachine, session } from './session.svelte.ts';
import { unreadable } from './unreadable.ts';

const PATIENCE_MS = 250;

/** The circuit's rules against every combination: asked for while they are on show. */
class Rules {
  /** The last answer, as long as it is about the circuit and conditions on show. */
  check = $state.raw<Check | undefined>();
  busy = $state(false);
  /** Busy for long enough to be worth a word. */
  slow = $state(false);
  /** 0 to 1. */
  share = $state(0);
  stopped = $state(false);
  /** Why there are no answers, in words. */
  failure = $state<string | undefined>();
  /** Rule id → why it cannot be answered; the others are. */
  problems = $state.raw<ReadonlyMap<string, Problem>>(new Map());

  #analyst: Analyst | undefined;
  #job: { readonly cancel: () => void } | undefined;
  #patience: ReturnType<typeof setTimeout> | undefined;
  #of: { readonly circuit: Circuit; readonly conditions: Conditions } | undefined;

  start(analyst: Analyst): void {
    this.#analyst = analyst;
  }

  /** Undefined = not answered yet. */
  of(id: string, text: string): CheckedRule | undefined {
    return this.check?.rules.find((rule) => rule.id === id && rule.text === text);
  }

  /** Ask anew, unless this was asked last; answers about another circuit or other conditions are dropped at once. */
  ask(circuit: Circuit, conditions: Conditions, again = false): void {
    const was = this.#of;
    const same = was !== undefined && sameMachine(was.circuit, circuit) && was.conditions === conditions;
    if (same && was.circuit.rules === circuit.rules && !again) return;
    this.#job?.cancel();
    this.#idle();
    this.#of = { circuit, conditions };
    if (!same) this.check = undefined;
    this.problems = new Map();
    this.failure = undefined;
    this.stopped = false;
    if ((circuit.rules ?? []).length > 0) this.#next(circuit, conditions, new Map());
  }

  /** Rules that cannot be read are put aside, and the rest is asked for again. */
  #next(circuit: Circuit, conditions: Conditions, aside: ReadonlyMap<string, Problem>): void {
    if (!this.#analyst) return;
    this.busy = true;
    this.share = 0;
    this.#patience ??= setTimeout(() => (this.slow = true), PATIENCE_MS);
    const job = this.#analyst.check({ circuit, conditions, table: finished(circuit, conditions) }, (share) => {
      if (this.#job === job) this.share = share;
    });
    this.#job = job;
    job.answer.then(
      (result) => {
        if (this.#job !== job) return;
        if (result.ok) {
          this.#settle(aside);
          this.check = result.value;
          return;
        }
        const { found, others, rest } = unreadable(circuit, result.problems);
        const all = new Map([...aside, ...found]);
        if (found.size > 0 && (rest.rules ?? []).length > 0) {
          this.#next(rest, conditions, all);
          return;
        }
        this.#settle(all);
        this.check = undefined;
        this.failure = others.map(({ what, remedy }) => `${what} ${remedy}`).join(' ') || undefined;
      },
      (error: unknown) => {
        if (this.#job !== job) return;
        this.#settle(aside);
        if (error instanceof Cancelled) this.stopped = true;
        else this.failure = sayError(error);
      },
    );
  }

  #settle(problems: ReadonlyMap<string, Problem>): void {
    this.#idle();
    this.problems = problems;
  }

  #idle(): void {
    this.#job = undefined;
    this.busy = false;
    this.slow = false;
    clearTimeout(this.#patience);
    this.#patience = undefined;
  }

  /** The person stops a long check. */
  stop(): void {
    this.#job?.cancel();
  }

  /** Nobody looks any more. */
  leave(): void {
    const { busy } = this;
    const job = this.#job;
    this.#idle();
    job?.cancel();
    if (busy) this.#of = undefined;
  }

  /** What keeps a text from being read as a rule. */
  read(circuit: Circuit, text: string): Job<readonly Problem[]> | undefined {
    return this.#analyst?.readRule(circuit, text);
  }
}

/** The table that a check may start from: that of the same machine, once the pressures are through with it. */
function finished(circuit: Circuit, conditions: Conditions): StateTable | undefined {
  const { answer } = session;
  const whole = answer?.conditions === conditions && session.progress === undefined && !session.stopped;
  return whole && sameMachine(answer.circuit, circuit) ? answer.table : undefined;
}

export const rules = new Rules();
