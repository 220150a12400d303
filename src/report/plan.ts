import type { PlanPowerLoss, PlanProblem, PlanReport, StepMotion, StepReport } from '../analysis/results.ts';
import { formatNumber, formatQuantity } from '../base/units.ts';
import type { UnitSystem } from '../base/units.ts';
import type { LoadCase } from '../circuit/model.ts';
import { nameOfCase } from './conditions.ts';
import { REPORT_VERSION } from './json.ts';
import { padEnd, padStart, plain, widthOf } from './width.ts';

export interface PlanSource {
  /** Of this program. */
  readonly version: string;
  readonly circuit: string;
  readonly loadCases?: readonly LoadCase[];
  readonly units: UnitSystem;
  readonly reports: readonly PlanReport[];
}

const LEVELS = { fault: 'Fault', caution: 'Caution', note: 'Note' } as const;
export const LOSS_CAUTION =
  'Stored energy stays after a stop: before work on the machine follow its documents and the local rules, and let qualified people do it.';

/** Every plan as a table by step, its problems in words and what a loss of power does; a line at a time. */
export function* writePlanText(source: PlanSource): Generator<string> {
  for (const [i, report] of source.reports.entries()) {
    if (i > 0) yield '\n';
    for (const line of planLines(source, report)) yield `${plain(line).trimEnd()}\n`;
  }
}

function* planLines({ circuit, loadCases, units }: PlanSource, report: PlanReport): Generator<string> {
  const load = nameOfCase(report.loadCase, loadCases);
  yield circuit;
  yield `Plan ${report.name}: ${report.good ? 'does what it says' : 'does not do what it says'}${load === undefined ? '' : `, load case ${load}`}`;
  yield '';
  yield* table(
    ['Step', 'On', 'Asked', 'What moves', 'Ends by', 'Ends at', 'Time', 'Energy'],
    ['start', 'start', 'start', 'start', 'start', 'end', 'end', 'end'],
    [
      ...report.steps.map((step, i) => [
        step.name === `${i + 1}` ? step.name : `${i + 1} ${step.name}`,
        step.commands.join(' ') || '–',
        step.expect || '–',
        step.outcome === 'not played'
          ? 'not played'
          : step.motions.map((motion) => sayMotion(motion, step)).join(', ') || '–',
        step.outcome === 'never ended' ? `${step.endsBy}: never` : step.endsBy,
        ...(step.outcome === 'not played'
          ? ['–', '–', '–']
          : [seconds(step.end), seconds(step.end - step.start), joules(step.energyIn)]),
      ]),
      ['', '', '', '', 'together', '', seconds(report.time), joules(report.energyIn)],
    ],
  );
  yield `Pumps deliver ${formatQuantity(report.volume, 'volume', units)}; of ${joules(report.energyIn)} they give, ${joules(report.energyLost)} become heat.`;
  const problems = [...report.problems, ...report.steps.flatMap((step) => step.problems)];
  if (problems.length > 0) {
    yield '';
    yield 'Problems';
    for (const problem of sorted(problems)) {
      const time = problem.time === undefined ? '' : ` at ${seconds(problem.time)}`;
      yield `${LEVELS[problem.level]}, ${problem.where}${time}: ${problem.what}`;
      yield `  ${problem.remedy}`;
    }
  }
  yield* lossLines(report);
  yield '';
  for (const line of report.assumptions) yield line;
}

const ORDER = ['fault', 'caution', 'note'];
const sorted = (problems: readonly PlanProblem[]): PlanProblem[] =>
  problems.toSorted((a, b) => ORDER.indexOf(a.level) - ORDER.indexOf(b.level));

/** `CLAMP+ 0 to 1.178 s`; what nobody asked for carries a mark. */
function sayMotion({ label, way, asked, start, end, atStop, rotary, by }: StepMotion, step: StepReport): string {
  const from = formatNumber(start - step.start);
  const to = formatNumber(end - step.start);
  const short = rotary || atStop ? '' : ', short of its stop';
  return `${asked ? '' : '! '}${label}${way} ${from} to ${to} s${by === 'load' ? ' by load' : ''}${short}`;
}

