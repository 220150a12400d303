import type { BleedAnswer, BleedCaution, BleedLine, BleedStep, LeftLine } from '../analysis/results.ts';
import type { LoadCase } from '../circuit/model.ts';
import { sayConditions } from './conditions.ts';
import { REPORT_VERSION } from './json.ts';
import { plain } from './width.ts';

export interface BleedSource {
  /** Of this program. */
  readonly version: string;
  readonly circuit: string;
  readonly loadCases?: readonly LoadCase[];
  readonly answer: BleedAnswer;
  /** Label → position of the start state, and of those that nobody gave and that were taken as they stand at rest. */
  readonly state: Readonly<Record<string, string>>;
  readonly assumed: Readonly<Record<string, string>>;
}

/** Order of isolation as 29 CFR 1910.147(d) names it; the rest is common practice and published safety alerts. */
export const BLEED_BEFORE: readonly string[] = [
  'Before: the order of isolation, as 29 CFR 1910.147(d) names it: know the energy, shut down, isolate, lock, relieve or restrain stored energy, verify.',
  'This list is about relieving stored pressure only. A lever or coil valve in its centre is not an isolating device.',
  'Support or restrain every load that can move.',
];
export const BLEED_AFTER: readonly string[] = [
  'After: verify at every line that nothing is left, and keep verifying where pressure can build up again (a load, heat, a passing valve).',
  'Cracking a fitting is not an accepted way to take pressure off. Oil from about 7 bar up can be injected through the skin: that is a surgical emergency.',
  'The list is worked out from the open paths of the drawing; it knows no wear, no stuck valve and no part that is not drawn.',
  'The documents of the machine, the local codes and qualified people decide what is done; they go before this list.',
];

/** The plan as a sheet to take along, a line at a time; every line ends with a line feed. */
export function* writeBleedText(source: BleedSource): Generator<string> {
  for (const line of bleedLines(source)) yield `${plain(line).trimEnd()}\n`;
}

function* bleedLines({ circuit, loadCases, answer, state, assumed }: BleedSource): Generator<string> {
  yield circuit;
  yield `Bleed-down from row ${answer.row + 1}: ${pairs(state) || 'nothing to command'}; ${sayConditions({ pumps: 'stopped' }, loadCases)}`;
  if (Object.keys(assumed).length > 0) yield `Not given, taken at rest: ${pairs(assumed)}`;
  yield '';
  yield* BLEED_BEFORE;
  yield '';
  yield* cautionLines(answer.stopping, 'Caution when the pumps stop: ');
  if (answer.start.length === 0) {
    yield 'No drawn line holds pressure once the pumps have stopped in this state. Verify it.';
  } else {
    yield 'Under pressure with the pumps stopped:';
    for (const line of answer.start) {
      yield `  ${line.name} (${measureOf(line)})`;
      for (const { text } of line.reasons) yield `    ${text}`;
    }
    yield '';
    yield* stepLines(answer.steps);
    yield* leftLines(answer.left, answer.steps.length > 0);
    yield* pointLines(answer);
  }
  if (!answer.proven) yield 'The search was cut short: a shorter list, or one that leaves less, may exist.';
  yield '';
  yield* BLEED_AFTER;
}

function* stepLines(steps: readonly BleedStep[]): Generator<string> {
  for (const [i, step] of steps.entries()) {
    yield* cautionLines(step.cautions, '    Caution: ');
    yield `[ ] ${i + 1}. Move ${step.label} from ${step.from} to ${step.to}.${keepOf(step)}`;
    if (step.vents.length > 0)
      yield `    Wait until down: ${step.vents.map((line) => `${line.name} (${measureOf(line)})`).join('; ')}`;
    yield `    Still under pressure: ${step.held.map(({ name }) => name).join(', ') || 'none'}`;
  }
}

function keepOf({ springsTo, keptUntil }: BleedStep): string {
  if (springsTo === undefined) return '';
  const until = keptUntil === undefined ? 'to the end of the list' : `until step ${keptUntil + 1}`;
  return ` Keep it there ${until}: let go, it returns to ${springsTo}.`;
}

function* leftLines(left: readonly LeftLine[], after: boolean): Generator<string> {
  if (left.length === 0) return;
  if (after) yield '';
  const never = left.filter((line) => line.never);
  const other = left.filter((line) => !line.never);
  if (never.length > 0) {
    yield 'No lever position opens these to tank; they stay under pressure:';
    for (const line of never) yield* leftLine(line);
  }
  if (other.length > 0) {
    yield 'No list of lever moves lets these down together with the rest; they stay under pressure:';
    for (const line of other) yield* leftLine(line);
  }
}

function* leftLine(line: LeftLine): Generator<string> {
  yield `  ${line.name} (${measureOf(line)})`;
  yield `    ${line.remedy}`;
}

function* pointLines({ points }: BleedAnswer): Generator<string> {
  if (!points) return;
  yield '';
  yield `With a bleed valve to tank on ${points.points.map(({ name }) => name).join(', ')}, opened first and left open:`;
  yield* cautionLines(points.cautions, '    Caution: ');
  yield `    Still under pressure: ${points.held.map(({ name }) => name).join(', ') || 'none'}`;
  yield* stepLines(points.steps);
  yield* leftLines(points.left, true);
}

function* cautionLines(cautions: readonly BleedCaution[], head: string): Generator<string> {
  for (const { text } of cautions) yield `${head}${text}`;
}

export const measureOf = ({ measure }: BleedLine): string =>
  measure.length > 0 ? `measure at ${measure.join(', ')}` : 'no gauge or test point is drawn on it';

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
