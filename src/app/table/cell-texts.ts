import { dependentNotes } from '../../report/rows.ts';
import { TRAP_REASONS } from '../../worker/client.ts';
import type { ActuatorNote, Finding, StateTable, TrapReason } from '../../worker/client.ts';

/** Words of one row, shortest form. */
export interface NamedGroup {
  readonly word: string;
  readonly names: readonly string[];
  /** Their lines, by index in the table. */
  readonly lines?: readonly number[];
}

/** Lines that no steady flow passes, by kind. */
export function blockedGroups(table: StateTable, row: number): NamedGroup[] {
  const pressed: string[] = [];
  const cutOff: string[] = [];
  table.data.lines.forEach((line, i) => {
    const kind = table.blocked(i, row);
    if (kind === 'under pressure') pressed.push(line.name);
    else if (kind === 'cut off') cutOff.push(line.name);
  });
  return [
    ...(pressed.length > 0 ? [{ word: 'under pressure', names: pressed }] : []),
    ...(cutOff.length > 0 ? [{ word: 'cut off', names: cutOff }] : []),
  ];
}

export interface TrappedGroup extends NamedGroup {
  readonly reason: TrapReason;
  /** All reasons of each name, in the same order. */
  readonly all: readonly (readonly TrapReason[])[];
}

/** Each line under its gravest reason; heat alone comes last. */
export function trappedGroups(table: StateTable, row: number): TrappedGroup[] {
  const groups = new Map<TrapReason, { line: number; name: string; reasons: TrapReason[] }[]>();
  table.data.lines.forEach((line, i) => {
    const reasons = table.trapped(i, row);
    const [first] = reasons;
    if (first === undefined) return;
    const group = groups.get(first) ?? [];
    group.push({ line: i, name: line.name, reasons });
    groups.set(first, group);
  });
  return TRAP_REASONS.flatMap((reason) => {
    const group = groups.get(reason);
    if (!group) return [];
    const names = group.map((each) => each.name);
    return [
      { reason, word: reason, names, lines: group.map((each) => each.line), all: group.map((each) => each.reasons) },
    ];
  });
}

export const sayGroups = (groups: readonly NamedGroup[]): string =>
  groups.map(({ word, names }) => `${word}: ${names.join(', ')}`).join('; ');

/** Where a valve stands that follows: `a`, `a or 0` where it depends on what came before, `a?` where pressures are to say. */
export function dependentText(table: StateTable, index: number, row: number): string {
  if (table.hunts(row)) return 'hunts';
  const { positions = [] } = table.data.dependents[index] ?? {};
  const at = table.dependent(index, row);
  const others = table.dependentOthers(index, row).filter((p) => p !== at);
  const said = [at, ...others].map((p) => positions[p] ?? '?').join(' or ');
  return table.dependentRests(index, row) ? `${said}?` : said;
}

export interface RowNote {
  readonly level: 'danger' | 'caution' | 'note';
  readonly text: string;
}

const LINEAR: Readonly<Record<ActuatorNote, string>> = {
  'outward by suction only': 'held outward by suction only',
  'inward by suction only': 'held inward by suction only',
  'void forms': 'void forms',
  'free outward': 'free outward',
  'free inward': 'free inward',
  'creeps outward on back pressure': 'creeps outward on back pressure',
  'creeps inward on back pressure': 'creeps inward on back pressure',
  'creeps through its own leakage': 'creeps through its own leakage',
};
const ROTARY: Readonly<Record<ActuatorNote, string>> = {
  'outward by suction only': 'held A→B by suction only',
  'inward by suction only': 'held B→A by suction only',
  'void forms': 'void forms',
  'free outward': 'free A→B',
  'free inward': 'free B→A',
  'creeps outward on back pressure': 'creeps A→B on back pressure',
  'creeps inward on back pressure': 'creeps B→A on back pressure',
  'creeps through its own leakage': 'creeps through its own leakage',
};

/** A motor knows no in and out. */
export const sayNote = (note: ActuatorNote, motion: 'linear' | 'rotary'): string =>
  (motion === 'rotary' ? ROTARY : LINEAR)[note];

/** A finding speaks in a row only if it lists every row that shows it; a cut list would leave rows out in silence. */
const complete = (finding: Finding): boolean => finding.rows.length === finding.rowCount;

export function rowNotes(table: StateTable, findings: readonly Finding[], row: number): RowNote[] {
  const notes: RowNote[] = [];
  const { data } = table;
  data.pumps.forEach((pump, i) => {
    if (table.pump(i, row) === 'dead-headed') notes.push({ level: 'danger', text: `${pump.label} dead-headed` });
  });
  // A rule that holds in every row says nothing about this one.
  for (const finding of findings) {
    if (finding.rowCount >= data.count || !complete(finding) || !finding.rows.includes(row)) continue;
    notes.push({ level: finding.level, text: finding.title });
  }
  data.actuators.forEach((actuator, i) => {
    for (const note of table.actuatorNotes(i, row)) {
      // Which way it is free matters where it is held the other way.
      if (note.startsWith('free') && table.actuator(i, row) !== 'held one way') continue;
      notes.push({ level: 'note', text: `${actuator.label} ${sayNote(note, actuator.motion)}` });
    }
  });
  for (const text of dependentNotes(table, row)) notes.push({ level: table.hunts(row) ? 'caution' : 'note', text });
  if (row === table.restRow()) notes.push({ level: 'note', text: 'rest: every lever let go' });
  const order = { danger: 0, caution: 1, note: 2 };
  return notes.sort((a, b) => order[a.level] - order[b.level]);
}
