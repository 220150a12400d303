import { countBits, emptySet, isEmpty, members, orInto } from '../base/bits.ts';
import type { BitSet } from '../base/bits.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import { ACTUATOR_VERDICTS, LINE_CLASSES, PUMP_VERDICTS } from '../engine/table/words.ts';
import type { ActuatorVerdict, LineClass, PumpVerdict } from '../engine/table/words.ts';
import { SHOWN_ROWS } from './finding.ts';

export const actuatorRows = (table: StateTable, actuator: number, ...verdicts: ActuatorVerdict[]): BitSet =>
  merge(
    table,
    verdicts.map((verdict) => table.data.actuatorPlanes[actuator]?.[ACTUATOR_VERDICTS.indexOf(verdict)]),
  );

export const pumpRows = (table: StateTable, pump: number, ...verdicts: PumpVerdict[]): BitSet =>
  merge(
    table,
    verdicts.map((verdict) => table.data.pumpPlanes[pump]?.[PUMP_VERDICTS.indexOf(verdict)]),
  );

export const lineRows = (table: StateTable, line: number, ...classes: LineClass[]): BitSet =>
  merge(
    table,
    classes.map((name) => table.data.linePlanes[line]?.[LINE_CLASSES.indexOf(name)]),
  );

/** Whether any row has one of these: nothing is merged for it. */
export const actuatorEver = (table: StateTable, actuator: number, ...verdicts: ActuatorVerdict[]): boolean =>
  verdicts.some((verdict) => some(table.data.actuatorPlanes[actuator]?.[ACTUATOR_VERDICTS.indexOf(verdict)]));

export const lineEver = (table: StateTable, line: number, ...classes: LineClass[]): boolean =>
  classes.some((name) => some(table.data.linePlanes[line]?.[LINE_CLASSES.indexOf(name)]));

const some = (plane: BitSet | undefined): boolean => plane !== undefined && !isEmpty(plane);

function merge(table: StateTable, planes: readonly (BitSet | undefined)[]): BitSet {
  const all = emptySet(table.count);
  for (const plane of planes) if (plane) orInto(all, plane);
  return all;
}

/** Up to `wanted` different indexes below `length`, rising, by the golden ratio: no lever is in step with them. */
export function spreadOver(length: number, wanted: number): number[] {
  if (wanted >= length) return Array.from({ length }, (_, i) => i);
  const out = new Set<number>();
  for (let i = 1; out.size < wanted && i <= 4 * wanted; i++) out.add(Math.floor(((i * GOLDEN) % 1) * length));
  return [...out].sort((a, b) => a - b);
}

const GOLDEN = (Math.sqrt(5) - 1) / 2;

/** A few rows as witnesses, and how many there are. */
export function witnesses(rows: BitSet): { rows: number[]; rowCount: number } {
  const first: number[] = [];
  for (const row of members(rows)) {
    if (first.length === SHOWN_ROWS) break;
    first.push(row);
  }
  return { rows: first, rowCount: countBits(rows) };
}

/** `row 4`, `rows 1, 2, 5`, `rows 1, 2, 3, 4, 5 and 13 more`. */
export function sayRows({ rows, rowCount }: { rows: readonly number[]; rowCount: number }): string {
  const list = rows.map((row) => row + 1).join(', ');
  const more = rowCount > rows.length ? ` and ${rowCount - rows.length} more` : '';
  return `${rowCount === 1 ? 'row' : 'rows'} ${list}${more}`;
}

/** The motions that count as driven or moved, both ways. */
export const OUTWARD: readonly ActuatorVerdict[] = [
  'extends',
  'turns A→B',
  'moved out by load',
  'moved out by spring',
  'driven A→B by load',
];
export const INWARD: readonly ActuatorVerdict[] = [
  'retracts',
  'turns B→A',
  'moved in by load',
  'moved in by spring',
  'driven B→A by load',
];
