import { WIDTH } from './assemble.ts';
import { SANE } from './laws.ts';
import type { BranchKind } from './problem.ts';
import type { FlowSolver } from './solver.ts';

/** Losses that nobody chose: they may be anything small. A throttle or a setting is somebody's choice. */
const LOSSES: ReadonlySet<BranchKind> = new Set([
  'path',
  'check',
  'flow control',
  'pressure valve',
  'cylinder',
  'motor',
]);
/** Flow that counts as motion: 0.01 L/min in m³/s. */
const MOTION = 1e-5 / 60;
/** Trials that must end in a steady state, and how many may be made for that. */
const TRIALS = 3;
const MOST_TRIALS = 8;

/**
 * Actuators whose speed rests on losses alone: equal rivals for one flow. The losses are made small, by
 * different factors for every branch, a few times over; where that swings a speed, the circuit leaves it
 * open. Differences of load, area or setting do not swing, whatever the losses. Branch numbers in rising order.
 * A trial without a steady state is made again with losses less small; where not even two have one, nothing
 * shows that any speed is free of the losses, and all are named. Leaves the solver's problem as it was.
 */
export function ties(solver: FlowSolver, warm: ArrayLike<number>): number[] {
  const { system } = solver;
  const { problem, law, active } = system;
  const actuators = [...active]
    .filter((j) => problem.branches[j]?.kind === 'cylinder' || problem.branches[j]?.kind === 'motor')
    .sort((a, b) => a - b);
  if (actuators.length === 0) return [];
  const start = Float64Array.from({ length: system.n }, (_, i) => warm[i] as number);
  const kept = law.slice();
  const speeds: number[][] = [];
  try {
    for (let trial = 0; speeds.length < TRIALS && trial < MOST_TRIALS; trial++) {
      const mild = trial - speeds.length;
      for (const j of active) {
        if (!LOSSES.has(problem.branches[j]?.kind as BranchKind)) continue;
        const share = 10 ** (-(1 + 2 * scatter(j, trial)) / (1 + mild));
        law[WIDTH * j + 4] = (kept[WIDTH * j + 4] as number) * share;
        law[WIDTH * j + 5] = (kept[WIDTH * j + 5] as number) * share;
      }
      const solution = solver.solve({ warm: start });
      if (solution.cancelled) return [];
      if (solution.status !== 'solved') continue;
      speeds.push(actuators.map((j) => solution.throughputs[j] as number));
    }
  } finally {
    law.set(kept);
  }
  if (speeds.length < 2) return actuators;
  return actuators.filter((j, i) => {
    const area = Math.max(Math.abs(law[WIDTH * j] as number), Math.abs(law[WIDTH * j + 1] as number));
    const seen = speeds.map((trial) => (trial[i] as number) * area);
    const spread = Math.max(...seen) - Math.min(...seen);
    return spread > MOTION && spread > 0.05 * Math.max(...seen.map(Math.abs)) && spread < SANE.speed * area;
  });
}

/** A fixed number from 0 to 1 for each branch and trial; opposite in the first two trials. */
function scatter(branch: number, trial: number): number {
  const mixed = Math.imul(branch + 1, 0x9e3779b1) ^ Math.imul((trial >> 1) + 1, 0x85ebca6b);
  const value = ((Math.imul(mixed ^ (mixed >>> 15), 0x2c1b3c6d) >>> 8) % 1009) / 1008;
  return (trial & 1) === 1 ? 1 - value : value;
}
