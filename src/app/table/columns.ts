import { countBits, emptySet, orInto } from '../../base/bits.ts';
import type { BitSet } from '../../base/bits.ts';
import { coilNames } from '../../base/coil-names.ts';
import { ACTUATOR_VERDICTS, PUMP_VERDICTS, TRAP_REASONS } from '../../worker/client.ts';
import type { StateTable } from '../../worker/client.ts';

export type ColumnOf =
  'row' | 'input' | 'coil' | 'dependent' | 'actuator' | 'pump' | 'blocked' | 'trapped' | 'notes' | 'number';

export interface Column {
  /** Unique in the table, also the key of its filter. */
  readonly id: string;
  readonly of: ColumnOf;
  /** Of the input, actuator or pump; 0 for the rest. */
  readonly index: number;
  readonly title: string;
  /** Coil columns: position that the coil leads to. */
  readonly position?: number;
  /** Track of the CSS grid. */
  readonly track: string;
  /** Least width in px. */
  readonly width: number;
  /** Its figures stand at the right edge. */
  readonly figures?: FigureHead;
}

/** What the head says of the figures below. */
export interface FigureHead {
  readonly unit: string;
  /** All of them rest on assumed values. */
  readonly assumed: boolean;
}

/** Heads of the figures of each actuator and pump, by index. */
export interface FigureHeads {
  readonly actuators: readonly FigureHead[];
  readonly pumps: readonly FigureHead[];
}

export interface ColumnGroup {
  readonly title: string;
  readonly columns: readonly Column[];
}

const CHARACTER = 7.2;
/** Labels in heads are mostly capitals. */
const HEAD_CHARACTER = 9.2;
const PADDING = 16;
const GLYPH = 25;
/** Five figures and the space before them. */
const FIGURES = 38;

const fits = (texts: readonly string[], extra: number, head: string): number =>
  Math.ceil(Math.max(...texts.map((text) => text.length * CHARACTER + extra), head.length * HEAD_CHARACTER) + PADDING);

/** Room for the asterisk of verdicts that rest on values. */
const mark = (valued: BitSet | undefined): number => (valued ? CHARACTER : 0);

/** Room for the figures beside the words, and for their unit beside the label. */
function withFigures(width: number, label: string, figures: FigureHead | undefined): number {
  if (!figures) return width;
  const head = label.length * HEAD_CHARACTER + (sayUnit(figures).length + 1) * CHARACTER + PADDING;
  return Math.ceil(Math.max(width + FIGURES, head));
}

/** The column in a sentence. */
export function sayColumn(column: Column): string {
  if (column.of === 'blocked') return 'blocked lines';
  if (column.of === 'trapped') return 'trapped pressure';
  return column.of === 'notes' ? 'danger and notes' : column.title;
}

function fixed(column: Omit<Column, 'track'>): Column {
  return { ...column, track: `${column.width}px` };
}

function wide(id: 'blocked' | 'trapped' | 'notes', title: string, width: number, share: number): Column {
  return { id, of: id, index: 0, title, width, track: `minmax(${width}px, ${share}fr)` };
}

export const sayUnit = ({ unit, assumed }: FigureHead): string => (assumed ? `${unit}, assumed` : unit);

/** `heads`: figures are shown beside the verdicts. */
export function columnGroups(
  table: StateTable,
  heads?: FigureHeads,
  numbers: readonly ColumnGroup[] = [],
): ColumnGroup[] {
  const { data } = table;
  const digits = String(data.count).length;
  const row = fixed({ id: 'row', of: 'row', index: 0, title: 'row', width: Math.max(76, digits * 8 + 34) });
  const coils = coilNames(data.inputs.flatMap(({ label, coils: own }) => own.map(({ name }) => ({ label, name }))));
  let next = 0;
  const levers = data.inputs.flatMap((input, index): Column[] => [
    fixed({
      id: `input:${index}`,
      of: 'input',
      index,
      title: input.label,
      // Its filter stands beside the shortest label.
      width: Math.max(52, fits(input.positions, 0, input.label)),
    }),
    ...input.coils.map(({ position }, i) => {
      const title = coils[next++] ?? '';
      const width = Math.ceil(Math.max(40, title.length * CHARACTER) + PADDING);
      return fixed({ id: `coil:${index}:${i}`, of: 'coil', index, title, position, width });
    }),
  ]);
  const [firstLever] = levers;
  // The heading of the group has its room too.
  if (firstLever && levers.length === 1) levers[0] = fixed({ ...firstLever, width: Math.max(firstLever.width, 70) });
  const followers = data.dependents.map((valve, index) =>
    fixed({
      id: `dependent:${index}`,
      of: 'dependent',
      index,
      title: valve.label,
      width: Math.max(fits(valve.positions, 2 * CHARACTER, valve.label), 70),
    }),
  );
  const actuators = data.actuators.map((actuator, index) => {
    const words = table.actuatorCounts(index).map((each) => each.verdict);
    const figures = heads?.actuators[index];
    return fixed({
      id: `actuator:${index}`,
      of: 'actuator',
      index,
      title: actuator.label,
      width: withFigures(
        fits(words.length > 0 ? words : ['held'], GLYPH + mark(data.valuedActuators[index]), actuator.label),
        actuator.label,
        figures,
      ),
      ...(figures && { figures }),
    });
  });
  const pumps = data.pumps.map((pump, index) => {
    const words = table.pumpCounts(index).map((each) => each.verdict);
    const figures = heads?.pumps[index];
    return fixed({
      id: `pump:${index}`,
      of: 'pump',
      index,
      title: pump.label,
      width: withFigures(
        fits(words.length > 0 ? words : ['working'], GLYPH + mark(data.valuedPumps[index]), pump.label),
        pump.label,
        figures,
      ),
      ...(figures && { figures }),
    });
  });
  const groups: ColumnGroup[] = [
    { title: '', columns: [row] },
    { title: 'Levers', columns: levers },
    { title: data.dependents.length === 1 ? 'Follows' : 'Follow', columns: followers },
    { title: 'Actuators', columns: actuators },
    { title: 'Pumps', columns: pumps },
    ...numbers,
    { title: 'Blocked lines', columns: [wide('blocked', 'dead end, or cut off', 150, 1.3)] },
    { title: 'Trapped pressure', columns: [wide('trapped', 'by reason', 160, 1.5)] },
    { title: 'Danger, notes', columns: [wide('notes', 'gravest first', 130, 1.1)] },
  ];
  return groups.filter((group) => group.columns.length > 0);
}

