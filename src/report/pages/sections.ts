import type { Circuit } from '../../circuit/model.ts';
import { columnsOf, headLines, LEVELS, sayRows, VALUED_LEGEND } from '../cells.ts';
import { NUMBERS_LEGEND } from '../figures.ts';
import { partListHead, partListRows } from '../part-list.ts';
import type { Report, ReportFinding, ReportRow } from '../rows.ts';
import { TRAPPED_CAUTION } from '../rows.ts';
import type { Block, TableColumn } from './blocks.ts';
import type { Section } from './pages.ts';

/** More rows than these fill hundreds of sheets. */
export const MOST_PRINTED_ROWS = 2000;

/** The state table, its head on every sheet. What is not printed of a long one is said in front of it. */
export function chartSection(report: Report): Section {
  const columns = columnsOf(report);
  const rows: ReportRow[] = [];
  for (const row of report.rows()) {
    if (rows.length === MOST_PRINTED_ROWS) break;
    rows.push(row);
  }
  const left = report.count - rows.length;
  const [, ...lines] = headLines(report);
  return {
    document: 'Operating chart',
    shows: report.under,
    columns: 'one',
    blocks: [
      { type: 'heading', text: `Operating chart: ${report.under}`, level: 1 },
      ...(left > 0
        ? [
            said(
              `Printed are the first ${rows.length.toLocaleString('en')} rows; ${left.toLocaleString('en')} more are not. The exported table has them all.`,
              true,
            ),
          ]
        : []),
      ...lines.map((line) => said(line)),
      { type: 'gap', height: 0.6 },
      {
        type: 'table',
        columns: columns.map(({ head, kind }, i): TableColumn => ({
          head,
          apart: i > 0 && kind !== columns[i - 1]?.kind,
          align: kind === 'number' || kind === 'figure' ? 'end' : 'start',
          weight: kind === 'position' ? 600 : 400,
        })),
        rows: rows.map((row) => columns.map(({ cell }) => cell(row).trim())),
      },
      { type: 'gap', height: 0.6 },
      ...(report.figures ? [said(NUMBERS_LEGEND)] : []),
      ...(rows.some(({ valued }) => valued) ? [said(VALUED_LEGEND)] : []),
      ...(rows.some(({ trapped }) => trapped.length > 0) ? [said(TRAPPED_CAUTION)] : []),
    ],
  };
}

const said = (text: string, framed = false): Block => ({ type: 'text', text, ...(framed && { framed: true }) });

export const partListBlock = (circuit: Circuit): Block => ({
  type: 'table',
  columns: partListHead(circuit).map((head): TableColumn => ({
    head,
    align: head === 'Item' || head === 'Count' ? 'end' : 'start',
    weight: head === 'Code' ? 600 : 400,
  })),
  rows: partListRows(circuit),
});

export const partListSection = (circuit: Circuit): Section => ({
  document: 'Part list',
  shows: '',
  columns: 'two',
  blocks: [
    { type: 'heading', text: 'Part list', level: 1 },
    said(
      'Data as entered; what nobody entered is left out. Points of a line are not listed, and all tank symbols are one tank.',
    ),
    { type: 'gap', height: 0.6 },
    partListBlock(circuit),
  ],
});

export function notesSection(circuit: Circuit): Section | undefined {
  const notes = circuit.notes?.trim() ?? '';
  if (notes === '') return undefined;
  return {
    document: 'Notes',
    shows: '',
    columns: 'two',
    blocks: [
      { type: 'heading', text: 'Notes', level: 1 },
      ...notes.split('\n').map((line): Block => (line.trim() === '' ? { type: 'gap', height: 0.8 } : said(line))),
    ],
  };
}

export const findingsSection = (findings: readonly ReportFinding[]): Section => ({
  document: 'Findings',
  shows: 'Of the table with the pumps running',
  columns: 'two',
  blocks: [
    { type: 'heading', text: 'Findings', level: 1 },
    ...(findings.length === 0
      ? [said('None of the design faults that are looked for shows in any row.')]
      : findings.flatMap(({ level, title, what, remedy, rows, rowCount }): Block[] => {
          const where = sayRows(rows, rowCount);
          return [
            { type: 'heading', text: `${LEVELS[level]}: ${title}`, level: 2 },
            said(`${what}${where === '' ? '' : ` (${where})`}`),
            said(remedy),
            { type: 'gap', height: 0.5 },
          ];
        })),
  ],
});
