/** The only door of the app to the analysis: the same requests, answered on another thread. */
import type { Conditions, Explanation, Finding } from '../analysis/results.ts';
import type { Circuit } from '../circuit/model.ts';
import type { StateTable } from '../engine/table/state-table.ts';

export type { Conditions, Explanation, Finding } from '../analysis/results.ts';
export type { ActuatorReason, PumpReason, ReasonStep, TrappedLine } from '../analysis/results.ts';
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
  table(circuit: Circuit, conditions: Conditions, progress: (share: number) => void): Job<TableAnswer>;
  explain(circuit: Circuit, conditions: Conditions, row: number): Job<Explanation>;
  close(): void;
}
