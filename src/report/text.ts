import { columnsOf, headLines, LEVELS, sayRows, VALUED_LEGEND } from './cells.ts';
import type { Column } from './cells.ts';
import { NUMBERS_LEGEND } from './figures.ts';
import { TRAPPED_CAUTION } from './rows.ts';
import type { Report } from './rows.ts';
import { cutTo, padEnd, padStart, plain, widthOf } from './width.ts';

export interface TextOptions {
  /** Columns of the terminal; absent = as wide as it needs to be. Lines are never wrapped. */
  readonly width?: number;
}

const GAP = '  ';
/** A list is cut to no less than this. */
const LEAST_LIST = 8;
/** Figures are not measured, since each row takes a calculation: `-0.0123` has room. */
const FIGURE = 7;

/** The table in aligned columns, a line at a time; every line ends with a line feed. */
export function* writeText(report: Report, options: TextOptions = {}): Generator<string> {
  const columns = columnsOf(report);
  const widths = fit(columns, measure(report, columns), options.width);
  const room = roomOf(widths, report, options.width);
  yield `${plain(report.circuit)}\n`;
  for (const line of headLines(report)) yield `${plain(line)}\n`;
  yield '\n';
  const draw = (cells: readonly string[]): string =>
    `${columns
      .map(({ kind }, i) => {
        const width = widths[i] ?? 0;
        const cell = plain(cells[i] ?? '');
        return kind === 'number' || kind === 'figure'
          ? padStart(cell, width)
          : padEnd(cutTo(cell, room[i] ?? width), width);
      })
      .join(GAP)
      .trimEnd()}\n`;
  yield draw(columns.map((column) => column.head));
  yield draw(widths.map((width) => '─'.repeat(width)));
  let trapped = false;
  let valued = false;
  for (const row of report.rows()) {
    trapped ||= row.trapped.length > 0;
    valued ||= row.fromValues.length > 0;
    yield draw(columns.map((column) => column.cell(row)));
  }
  if (report.figures) yield `\n${NUMBERS_LEGEND}\n`;
  if (valued) yield `\n${VALUED_LEGEND}\n`;
  if (trapped) yield `\n${TRAPPED_CAUTION}\n`;
  yield* findings(report);
}

/** What each column needs so that nothing is cut. */
function measure(report: Report, columns: readonly Column[]): number[] {
  const widths = columns.map(({ head, kind }) => Math.max(widthOf(plain(head)), kind === 'figure' ? FIGURE : 0));
  for (const row of report.rows(true)) {
    columns.forEach((column, i) => {
      if (column.kind === 'figure') return;
      widths[i] = Math.max(widths[i] ?? 0, widthOf(plain(column.cell(row))));
    });
  }
  return widths;
}

/** Where rows have numbers, the notes say more than was measured: the last column may go on to the edge. */
function roomOf(widths: readonly number[], { figures }: Report, limit = Infinity): readonly number[] {
  if (!figures) return widths;
  const last = widths.length - 1;
  const before = widths.slice(0, last).reduce((sum, width) => sum + width + GAP.length, 0);
  return [...widths.slice(0, last), Math.max(widths[last] ?? 0, limit - before)];
}

/** Takes what is too much from the widest lists; row numbers, positions, coils and verdicts keep every letter. */
function fit(columns: readonly Column[], wanted: readonly number[], limit: number | undefined): number[] {
  const widths = [...wanted];
  if (limit === undefined) return widths;
  const total = (): number => widths.reduce((sum, w) => sum + w, 0) + GAP.length * (widths.length - 1);
  for (let over = total() - limit; over > 0; over--) {
    let widest = -1;
    columns.forEach(({ kind }, i) => {
      const width = widths[i] ?? 0;
      if (kind === 'list' && width > LEAST_LIST && width > (widths[widest] ?? 0)) widest = i;
    });
    if (widest < 0) break;
    widths[widest] = (widths[widest] ?? 0) - 1;
  }
  return widths;
}

function* findings(report: Report): Generator<string> {
  if (report.findings.length === 0) return;
  yield '\nFindings\n';
  for (const finding of report.findings) {
    const where = sayRows(finding.rows, finding.rowCount);
    yield `${LEVELS[finding.level]}: ${plain(finding.title)}${where === '' ? '' : ` (${where})`}\n`;
    yield `  ${plain(finding.what)}\n`;
    yield `  ${plain(finding.remedy)}\n`;
  }
}
