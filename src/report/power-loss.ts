import type { BleedCaution, BleedLine, Conditions, PowerLossAnswer } from '../analysis/results.ts';
import type { LoadCase } from '../circuit/model.ts';
import { sayConditions } from './conditions.ts';
import { REPORT_VERSION } from './json.ts';
import { LOSS_CASES, LOSS_WORDS, sayLoss, sayReturned } from './power-loss-words.ts';
import type { LossCase } from './power-loss-words.ts';
import { plain } from './width.ts';

export interface PowerLossSource {
  /** Of this program. */
  readonly version: string;
  readonly circuit: string;
  readonly conditions: Conditions;
  readonly loadCases?: readonly LoadCase[];
  readonly answer: PowerLossAnswer;
  readonly state: Readonly<Record<string, string>>;
  readonly assumed: Readonly<Record<string, string>>;
}

/** A line at a time; every line ends with a line feed. */
export function* writePowerLossText(source: PowerLossSource): Generator<string> {
  for (const line of lossLines(source)) yield `${plain(line).trimEnd()}\n`;
}

function* lossLines({ circuit, conditions, loadCases, answer, state, assumed }: PowerLossSource): Generator<string> {
  yield circuit;
  yield `Loss of power in row ${answer.before + 1}: ${pairs(state) || 'nothing to command'}; before it ${sayConditions(conditions, loadCases)}`;
  if (Object.keys(assumed).length > 0) yield `Not given, taken at rest: ${pairs(assumed)}`;
  yield sayReturned(answer);
  for (const { key, title } of LOSS_CASES) {
    yield '';
    yield `${title}${key === 'alone' ? '' : ` (row ${answer.after + 1})`}:`;
    for (const actuator of answer.actuators) {
      yield `  ${actuator.label}: ${sayLoss(actuator[key])} (${actuator.before} before)`;
    }
    yield `  Under pressure: ${names(answer.underPressure[key]).join(', ') || 'no drawn line'}`;
    for (const { text } of cautionsOf(answer, key)) yield `  Caution: ${text}`;
  }
  yield '';
  yield* LOSS_WORDS;
}

const names = (lines: readonly BleedLine[]): string[] => lines.map(({ name }) => name);

/** While the pumps run on, what moves stands in the verdicts. */
const cautionsOf = (answer: PowerLossAnswer, key: LossCase): readonly BleedCaution[] =>
  key === 'running' ? [] : key === 'stopped' ? answer.cautions : answer.aloneCautions;

const pairs = (record: Readonly<Record<string, string>>): string =>
  Object.entries(record)
    .map(([key, value]) => `${key} ${value}`)
    .join(', ');

/** The same as one JSON object; rows 1-based. */
export function writePowerLossJson({ version, circuit, answer, state, assumed }: PowerLossSource): string {
  const cases = LOSS_CASES.map(({ key }) => [
    key === 'running' ? 'coilsOff' : key === 'stopped' ? 'coilsOffPumpsStopped' : 'pumpsStopped',
    {
      row: (key === 'alone' ? answer.before : answer.after) + 1,
      actuators: answer.actuators.map((actuator) => ({ actuator: actuator.label, ...actuator[key] })),
      underPressure: names(answer.underPressure[key]),
      cautions: cautionsOf(answer, key).map(({ kind, text }) => ({ kind, text })),
    },
  ]);
  const out = {
    spooltable: { version, report: REPORT_VERSION },
    circuit,
    row: answer.before + 1,
    state,
    assumed,
    before: answer.actuators.map(({ label, before }) => ({ actuator: label, verdict: before })),
    returned: answer.returned.map(({ label, from, to }) => ({ valve: label, from, to })),
    ...Object.fromEntries(cases),
    words: LOSS_WORDS,
  };
  return `${JSON.stringify(out, null, 2)}\n`;
}
