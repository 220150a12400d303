/** The only door of the app to the analysis: the same requests, answered on another thread. */
import type { Conditions, Explanation, Finding, RowNumbers } from '../analysis/results.ts';
import type { BleedAnswer } from '../analysis/bleed-results.ts';
import type { Check } from '../analysis/check-results.ts';
import { Cancelled } from '../base/budget.ts';
import type { Problem, Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import { StateTable } from '../engine/table/state-table.ts';
import type { Question, Reply } from './messages.ts';

export type { Conditions, Explanation, Finding } from '../analysis/results.ts';
export type { ActuatorReason, PumpReason, ReasonStep, RowNumbers, TrappedLine } from '../analysis/results.ts';
export type { BleedAnswer, BleedCaution, BleedLine, BleedStep } from '../analysis/bleed-results.ts';
export type { Check, CheckedRule, RuleAnswer, RuleCases } from '../analysis/check-results.ts';
export { StateTable } from '../engine/table/state-table.ts';
export type { RowFilter } from '../engine/table/state-table.ts';
export type { TableData, TableInput, TableLine } from '../engine/table/table-data.ts';
export * from '../engine/table/words.ts';

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
  explain(circuit: Circuit, conditions: Conditions, row: number): Job<Explanation>;
  /** Pressures, flows and speeds of these rows, in this order; SI. */
  numbers(circuit: Circuit, conditions: Conditions, rows: readonly number[]): Job<readonly RowNumbers[]>;
  /** The circuit's rules against every combination. */
  check(circuit: Circuit, conditions: Conditions): Job<Result<Check>>;
  /** What keeps a rule's text from being read; empty = it can be checked. */
  readRule(circuit: Circuit, text: string): Job<readonly Problem[]>;
  /** How to let the pressure down once the pumps stop in this row (0-based). */
  bleed(circuit: Circuit, conditions: Conditions, row: number): Job<BleedAnswer>;
  close(): void;
}

/** Tables, explanations and plans have a thread each, so that a click on "why" never waits for a long table. */
export function createAnalyst(): Analyst {
  const tables = new Thread();
  const words = new Thread();
  const long = new Thread();
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
    explain: (circuit, conditions, row) =>
      words.ask(
        { ask: 'explain', circuit, conditions, row },
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
    close: () => {
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

interface Pending {
  readonly question: Question;
  readonly settle: (reply: Reply) => void;
  readonly refuse: (error: Error) => void;
}

type Open<Q> = Q extends unknown ? Omit<Q, 'id'> : never;

/** A worker that can be given up in the middle of a computation: it is ended and a fresh one takes over the rest. */
class Thread {
  #worker: Worker | undefined;
  #next = 1;
  readonly #pending = new Map<number, Pending>();

  ask<T>(open: Open<Question>, meanwhile: (reply: Reply) => void, read: (reply: Reply) => T | undefined): Job<T> {
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
      this.#pending.set(id, { question, settle, refuse: reject });
    });
    this.#send(question);
    return { answer, cancel: () => this.#giveUp(id) };
  }

  stop(): void {
    this.#worker?.terminate();
    this.#worker = undefined;
    for (const { refuse } of this.#pending.values()) refuse(new Cancelled());
    this.#pending.clear();
  }

  #send(question: Question): void {
    // Reactive proxies cannot be cloned across threads; circuits are plain JSON anyway.
    this.#running().postMessage(JSON.parse(JSON.stringify(question)));
  }

  #running(): Worker {
    if (this.#worker) return this.#worker;
    const worker = new Worker(new URL('./analysis.worker.ts', import.meta.url), { type: 'module' });
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
    for (const { question } of this.#pending.values()) this.#send(question);
  }
}
