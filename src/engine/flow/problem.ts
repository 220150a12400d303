import type { Law } from './laws.ts';

/**
 * The steady state of one combination as the solver sees it. SI throughout; pressures are gauge.
 *
 * Lines carry numbers 0 … n−1 and have one unknown pressure each; the tank is `TANK`, fixed at 0.
 * A branch is driven by `u = ca·p[a] + cb·p[b]` and takes `ca·x` out of line a and `cb·x` out of
 * line b. Every line has besides a void branch (it cannot go below tank pressure; what flows in there
 * is void) and a tiny leak to tank, which picks the least pressure where lines are cut off.
 */
export interface FlowProblem {
  /** Names, for messages and results. */
  readonly lines: readonly string[];
  readonly pumps: readonly Pump[];
  readonly branches: readonly Branch[];
  /** Ties of more than two lines. */
  readonly couplers?: readonly Coupler[];
  /** m³/s per Pa from each line to tank. */
  readonly leak: number;
}

export const TANK = -1;

export interface Pump {
  readonly id: string;
  /** Outlet line. */
  readonly line: number;
  /** m³/s at full stroke; 0 when it stands still. */
  readonly flow: number;
  /** Branch that takes back what a compensated pump does not deliver. */
  readonly compensator?: number;
}

/**
 * Flows of several lines in a fixed ratio, as of two motors on one shaft: driven by `u = Σ factor·p`, it takes
 * `factor·x` out of each of its lines, x = u / r. The factors of lines that get oil are negative.
 */
export interface Coupler {
  readonly id: string;
  readonly lines: readonly number[];
  readonly factors: readonly number[];
  /** Pa per m³/s */
  readonly r: number;
}

export type BranchKind =
  | 'path'
  | 'check'
  | 'throttle'
  | 'flow control'
  | 'relief'
  | 'compensator'
  | 'accumulator'
  | 'leakage'
  | 'cylinder'
  | 'motor'
  | 'pressure valve';

export interface Branch extends Law {
  readonly id: string;
  readonly kind: BranchKind;
  readonly a: number;
  readonly b: number;
  readonly ca: number;
  readonly cb: number;
  /** False: not there in this combination (a path of another valve position). */
  readonly on: boolean;
  /** Pilot-sensed valves: the flow is at most what the pilot pressure lets open. */
  readonly pilot?: Pilot;
  /** Actuators only: what the drive works against. */
  readonly load?: Load;
}

/** `x ≤ max(0, (Σ factor·p[line] − setting) / gradient)` */
export interface Pilot {
  readonly signals: readonly Signal[];
  /** Pa */
  readonly setting: number;
  /** Pa per m³/s */
  readonly gradient: number;
}

export interface Signal {
  readonly line: number;
  readonly factor: number;
}

/** N (cylinder) or N·m (motor). Extending, or turning A→B, is the positive direction. */
export interface Load {
  /** Presses at rest too; positive pushes it in (or B→A). */
  readonly pressing?: number;
  /** Resists motion either way, never drives. */
  readonly resisting?: number;
  /** Breakaway and running friction of the actuator itself. */
  readonly friction?: number;
  /** Spring force where it stands; positive pushes it in. */
  readonly spring?: number;
}

/** Something that the entered data leave impossible, in words. */
export interface Contradiction {
  /** Branch, pump or line id. */
  readonly where: string;
  readonly what: string;
}

const bad = (value: number): boolean => Number.isNaN(value);
const finite = (value: number): boolean => Number.isFinite(value);

/** What no steady state can satisfy, or what is no monotone law; empty if all is well. */
export function contradictions(problem: FlowProblem): Contradiction[] {
  const found: Contradiction[] = [];
  const known = (line: number): boolean => Number.isInteger(line) && line >= TANK && line < problem.lines.length;
  if (!(problem.leak > 0) || !finite(problem.leak))
    found.push({ where: 'leak', what: 'The leak of the lines must be above 0.' });
  for (const pump of problem.pumps) {
    if (!known(pump.line) || pump.line === TANK)
      found.push({ where: pump.id, what: 'Its outlet is no line of this circuit.' });
    if (!finite(pump.flow) || pump.flow < 0) found.push({ where: pump.id, what: 'Its flow must be 0 or more.' });
    if (pump.compensator !== undefined && problem.branches[pump.compensator]?.kind !== 'compensator') {
      found.push({ where: pump.id, what: 'Its compensator is missing.' });
    }
  }
  for (const branch of problem.branches) {
    const say = (what: string): void => void found.push({ where: branch.id, what });
    if (!known(branch.a) || !known(branch.b)) say('It joins a line that this circuit does not have.');
    if (!finite(branch.ca) || !finite(branch.cb)) say('Its areas must be numbers.');
    if (!(branch.r > 0) || !finite(branch.r) || !(branch.k >= 0) || !finite(branch.k))
      say('Its loss must rise with the flow.');
    if (bad(branch.lo) || bad(branch.hi) || branch.lo > branch.hi) {
      say('The least flow that it must pass is above the most that it can pass: no flow satisfies both.');
    }
    if (bad(branch.forward) || bad(branch.backward) || branch.backward > branch.forward)
      say('Friction and cracking pressure must be 0 or more.');
    if ((branch.hi > 0 && !finite(branch.forward)) || (branch.lo < 0 && !finite(branch.backward)))
      say('Its setting or load must be a number.');
    if (branch.pilot) {
      const { signals, setting, gradient } = branch.pilot;
      if (!signals.every((s) => known(s.line) && finite(s.factor)))
        say('It senses a line that this circuit does not have.');
      if (bad(setting) || !(gradient > 0) || !finite(gradient))
        say('Its setting and override must be numbers, the override above 0.');
      if (branch.lo > 0) say('A pilot-sensed valve can be shut: its least flow must not be above 0.');
    }
  }
  return found;
}
