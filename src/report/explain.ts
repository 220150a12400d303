import type { Explanation, ReasonStep } from '../analysis/results.ts';
import { REPORT_VERSION } from './json.ts';
import { sayFigure } from './figures.ts';
import type { FigureUnits, RowFigures } from './figures.ts';
import { motorNotes, sayNote } from './notes.ts';
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
  yield `Row ${row.row} of ${report.count}, ${report.under}: ${stateOf(row)}`;
  if (Object.keys(source.assumed).length > 0) yield `Not given, taken at rest: ${pairs(source.assumed)}`;
  if (report.coils.length > 0) yield `Coils on: ${names(report.coils.filter((coil) => row.coils[coil] === 'on'))}`;
  for (const { label, name, hunts, others, steps } of explanation.dependents) {
    yield '';
    yield `${label}: ${hunts ? 'hunts' : [name, ...others.map((other) => `or ${other}`)].join(' ')}`;
    yield* stepLines(steps);
  }
  for (const { label, verdict, notes, rests, steps } of explanation.actuators) {
    yield '';
    const said = notes.map((note) => sayNote(note, report.motors.includes(label)));
    yield `${label}: ${[verdict, ...said].join('; ')}`;
    yield* restLines(rests);
    yield* stepLines(steps);
  }
  for (const { label, verdict, rests, steps } of explanation.pumps) {
    yield '';
    yield `${label}: ${verdict}`;
    yield* restLines(rests);
    yield* stepLines(steps);
  }
  if (row.numbers && report.figures) yield* figureLines(row.numbers, report.figures.units, row);
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
  const said = motorNotes(report.motors);
  for (const note of explanation.notes) yield `Note: ${said.get(note) ?? note}`;
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

export const FIGURES_REST = 'These figures rest on entered values and, where nothing was entered, on assumed ones.';

function* figureLines(figures: RowFigures, units: FigureUnits, row: ReportRow): Generator<string> {
  yield '';
  if (figures.status !== 'solved') {
    yield `No steady pressures: ${figures.words}`;
    return;
  }
  const by = (label: string): boolean =>
    row.trapped.some(({ line, reasons }) => line === label && reasons.includes('load'));
  yield 'Pressures';
  for (const [line, pressure] of Object.entries(figures.lines)) {
    const said =
      pressure === null ? 'sealed; what stands in it is not known' : `${sayFigure(pressure)} ${units.pressure}`;
    yield `  ${line}: ${said}${by(line) && pressure !== null ? ' from its load; more may be trapped in it' : ''}`;
  }
  const reliefs = Object.entries(figures.reliefs);
  if (reliefs.length > 0) yield 'Flow over relief valves';
  for (const [label, flow] of reliefs) yield `  ${label}: ${sayFigure(flow)} ${units.flow}`;
  const flows = Object.entries(figures.flows);
  if (flows.length > 0) yield 'Flows';
  for (const [way, { flow, drop }] of flows)
    yield `  ${way}: ${sayFigure(flow)} ${units.flow}, drop ${sayFigure(drop)} ${units.pressure}`;
  const { pumps, loads, stores, useful, lost } = figures.power;
  const power = (figure: number): string => `${sayFigure(figure)} ${units.power}`;
  const spare =
    stores === 0 ? '' : `, springs and accumulators ${stores > 0 ? 'give' : 'take'} ${power(Math.abs(stores))}`;
  yield 'Power';
  yield `  in: pumps give ${power(pumps)}${loads === 0 ? '' : `, loads give ${power(loads)}`}${spare}`;
  yield `  useful: ${power(useful)}`;
  yield `  lost: ${power(lost)}`;
  for (const [part, share] of Object.entries(figures.powerBy)) {
    const said = (['given', 'useful', 'lost'] as const).flatMap((word) =>
      share[word] === 0 ? [] : [`${word} ${power(share[word])}`],
    );
    if (said.length > 0) yield `  ${part}: ${said.join(', ')}`;
  }
  yield FIGURES_REST;
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
    ...(report.loadCase === undefined ? {} : { loadCase: report.loadCase }),
    ...(report.figures ? { units: report.figures.units, figuresRestOn: FIGURES_REST } : {}),
    assumed: source.assumed,
    ...report.rowAt(explanation.row),
    ...(explanation.dependents.length > 0 && {
      dependents: Object.fromEntries(
        explanation.dependents.map((d) => [
          d.label,
          { position: d.name, hunts: d.hunts, others: d.others, steps: steps(d.steps) },
        ]),
      ),
    }),
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
