import type { BleedAnswer, BleedCaution, BleedLine, BleedStep, Conditions, LeftLine } from '../analysis/results.ts';
import type { LoadCase } from '../circuit/model.ts';
import {
  BLEED_AFTER,
  BLEED_BEFORE,
  CUT_SHORT,
  HELD_HEAD,
  leftGroups,
  measureOf,
  NOTHING_HELD,
  sayHeld,
  sayKeep,
  sayMove,
  sayPoints,
  sayVents,
} from './bleed-words.ts';
import { sayConditions } from './conditions.ts';
import { REPORT_VERSION } from './json.ts';
import { plain } from './width.ts';

export interface BleedSource {
  /** Of this program. */
  readonly version: string;
  readonly circuit: string;
  readonly conditions: Conditions;
  readonly loadCases?: readonly LoadCase[];
  readonly answer: BleedAnswer;
  /** Label → position of the start state, and of those that nobody gave and that were taken as they stand at rest. */
  readonly state: Readonly<Record<string, string>>;
  readonly assumed: Readonly<Record<string, string>>;
}

/** The plan as a sheet to take along, a line at a time; every line ends with a line feed. */
export function* writeBleedText(source: BleedSource): Generator<string> {
  for (const line of bleedLines(source)) yield `${plain(line).trimEnd()}\n`;
}

function* bleedLines({ circuit, conditions, loadCases, answer, state, assumed }: BleedSource): Generator<string> {
  yield circuit;
  yield `Bleed-down from row ${answer.row + 1}: ${pairs(state) || 'nothing to command'}; ${sayConditions(conditions, loadCases)}`;
  if (Object.keys(assumed).length > 0) yield `Not given, taken at rest: ${pairs(assumed)}`;
  yield '';
  yield* BLEED_BEFORE;
  yield '';
  yield* cautionLines(answer.stopping, 'Caution when the pumps stop: ');
  if (answer.start.length === 0) {
    yield NOTHING_HELD;
  } else {
    yield HELD_HEAD;
    for (const line of answer.start) {
      yield `  ${line.name} (${measureOf(line)})`;
      for (const { text } of line.reasons) yield `    ${text}`;
    }
    yield '';
    yield* stepLines(answer.steps);
    yield* leftLines(answer.left, answer.steps.length > 0);
    yield* pointLines(answer);
  }
  if (!answer.proven) yield CUT_SHORT;
  yield '';
  yield* BLEED_AFTER;
}

function* stepLines(steps: readonly BleedStep[]): Generator<string> {
  for (const [i, step] of steps.entries()) {
    yield* cautionLines(step.cautions, '    Caution: ');
    const keep = sayKeep(step);
    yield `[ ] ${i + 1}. ${sayMove(step)}${keep === undefined ? '' : ` ${keep}`}`;
    const vents = sayVents(step);
    if (vents !== undefined) yield `    ${vents}`;
    yield `    ${sayHeld(step.held)}`;
  }
}

function* leftLines(left: readonly LeftLine[], after: boolean): Generator<string> {
  if (left.length === 0) return;
  if (after) yield '';
  for (const { head, lines } of leftGroups(left)) {
    yield head;
    for (const line of lines) yield* leftLine(line);
  }
}

function* leftLine(line: LeftLine): Generator<string> {
  yield `  ${line.name} (${measureOf(line)})`;
  yield `    ${line.remedy}`;
}

function* pointLines({ points }: BleedAnswer): Generator<string> {
  if (!points) return;
  yield '';
  yield sayPoints(points);
  yield* cautionLines(points.cautions, '    Caution: ');
  yield `    ${sayHeld(points.held)}`;
  yield* stepLines(points.steps);
  yield* leftLines(points.left, true);
}

function* cautionLines(cautions: readonly BleedCaution[], head: string): Generator<string> {
  for (const { text } of cautions) yield `${head}${text}`;
}

const pairs = (record: Readonly<Record<string, string>>): string =>
  Object.entries(record)
    .map(([key, value]) => `${key} ${value}`)
    .join(', ');

/** The same as one JSON object; lines and parts by their shown names, rows 1-based. */
export function writeBleedJson({ version, circuit, answer, state, assumed }: BleedSource): string {
  const names = (lines: readonly BleedLine[]): string[] => lines.map(({ name }) => name);
  const cautions = (list: readonly BleedCaution[]): unknown => list.map(({ kind, text }) => ({ kind, text }));
  const steps = (list: readonly BleedStep[]): unknown =>
    list.map((step, i) => ({
      step: i + 1,
      valve: step.label,
      from: step.from,
      to: step.to,
      row: step.row + 1,
      ...(step.springsTo === undefined ? {} : { springsTo: step.springsTo }),
      ...(step.keptUntil === undefined ? {} : { keptUntilStep: step.keptUntil + 1 }),
      cautions: cautions(step.cautions),
      vents: names(step.vents),
      underPressure: names(step.held),
    }));
  const left = (list: readonly LeftLine[]): unknown =>
    list.map(({ name, never, measure, remedy }) => ({ line: name, never, measure, remedy }));
  const { points } = answer;
  const out = {
    spooltable: { version, report: REPORT_VERSION },
    circuit,
    row: answer.row + 1,
    state,
    assumed,
    before: BLEED_BEFORE,
    underPressure: answer.start.map(({ name, measure, reasons }) => ({ line: name, measure, reasons })),
    stopping: cautions(answer.stopping),
    steps: steps(answer.steps),
    left: left(answer.left),
    ...(points && {
      withBleedValves: {
        on: names(points.points),
        cautions: cautions(points.cautions),
        underPressure: names(points.held),
        steps: steps(points.steps),
        left: left(points.left),
      },
    }),
    proven: answer.proven,
    after: BLEED_AFTER,
  };
  return `${JSON.stringify(out, null, 2)}\n`;
}
