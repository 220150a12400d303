import { foldFrom } from '../analysis/fold.ts';
import { influenceFrom } from '../analysis/influence.ts';
import { outcomesOf } from '../analysis/outcomes.ts';
import type { Outcomes } from '../analysis/outcomes.ts';
import type { Conditions, FoldAnswer, FoldBy, Influence } from '../analysis/results.ts';
import type { Budget } from '../base/budget.ts';
import type { Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import type { TableData } from '../engine/table/table-data.ts';

/** The table that questions are about, and its outcomes as sets, so that one fold after another starts from them. */
export class Held {
  #table: TableData | undefined;
  #outcomes: { readonly key: string; readonly found: Result<Outcomes> } | undefined;

  get table(): TableData | undefined {
    return this.#table;
  }

  take(data: TableData | undefined): void {
    this.#table = data;
    this.#outcomes = undefined;
  }

  fold(circuit: Circuit, conditions: Conditions, by: FoldBy, budget: Budget): Result<FoldAnswer> {
    const found = this.#of(circuit, conditions, budget);
    return found.ok ? foldFrom(found.value, by, budget) : found;
  }

  influence(circuit: Circuit, conditions: Conditions, budget: Budget): Result<Influence> {
    const found = this.#of(circuit, conditions, budget);
    return found.ok ? influenceFrom(found.value, budget) : found;
  }

  #of(circuit: Circuit, conditions: Conditions, budget: Budget): Result<Outcomes> {
    const key = JSON.stringify([circuit, conditions]);
    if (this.#outcomes?.key !== key)
      this.#outcomes = { key, found: outcomesOf(circuit, conditions, budget, this.#table) };
    return this.#outcomes.found;
  }
}
