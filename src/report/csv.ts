import { figureColumns } from './cells.ts';
import type { Report, ReportRow } from './rows.ts';

const END = '\r\n';

/**
 * One field of RFC 4180. A text that a spreadsheet would take for a formula gets an apostrophe in front,
 * because labels come from files of others.
 */
export function field(text: string): string {
  const safe = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

interface CsvColumn {
  readonly head: string;
  readonly cell: (row: ReportRow) => string;
  /** Written as it is: a negative number is no formula. */
  readonly figure?: true;
}

/** Lists inside a field are parted by `; `. */
const list = (items: readonly string[]): string => items.join('; ');

function columnsOf(report: Report): CsvColumn[] {
  return [
    { head: 'row', cell: (row) => String(row.row) },
    ...report.inputs.map(({ label }) => ({ head: label, cell: (row: ReportRow) => row.state[label] ?? '' })),
    ...report.coils.map((coil) => ({ head: `coil ${coil}`, cell: (row: ReportRow) => row.coils[coil] ?? '' })),
    ...report.dependents.map(({ label }) => ({
      head: label,
      cell: (row: ReportRow) => row.dependents?.[label] ?? '',
    })),
    ...report.actuators.map((label) => ({ head: label, cell: (row: ReportRow) => row.actuators[label] ?? '' })),
    ...report.pumps.map((label) => ({ head: label, cell: (row: ReportRow) => row.pumps[label] ?? '' })),
    ...report.lines.map((line) => ({ head: `line ${line}`, cell: (row: ReportRow) => row.lines[line] ?? '' })),
    { head: 'blocked under pressure', cell: (row) => list(row.blocked.underPressure) },
    { head: 'cut off', cell: (row) => list(row.blocked.cutOff) },
    { head: 'trapped', cell: (row) => list(row.trapped.map((t) => `${t.line} (${t.reasons.join(', ')})`)) },
    {
      head: 'rests on',
      cell: (row) =>
        list(
          Object.entries(row.rests)
            .filter(([, { reasons }]) => reasons.length > 0)
            .map(([label, { reasons }]) => `${label} (${reasons.join(', ')})`),
        ),
    },
    { head: 'from values', cell: (row) => (row.valued ? 'yes' : 'no') },
    { head: 'notes', cell: (row) => list(row.notes) },
    ...figureColumns(report).map(({ what, label, unit, cell }) => ({
      head: `${what} ${label} ${unit}`,
      cell,
      figure: true as const,
    })),
    // Last, so that columns of older tables stay where they were.
    { head: 'verdicts from values', cell: (row) => list(row.fromValues) },
  ];
}

/** The rows of the table with a head, one record per row (RFC 4180, UTF-8, CRLF). Findings are not in it. */
export function* writeCsv(report: Report): Generator<string> {
  const columns = columnsOf(report);
  yield columns.map((column) => field(column.head)).join(',') + END;
  for (const row of report.rows())
    yield columns.map(({ cell, figure }) => (figure ? cell(row) : field(cell(row)))).join(',') + END;
}
