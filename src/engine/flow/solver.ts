import { assemble, listActive } from './assemble.ts';
import type { FlowSystem } from './assemble.ts';
import { certify, isGood } from './certificate.ts';
import type { Certificate } from './certificate.ts';
import { SANE } from './laws.ts';
import { COLD, SLOW, WARM, minimise } from './newton.ts';
import type { Start } from './newton.ts';
import { solvePiloted } from './piloted.ts';
import type { FlowProblem } from './problem.ts';
import { newWorkspace } from './workspace.ts';
import type { Limits, Outcome, Workspace } from './workspace.ts';

/** What one solve may spend, and what it may start from. */
export interface SolveOptions {
  /** Pressures of a neighbouring state, one per line. */
  readonly warm?: ArrayLike<number>;
  readonly cancelled?: () => boolean;
  /** Newton iterations per attempt. */
  readonly iterations?: number;
}

export type Status = 'solved' | 'infeasible' | 'unbounded' | 'not converged';

/** Views into the solver's own arrays: copy what must outlive the next solve. */
export interface Solution {
  readonly status: Status;
  /** Pa per line, then the tank's 0. */
  readonly pressures: Float64Array;
  /** Through-put of every branch: m³/s, m/s or rad/s; 0 where it is off. */
  readonly throughputs: Float64Array;
  readonly iterations: number;
  readonly cancelled: boolean;
}

/**
 * Solves the states of one circuit: lay it out once, switch branches on and off, solve from the last
 * state. Deterministic; the iteration allocates nothing.
 */
export class FlowSolver {
  readonly system: FlowSystem;
  readonly #work: Workspace;
  #dirty = false;

  constructor(problem: FlowProblem) {
    this.system = assemble(problem);
    this.#work = newWorkspace(this.system);
  }

  /** Puts a path of another valve position in or out. */
  setOn(branch: number, on: boolean): void {
    const flag = on ? 1 : 0;
    if (this.system.on[branch] === flag) return;
    this.system.on[branch] = flag;
    this.#dirty = true;
  }

  /** Starts or stops a pump; stopped it is tight unless a leakage branch is switched on as well. */
  setRunning(pump: number, running: boolean): void {
    const { problem, source, pumpFlow } = this.system;
    const spec = problem.pumps[pump];
    if (!spec) return;
    pumpFlow[pump] = running ? spec.flow : 0;
    let sum = 0;
    problem.pumps.forEach((other, i) => {
      if (other.line === spec.line) sum += pumpFlow[i] as number;
    });
    source[spec.line] = sum;
    if (spec.compensator !== undefined) this.setOn(spec.compensator, running && spec.flow > 0);
  }

  solve(options: SolveOptions = {}): Solution {
    const { system } = this;
    const work = this.#work;
    if (system.contradictions.length > 0) return this.#answer('infeasible', false);
    if (this.#dirty) {
      listActive(system);
      this.#dirty = false;
    }
    const limits: Limits = { cancelled: options.cancelled ?? never, iterations: options.iterations ?? 200 };
    work.counts.iterations = work.counts.evaluations = work.counts.rays = 0;
    const piloted = system.active.length > system.plain;
    const outcome = piloted ? solvePiloted(system, work, limits, options.warm) : this.#convex(limits, options.warm);
    if (outcome === 'cancelled') return this.#answer('not converged', true);
    if (outcome === 'runs away' || this.#insane()) return this.#answer('unbounded', false);
    return this.#answer(outcome === 'converged' || isGood(this.certificate()) ? 'solved' : 'not converged', false);
  }

  /** Evidence for the last solve. */
  certificate(): Certificate {
    const { now, counts } = this.#work;
    return certify(this.system, now.p, now.x, counts.iterations);
  }

  #convex(limits: Limits, warm: ArrayLike<number> | undefined): Outcome {
    if (warm) {
      const outcome = this.#from(warm, WARM, { ...limits, iterations: Math.min(limits.iterations, 40) });
      if (outcome === 'converged' || outcome === 'cancelled') return outcome;
    }
    const cold = this.#from(undefined, COLD, limits);
    return cold === 'stuck' ? this.#from(undefined, SLOW, limits) : cold;
  }

  #from(warm: ArrayLike<number> | undefined, start: Start, limits: Limits): Outcome {
    const { p } = this.#work.now;
    if (warm) for (let i = 0; i < this.system.n; i++) p[i] = warm[i] as number;
    else p.fill(0);
    return minimise(this.system, this.#work, limits, start);
  }

  /** True if pressures or speeds are out of this world although they balance. */
  #insane(): boolean {
    const { n, problem, active } = this.system;
    const { p, x } = this.#work.now;
    for (let i = 0; i < n; i++) if (!(Math.abs(p[i] as number) < SANE.pressure)) return true;
    for (const j of active) {
      const kind = problem.branches[j]?.kind;
      if (kind !== 'cylinder' && kind !== 'motor') continue;
      if (!(Math.abs(x[j] as number) < (kind === 'cylinder' ? SANE.speed : SANE.rotation))) return true;
    }
    return false;
  }

  #answer(status: Status, cancelled: boolean): Solution {
    const { now, counts } = this.#work;
    const { on, m } = this.system;
    for (let j = 0; j < m; j++) if (on[j] === 0) now.x[j] = 0;
    return { status, pressures: now.p, throughputs: now.x, iterations: counts.iterations, cancelled };
  }
}

const never = (): boolean => false;
