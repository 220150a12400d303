import { WIDTH, flowScale } from './assemble.ts';
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

/** Pa: two drives nearer than this, or than some times all losses together, may be told apart by the losses alone. */
const NEAR = 1e5;
const LOSSES_TIMES = 2;
/** Speeds that differ by less are the same in every trial. */
const SAME = 0.01;

/**
 * Finds actuators whose speed rests on losses alone: equal rivals for one flow. The losses are made small, by
 * different factors for every branch, a few times over; where that swings a speed, the circuit leaves it
 * open. Differences of load, area or setting do not swing, whatever the losses.
 * A trial without a steady state is made again with losses less small; where not even two have one, nothing
 * shows that any speed is free of the losses, and all are named. Leaves the solver's problem as it was.
 */
export class TieFinder {
  readonly #solver: FlowSolver;
  readonly #lossy: Uint8Array;
  readonly #actuators: readonly number[];
  readonly #shares = new Map<number, Float64Array>();
  readonly #kept: Float64Array;
  /** Pressures of the last solution of each trial; the entry behind them is 1 if there is one. */
  readonly #last: readonly Float64Array[];

  constructor(solver: FlowSolver) {
    const { branches } = solver.system.problem;
    this.#solver = solver;
    this.#kept = solver.system.law.slice();
    this.#last = Array.from({ length: MOST_TRIALS }, () => new Float64Array(solver.system.n + 1));
    this.#lossy = Uint8Array.from(branches, ({ kind }) => (LOSSES.has(kind) ? 1 : 0));
    this.#actuators = branches.flatMap(({ kind }, j) => (kind === 'cylinder' || kind === 'motor' ? [j] : []));
  }

