import type { UnitSystem } from '../../base/units.ts';
import { Cancelled } from '../../base/budget.ts';
import type { Circuit } from '../../circuit/model.ts';
import type { Analyst, Conditions, Explanation, Job, ReasonStep, TableAnswer } from '../../worker/client.ts';
import { BACKGROUND_ROWS, MOST_ROWS, StateTable } from '../../worker/client.ts';
import { connectionLooks } from './connection-looks.ts';
import type { ConnectionLook } from './connection-looks.ts';
import { editor } from './editor.svelte.ts';
import { hint } from './hint.svelte.ts';
import { inputsOf } from './inputs.ts';
import { lateRows } from './late-rows.svelte.ts';
import { foundAt, litSteps, stepsOf } from './lit.ts';
import type { Lit, Subject } from './lit.ts';
import { conditionsIn, loaded, withCase, withPlace } from './conditions.ts';
import { sayError } from './said.ts';
import type { CircuitInput } from './inputs.ts';
import type { Moment } from './moment.ts';
import { view } from './view.svelte.ts';

export type { ConnectionLook } from './connection-looks.ts';
export type { Lit, LitStep, Subject } from './lit.ts';

/** The table as it was computed; `early`: there is more to come. */
export interface SessionAnswer extends TableAnswer {
  readonly circuit: Circuit;
  readonly conditions: Conditions;
  readonly early: boolean;
}

const PATIENCE_MS = 250;
/** Rows that the levers picked on a large panel may have. */
const MOST_LISTED = 7_000;

/** The state on show: conditions, the whole table, the current row, and why it is so. */
class Session {
  #conditions = $state.raw<Conditions>({ pumps: 'running' });
  #conditionsNow: Conditions = $derived(conditionsIn(editor.circuit, this.#conditions));
  /** The last answer, with the circuit it was computed for. */
  answer = $state.raw<SessionAnswer | undefined>();
  /** Share of the running computation, 0 to 1; undefined = nothing runs. */
  progress = $state<number | undefined>();
  /** Why there is no table, in words. */
  failure = $state<string | undefined>();
  stopped = $state(false);
  /** True once the running computation has taken long enough to be worth a word. */
  slow = $state(false);
  explanation = $state.raw<Explanation | undefined>();
  explainFailure = $state<string | undefined>();
  /** What the Why panel is about. */
  subject = $state.raw<Subject | undefined>();
  /** Index of the step under the pointer or focus. */
  step = $state<number | undefined>();
  /** Finding whose parts and lines are lit. */
  finding = $state<number | undefined>();
  /** What a line of another panel speaks of, while it is under the pointer or has the focus. */
  pointed = $state.raw<Pick<Lit, 'lines' | 'parts'> | undefined>();

  /** The moment of a step plan that is on show; moving a lever or changing the conditions ends it. */
  #moment = $state.raw<Moment | undefined>();
  /** Conditions from before the first moment on show. */
  #before: Conditions | undefined;

  /** Part id → where its lever stands; survives edits, so a redrawn circuit keeps its state. */
  #levers = $state.raw<Readonly<Record<string, number>>>({});

