import type { Explanation, ReasonStep } from '../analysis/results.ts';
import { REPORT_VERSION } from './json.ts';
import { labelOfPart, makeReport, TRAPPED_CAUTION } from './rows.ts';
import type { ReportRow, ReportSource } from './rows.ts';
import { plain } from './width.ts';

/** One row with its reasons. */
export interface ExplainSource extends ReportSource {
  readonly explanation: Explanation;
  /** Label → position of the inputs that nobody gave and that were taken as they stand at rest. */
  readonly assumed: Readonly<Record<string, string>>;
}

const pairs = (record: Readonly<Record<string, string>>): string =>
  Object.entries(record)
    .map(([key, value]) => `${key} ${value}`)
    .join(', ');

const names = (items: readonly string[]): string => (items.length > 0 ? items.join(', ') : 'none');

/** The row in sentences, a line at a time; every line ends with a line feed. */
export function* writeExplanationText(source: ExplainSource): Generator<string> {
  for (const line of explanationLines(source)) yield `${plain(line).trimEnd()}\n`;
}

function* explanationLines(source: ExplainSource): Generator<string> {
  const report = makeReport(source);
  const { explanation } = source;
  const row = report.rowAt(explanation.row);
  yield report.circuit;
  yield `Row ${row.row} of ${report.count}, pumps ${source.conditions.pumps}: ${stateOf(row)}`;
  if (Object.keys(source.assumed).length > 0) yield `Not given, taken at rest: ${pairs(source.assumed)}`;
  if (report.coils.length > 0) yield `Coils on: ${names(report.coils.filter((coil) => row.coils[coil] === 'on'))}`;
  for (const { label, verdict, notes, rests, steps } of explanation.actuators) {
    yield '';
    yield `${label}: ${[verdict, ...notes].join('; ')}`;
    yield* restLines(rests);
    yield* stepLines(steps);
  }
  for (const { label, verdict, rests, steps } of explanation.pumps) {
    yield '';
    yield `${label}: ${verdict}`;
    yield* restLines(rests);
    yield* stepLines(steps);
  }
  yield '';
  yield `Blocked under pressure: ${names(row.blocked.underPressure)}`;
  yield `Cut off: ${names(row.blocked.cutOff)}`;
  for (const { name, reasons, steps } of explanation.trapped) {
    yield '';
    yield `Trapped pressure in ${name} (${reasons.map((reason) => reason.kind).join(', ')})`;
    for (const { text } of reasons) yield `  ${text}`;
    yield* stepLines(steps);
  }
  if (explanation.trapped.length > 0) yield TRAPPED_CAUTION;
  if (explanation.notes.length > 0) yield '';
  for (const note of explanation.notes) yield `Note: ${note}`;
}

const stateOf = (row: ReportRow): string => pairs(row.state) || 'nothing to command';

function* restLines(
  rests: { readonly why: string; readonly candidates: readonly string[] } | undefined,
): Generator<string> {
  if (!rests) return;
  yield `  ${rests.why}`;
  yield `  Possible: ${names(rests.candidates)}`;
}

function* stepLines(steps: readonly ReasonStep[]): Generator<string> {
  for (const [i, step] of steps.entries()) yield `  ${i + 1}. ${step.text}`;
}

/** The same as one JSON object; lines and parts by their shown names, `row` 1-based. */
export function writeExplanationJson(source: ExplainSource): string {
  const report = makeReport(source);
  const { explanation, table } = source;
  const lineName = (index: number): string => table.data.lines[index]?.name ?? String(index);
  const steps = (list: readonly ReasonStep[]): unknown =>
    list.map((step) => ({
      text: step.text,
      lines: step.lines.map(lineName),
      parts: step.parts.map((id) => labelOfPart(source.circuit, id)),
    }));
  const out = {
    spooltable: { version: source.version, report: REPORT_VERSION },
    circuit: report.circuit,
    conditions: source.conditions,
    assumed: source.assumed,
    ...report.rowAt(explanation.row),
    actuators: Object.fromEntries(
      explanation.actuators.map((a) => [
        a.label,
        { verdict: a.verdict, notes: a.notes, ...(a.rests ? { rests: a.rests } : {}), steps: steps(a.steps) },
      ]),
    ),
    pumps: Object.fromEntries(
      explanation.pumps.map((p) => [
        p.label,
        { verdict: p.verdict, ...(p.rests ? { rests: p.rests } : {}), steps: steps(p.steps) },
      ]),
    ),
    trapped: explanation.trapped.map((t) => ({ line: t.name, reasons: t.reasons, steps: steps(t.steps) })),
    notes: explanation.notes,
  };
  return `${JSON.stringify(out, null, 2)}\n`;
}
