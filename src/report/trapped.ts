import type { Conditions, TrappedPanel, TrappedSummary } from '../analysis/results.ts';
import type { LoadCase } from '../circuit/model.ts';
import { measureOf } from './bleed-words.ts';
import { nameOfCase, sayConditions } from './conditions.ts';
import { REPORT_VERSION } from './json.ts';
import { TRAPPED_CAUTION } from './rows.ts';
import { plain } from './width.ts';

export interface TrappedSource {
  /** Of this program. */
  readonly version: string;
  readonly circuit: string;
  readonly conditions: Conditions;
  readonly loadCases?: readonly LoadCase[];
  readonly summary: TrappedSummary;
  /** Rows of the table. */
  readonly count: number;
}

/** Line by line, every reason once with its rows; every line ends with a line feed. */
export function* writeTrappedText(source: TrappedSource): Generator<string> {
  for (const line of trappedLines(source)) yield `${plain(line).trimEnd()}\n`;
}

function* trappedLines({ circuit, conditions, loadCases, summary, count }: TrappedSource): Generator<string> {
  yield circuit;
  yield `Trapped pressure over ${count.toLocaleString('en')} ${count === 1 ? 'row' : 'rows'}, ${sayConditions(conditions, loadCases)}`;
  if (summary.lines.length === 0) {
    yield '';
    yield 'No line is trapped in any row.';
  }
  for (const line of summary.lines) {
    yield '';
    yield `${line.name} (${measureOf(line)})`;
    for (const { kind, rowCount, examples } of line.reasons) {
      yield `  ${kind}: ${rowCount.toLocaleString('en')} of ${count.toLocaleString('en')} ${count === 1 ? 'row' : 'rows'}`;
      for (const { text, rows } of sameText(examples)) {
        yield `    ${rows.length === 1 ? 'row' : 'rows'} ${rows.join(', ')}${text === '' ? '' : `: ${text}`}`;
      }
      if (rowCount > examples.length) yield `    and ${(rowCount - examples.length).toLocaleString('en')} more`;
    }
  }
  yield '';
  yield TRAPPED_CAUTION;
}

/** Rows in which the same is said, 1-based, put together. */
function sameText(
  examples: readonly { readonly row: number; readonly text: string }[],
): { text: string; rows: number[] }[] {
  const found = new Map<string, number[]>();
  for (const { row, text } of examples) found.set(text, [...(found.get(text) ?? []), row + 1]);
  return [...found].map(([text, rows]) => ({ text, rows }));
}

/** The same as one JSON object; rows 1-based. */
export function writeTrappedJson({ version, circuit, conditions, loadCases, summary, count }: TrappedSource): string {
  const loadCase = nameOfCase(conditions.loadCase, loadCases);
  const out = {
    spooltable: { version, report: REPORT_VERSION },
    circuit,
    conditions,
    ...(loadCase === undefined ? {} : { loadCase }),
    rows: count,
    lines: summary.lines.map(({ name, measure, reasons }) => ({
      line: name,
      measure,
      reasons: reasons.map(({ kind, rowCount, examples }) => ({
        kind,
        rowCount,
        examples: examples.map(({ row, text }) => ({ row: row + 1, text })),
      })),
    })),
    caution: TRAPPED_CAUTION,
  };
  return `${JSON.stringify(out, null, 2)}\n`;
}

export interface TrappedPanelSource extends Omit<TrappedSource, 'summary' | 'count'> {
  readonly panel: TrappedPanel;
}

/** The same of a panel too large to list: exact counts, and one combination for each reason. */
export function* writeTrappedPanelText({
  circuit,
  conditions,
  loadCases,
  panel,
}: TrappedPanelSource): Generator<string> {
  const line = (text: string): string => `${plain(text).trimEnd()}\n`;
  const total = panel.total.toLocaleString('en');
  yield line(circuit);
  yield line(`Trapped pressure over ${total} combinations, ${sayConditions(conditions, loadCases)}; open paths alone`);
  if (panel.lines.length === 0) yield line('\nNo line is trapped in any combination.');
  for (const entry of panel.lines) {
    yield '\n';
    yield line(`${entry.name} (${measureOf(entry)})`);
    for (const { kind, count, levers, text } of entry.reasons) {
      yield line(`  ${kind}: ${count.toLocaleString('en')} of ${total}`);
      const state = levers.map(({ label, position }) => `${label} ${position}`).join(', ');
      yield line(`    ${state === '' ? 'always' : `with ${state}`}: ${text}`);
    }
  }
  yield '\n';
  yield line(TRAPPED_CAUTION);
}

/** The same as one JSON object; counts as strings, since they can be larger than a number holds. */
export function writeTrappedPanelJson({ version, circuit, conditions, panel }: TrappedPanelSource): string {
  const out = {
    spooltable: { version, report: REPORT_VERSION },
    circuit,
    conditions,
    combinations: String(panel.total),
    openPathsAlone: true,
    lines: panel.lines.map(({ name, measure, reasons }) => ({
      line: name,
      measure,
      reasons: reasons.map(({ kind, count, levers, text }) => ({
        kind,
        combinations: String(count),
        example: { state: Object.fromEntries(levers.map(({ label, position }) => [label, position])), text },
      })),
    })),
    caution: TRAPPED_CAUTION,
  };
  return `${JSON.stringify(out, null, 2)}\n`;
}
