import type { UnitSystem } from '../base/units.ts';
/** The only door of the app to the analysis: the same requests, answered on another thread. */
import type { AskAnswer, FoldAnswer, FoldBy, Influence, Next } from '../analysis/results.ts';
import type { Conditions, Explanation, Finding, RowNumbers } from '../analysis/results.ts';
import type { BleedAnswer, PowerLossAnswer } from '../analysis/bleed-results.ts';
import type { MovesAnswer, VentAnswer } from '../analysis/moves-results.ts';
import type { Check } from '../analysis/check-results.ts';
import type { CoilLogic } from '../analysis/coil-logic-results.ts';
import type { PlanDraft, PlanReport } from '../analysis/plan-results.ts';
import type { Problem, Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import type { LateRows } from '../engine/table/late-rows.ts';
import { StateTable } from '../engine/table/state-table.ts';
import { Asking } from './asking.ts';
import type { Job } from './asking.ts';
import type { Reply } from './messages.ts';

export type { Job } from './asking.ts';
export type { Conditions, Explanation, Finding } from '../analysis/results.ts';
export type { ActuatorReason, PumpReason, ReasonStep, RowNumbers, TrappedLine } from '../analysis/results.ts';
export type { AskAnswer, FoldAnswer, FoldBy, FoldItem, FoldRow, Next } from '../analysis/results.ts';
export type { Influence, InfluenceRow, SubCircuit } from '../analysis/results.ts';
export type { BleedAnswer, BleedCaution, BleedLine, BleedStep, PowerLossAnswer } from '../analysis/bleed-results.ts';
export type { LeverMove, MoveNote, MovesAnswer, MoveStage, VentAnswer } from '../analysis/moves-results.ts';
export type { Check, CheckedRule, RuleAnswer, RuleCases } from '../analysis/check-results.ts';
export type * from '../analysis/coil-logic-results.ts';
export type * from '../analysis/plan-results.ts';
export { BACKGROUND_ROWS, MOST_ROWS } from '../analysis/limits.ts';
export { StateTable } from '../engine/table/state-table.ts';
export type { LateRows } from '../engine/table/late-rows.ts';
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
  /** What the pressures say of these rows, ahead of the table that they are still at; empty where valves follow from them. */
  late(circuit: Circuit, conditions: Conditions, rows: readonly number[]): Job<readonly LateRows[]>;
  /** The circuit's rules against every combination; `table`: the finished one, if it is there. */
  check(asked: Asked, progress: (share: number) => void): Job<Result<Check>>;
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

/** ms: questions of a moment are left to finish so long when nobody wants their answer any more. */
const PATIENCE = 300;
const ignore = (): void => {};

/**
 * Tables, their open paths, explanations, bleed plans, step plans and questions about whole tables have a thread each,
 * so that neither a click on "why" nor the first sight of an edited circuit waits for a long table.
 */
export function createAnalyst(): Analyst {
  const tables = new Asking();
  const quick = new Asking(PATIENCE);
  const words = new Asking(PATIENCE);
  const long = new Asking();
  const whole = new Asking();
  const moving = new Asking();
  const steps = new Asking();
  const share =
    (progress: (share: number) => void) =>
    (reply: Reply): void => {
      if (reply.say === 'progress') progress(reply.share);
    };
  return {
    table: (circuit, conditions, progress, early = () => {}) => {
      const first = quick.ask({ ask: 'open-paths', circuit, conditions }, ignore, (reply) =>
        reply.say === 'open-paths' ? reply : undefined,
      );
      const whole = tables.ask(
        { ask: 'table', circuit, conditions },
        (reply) => {
          if (reply.say === 'progress') progress(reply.share);
          else if (reply.say === 'table') early(tableOf(reply));
        },
        (reply) => (reply.say === 'table' ? tableOf(reply) : undefined),
      );
      // What keeps open paths from an answer, the whole table tells.
      first.answer.then(({ table }) => table && early(tableOf(table)), ignore);
      whole.answer.then(first.cancel, first.cancel);
      return {
        answer: whole.answer,
        cancel: () => {
          first.cancel();
          whole.cancel();
        },
      };
    },
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
    // By then the thread of open paths has had its say about this circuit.
    late: (circuit, conditions, rows) =>
      quick.ask({ ask: 'late', circuit, conditions, rows }, ignore, (reply) =>
        reply.say === 'late' ? reply.rows : undefined,
      ),
    check: ({ circuit, conditions, table }, progress) =>
      // Where there is no table yet, one is made, which must not keep questions waiting.
      (table ? whole : long).ask(
        { ask: 'check', circuit, conditions },
        share(progress),
        (reply) => (reply.say === 'check' ? reply.result : undefined),
        table && { table: table.data },
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
      quick.stop();
      long.stop();
      words.stop();
    },
  };
}

const tableOf = (reply: NonNullable<Extract<Reply, { say: 'open-paths' }>['table']>): TableAnswer => ({
  table: new StateTable(reply.data),
  findings: reply.findings,
  took: reply.took,
});
