import type { UnitSystem } from '../base/units.ts';
/** The only door of the app to the analysis: the same requests, answered on another thread. */
import type { AskAnswer, FoldAnswer, FoldBy, Influence, Next } from '../analysis/results.ts';
import type { Conditions, Explanation, Finding, RowNumbers } from '../analysis/results.ts';
import type { BleedAnswer, PowerLossAnswer } from '../analysis/bleed-results.ts';
import type { MovesAnswer, VentAnswer } from '../analysis/moves-results.ts';
import type { Check } from '../analysis/check-results.ts';
import type { CoilLogic } from '../analysis/coil-logic-results.ts';
import type { PlanDraft, PlanReport } from '../analysis/plan-results.ts';
import { Cancelled } from '../base/budget.ts';
import type { Problem, Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import { StateTable } from '../engine/table/state-table.ts';
import type { TableData } from '../engine/table/table-data.ts';
import type { Holding, Question, Reply } from './messages.ts';
import { startThread } from './thread.ts';

export type { Conditions, Explanation, Finding } from '../analysis/results.ts';
export type { ActuatorReason, PumpReason, ReasonStep, RowNumbers, TrappedLine } from '../analysis/results.ts';
export type { AskAnswer, FoldAnswer, FoldBy, FoldItem, FoldRow, Next } from '../analysis/results.ts';
export type { Influence, InfluenceRow, SubCircuit } from '../analysis/results.ts';
export type { BleedAnswer, BleedCaution, BleedLine, BleedStep, PowerLossAnswer } from '../analysis/bleed-results.ts';
export type { LeverMove, MoveNote, MovesAnswer, MoveStage, VentAnswer } from '../analysis/moves-results.ts';
export type { Check, CheckedRule, RuleAnswer, RuleCases } from '../analysis/check-results.ts';
export type * from '../analysis/coil-logic-results.ts';
export type * from '../analysis/plan-results.ts';
export { MOST_ROWS } from '../analysis/limits.ts';
export { StateTable } from '../engine/table/state-table.ts';
export type { RowFilter } from '../engine/table/state-table.ts';
export type { TableData, TableInput, TableLine } from '../engine/table/table-data.ts';
export * from '../engine/table/words.ts';
export { parseMotions, sayMotion } from '../engine/sequence/notation.ts';

export interface TableAnswer {
  readonly table: StateTable;
  readonly findings: readonly Finding[];
  /** Milliseconds the computation took. */
  readonly took: number;
}

/** A running request: await `answer`, or `cancel()`, upon which `answer` rejects with `Cancelled`. */
export interface Job<T> {
  readonly answer: Promise<T>;
  readonly cancel: () => void;
}

export interface Analyst {
  /**
   * `early` gets what open paths say of a long table, well before the answer that the pressures complete.
   */
  table(
    circuit: Circuit,
    conditions: Conditions,
    progress: (share: number) => void,
    early?: (answer: TableAnswer) => void,
  ): Job<TableAnswer>;
  /** Quantities in the sentences are in these units; metric when absent. */
  explain(circuit: Circuit, conditions: Conditions, row: number, units?: UnitSystem): Job<Explanation>;
  /** Pressures, flows and speeds of these rows, in this order; SI. */
  numbers(circuit: Circuit, conditions: Conditions, rows: readonly number[]): Job<readonly RowNumbers[]>;
  /** The circuit's rules against every combination. */
  check(circuit: Circuit, conditions: Conditions): Job<Result<Check>>;
  /** What keeps a rule's text from being read; empty = it can be checked. */
  readRule(circuit: Circuit, text: string): Job<readonly Problem[]>;
  /** How to let the pressure down once the pumps stop in this row (0-based). */
  bleed(circuit: Circuit, conditions: Conditions, row: number): Job<BleedAnswer>;
  /** What a loss of power does in this row (0-based). */
  powerLoss(circuit: Circuit, conditions: Conditions, row: number): Job<PowerLossAnswer>;
  /** Every move of one lever from here, an entry of `positions` for each input. */
  moves(circuit: Circuit, conditions: Conditions, positions: readonly number[], units: UnitSystem): Job<MovesAnswer>;
  /** The fewest moves that open a line (its index in the table) to tank. */
  vent(asked: VentQuestion): Job<Result<VentAnswer>>;
  /** A step plan played event by event, by its id; `conditions.loadCase` goes before its own. */
  plan(circuit: Circuit, conditions: Conditions, plan: string, progress: (share: number) => void): Job<PlanReport>;
  /** What a control has to do for a step plan. */
  coilLogic(circuit: Circuit, plan: string): Job<Result<CoilLogic>>;
  /** Steps for a motion sequence in trade notation. */
  draftPlan(
    circuit: Circuit,
    conditions: Conditions,
    text: string,
    progress: (share: number) => void,
  ): Job<Result<PlanDraft>>;
  /** The table folded; `table` is the one of these conditions, undefined where there are too many combinations to list. */
  fold(asked: Asked, by: FoldBy, progress: (share: number) => void): Job<Result<FoldAnswer>>;
  /** Which levers can change which outcome, and what is independent. */
  influence(asked: Asked, progress: (share: number) => void): Job<Result<Influence>>;
  /** The rows in which a condition of the rules' language holds. */
  rows(asked: Asked, text: string, progress: (share: number) => void): Job<Result<AskAnswer>>;
  /** How a rule or question may go on at its end. */
  next(circuit: Circuit, text: string, as: 'rule' | 'condition'): Job<readonly Next[]>;
  close(): void;
}

export interface VentQuestion {
  readonly circuit: Circuit;
  readonly conditions: Conditions;
  readonly line: number;
  readonly positions: readonly number[];
  readonly units: UnitSystem;
}

/** What a question about the whole table is about. */
export interface Asked {
  readonly circuit: Circuit;
  readonly conditions: Conditions;
  readonly table: StateTable | undefined;
}

/** Tables, explanations, bleed plans, step plans and questions about whole tables have a thread each, so that a click on "why" never waits for a long table. */
export function createAnalyst(): Analyst {
  const tables = new Thread();
  const words = new Thread();
  const long = new Thread();
  const whole = new Thread();
  const moving = new Thread();
  const steps = new Thread();
  const share =
    (progress: (share: number) => void) =>
    (reply: Reply): void => {
      if (reply.say === 'progress') progress(reply.share);
    };
  return {
    table: (circuit, conditions, progress, early = () => {}) =>
      tables.ask(
        { ask: 'table', circuit, conditions },
        (reply) => {
          if (reply.say === 'progress') progress(reply.share);
          else if (reply.say === 'table') early(tableOf(reply));
        },
        (reply) => (reply.say === 'table' ? tableOf(reply) : undefined),
      ),
    explain: (circuit, conditions, row, units = 'metric') =>
      words.ask(
        { ask: 'explain', circuit, conditions, row, units },
        () => {},
        (reply) => (reply.say === 'explanation' ? reply.explanation : undefined),
      ),
    numbers: (circuit, conditions, rows) =>
      words.ask(
        { ask: 'numbers', circuit, conditions, rows },
        () => {},
        (reply) => (reply.say === 'numbers' ? reply.numbers : undefined),
      ),
    check: (circuit, conditions) =>
      long.ask(
        { ask: 'check', circuit, conditions },
        () => {},
        (reply) => (reply.say === 'check' ? reply.result : undefined),
      ),
    readRule: (circuit, text) =>
      words.ask(
        { ask: 'read-rule', circuit, conditions: { pumps: 'running' }, text },
        () => {},
        (reply) => (reply.say === 'rule-read' ? reply.problems : undefined),
      ),
    bleed: (circuit, conditions, row) =>
      long.ask(
        { ask: 'bleed', circuit, conditions, row },
        () => {},
        (reply) => (reply.say === 'bleed' ? reply.plan : undefined),
      ),
    powerLoss: (circuit, conditions, row) =>
      moving.ask(
        { ask: 'power-loss', circuit, conditions, row },
        () => {},
        (reply) => (reply.say === 'power-loss' ? reply.loss : undefined),
      ),
    moves: (circuit, conditions, positions, units) =>
      moving.ask(
        { ask: 'moves', circuit, conditions, positions, units },
        () => {},
        (reply) => (reply.say === 'moves' ? reply.moves : undefined),
      ),
    vent: (asked) =>
      moving.ask(
        { ask: 'vent', ...asked },
        () => {},
        (reply) => (reply.say === 'vent' ? reply.result : undefined),
      ),
    plan: (circuit, conditions, plan, progress) =>
      steps.ask({ ask: 'plan', circuit, conditions, plan }, share(progress), (reply) =>
        reply.say === 'plan' ? reply.report : undefined,
      ),
    coilLogic: (circuit, plan) =>
      steps.ask(
        { ask: 'coil-logic', circuit, conditions: { pumps: 'running' }, plan },
        () => {},
        (reply) => (reply.say === 'coil-logic' ? reply.result : undefined),
      ),
    draftPlan: (circuit, conditions, text, progress) =>
      steps.ask({ ask: 'draft-plan', circuit, conditions, text }, share(progress), (reply) =>
        reply.say === 'draft-plan' ? reply.result : undefined,
      ),
    fold: ({ circuit, conditions, table }, by, progress) =>
      whole.ask(
        { ask: 'fold', circuit, conditions, by },
        share(progress),
        (reply) => (reply.say === 'fold' ? reply.result : undefined),
        { table: table?.data },
      ),
    influence: ({ circuit, conditions, table }, progress) =>
      whole.ask(
        { ask: 'influence', circuit, conditions },
        share(progress),
        (reply) => (reply.say === 'influence' ? reply.result : undefined),
        { table: table?.data },
      ),
    rows: ({ circuit, conditions, table }, text, progress) =>
      whole.ask(
        { ask: 'rows', circuit, conditions, text },
        share(progress),
        (reply) => (reply.say === 'rows' ? reply.result : undefined),
        { table: table?.data },
      ),
    next: (circuit, text, as) =>
      words.ask(
        { ask: 'continue', circuit, conditions: { pumps: 'running' }, text, as },
        () => {},
        (reply) => (reply.say === 'continue' ? reply.next : undefined),
      ),
    close: () => {
      steps.stop();
      whole.stop();
      moving.stop();
      tables.stop();
      long.stop();
      words.stop();
    },
  };
}

const tableOf = (reply: Extract<Reply, { say: 'table' }>): TableAnswer => ({
  table: new StateTable(reply.data),
  findings: reply.findings,
  took: reply.took,
});

/** A table that goes with a question; it crosses over once for all questions about it. */
interface With {
  readonly table: TableData | undefined;
}

interface Pending {
  readonly question: Question;
  readonly held: With | undefined;
  readonly settle: (reply: Reply) => void;
  readonly refuse: (error: Error) => void;
}

type Open<Q> = Q extends unknown ? Omit<Q, 'id'> : never;

/** A worker that can be given up in the middle of a computation: it is ended and a fresh one takes over the rest. */
class Thread {
  #worker: Worker | undefined;
  #next = 1;
  readonly #pending = new Map<number, Pending>();
  #holds: TableData | undefined;

  ask<T>(
    open: Open<Question>,
    meanwhile: (reply: Reply) => void,
    read: (reply: Reply) => T | undefined,
    held?: With,
  ): Job<T> {
    const id = this.#next++;
    const question = { ...open, id } as Question;
    const answer = new Promise<T>((resolve, reject) => {
      const settle = (reply: Reply): void => {
        if (reply.say === 'progress' || (reply.say === 'table' && reply.early)) {
          meanwhile(reply);
          return;
        }
        this.#pending.delete(id);
        const value = read(reply);
        if (value !== undefined) resolve(value);
        else
          reject(
            new Error(reply.say === 'failed' ? reply.message : 'The analysis gave an answer to another question.'),
          );
      };
      this.#pending.set(id, { question, held, settle, refuse: reject });
    });
    this.#send(question, held);
    return { answer, cancel: () => this.#giveUp(id) };
  }

  stop(): void {
    this.#worker?.terminate();
    this.#worker = undefined;
    for (const { refuse } of this.#pending.values()) refuse(new Cancelled());
    this.#pending.clear();
  }

  #send(question: Question, held: With | undefined): void {
    const worker = this.#running();
    if (held && held.table !== this.#holds) {
      this.#holds = held.table;
      worker.postMessage({ ask: 'hold', data: held.table } satisfies Holding);
    }
    // Reactive proxies cannot be cloned across threads; circuits are plain JSON anyway.
    worker.postMessage(JSON.parse(JSON.stringify(question)));
  }

  #running(): Worker {
    if (this.#worker) return this.#worker;
    this.#holds = undefined;
    const worker = startThread();
    worker.onmessage = ({ data }: MessageEvent<Reply>) => this.#pending.get(data.id)?.settle(data);
    worker.onerror = (event) => {
      for (const { refuse } of this.#pending.values())
        refuse(new Error(event.message || 'The analysis stopped unexpectedly.'));
      this.#pending.clear();
      this.#worker = undefined;
    };
    this.#worker = worker;
    return worker;
  }

  #giveUp(id: number): void {
    const given = this.#pending.get(id);
    if (!given) return;
    this.#pending.delete(id);
    given.refuse(new Cancelled());
    this.#worker?.terminate();
    this.#worker = undefined;
    for (const { question, held } of this.#pending.values()) this.#send(question, held);
  }
}
