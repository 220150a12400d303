import type { CheckedInput } from './check-results.ts';

/** What a table is folded by: one item of the table, or one of the groups of actuators that share valves. */
export interface FoldBy {
  readonly of: 'actuator' | 'pump' | 'line' | 'group';
  readonly index: number;
}

/** An actuator, pump or line whose outcome a fold says. */
export interface FoldItem {
  readonly of: 'actuator' | 'pump' | 'line';
  readonly index: number;
  readonly label: string;
}

/** "These levers in these positions, the others any": what comes out. */
export interface FoldRow {
  /** Per input its positions (bit p = position p); all of them = any. */
  readonly positions: readonly number[];
  /** A word per item. */
  readonly outcome: readonly string[];
  /** Combinations; rows of one outcome may share some. */
  readonly count: bigint;
}

/** A table folded by one thing, equal to the whole: every description was checked against its set. */
export interface FoldAnswer {
  readonly by: FoldBy;
  readonly items: readonly FoldItem[];
  readonly inputs: readonly CheckedInput[];
  readonly rows: readonly FoldRow[];
  /** Every combination that no row names. */
  readonly otherwise: {
    readonly outcome: readonly string[];
    readonly count: bigint;
    /** Position of each input in one of them, as many at rest as can be. */
    readonly example: readonly number[];
  };
  readonly combinations: bigint;
  /** Known to be the fewest rows of each outcome but the last. */
  readonly least: boolean;
  /** Actuators that share valves, by number: what `group` numbers. */
  readonly groups: readonly (readonly number[])[];
  /** False where there are too many combinations to list: then open paths alone have answered. */
  readonly listed: boolean;
  /** Labels of valves that pressures or actuators move, where open paths alone have answered: there open paths put them. */
  readonly followers?: readonly string[];
}

export type InfluenceOf = 'actuator' | 'pump' | 'line' | 'blocked' | 'trapped';

/** Which inputs can change one outcome at all. */
export interface InfluenceRow {
  readonly of: InfluenceOf;
  /** Of the actuator, pump or line. */
  readonly index: number;
  readonly label: string;
  readonly inputs: readonly number[];
}

/** A part of the circuit that nothing outside it bears on. */
export interface SubCircuit {
  readonly inputs: readonly number[];
  readonly actuators: readonly number[];
  readonly pumps: readonly number[];
  readonly lines: readonly number[];
  readonly combinations: bigint;
}

export interface Influence {
  readonly inputs: readonly (CheckedInput & { readonly part: string; readonly rest?: number })[];
  readonly rows: readonly InfluenceRow[];
  /** Per input its positions in groups between which nothing changes; groups of two and more change nothing. */
  readonly alike: readonly (readonly (readonly number[])[])[];
  /** Independent of each other; their combinations multiply to all of them. Lines that never change are in none. */
  readonly parts: readonly SubCircuit[];
  readonly combinations: bigint;
  readonly listed: boolean;
  /** Labels of valves that pressures or actuators move, where open paths alone have answered: there open paths put them. */
  readonly followers?: readonly string[];
}
