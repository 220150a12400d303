import { good } from '../../base/result.ts';
import type { Circuit } from '../../circuit/model.ts';
import type { PlanStep, StepPlan } from '../../circuit/plan.ts';
import type { Analyst, CoilLogic, Job, PlanDraft, PlanReport } from '../../worker/client.ts';
import { editor } from './editor.svelte.ts';
import { Inquiry } from './inquiry.svelte.ts';
import { momentOf } from './moment.ts';
import { sameMachine, session } from './session.svelte.ts';

export type PlanPage = 'steps' | 'diagram' | 'loss' | 'logic';

/** Typing goes on for a while, and a check of every letter would be thrown away. */
const PAUSE_MS = 250;
const NONE: readonly PlanStep[] = [];

/** Where the play is looked at: a sample of the trace, and a time from it to the next. */
export interface PlayedAt {
  readonly sample: number;
  readonly time: number;
}

/** Step plans of the circuit: the one on show is always checked while somebody looks. */
class Plans {
  /** Plan id → what was picked in it stays picked while it is edited. */
  #id = $state<string | undefined>();
  #stepId = $state<string | undefined>();
  page = $state<PlanPage>('steps');
  kind = $state<'step' | 'time'>('step');
  /** The form for a draft stands in place of the plans. */
  drafting = $state(false);
  /** Names of the lines whose pressures the diagram shows; undefined = those with most to tell. */
  lines = $state.raw<readonly string[] | undefined>();
  #at = $state.raw<PlayedAt | undefined>();

  list: readonly StepPlan[] = $derived(editor.circuit.plans ?? []);
  plan: StepPlan | undefined = $derived(this.list.find(({ id }) => id === this.#id) ?? this.list[0]);
  steps: readonly PlanStep[] = $derived(this.plan?.steps ?? NONE);
  /** Index of the picked step; -1 = none. */
  step = $derived(this.steps.findIndex(({ id }) => id === this.#stepId));

  readonly check = new Inquiry<PlanReport>();
  readonly logic = new Inquiry<CoilLogic>();
  readonly draft = new Inquiry<PlanDraft>();
  /** The last report, as long as it is of the plan on show. */
  report: PlanReport | undefined = $derived(this.check.value?.plan === this.plan?.id ? this.check.value : undefined);
  /** What is on show was changed since. */
  stale = $derived(this.check.busy);
  /** The moment on show. */
  at: PlayedAt | undefined = $derived(session.moment ? this.#at : undefined);

  #analyst: Analyst | undefined;
  #pause: ReturnType<typeof setTimeout> | undefined;
  #asked: { readonly circuit: Circuit; readonly plan: StepPlan } | undefined;
  #logicOf: { readonly circuit: Circuit; readonly plan: StepPlan } | undefined;

  start(analyst: Analyst): void {
    this.#analyst = analyst;
  }

  pick(id: string): void {
    if (id === this.plan?.id) return;
    this.#id = id;
    this.#stepId = undefined;
    this.lines = undefined;
    session.leaveMoment();
  }

  /** Pick a step, and take the sheet to where it begins if it was played. */
  pickStep(id: string, follow = true): void {
    this.#stepId = id;
    const index = this.steps.findIndex((step) => step.id === id);
    const first = this.report?.trace.steps[index]?.first;
    if (follow && first !== undefined) this.show({ sample: first, time: this.#timeOf(first) });
  }

  /** Take the sheet to a moment of the play. */
  show(at: PlayedAt): void {
    const { report } = this;
    const moment = report && momentOf(report.trace, at.sample, at.time, report.loadCase);
    const sample = report?.trace.samples[at.sample];
    if (!report || !moment || !sample) return;
    this.#at = at;
    this.#stepId = this.steps[sample.step]?.id;
    session.showMoment(moment);
  }

  /** The moment at a time of a step. */
  showTime(step: number, time: number): void {
    const samples = this.report?.trace.samples ?? [];
    const sample = samples.findLastIndex((each) => each.step === step && each.time <= time + 1e-12);
    if (sample >= 0) this.show({ sample, time });
  }

  /** To the event before or after; from no moment to the first or last one. */
  showNext(by: 1 | -1): void {
    const { report, at } = this;
    if (!report) return;
    const { samples } = report.trace;
    const events = samples.flatMap(({ events: found, time }, i) =>
      i === 0 || found.some(({ kind }) => kind !== 'stage') ? [{ sample: i, time }] : [],
    );
    const now = at ?? { sample: by > 0 ? -1 : samples.length, time: 0 };
    const between = at !== undefined && at.time > this.#timeOf(at.sample);
    const next =
      by > 0
        ? events.find(({ sample }) => sample > now.sample)
        : events.findLast(({ sample }) => sample < now.sample || (between && sample === now.sample));
    if (next) this.show(next);
  }

  /** Check the plan on show anew; the last report stays until the next one is there. */
  ask(circuit: Circuit, plan: StepPlan | undefined, again = false): void {
    const was = this.#asked;
    clearTimeout(this.#pause);
    if (!plan) {
      this.#asked = undefined;
      this.check.clear();
      return;
    }
    if (!again && was && sameMachine(was.circuit, circuit) && was.plan === plan && !this.check.failure) return;
    const other = was?.plan.id !== plan.id;
    this.#pause = setTimeout(() => this.#run(circuit, plan), other || again ? 0 : PAUSE_MS);
  }

  #run(circuit: Circuit, plan: StepPlan): void {
    const analyst = this.#analyst;
    if (!analyst) return;
    this.#asked = { circuit, plan };
    const other = this.check.value?.plan !== plan.id;
    this.check.run((progress) => asResult(analyst.plan(circuit, { pumps: 'running' }, plan.id, progress)), other);
  }

  /** A new report takes a moment on show along to the same step, or ends it. */
  follow(report: PlanReport | undefined): void {
    if (!session.moment) return;
    const first = this.step < 0 ? undefined : report?.trace.steps[this.step]?.first;
    if (first === undefined) session.leaveMoment();
    else this.show({ sample: first, time: report?.trace.samples[first]?.time ?? 0 });
  }

  askLogic(circuit: Circuit, plan: StepPlan | undefined): void {
    const analyst = this.#analyst;
    const was = this.#logicOf;
    if (!analyst || !plan) return;
    if (was && sameMachine(was.circuit, circuit) && was.circuit.rules === circuit.rules && was.plan === plan) return;
    this.#logicOf = { circuit, plan };
    this.logic.run(() => analyst.coilLogic(circuit, plan.id));
  }

  askDraft(circuit: Circuit, loadCase: string | undefined, text: string): void {
    const analyst = this.#analyst;
    if (!analyst) return;
    const conditions = { pumps: 'running' as const, ...(loadCase !== undefined && { loadCase }) };
    this.draft.run((progress) => analyst.draftPlan(circuit, conditions, text, progress), true);
  }

  stop(): void {
    this.check.stop();
  }

  /** What was stopped or failed, once more. */
  again(): void {
    this.ask(editor.circuit, this.plan, true);
  }

  /** Nobody looks any more. */
  leave(): void {
    clearTimeout(this.#pause);
    if (!this.check.busy) return;
    this.#asked = undefined;
    this.check.clear();
  }

  #timeOf(sample: number): number {
    return this.report?.trace.samples[sample]?.time ?? 0;
  }
}

const asResult = <T>({ answer, cancel }: Job<T>) => ({ answer: answer.then((value) => good(value)), cancel });

export const plans = new Plans();
