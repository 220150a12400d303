import { explainPressures } from './explain-pressures.ts';
import { solveOne } from './one-state.ts';
import type { OneState } from './one-state.ts';
import type { RowNumbers } from './row-numbers.ts';

/** m/s: slower is at rest. */
const MOVES = 1e-6;

const known = new WeakMap<OneState, readonly number[]>();

/**
 * Pa by line: the most that the pumps and loads of this state bring about, from entered and assumed values. What
 * moves comes to its stop sooner or later, and only then does the full pressure stand: so it is the larger of
 * the steady state and of the one with everything at the stop that it moves to. Empty where there is no steady state.
 */
export function mostPressures(state: OneState): readonly number[] {
  const before = known.get(state);
  if (before) return before;
  const now = explainPressures(state).numbers;
  const stopped = atStops(state, now);
  const then = stopped && explainPressures(stopped).numbers;
  const most = now.lines.map((pressure, line) => Math.max(pressure, then?.lines[line] ?? 0));
  known.set(state, most);
  return most;
}

/** Undefined where nothing moves that has a stop. */
function atStops({ net, conditions, row, settlers, units }: OneState, { actuators }: RowNumbers): OneState | undefined {
  const ways = net.actuators.map(({ stroke }, i): 'in' | 'out' | undefined => {
    const speed = actuators[i]?.speed ?? 0;
    if (stroke === undefined || Math.abs(speed) < MOVES) return undefined;
    return speed > 0 ? 'out' : 'in';
  });
  if (ways.every((way) => way === undefined)) return undefined;
  const places = conditions.places.map((place, i) => ways[i] ?? place);
  // Where dependent valves stand was settled for other places.
  const own = net.dependents.length === 0 ? settlers : undefined;
  return solveOne(net, { ...conditions, places }, row, own, units);
}