function* lossLines({ powerLoss, steps, trace }: PlanReport): Generator<string> {
  const [first] = powerLoss;
  if (!first) return;
  yield '';
  yield 'Loss of power';
  const names = first.actuators.map(({ label }) => label);
  yield* table(
    ['Step', 'When', 'Lost', ...names, 'Under pressure', 'Goes on'],
    ['start', 'start', 'start', ...names.map(() => 'start' as const), 'start', 'start'],
    powerLoss.map((loss) => [
      `${loss.step + 1}`,
      loss.at,
      loss.lost,
      ...loss.actuators.map((actuator, i) => sayActuator(actuator, trace.actuators[i]?.rotary ?? false)),
      loss.underPressure.join(', ') || '–',
      loss.resumes ? (loss.step + 1 === steps.length && loss.at === 'step end' ? '–' : 'yes') : 'no',
    ]),
  );
  const why = [...new Set(powerLoss.flatMap((loss) => (loss.why === undefined ? [] : [sayWhy(loss)])))];
  if (why.length > 0) yield '';
  yield* why;
  yield '';
  yield LOSS_CAUTION;
}

const sayWhy = ({ step, at, lost, why }: PlanPowerLoss): string =>
  `Cannot go on after step ${step + 1}, ${at}, ${lost}: ${why ?? ''}`;

const sayActuator = ({ comes, from, to }: PlanPowerLoss['actuators'][number], rotary: boolean): string => {
  if (from === to) return comes;
  return `${comes} ${rotary ? (to > from ? 'A→B' : 'B→A') : to > from ? 'out' : 'in'}`;
};

function* table(
  heads: readonly string[],
  align: readonly ('start' | 'end')[],
  rows: readonly (readonly string[])[],
): Generator<string> {
  const clean = rows.map((row) => row.map(plain));
  const widths = heads.map((head, i) => Math.max(widthOf(plain(head)), ...clean.map((row) => widthOf(row[i] ?? ''))));
  const draw = (cells: readonly string[]): string =>
    cells.map((cell, i) => (align[i] === 'end' ? padStart : padEnd)(cell, widths[i] ?? 0)).join('  ');
  yield draw(heads.map(plain));
  yield draw(widths.map((width) => '─'.repeat(width)));
  for (const row of clean) yield draw(row);
}

const seconds = (s: number): string => `${s.toFixed(3)} s`;
const joules = (j: number): string =>
  Math.abs(j) < 1000 ? `${formatNumber(j, 3)} J` : `${formatNumber(j / 1000, 4)} kJ`;

/** The same as one JSON object; SI throughout, steps counted from 1, parts and lines by their shown names. */
export function writePlanJson({ version, circuit, reports }: PlanSource): string {
  const out = {
    spooltable: { version, report: REPORT_VERSION },
    circuit,
    plans: reports.map((report) => ({
      plan: report.plan,
      name: report.name,
      ...(report.loadCase !== undefined && { loadCase: report.loadCase }),
      good: report.good,
      time: report.time,
      energyIn: report.energyIn,
      energyLost: report.energyLost,
      volume: report.volume,
      problems: report.problems.map((problem) => problemFields(report, problem)),
      steps: report.steps.map((step, i) => ({
        step: i + 1,
        ...step,
        problems: step.problems.map((problem) => problemFields(report, problem)),
      })),
      powerLoss: report.powerLoss.map((loss) => ({ ...loss, step: loss.step + 1 })),
      trace: report.trace,
      assumptions: report.assumptions,
    })),
  };
  return `${JSON.stringify(out, null, 2)}\n`;
}

const problemFields = ({ trace }: PlanReport, { step, lines, ...problem }: PlanProblem): unknown => ({
  ...problem,
  ...(step !== undefined && { step: step + 1 }),
  lines: lines.map((line) => trace.lines[line] ?? ''),
});
