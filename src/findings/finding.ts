import type { Network } from '../network/network.ts';
import type { StateTable } from '../engine/table/state-table.ts';

/** A design fault that the trade knows, with the states that show it. */
export interface Finding {
  readonly rule: string;
  readonly level: 'danger' | 'caution' | 'note';
  readonly title: string;
  readonly what: string;
  readonly remedy: string;
  /** Part ids to mark on the sheet. */
  readonly parts: readonly string[];
  readonly lines: readonly number[];
  /** 0-based rows that show it, a few at most, and how many there are in all. */
  readonly rows: readonly number[];
  readonly rowCount: number;
  /** Where rows have no numbers: position of each input in a combination that shows it. */
  readonly example?: readonly number[];
}

/** What a finding may look at. The table is the one with the pumps running. */
export interface Evidence {
  readonly net: Network;
  readonly table: StateTable;
}

export type Rule = (evidence: Evidence) => readonly Finding[];

export const SHOWN_ROWS = 5;
