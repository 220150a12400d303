import { sayFigure } from './figures.ts';
import { motorNotes } from './notes.ts';
import type { Report, ReportRow } from './rows.ts';

/** One column of the table as people read it. */
export interface Column {
  readonly head: string;
  /** What a column holds; only lists and remarks may be cut short where space is scarce. */
  readonly kind: 'number' | 'figure' | 'position' | 'coils' | 'verdict' | 'list';
  readonly cell: (row: ReportRow) => string;
}

export const NONE = '–';

/** Behind a verdict that rests on values. */
const VALUED_MARK = '*';
export const VALUED_LEGEND = `${VALUED_MARK} Rests on entered or assumed values: pressures decide here. Other decided verdicts hold for any values.`;

const OPEN = ['rests on pressure', 'undetermined'];

const list = (items: readonly string[]): string => (items.length > 0 ? items.join(', ') : NONE);

/** The columns of the text and Markdown tables. Coils show which are on. */
export function columnsOf(report: Report): Column[] {
  const said = motorNotes(report.motors);
  return [
    { head: 'Row', kind: 'number', cell: (row) => String(row.row) },
    ...report.inputs.map(({ label }): Column => ({
      head: label,
      kind: 'position',
      cell: (row) => row.state[label] ?? '',
    })),
    ...(report.coils.length === 0 ? [] : [coilsOn(report.coils)]),
    ...report.dependents.map(({ label }): Column => ({
      head: label,
      kind: 'position',
      cell: (row) => row.dependents?.[label] ?? '',
    })),
    ...report.actuators.map((label): Column => ({
      head: label,
      kind: 'verdict',
      cell: (row) => verdictOf(row, label),
    })),
    ...report.pumps.map((label): Column => ({
      head: label,
      kind: 'verdict',
      cell: (row) => marked(row, label, row.pumps[label] ?? ''),
    })),
    ...figureColumns(report).map(({ label, unit, cell }): Column => ({
      head: `${label} ${unit}`,
      kind: 'figure',
      cell,
    })),
    { head: 'Blocked under pressure', kind: 'list', cell: (row) => list(row.blocked.underPressure) },
    { head: 'Cut off', kind: 'list', cell: (row) => list(row.blocked.cutOff) },
    {
      head: 'Trapped',
      kind: 'list',
      cell: (row) => list(row.trapped.map(({ line, reasons }) => `${line} (${reasons.join(', ')})`)),
    },
    {
      head: 'Notes',
      kind: 'list',
      cell: (row) => (row.notes.length > 0 ? row.notes.map((note) => said.get(note) ?? note).join('; ') : NONE),
    },
  ];
}

export interface FigureColumn {
  readonly what: 'speed' | 'pressure' | 'flow';
  readonly label: string;
  readonly unit: string;
  /** Blank where there is no figure. */
  readonly cell: (row: ReportRow) => string;
}

/** The numbers of a table: speed of each actuator, pressure of each pump, flow over each relief valve. */
export function figureColumns({ figures, actuators, motors, pumps }: Report): FigureColumn[] {
  if (!figures) return [];
  const { units, reliefs } = figures;
  const solved = ({ numbers }: ReportRow) => (numbers?.status === 'solved' ? numbers : undefined);
  return [
    ...actuators.map((label): FigureColumn => ({
      what: 'speed',
      label,
      unit: motors.includes(label) ? units.rotarySpeed : units.speed,
      cell: (row) => sayFigure(solved(row)?.actuators[label]?.speed),
    })),
    ...pumps.map((label): FigureColumn => ({
      what: 'pressure',
      label,
      unit: units.pressure,
      cell: (row) => sayFigure(solved(row)?.pumps[label]?.pressure),
    })),
    ...reliefs.map((label): FigureColumn => ({
      what: 'flow',
      label,
      unit: units.flow,
      cell: (row) => sayFigure(solved(row)?.reliefs[label]),
    })),
  ];
}

const coilsOn = (coils: readonly string[]): Column => ({
  head: 'Coils on',
  kind: 'coils',
  cell: (row) => list(coils.filter((coil) => row.coils[coil] === 'on')),
});

/** `rests on pressure (load, rivals)`: the reasons belong to a verdict that stays open. */
function verdictOf(row: ReportRow, label: string): string {
  const verdict = row.actuators[label] ?? '';
  const reasons = row.rests[label]?.reasons ?? [];
  return OPEN.includes(verdict) && reasons.length > 0
    ? `${verdict} (${reasons.join(', ')})`
    : marked(row, label, verdict);
}

/** What is left open says so itself. */
const marked = (row: ReportRow, label: string, verdict: string): string =>
  row.fromValues.includes(label) && !OPEN.includes(verdict) ? `${verdict}${VALUED_MARK}` : verdict;

/** Lines above the table: what it is, how many rows, what is not in it, where rest is. */
export function headLines(report: Report): string[] {
  const { count, notPermitted, commandCombinations, inputs } = report;
  const rest = inputs.map(({ label, rest: at }) => `${label} ${at ?? 'stays where it was left'}`).join(', ');
  return [
    `State table, ${report.under}`,
    `${count} ${count === 1 ? 'row' : 'rows'}.` +
      (notPermitted > 0
        ? ` ${notPermitted} of ${commandCombinations} lever and coil combinations ${notPermitted === 1 ? 'is' : 'are'} not permitted (opposed coils on at once); no row is given to what is not permitted.`
        : ''),
    inputs.length > 0
      ? `At rest: ${rest}; see row ${report.restRow}.`
      : 'No part of this circuit is commanded by hand or coil.',
  ];
}

export const LEVELS = { danger: 'Danger', caution: 'Caution', note: 'Note' } as const;

/** Where a finding shows: `rows 3, 4 and 12 more`. */
export function sayRows(rows: readonly number[], rowCount: number): string {
  if (rowCount === 0 || rows.length === 0) return '';
  const more = rowCount - rows.length;
  return `${rowCount === 1 ? 'row' : 'rows'} ${rows.join(', ')}${more > 0 ? ` and ${more} more` : ''}`;
}
