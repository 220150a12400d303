import { HI, WIDTH } from './assemble.ts';
import type { FlowSystem } from './assemble.ts';
import { solveCoupled } from './coupled.ts';
import { COLD, SLOW, WARM, minimise } from './newton.ts';
import type { Limits, Outcome, Workspace } from './workspace.ts';

/**
 * Pilot-sensed valves. Their flow follows pressures elsewhere, so that the whole has no co-content to
 * minimise. But once each of them is given a most flow h, the rest is convex again and its pressures p(h)
 * are unique. What remains is h = T(p(h)), T = flow that the pilot pressures let open: as many unknowns
 * as there are such valves. A Newton method on h, whose slopes come from the factors of the last convex
 * solve, finds most answers; several starts and then bracketing find the rest.
 */
export interface Pilotage {
  readonly system: FlowSystem;
  readonly work: Workspace;
  readonly limits: Limits;
  /** Valves that are on, as numbers into `system.pilots`. */
  readonly valves: Int32Array;
  /** Most flow of each, and what the pilots would open at the pressures found with it. */
  readonly h: Float64Array;
  readonly open: Float64Array;
  readonly scale: number;
}

/** All at once from the pressures as they stand, with the true bounds of the valves. */
export function couple(at: Pilotage, transient = 0): Outcome {
  const { system, work, limits, valves, scale } = at;
  for (const i of valves) system.law[WIDTH * (system.pilots.branch[i] as number) + HI] = Infinity;
  return solveCoupled(
    system,
    work,
    { cancelled: limits.cancelled, iterations: transient > 0 ? 150 : 40 },
    scale,
    transient,
  );
}

/** What the pilot pressures at `work.now.p` let open, into `open`. */
export function sense(at: Pilotage): void {
  const { system, work, valves, open } = at;
  for (let v = 0; v < valves.length; v++) open[v] = Math.max(0, signalOf(system, valves[v] as number, work.now.p));
}

/** The same, below 0 where the valve is shut. m³/s */
export function signalOf(system: FlowSystem, i: number, p: Float64Array): number {
  const { start, line, factor, setting, slope } = system.pilots;
  let sum = -(setting[i] as number);
  for (let s = start[i] as number; s < (start[i + 1] as number); s++)
    sum += (factor[s] as number) * (p[line[s] as number] as number);
  return sum * (slope[i] as number);
}

/** Convex solve with the flows `h` as upper bounds, from where the last one ended. */
export function settleAt(at: Pilotage): Outcome {
  const { system, work, limits, valves, h } = at;
  for (let v = 0; v < valves.length; v++)
    system.law[WIDTH * (system.pilots.branch[valves[v] as number] as number) + HI] = h[v] as number;
  let outcome: Outcome = 'stuck';
  let highest = 0;
  for (let i = 0; i < system.n; i++) highest = Math.max(highest, Math.abs(work.now.p[i] as number));
  if (highest < 1e8) outcome = minimise(system, work, { cancelled: limits.cancelled, iterations: 30 }, WARM);
  for (const start of [COLD, SLOW]) {
    if (outcome === 'converged' || outcome === 'cancelled' || (outcome === 'runs away' && start === SLOW)) break;
    work.now.p.fill(0);
    outcome = minimise(system, work, limits, start);
  }
  sense(at);
  return outcome;
}

/** How far valve v is from what its pilot asks: h − T while h is what limits it, else only what the pilot takes away. */
export function gap(at: Pilotage, v: number): number {
  const { system, work, valves, h, open } = at;
  const x = work.now.x[system.pilots.branch[valves[v] as number] as number] as number;
  const limit = h[v] as number;
  const asked = open[v] as number;
  if (x < limit && asked >= x) return 0;
  return Math.min(x, limit) - asked;
}
