import type { PathConditions } from '../paths/reach.ts';
import { solveOne } from './one-state.ts';
import type { OneState } from './one-state.ts';
import { PressureSolver } from './resolve.ts';

/** m/s: slower is at rest. */
const MOVES = 1e-6;

const known = new WeakMap<OneState, readonly number[]>();

/** Pa by line, and the speed of each actuator. */
interface Steady {
  readonly lines: readonly number[];
  readonly speeds: readonly number[];
}

/**
 * Pa by line: the most that the pumps and loads of this state bring about, from entered and assumed values. What
 * moves comes to its stop sooner or later, and only then does the full pressure stand: so it is the larger of
 * the steady state and of the one with everything at the stop that it moves to. Empty where there is no steady state.
 */
export function mostPressures(state: OneState): readonly number[] {
  const before = known.get(state);
  if (before) return before;
  const { net, row, settlers, conditions } = state;
  const plain = net.dependents.length === 0;
  const solver = plain ? settlers.pressures(conditions) : new PressureSolver(net, conditions);
  const now = steady(solver, row, state.settled.setting);
  const places = now && atStops(state, now);
  let then: Steady | undefined;
  if (places && plain) then = steady(settlers.pressures({ ...conditions, places }), row, []);
  else if (places) {
    // Where dependent valves stand was settled for other places.
    const where = { ...conditions, places };
    then = steady(new PressureSolver(net, where), row, solveOne(net, where, row).settled.setting);
  }
  const most = (now?.lines ?? []).map((pressure, line) => Math.max(pressure, then?.lines[line] ?? 0));
  known.set(state, most);
  return most;
}

function steady(solver: PressureSolver, row: number, setting: readonly number[]): Steady | undefined {
  const { result } = solver.solve(row, setting);
  if (result.status !== 'solved') return undefined;
  return {
    lines: Array.from({ length: solver.net.shown }, (_, line) => solver.pressure(result, line)),
    speeds: result.actuators.map(({ speed }) => speed),
  };
}

/** Undefined where nothing moves that has a stop. */
function atStops({ net, conditions }: OneState, { speeds }: Steady): PathConditions['places'] | undefined {
  const ways = net.actuators.map(({ stroke }, i): 'in' | 'out' | undefined => {
    const speed = speeds[i] ?? 0;
    if (stroke === undefined || Math.abs(speed) < MOVES) return undefined;
    return speed > 0 ? 'out' : 'in';
  });
  if (ways.every((way) => way === undefined)) return undefined;
  return conditions.places.map((place, i) => ways[i] ?? place);
}
