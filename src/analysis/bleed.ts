import type { Budget } from '../base/budget.ts';
import { unlimited } from '../base/budget.ts';
import { countBits, members } from '../base/bits.ts';
import type { Circuit } from '../circuit/model.ts';
import { BleedModel } from '../engine/sequence/bleed-model.ts';
import { planBleed, planWithPoints } from '../engine/sequence/bleed.ts';
import type { BleedMove } from '../engine/sequence/bleed.ts';
import { loseCoils, runningPaths } from '../engine/sequence/power-loss.ts';
import { settledPlanes } from '../engine/table/dependents.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import { TRAP_REASONS } from '../engine/table/words.ts';
import type { ActuatorVerdict } from '../engine/table/words.ts';
import { explainRow, MOST_SOLVED, networkOf } from './analyse.ts';
import type {
  BleedAnswer,
  BleedStep,
  PowerLossAnswer,
  PowerLossOutcome,
  TrappedReason,
  TrappedSummary,
} from './bleed-results.ts';
import { BleedWords } from './bleed-words.ts';
import type { Conditions } from './results.ts';

/** What holds besides the pumps, which are stopped here. */
export type BleedConditions = Pick<Conditions, 'places' | 'loadCase'>;

function modelOf(
  circuit: Circuit,
  conditions: BleedConditions,
  budget: Budget,
): { model: BleedModel; words: BleedWords } {
  const net = networkOf(circuit, conditions);
  const { places = {} } = conditions;
  const standing = net.actuators.map((actuator) => places[net.parts[actuator.part]?.id ?? ''] ?? ('between' as const));
  const where = { pumpsRunning: true, places: standing };
  const running = settledPlanes(net, where, budget, MOST_SOLVED);
  const stopped = settledPlanes(net, { ...where, pumpsRunning: false }, budget, MOST_SOLVED);
  const settings = running && stopped && { running, stopped };
  return { model: new BleedModel(net, where, [], settings), words: new BleedWords(net, circuit) };
}

/**
 * How the pressure is let down after the pumps were stopped in `row` (0-based): lines that hold it, the
 * shortest list of lever moves, what is left. Throws `Cancelled`, and a RangeError for a row that is not there.
 */
export function bleedPlan(
  circuit: Circuit,
  conditions: BleedConditions,
  row: number,
  budget: Budget = unlimited,
): BleedAnswer {
  const { model, words } = modelOf(circuit, conditions, budget);
  const plan = planBleed(model, row, { budget });
  const points = planWithPoints(model, plan, { budget });
  const { net } = model;
  return {
    row,
    positions: net.inputs.map(({ positions }, i) => Math.floor(row / (model.strides[i] as number)) % positions.length),
    start: plan.start.map(({ line, reasons }) => words.held(line, reasons)),
    stopping: plan.stopping.map((caution) => words.caution(caution)),
    steps: stepsOf(words, plan.moves),
    left: plan.left.map(({ line, never }) => words.left(line, never)),
    ...(points && {
      points: {
        points: words.lines(points.points),
        cautions: points.opening.map((caution) => words.caution(caution)),
        held: words.lines(points.held),
        steps: stepsOf(words, points.moves),
        left: points.left.map(({ line, never }) => words.left(line, never)),
      },
    }),
    proven: plan.proven,
  };
}

function stepsOf(words: BleedWords, moves: readonly BleedMove[]): BleedStep[] {
  return moves.map(({ input, from, to, row, cautions, vents, held }, i) => {
    const spec = words.net.inputs[input];
    const again = moves.findIndex((other, j) => j > i && other.input === input);
    return {
      part: words.id(spec?.part),
      label: words.label(spec?.part),
      from: words.position(input, from),
      to: words.position(input, to),
      row,
      ...(spec?.rest !== undefined && spec.rest !== to && { springsTo: words.position(input, spec.rest) }),
      ...(again >= 0 && { keptUntil: again }),
      cautions: cautions.map((caution) => words.caution(caution)),
      vents: words.lines(vents),
      held: words.lines(held),
    };
  });
}

