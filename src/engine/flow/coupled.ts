import { HI, WIDTH, balance, branchFlows } from './assemble.ts';
import type { FlowSystem, Point } from './assemble.ts';
import { NEAR_IDEAL } from './laws.ts';
import { SLACK, noise } from './newton.ts';
import type { Limits, Outcome, Workspace } from './workspace.ts';
import { factorGeneral, solveGeneral } from './sparse.ts';

/** Longest step, Pa. */
const LONGEST = 2e7;
const LAST_STEP = 1e-3;

/**
 * All line pressures at once, pilot-sensed valves included: the Jacobian is no longer symmetric. Newton with a
 * step limit and the natural monotonicity test (the next simplified step must be shorter), and a pseudo-
 * transient term σ where that fails. Starts from `work.now.p` and needs a start in the right region; where it
 * has one it also finds answers that hang on a flow too fine to be bracketed.
 * `transient` (m³/s per Pa) begins instead with that term and lets it fade, which goes further from a poor start.
 */
export function solveCoupled(
  system: FlowSystem,
  work: Workspace,
  limits: Limits,
  scale: number,
  transient = 0,
): Outcome {
  const { n, plan } = system;
  const { step, counts, simplified } = work;
  const floor = system.leak * 1e-3;
  let sigma = transient;
  work.now.softness = work.next.softness = 0;
  work.next.x.fill(0);
  evaluateCoupled(system, work.now, work.next.x);
  for (let iteration = 0; iteration < limits.iterations; iteration++) {
    if ((iteration & 15) === 15 && limits.cancelled()) return 'cancelled';
    counts.iterations++;
    const { f, v, p } = work.now;
    let norm = 0,
      highest = 0;
    for (let i = 0; i < n; i++) {
      step[i] = -(f[i] as number);
      norm = Math.max(norm, Math.abs(f[i] as number));
      highest = Math.max(highest, Math.abs(p[i] as number));
      v[i] = (v[i] as number) + sigma;
    }
    factorGeneral(plan, v, floor);
    solveGeneral(plan, v, step);
    const longest = size(step, n);
    if (!(longest < 1e15)) return 'stuck';
    if (sigma === 0 && longest <= LAST_STEP + 1e-11 * highest && norm <= SLACK * scale + noise(system, work.now)) {
      settleCoupled(system, work);
      return 'converged';
    }
    let share = Math.min(1, LONGEST / longest);
    let good = false;
    if (transient > 0 && sigma > 0) {
      // Pseudo-transient: each line fills as if it had a capacity; the term fades as the balance improves.
      for (let i = 0; i < n; i++) work.next.p[i] = (p[i] as number) + share * (step[i] as number);
      evaluateCoupled(system, work.next, work.now.x);
      const reached = size(work.next.f, n);
      sigma *= Math.min(2, Math.max(0.3, norm > 0 ? reached / norm : 0.3)) * 0.9;
      if (sigma < 1e-4 * NEAR_IDEAL.leak) sigma = 0;
      const { now } = work;
      work.now = work.next;
      work.next = now;
      continue;
    }
    for (let trial = 0; trial < 7 && !good; trial++, share *= 0.5) {
      for (let i = 0; i < n; i++) work.next.p[i] = (p[i] as number) + share * (step[i] as number);
      evaluateCoupled(system, work.next, work.now.x);
      counts.evaluations++;
      for (let i = 0; i < n; i++) simplified[i] = -(work.next.f[i] as number);
      solveGeneral(plan, v, simplified);
      good = size(simplified, n) <= (1 - share / 4) * longest;
    }
    if (good) sigma = sigma > 1e-3 * NEAR_IDEAL.leak ? sigma * 0.2 : 0;
    else {
      if (sigma > 1e6 * scale) return 'stuck';
      sigma = sigma === 0 ? (scale / 1e7) * 1e-3 : sigma * 10;
      evaluateCoupled(system, work.now, work.next.x);
      continue;
    }
    const { now } = work;
    work.now = work.next;
    work.next = now;
  }
  return 'stuck';
}

