import { columnsOf, headLines, LEVELS, sayRows, VALUED_LEGEND } from './cells.ts';
import { NUMBERS_LEGEND } from './figures.ts';
import { TRAPPED_CAUTION } from './rows.ts';
import type { Report } from './rows.ts';
import { plain } from './width.ts';

/** Shown as written: pipes would part cells, the rest would start markup or HTML. */
export const escapeMarkdown = (text: string): string =>
  plain(text)
    .replace(/[\\|`*_[\]<>~]/g, '\\$&')
    .replace(/&/g, '&amp;')
    .replace(/^([#+\-=])/, '\\$1')
    .replace(/^(\d+)([.)])/, '$1\\$2');

const tableRow = (cells: readonly string[]): string => `| ${cells.join(' | ')} |\n`;
const escapeCell = (text: string): string => escapeMarkdown(text).trim();

/** Heading, pipe table and findings (GitHub-flavoured tables). */
export function* writeMarkdown(report: Report): Generator<string> {
  const columns = columnsOf(report);
  yield `# ${escapeMarkdown(report.circuit)}\n\n`;
  for (const line of headLines(report)) yield `${escapeMarkdown(line)}  \n`;
  yield '\n';
  yield tableRow(columns.map(({ head }) => escapeCell(head)));
  yield `|${columns.map(({ kind }) => (kind === 'number' || kind === 'figure' ? ' ---: ' : ' --- ')).join('|')}|\n`;
  let trapped = false;
  let valued = false;
  for (const row of report.rows()) {
    trapped ||= row.trapped.length > 0;
    valued ||= row.fromValues.length > 0;
    yield tableRow(columns.map(({ cell, kind }) => (kind === 'figure' ? cell(row) : escapeCell(cell(row)))));
  }
  if (report.figures) yield `\n${escapeMarkdown(NUMBERS_LEGEND)}\n`;
  if (valued) yield `\n${escapeMarkdown(VALUED_LEGEND)}\n`;
  if (trapped) yield `\n> ${TRAPPED_CAUTION}\n`;
  if (report.findings.length === 0) return;
  yield '\n## Findings\n\n';
  for (const { level, title, what, remedy, rows, rowCount } of report.findings) {
    const where = sayRows(rows, rowCount);
    yield `- **${LEVELS[level]}: ${escapeMarkdown(title)}**${where === '' ? '' : ` (${where})`}. ${escapeMarkdown(what)} ${escapeMarkdown(remedy)}\n`;
  }
}