/**
 * What happens when power goes in `row` (0-based): every coil valve to rest, pumps running on and stopped; or the
 * pumps stop alone. Levers stay. Throws a RangeError for a row that is not there.
 */
export function powerLoss(circuit: Circuit, conditions: BleedConditions, row: number): PowerLossAnswer {
  const { model, words } = modelOf(circuit, conditions, unlimited);
  const rows = loseCoils(model, runningPaths(model), row);
  const { net, strides } = model;
  const verdicts = (pumps: Conditions['pumps'], at: number): ActuatorVerdict[] =>
    explainRow(circuit, { ...conditions, pumps }, at).actuators.map(({ verdict }) => verdict);
  const before = verdicts('running', row);
  const running = verdicts('running', rows.after);
  const stopped = verdicts('stopped', rows.after);
  const alone = rows.after === row ? stopped : verdicts('stopped', row);
  const nameAt = (input: number, at: number): string =>
    words.position(input, Math.floor(at / (strides[input] as number)) % (net.inputs[input]?.positions.length ?? 1));
  return {
    before: row,
    after: rows.after,
    returned: rows.returned.map((input) => ({
      part: words.id(net.inputs[input]?.part),
      label: words.label(net.inputs[input]?.part),
      from: nameAt(input, row),
      to: nameAt(input, rows.after),
    })),
    actuators: net.actuators.map(({ part }, i) => {
      const was = before[i] as ActuatorVerdict;
      const come = (verdict: ActuatorVerdict) => ({ verdict, comes: outcomeOf(was, verdict) });
      return {
        part: words.id(part),
        label: words.label(part),
        before: was,
        running: come(running[i] as ActuatorVerdict),
        stopped: come(stopped[i] as ActuatorVerdict),
        alone: come(alone[i] as ActuatorVerdict),
      };
    }),
    underPressure: {
      running: words.lines(rows.running),
      stopped: words.lines(rows.stopped),
      alone: words.lines(rows.alone),
    },
    cautions: rows.stopping.map((caution) => words.caution(caution)),
    aloneCautions: rows.stoppingAlone.map((caution) => words.caution(caution)),
  };
}

function outcomeOf(before: ActuatorVerdict, after: ActuatorVerdict): PowerLossOutcome {
  if (after.endsWith('by load')) return 'drops';
  if (after.endsWith('by spring')) return 'moves by spring';
  switch (after) {
    case 'extends':
    case 'retracts':
    case 'turns A→B':
    case 'turns B→A':
      return before === after ? 'goes on' : 'starts';
    case 'held':
    case 'held one way':
    case 'at stop':
    case 'stalled':
      return 'holds';
    case 'floats':
      return 'floats';
    default:
      return 'open';
  }
}

const EXAMPLES = 3;

/** Every line that pressure stays trapped in, with the reasons over all rows of the table and a few rows in words. */
export function trappedSummary(circuit: Circuit, conditions: Conditions, table: StateTable): TrappedSummary {
  const words = new BleedWords(networkOf(circuit, conditions), circuit);
  const said = new Map<number, ReturnType<typeof explainRow>['trapped']>();
  const trappedIn = (row: number): ReturnType<typeof explainRow>['trapped'] => {
    const known = said.get(row) ?? explainRow(circuit, conditions, row).trapped;
    said.set(row, known);
    return known;
  };
  const lines = table.data.lines.flatMap((_, line) => {
    const reasons = TRAP_REASONS.flatMap((kind, index): TrappedReason[] => {
      const plane = table.data.trapPlanes[line]?.[index];
      if (!plane) return [];
      const examples: TrappedReason['examples'][number][] = [];
      const rowCount = countBits(plane);
      for (const row of members(plane)) {
        if (examples.length === EXAMPLES) break;
        const text = trappedIn(row)
          .find((entry) => entry.line === line)
          ?.reasons.find((reason) => reason.kind === kind)?.text;
        examples.push({ row, text: text ?? '' });
      }
      return rowCount > 0 ? [{ kind, rowCount, examples }] : [];
    });
    return reasons.length > 0 ? [{ ...words.line(line), reasons }] : [];
  });
  return { lines };
}
