import type { TrapAnswer } from './answers.ts';
import { besidesOf } from './left-behind.ts';
import type { Beside } from './left-behind.ts';
import { lineOutcomes } from './line-outcomes.ts';
import { mostPressures } from './most-pressures.ts';
import { solveOne } from './one-state.ts';
import type { OneState } from './one-state.ts';
import { enclosing, partLabel } from './reasons.ts';
import { sayPressure } from './say-quantities.ts';
import { strides } from './strides.ts';
import { standingReasons } from './trapped.ts';
import { LINE_CLASSES } from './words.ts';
import type { TrapReason } from './words.ts';

const CUT_OFF = LINE_CLASSES.indexOf('cut off');
const FED = LINE_CLASSES.indexOf('fed');
/** Pa: less is not worth a number. */
const NOTICED = 0.5e5;

/** Every trapped line of the state with its reasons in words, and the moves that leave it behind. */
export function explainTrapped(state: OneState, besides: readonly Beside[] = []): TrapAnswer[] {
  const { net, edges, conditions, block } = state;
  const { classes } = lineOutcomes(net, edges, conditions, block);
  const standing = standingReasons(net, edges, conditions, block, (line) => classes[line]?.[CUT_OFF]);
  const running = conditions.pumpsRunning
    ? state
    : solveOne(net, { ...conditions, pumpsRunning: true }, state.row, state.settlers, state.units);
  const runningClasses = conditions.pumpsRunning
    ? classes
    : lineOutcomes(net, edges, running.conditions, running.block).classes;
  const moves = [...neighbours(running), ...heldNeighbours(running, besides)];

  return net.lines.slice(0, net.shown).flatMap((entry, line): TrapAnswer[] => {
    const reasons: { kind: TrapReason; text: string }[] = [];
    const cutOff = state.is(classes[line]?.[CUT_OFF]);
    if (cutOff) {
      if (state.is(standing[line]?.load)) reasons.push({ kind: 'load', text: loadText(state, line) });
      if (state.is(runningClasses[line]?.[CUT_OFF])) {
        const from = moves
          .filter((move) => move.state.on(move.state.block.reach.leaves, line))
          .map((move) => `${move.text}${stoodAt(move.state, line)}`);
        if (from.length > 0)
          reasons.push({
            kind: 'left behind',
            text: `Under pressure before this move of one lever: ${from.join('; ')}.`,
          });
      }
      if (!conditions.pumpsRunning && running.on(running.block.reach.leaves, line)) {
        reasons.push({
          kind: 'stopped',
          text: `Under pressure while the pumps run${stoodAt(running, line)}; stopping them does not let it down.`,
        });
      }
      if (state.is(standing[line]?.heat)) {
        reasons.push({
          kind: 'heat',
          text: 'Full of oil with no pressure valve to let it out: it climbs by about 10 bar for each kelvin that it warms (common practice).',
        });
      }
    } else if (!conditions.pumpsRunning && state.is(classes[line]?.[FED])) {
      const at = pressureIn(state, line);
      const text = `A charged accumulator keeps it under pressure${at === undefined ? '' : `, at ${at}`}.`;
      reasons.push({ kind: 'stored', text });
    }
    if (reasons.length === 0) return [];
    return [{ line, name: entry.name, reasons, steps: [enclosing(state, line, -1)] }];
  });
}

/** The states one lever move away, pumps running, and the move in words. */
function neighbours(state: OneState): { state: OneState; text: string }[] {
  const { net, row, conditions, units } = state;
  const steps = strides(net.inputs.map((input) => input.positions.length));
  const stands = net.inputs.map((_, i) => state.position(i));
  const moves = net.inputs.flatMap((input, i) => {
    const now = stands[i] as number;
    return input.positions.flatMap((name, p) => {
      if (p === now) return [];
      const from = row + (p - now) * (steps[i] as number);
      const text = `${partLabel(state, input.part)} from ${name} to ${input.positions[now] ?? '?'} (row ${from + 1})`;
      return [{ from, text, held: stands.map((at, other) => (other === i ? p : at)) }];
    });
  });
  if (net.dependents.length > 0)
    return moves.map(({ from, text }) => ({ text, state: solveOne(net, conditions, from, state.settlers, units) }));
  return besidesOf(net, moves).map(({ text, at }) => ({ text, state: at(conditions, 0, units) }));
}

/** The same for levers that are held here. */
const heldNeighbours = (state: OneState, besides: readonly Beside[]): { state: OneState; text: string }[] =>
  besides.map(({ text, at }) => ({ text, state: at(state.conditions, state.row, state.units) }));

/** In words; undefined where there is no steady state, or next to nothing. */
function pressureIn(state: OneState, line: number): string | undefined {
  const pressure = mostPressures(state)[line] ?? 0;
  return pressure < NOTICED ? undefined : sayPressure(pressure, state.units);
}

/** The bound of what can be left: it stood there before, and nothing but a load or heat adds to it. */
function stoodAt(state: OneState, line: number): string {
  const at = pressureIn(state, line);
  return at === undefined ? '' : `, at up to ${at}`;
}

function loadText(state: OneState, line: number): string {
  const pressing = state.net.actuators.filter(
    (actuator) => actuator.push.way !== 'none' && (actuator.a === line || actuator.b === line),
  );
  const names = pressing.map(
    (actuator) => `${actuator.push.by === 'spring' ? 'the spring' : 'the load'} of ${partLabel(state, actuator.part)}`,
  );
  const [only, second] = pressing;
  if (only && !second && !state.on(state.block.reach.underPressure, line)) {
    const area = only.a === line ? only.areaA : only.areaB;
    const size =
      only.push.by === 'load' && area > 0 ? `: ${sayPressure(only.push.size / area, state.units)} (F/A)` : '';
    return `Pressed on at rest by ${names.join(' and ')}${size}.`;
  }
  const at = pressureIn(state, line);
  const steady = at === undefined ? '' : ` It stands at ${at}.`;
  if (names.length > 0) return `Pressed on at rest by ${names.join(' and ')}.${steady}`;
  return state.on(state.block.reach.underPressure, line)
    ? `Another chamber of the same actuator is under pressure and passes it on by the ratio of the areas (p·A1/A2).${steady}`
    : `A load presses on it at rest through the lines it is joined to.${steady}`;
}