  /** Commanded inputs of the circuit as drawn now, in circuit order (needs no table). */
  inputs: readonly CircuitInput[] = $derived(inputsOf(editor.circuit));
  /** All combinations of the circuit as drawn now. */
  combinations = $derived(this.inputs.reduce((n, input) => n * BigInt(input.positions.length), 1n));
  /** Too many to list: the table has the rows of some levers, the others stay where they stand. */
  large = $derived(this.combinations > BigInt(MOST_ROWS));
  /** Part ids of the levers that a large panel has rows of, as picked. */
  #listed = $state.raw<readonly string[]>([]);
  /** Those of them that the circuit has. */
  listed: readonly CircuitInput[] = $derived(this.inputs.filter(({ part }) => this.#listed.includes(part)));
  #held = $derived(this.large ? JSON.stringify(this.#heldNow()) : undefined);
  /** What the table is asked for: the conditions, and the levers of a large panel that are held. */
  wanted: Conditions = $derived(
    this.#held === undefined
      ? this.conditions
      : { ...this.conditions, held: JSON.parse(this.#held) as Readonly<Record<string, number>> },
  );
  #computed: StateTable | undefined = $derived(this.answer?.table);
  /** The table on show: as computed, and what the pressures have said of single rows ahead of it. */
  table: StateTable | undefined = $derived(this.#computed && new StateTable(this.#computed.data, lateRows));
  /** The circuit of the table on show, with the loads that it was computed for. */
  tabled: Circuit = $derived(this.answer ? loaded(this.answer.circuit, this.answer.conditions) : editor.circuit);
  findings = $derived(this.answer?.findings ?? []);
  /** True while the table on show belongs to an earlier form of the circuit. */
  stale = $derived(
    this.answer !== undefined && (this.answer.circuit !== editor.circuit || this.answer.conditions !== this.wanted),
  );
  /** Current row, 0-based; 0 while there is no table. */
  row = $derived(this.table ? this.table.rowOf(this.#positionsFor(this.table)) : 0);

  #looks: ReadonlyMap<string, ConnectionLook> = $derived.by(() => connectionLooks(this.table, this.row));

  /** Steps of the reason on show, from the explanation of the current row. */
  steps: readonly ReasonStep[] = $derived(stepsOf(this.explanation, this.subject, this.row));

  lit: Lit = $derived(
    this.pointed
      ? { ...this.pointed, steps: [] }
      : (foundAt(this.findings, this.finding) ?? litSteps(this.steps, this.step)),
  );

  #analyst: Analyst | undefined;
  #patience: ReturnType<typeof setTimeout> | undefined;
  #job: Job<TableAnswer> | undefined;
  #explaining: Job<Explanation> | undefined;

  /** Where an input part stands now: index into its positions. */
  positionOf(partId: string): number {
    const input = this.inputs.find((each) => each.part === partId);
    return input ? clampTo(this.#levers[partId] ?? input.rest ?? 0, input.positions.length) : 0;
  }

  /** Gives a lever of a large panel rows of its own, or holds it again. */
  list(partId: string, on: boolean): void {
    const others = this.#listed.filter((part) => part !== partId);
    this.#listed = on ? [...others, partId] : others;
  }

  /** Whether one lever more can have rows of its own. */
  canList({ positions }: CircuitInput): boolean {
    return positions.length * this.listed.reduce((n, each) => n * each.positions.length, 1) <= MOST_LISTED;
  }

  #heldNow(): Record<string, number> {
    const free = this.inputs.filter(({ part }) => !this.#listed.includes(part));
    return Object.fromEntries(free.map(({ part }) => [part, this.positionOf(part)]));
  }

  setPosition(partId: string, index: number): void {
    const input = this.inputs.find((each) => each.part === partId);
    if (!input || index < 0 || index >= input.positions.length) return;
    this.leaveMoment();
    this.#levers = { ...this.#levers, [partId]: index };
    hint.dismiss();
  }

  /** Every lever back to where its springs put it; detented ones stay. */
  letGo(): void {
    this.leaveMoment();
    const levers = { ...this.#levers };
    for (const input of this.inputs) if (input.rest !== undefined) levers[input.part] = input.rest;
    this.#levers = levers;
  }

  /** A position for each input of the circuit. */
  goToPositions(positions: readonly number[]): void {
    this.inputs.forEach(({ part }, i) => this.setPosition(part, positions[i] ?? 0));
  }

  goToRow(row: number): void {
    const { table } = this;
    if (!table || row < 0 || row >= table.count) return;
    this.leaveMoment();
    const levers = { ...this.#levers };
    table.positionsOf(row).forEach((position, i) => {
      const input = table.data.inputs[i];
      if (input && this.answer?.conditions.held?.[input.part] === undefined) levers[input.part] = position;
    });
    this.#levers = levers;
  }

  get moment(): Moment | undefined {
    return this.#moment;
  }

  /** Levers, conditions and the sheet go to this moment of a plan. */
  showMoment(moment: Moment): void {
    if (!this.#moment) this.#before = this.#conditions;
    const levers = { ...this.#levers };
    for (const { part, positions } of this.inputs) {
      const at = moment.levers.get(part);
      if (at !== undefined && at < positions.length) levers[part] = at;
    }
    this.#levers = levers;
    this.#moment = moment;
    const { conditions } = moment;
    if (JSON.stringify(conditions) !== JSON.stringify(this.#conditions)) this.#conditions = conditions;
    hint.dismiss();
  }

  /** The levers stay where they are; what holds for every row is as before again. */
  leaveMoment(): void {
    if (!this.#moment) return;
    this.#moment = undefined;
    if (this.#before) this.#conditions = this.#before;
    this.#before = undefined;
  }

  /** Levers as part id → index, to be kept beside the circuit. */
  get levers(): Readonly<Record<string, number>> {
    return this.#levers;
  }

  set levers(levers: Readonly<Record<string, number>>) {
    this.#levers = levers;
  }

  /** What holds for every row; a load case that is no longer there counts as none. */
  get conditions(): Conditions {
    return this.#conditionsNow;
  }

  set conditions(conditions: Conditions) {
    this.leaveMoment();
    this.#conditions = conditions;
  }

  /** Undefined while the connection is in no line of the table yet. */
  connectionLook(connectionId: string): ConnectionLook | undefined {
    return this.#looks.get(connectionId);
  }

  setPumps(pumps: Conditions['pumps']): void {
    if (pumps === this.conditions.pumps) return;
    this.leaveMoment();
    this.conditions = { ...this.conditions, pumps };
  }

  /** `between` its stops, or at one. */
  setPlace(partId: string, place: 'between' | 'in' | 'out'): void {
    this.leaveMoment();
    this.conditions = withPlace(this.conditions, partId, place);
  }

  /** Undefined = the loads as drawn. */
  setLoadCase(id: string | undefined): void {
    if (id === this.conditions.loadCase) return;
    this.leaveMoment();
    this.conditions = withCase(this.conditions, id);
  }

  /** Show the reason of a verdict of the current row, in its panel and on the sheet. */
  why(subject: Subject): void {
    this.subject = subject;
    this.step = undefined;
    this.finding = undefined;
    view.open('why');
  }

  whyNot(): void {
    this.subject = undefined;
    this.step = undefined;
  }

  start(analyst: Analyst): void {
    this.#analyst = analyst;
  }

  /** Ask for the table anew; an answer to an older question is dropped. */
  compute(circuit: Circuit, conditions: Conditions): void {
    const analyst = this.#analyst;
    if (!analyst || this.#stillFits(circuit, conditions)) return;
    // What was played belongs to the circuit as it was.
    if (this.answer && !sameMachine(this.answer.circuit, circuit)) this.leaveMoment();
    this.#job?.cancel();
    this.stopped = false;
    this.progress = 0;
    this.slow = false;
    clearTimeout(this.#patience);
    this.#patience = setTimeout(() => (this.slow = true), PATIENCE_MS);
    const job = analyst.table(
      circuit,
      conditions,
      (share) => {
        if (this.#job === job) this.progress = share;
      },
      (early) => {
        if (this.#job !== job) return;
        this.#show({ ...early, circuit, conditions, early: true });
      },
    );
    this.#job = job;
    job.answer.then(
      (answer) => {
        if (this.#job !== job) return;
        this.#show({ ...answer, circuit, conditions, early: false });
        this.progress = undefined;
      },
      (error: unknown) => {
        if (this.#job !== job) return;
        this.progress = undefined;
        if (error instanceof Cancelled) this.stopped = true;
        else {
          this.failure = sayError(error);
          // A table of another circuit must not pass for one of this.
          this.answer = undefined;
        }
      },
    );
  }

  /** Rows known ahead go with their table, or once it knows them all. */
  #show(answer: SessionAnswer): void {
    const was = this.answer;
    const same = was?.conditions === answer.conditions && sameMachine(was.circuit, answer.circuit);
    if (!same || (!answer.early && answer.table.count <= BACKGROUND_ROWS)) lateRows.clear();
    this.answer = answer;
    this.failure = undefined;
  }

  /** Nothing changed that a table is about, such as a step plan: the answer goes on with the new circuit. */
  #stillFits(circuit: Circuit, conditions: Conditions): boolean {
    const { answer } = this;
    const settled = this.progress === undefined && !this.stopped && this.failure === undefined;
    if (!settled || answer?.conditions !== conditions || answer.circuit === circuit) return false;
    if (!sameMachine(answer.circuit, circuit)) return false;
    this.answer = { ...answer, circuit };
    return true;
  }

  again(): void {
    this.compute(editor.circuit, this.wanted);
  }

  /** The person stops a long computation; the last table stays on show. */
  stop(): void {
    this.#job?.cancel();
  }

  explain(units: UnitSystem): void {
    this.#explaining?.cancel();
    this.#explaining = undefined;
    const { answer } = this;
    if (!answer || !this.#analyst) return;
    const job = this.#analyst.explain(answer.circuit, answer.conditions, this.row, units);
    this.#explaining = job;
    job.answer.then(
      (explanation) => {
        if (this.#explaining !== job) return;
        this.explanation = explanation;
        this.explainFailure = undefined;
      },
      (error: unknown) => {
        if (this.#explaining === job && !(error instanceof Cancelled)) this.explainFailure = sayError(error);
      },
    );
  }

  #positionsFor(table: StateTable): number[] {
    return table.data.inputs.map((input) =>
      clampTo(this.#levers[input.part] ?? input.rest ?? 0, input.positions.length),
    );
  }
}

const clampTo = (index: number, length: number): number => Math.min(Math.max(index, 0), Math.max(length - 1, 0));

/** Rules, step plans and texts on the sheet aside. */
export const sameMachine = (a: Circuit, b: Circuit): boolean =>
  a.parts === b.parts && a.connections === b.connections && a.loadCases === b.loadCases;

export const session = new Session();