export interface Option {
  readonly value: number;
  readonly text: string;
  readonly rows: number;
}

/** Rows with input `index` in `position`. */
function positionPlane(table: StateTable, index: number, position: number): BitSet {
  const { data } = table;
  const plane = emptySet(data.count);
  const stride = data.inputs.slice(index + 1).reduce((n, input) => n * input.positions.length, 1);
  const cycle = stride * (data.inputs[index]?.positions.length ?? 1);
  for (let start = position * stride; start < data.count; start += cycle) {
    for (let row = start; row < start + stride; row++)
      plane[row >>> 5] = (plane[row >>> 5] as number) | (1 << (row & 31));
  }
  return plane;
}

function joined(table: StateTable, planes: readonly (BitSet | undefined)[]): BitSet {
  const any = emptySet(table.count);
  for (const plane of planes) if (plane) orInto(any, plane);
  return any;
}

export const LEVELS = ['danger', 'note', 'nothing'] as const;

/** Danger and notes that follow from the table's own planes. */
export function levelPlanes(table: StateTable): [BitSet, BitSet, BitSet] {
  const dead = PUMP_VERDICTS.indexOf('dead-headed');
  const danger = joined(
    table,
    table.data.pumpPlanes.map((planes) => planes[dead]),
  );
  const note = joined(table, table.data.actuatorNotes.flat());
  const nothing = emptySet(table.count);
  for (let w = 0; w < nothing.length; w++) {
    note[w] = (note[w] as number) & ~(danger[w] as number);
    nothing[w] = ~((danger[w] as number) | (note[w] as number));
  }
  const used = table.count & 31;
  if (used !== 0) {
    const last = nothing.length - 1;
    nothing[last] = (nothing[last] as number) & ((1 << used) - 1);
  }
  return [danger, note, nothing];
}

/** Rows that option `value` of the column's filter keeps. */
export function planeOf(table: StateTable, column: Pick<Column, 'of' | 'index'>, value: number): BitSet {
  const { data } = table;
  switch (column.of) {
    case 'input':
    case 'coil':
      return positionPlane(table, column.index, value);
    case 'dependent':
      return joined(table, [data.dependentPlanes[column.index]?.[value]]);
    case 'actuator':
      return joined(table, [data.actuatorPlanes[column.index]?.[value]]);
    case 'pump':
      return joined(table, [data.pumpPlanes[column.index]?.[value]]);
    case 'blocked':
      return joined(table, data.blockedPlanes[value] ?? []);
    case 'trapped':
      return joined(
        table,
        data.trapPlanes.map((planes) => planes[value]),
      );
    case 'notes':
      return levelPlanes(table)[value] ?? emptySet(table.count);
    case 'row':
    case 'number':
      return emptySet(table.count);
  }
}

/** What a column can be filtered by, with the number of rows of each in the whole table. */
export function optionsOf(table: StateTable, column: Column): Option[] {
  const { data } = table;
  const counted = (value: number, text: string): Option[] => {
    const rows = countBits(planeOf(table, column, value));
    return rows > 0 ? [{ value, text, rows }] : [];
  };
  switch (column.of) {
    case 'input':
    case 'coil': {
      const positions = data.inputs[column.index]?.positions ?? [];
      return positions.map((text, value) => ({ value, text, rows: data.count / positions.length }));
    }
    case 'dependent':
      return (data.dependents[column.index]?.positions ?? []).flatMap((text, value) => counted(value, text));
    case 'actuator':
      return ACTUATOR_VERDICTS.flatMap((word, value) => counted(value, word));
    case 'pump':
      return PUMP_VERDICTS.flatMap((word, value) => counted(value, word));
    case 'blocked':
      return data.lines.flatMap((line, value) => counted(value, line.name));
    case 'trapped':
      return TRAP_REASONS.flatMap((word, value) => counted(value, word));
    case 'notes':
      return LEVELS.flatMap((word, value) => counted(value, word));
    case 'row':
    case 'number':
      return [];
  }
}