  /**
   * Whether an actuator (its branch) moves, or stands so near to where it would that losses could decide it.
   * Arrays of the solution at hand: n + 1 pressures, flows of the branches.
   */
  wavers(pressures: ArrayLike<number>, flows: ArrayLike<number>): (branch: number) => boolean {
    const { law, active, ends } = this.#solver.system;
    // What rivals share comes from the pumps: the losses of a load that runs away on its own are none between them.
    const most = 2 * flowScale(this.#solver.system);
    let sum = 0;
    for (let i = 0; i < active.length; i++) {
      const j = active[i] as number;
      if (this.#lossy[j] === 0) continue;
      const area = this.#area(j);
      const x = Math.min(Math.abs(flows[j] as number), most / area);
      if (x !== 0) sum += ((law[WIDTH * j + 4] as number) * x + (law[WIDTH * j + 5] as number) * x * x) / area;
    }
    const near = NEAR + LOSSES_TIMES * sum;
    return (j) => {
      const area = this.#area(j);
      if (Math.abs(flows[j] as number) * area > MOTION) return true;
      const [a, b] = [ends[3 * j] as number, ends[3 * j + 1] as number];
      const l = WIDTH * j;
      const u = (law[l] as number) * (pressures[a] as number) + (law[l + 1] as number) * (pressures[b] as number);
      const off = Math.min(Math.abs(u - (law[l + 2] as number)), Math.abs(u - (law[l + 3] as number)));
      return off <= near * area;
    };
  }

  /**
   * Branches of actuators whose speed swings, in rising order. `pressures`: the solution at hand. `rivals`: asks
   * of these alone, and whether at least two of them do; `flows` of the solution then save trials.
   */
  find(
    pressures: ArrayLike<number>,
    asked?: { readonly rivals: readonly number[]; readonly flows: ArrayLike<number> },
  ): number[] {
    const { system } = this.#solver;
    const { law, active, on, n } = system;
    const actuators = asked?.rivals ?? this.#actuators.filter((j) => on[j] === 1);
    if (actuators.length < (asked ? 2 : 1)) return [];
    const areas = actuators.map((j) => this.#area(j));
    const seen: number[][] = actuators.map(() => []);
    const kept = this.#kept;
    kept.set(law);
    let found = 0;
    try {
      for (let trial = 0; found < TRIALS && trial < MOST_TRIALS; trial++) {
        const shares = this.#sharesOf(trial, trial - found);
        for (let i = 0; i < active.length; i++) {
          const j = active[i] as number;
          law[WIDTH * j + 4] = (kept[WIDTH * j + 4] as number) * (shares[j] as number);
          law[WIDTH * j + 5] = (kept[WIDTH * j + 5] as number) * (shares[j] as number);
        }
        const last = this.#last[trial] as Float64Array;
        // The same trial of the last state is nearer than the solution at hand, whose losses are larger.
        if (!asked || (last[n] as number) === 0) for (let i = 0; i < n; i++) last[i] = pressures[i] as number;
        const solution = this.#solver.solve({ warm: last });
        if (solution.cancelled) return [];
        last[n] = solution.status === 'solved' ? 1 : 0;
        if (solution.status !== 'solved') continue;
        for (let i = 0; i < n; i++) last[i] = solution.pressures[i] as number;
        found++;
        if (!asked) {
          actuators.forEach((j, i) => seen[i]?.push((solution.throughputs[j] as number) * (areas[i] as number)));
          continue;
        }
        // Small losses tell at once who stands for another reason: rivals both stand on the verge of moving.
        const wavers = this.wavers(solution.pressures, solution.throughputs);
        let verge = 0;
        let told = true;
        actuators.forEach((j, i) => {
          const flows = seen[i] as number[];
          flows.push((solution.throughputs[j] as number) * (areas[i] as number));
          if (wavers(j)) verge++;
          // Losses scattered one way and the other, and as they are: where all agree, or differ for good, a third says nothing new.
          told &&= swings(flows, areas[i] as number) || same(flows, (asked.flows[j] as number) * (areas[i] as number));
        });
        if (verge < 2) return [];
        if (found === 2 && told) break;
      }
    } finally {
      law.set(kept);
    }
    return found < 2 ? [...actuators] : actuators.filter((_, i) => swings(seen[i] as number[], areas[i] as number));
  }

  /** Per branch: what is left of its losses in a trial; `mild`: the trials before it without a steady state. */
  #sharesOf(trial: number, mild: number): Float64Array {
    const key = trial * MOST_TRIALS + mild;
    const known = this.#shares.get(key);
    if (known) return known;
    const shares = Float64Array.from(this.#lossy, (lossy, j) =>
      lossy === 0 ? 1 : 10 ** (-(1 + 2 * scatter(j, trial)) / (1 + mild)),
    );
    this.#shares.set(key, shares);
    return shares;
  }

  #area(j: number): number {
    const { law } = this.#solver.system;
    return Math.max(Math.abs(law[WIDTH * j] as number), Math.abs(law[WIDTH * j + 1] as number));
  }
}

export const ties = (solver: FlowSolver, pressures: ArrayLike<number>): number[] =>
  new TieFinder(solver).find(pressures);

function swings(flows: readonly number[], area: number): boolean {
  const spread = Math.max(...flows) - Math.min(...flows);
  return spread > MOTION && spread > 0.05 * Math.max(...flows.map(Math.abs)) && spread < SANE.speed * area;
}

const same = (flows: readonly number[], first: number): boolean =>
  flows.every((flow) => Math.abs(flow - first) <= Math.max(MOTION, SAME * Math.abs(first)));

/** A fixed number from 0 to 1 for each branch and trial; opposite in the first two trials. */
function scatter(branch: number, trial: number): number {
  const mixed = Math.imul(branch + 1, 0x9e3779b1) ^ Math.imul((trial >> 1) + 1, 0x85ebca6b);
  const value = ((Math.imul(mixed ^ (mixed >>> 15), 0x2c1b3c6d) >>> 8) % 1009) / 1008;
  return (trial & 1) === 1 ? 1 - value : value;
}