function size(values: Float64Array, n: number): number {
  let most = 0;
  for (let i = 0; i < n; i++) most = Math.max(most, Math.abs(values[i] as number));
  return most;
}

/** As `evaluate`, with both triangles, and with pilot-sensed valves at most as far open as their pilots ask. */
function evaluateCoupled(system: FlowSystem, at: Point, before: Float64Array): void {
  const { plan, n, plain, active, pilots, ends, law } = system;
  const { p, f, v, x, slope } = at;
  balance(system, at);
  branchFlows(system, at, before, 0, plain);
  for (let s = n + 1; s <= n + plan.lower; s++) v[s + plan.lower] = v[s] as number;
  for (let q = plain; q < active.length; q++) {
    const j = active[q] as number;
    const i = pilots.of[j] as number;
    const a = ends[3 * j] as number,
      b = ends[3 * j + 1] as number;
    const l = WIDTH * j;
    const u = (law[l] as number) * (p[a] as number) + (law[l + 1] as number) * (p[b] as number);
    let flow = 0,
      s = 0;
    if (u > 0) {
      const r = law[l + 4] as number,
        k = law[l + 5] as number;
      const root = Math.sqrt(r * r + 4 * k * u);
      flow = (2 * u) / (r + root);
      s = (before[j] as number) > 0 ? 1 / root : flow / u;
    }
    let limit = -(pilots.setting[i] as number);
    const first = pilots.start[i] as number,
      end = pilots.start[i + 1] as number;
    for (let w = first; w < end; w++) limit += (pilots.factor[w] as number) * (p[pilots.line[w] as number] as number);
    limit *= pilots.slope[i] as number;
    const capped = limit < flow;
    const hard = law[l + HI] as number;
    if (capped) flow = Math.max(0, limit);
    if (flow >= hard) flow = hard;
    x[j] = flow;
    slope[j] = capped || flow === hard ? 0 : s;
    f[a] = (f[a] as number) + (law[l] as number) * flow;
    f[b] = (f[b] as number) + (law[l + 1] as number) * flow;
    if (capped && limit > 0 && flow < hard) {
      const rate = pilots.slope[i] as number;
      for (let w = first; w < end; w++) {
        const g = rate * (pilots.factor[w] as number);
        const sa = pilots.slotA[w] as number,
          sb = pilots.slotB[w] as number;
        if (a < n) v[sa] = (v[sa] as number) + (law[l] as number) * g;
        if (b < n) v[sb] = (v[sb] as number) + (law[l + 1] as number) * g;
      }
    } else if (slope[j] !== 0) {
      const slot = ends[3 * j + 2] as number;
      const ca = law[l] as number,
        cb = law[l + 1] as number;
      v[a] = (v[a] as number) + ca * ca * s;
      v[b] = (v[b] as number) + cb * cb * s;
      v[slot] = (v[slot] as number) + ca * cb * s;
      if (slot > n) v[slot + plan.lower] = (v[slot + plan.lower] as number) + ca * cb * s;
    }
  }
}

/** The last step, taken along the slopes. */
function settleCoupled(system: FlowSystem, work: Workspace): void {
  const { ends, law, active, pilots, n } = system;
  const { p, x, slope } = work.now;
  const { step } = work;
  step[n] = 0;
  for (const j of active) {
    const l = WIDTH * j;
    const s = slope[j] as number;
    const i = pilots.of[j] as number;
    const flow = x[j] as number;
    let after = flow;
    if (s !== 0) {
      after +=
        s *
        ((law[l] as number) * (step[ends[3 * j] as number] as number) +
          (law[l + 1] as number) * (step[ends[3 * j + 1] as number] as number));
    } else if (i >= 0 && flow > 0 && flow < (law[l + HI] as number)) {
      for (let w = pilots.start[i] as number; w < (pilots.start[i + 1] as number); w++) {
        after +=
          (pilots.slope[i] as number) * (pilots.factor[w] as number) * (step[pilots.line[w] as number] as number);
      }
    }
    x[j] = Math.min(law[l + HI] as number, Math.max(law[l + HI - 1] as number, after));
  }
  for (let i = 0; i < n; i++) p[i] = (p[i] as number) + (step[i] as number);
}
