import type { UnitSystem } from '../base/units.ts';
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
import type { TableData } from '../engine/table/table-data.ts';

export type Question =
  | { readonly id: number; readonly ask: 'table'; readonly circuit: Circuit; readonly conditions: Conditions }
  /** What open paths say of a table that the pressures take long for. */
  | { readonly id: number; readonly ask: 'open-paths'; readonly circuit: Circuit; readonly conditions: Conditions }
  | {
      readonly id: number;
      readonly ask: 'numbers';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly rows: readonly number[];
    }
  /** What the pressures say of rows whose table they are still at. */
  | {
      readonly id: number;
      readonly ask: 'late';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly rows: readonly number[];
    }
  | { readonly id: number; readonly ask: 'check'; readonly circuit: Circuit; readonly conditions: Conditions }
  | {
      readonly id: number;
      readonly ask: 'read-rule';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly text: string;
    }
  | {
      readonly id: number;
      readonly ask: 'bleed';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly row: number;
    }
  | {
      readonly id: number;
      readonly ask: 'power-loss';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly row: number;
    }
  | {
      readonly id: number;
      readonly ask: 'moves';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly positions: readonly number[];
      readonly units: UnitSystem;
    }
  | {
      readonly id: number;
      readonly ask: 'vent';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly line: number;
      readonly positions: readonly number[];
      readonly units: UnitSystem;
    }
  /** The three of them answer from the table that was held out, if it is of the same question. */
  | {
      readonly id: number;
      readonly ask: 'fold';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly by: FoldBy;
    }
  | { readonly id: number; readonly ask: 'influence'; readonly circuit: Circuit; readonly conditions: Conditions }
  | {
      readonly id: number;
      readonly ask: 'rows';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly text: string;
    }
  | {
      readonly id: number;
      readonly ask: 'continue';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly text: string;
      readonly as: 'rule' | 'condition';
    }
  | {
      readonly id: number;
      readonly ask: 'plan' | 'coil-logic';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly plan: string;
    }
  | {
      readonly id: number;
      readonly ask: 'draft-plan';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly text: string;
    }
  | {
      readonly id: number;
      readonly ask: 'explain';
      readonly circuit: Circuit;
      readonly conditions: Conditions;
      readonly row: number;
      readonly units: UnitSystem;
    };

/** A table for the questions that follow, until another one comes; undefined = there is none. */
export interface Holding {
  readonly ask: 'hold';
  readonly data: TableData | undefined;
}

export type Reply =
  | { readonly id: number; readonly say: 'progress'; readonly share: number }
  /** `early`: there is a second reply to come, which knows more. */
  | {
      readonly id: number;
      readonly say: 'table';
      readonly early: boolean;
      readonly data: TableData;
      readonly findings: readonly Finding[];
      readonly took: number;
    }
  /** `table` is absent where the whole one comes as soon. */
  | {
      readonly id: number;
      readonly say: 'open-paths';
      readonly table:
        { readonly data: TableData; readonly findings: readonly Finding[]; readonly took: number } | undefined;
    }
  | { readonly id: number; readonly say: 'numbers'; readonly numbers: readonly RowNumbers[] }
  | { readonly id: number; readonly say: 'late'; readonly rows: readonly LateRows[] }
  | { readonly id: number; readonly say: 'check'; readonly result: Result<Check> }
  | { readonly id: number; readonly say: 'fold'; readonly result: Result<FoldAnswer> }
  | { readonly id: number; readonly say: 'influence'; readonly result: Result<Influence> }
  | { readonly id: number; readonly say: 'rows'; readonly result: Result<AskAnswer> }
  | { readonly id: number; readonly say: 'continue'; readonly next: readonly Next[] }
  | { readonly id: number; readonly say: 'rule-read'; readonly problems: readonly Problem[] }
  | { readonly id: number; readonly say: 'bleed'; readonly plan: BleedAnswer }
  | { readonly id: number; readonly say: 'power-loss'; readonly loss: PowerLossAnswer }
  | { readonly id: number; readonly say: 'moves'; readonly moves: MovesAnswer }
  | { readonly id: number; readonly say: 'vent'; readonly result: Result<VentAnswer> }
  | { readonly id: number; readonly say: 'plan'; readonly report: PlanReport }
  | { readonly id: number; readonly say: 'coil-logic'; readonly result: Result<CoilLogic> }
  | { readonly id: number; readonly say: 'draft-plan'; readonly result: Result<PlanDraft> }
  | { readonly id: number; readonly say: 'explanation'; readonly explanation: Explanation }
  | { readonly id: number; readonly say: 'failed'; readonly message: string };
