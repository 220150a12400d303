import { HI, WIDTH, evaluate, flowAt, flowScale } from './assemble.ts';
import type { FlowSystem, Point } from './assemble.ts';
import { SANE } from './laws.ts';
import { searchRay } from './ray.ts';
import { factorSymmetric, solveSymmetric } from './sparse.ts';
import type { Limits, Outcome, Workspace } from './workspace.ts';

/** Pa: a typical pressure of the circuit; the first steps are about this long. */
const PRESSURE_STEP = 1e7;
/** Pa: once a full step is shorter than this, its end is the answer. */
const LAST_STEP = 1e-3;
/** Imbalance that counts as none, as a share of the flow scale. */
export const SLACK = 1e-9;
/** Softness, as a share of the first, below which it is dropped. */
const HARD = 1e-6;

/** Pa: a step this short may be the last one, if every branch follows its slope all along it. */
const SHORT = 100;
/** What flows may be off their laws after such a step, as a share of the flow scale. */
const OFF_LAW = 2e-10;

/**
 * Near-ideal laws are all corners. A cold iteration begins with every branch softer, so that a pressure of
 * 100 bar drives about the pump's flow through it, and hardens by `rate` with each step that succeeds.
 * `damping`: most conductance that is added to a line out of balance, as a share of its imbalance per
 * typical pressure. Little of it takes fewer steps; more of it is the surer way.
 */
export interface Start {
  readonly softness: number;
  readonly rate: number;
  readonly damping: number;
}
export const COLD: Start = { softness: 1, rate: 0.25, damping: 0.05 };
export const SLOW: Start = { softness: 1, rate: 0.5, damping: 1 };
export const WARM: Start = { softness: 0, rate: 0, damping: 0.05 };

/**
 * Minimises the convex co-content in the line pressures, from `work.now.p`. Its gradient is the net
 * outflow of the lines (Millar 1951; Birkhoff and Diaz 1956), its Hessian the conductances. Semismooth
 * Newton, damped where a line is out of balance, with a line search on the slope of the co-content:
 * values of the co-content itself would drown in rounding.
 *
 * On return `work.now` holds the pressures and flows that balance to the accuracy of the last linear solve.
 */
export function minimise(system: FlowSystem, work: Workspace, limits: Limits, start: Start): Outcome {
  const { n, plan } = system;
  const { step, counts } = work;
  const scale = flowScale(system);
  const floor = system.leak * 0.1;
  const least = Math.min(0.1, start.damping) / PRESSURE_STEP;
  const most = start.damping / PRESSURE_STEP;
  let damping = most;
  let corners = 0;
  let softness = (start.softness * PRESSURE_STEP) / scale;
  const hard = HARD * (PRESSURE_STEP / scale);
  work.now.softness = softness;
  work.next.x.fill(0);
  evaluate(system, work.now, work.next.x);
  counts.evaluations++;
  for (let iteration = 0; iteration < limits.iterations; iteration++) {
    if ((iteration & 15) === 15 && limits.cancelled()) return 'cancelled';
    counts.iterations++;
    const { f, v, p } = work.now;
    let norm = 0;
    for (let i = 0; i < n; i++) {
      const out = f[i] as number;
      const size = Math.abs(out);
      if (size > norm) norm = size;
      step[i] = -out;
      v[i] = (v[i] as number) + damping * size;
    }
    factorSymmetric(plan, v, floor);
    solveSymmetric(plan, v, step);
    let longest = 0;
    let slope = 0;
    let highest = 0;
    let damped = 0;
    for (let i = 0; i < n; i++) {
      const d = step[i] as number;
      const part = d * (f[i] as number);
      slope += part;
      if (Math.abs(part) > damped) damped = Math.abs(part);
      if (Math.abs(d) > longest) longest = Math.abs(d);
      if (Math.abs(p[i] as number) > highest) highest = Math.abs(p[i] as number);
    }
    if (softness === 0 && longest <= LAST_STEP + 1e-11 * highest && norm <= SLACK * scale + noise(system, work.now)) {
      if (settle(system, work)) return 'converged';
      // A corner lies within the last step. After a few tries the balance that was reached is good enough.
      if (++corners > 6) return 'converged';
    }
    if (softness === 0 && longest <= SHORT && damping * damped <= OFF_LAW * scale && settleShort(system, work, scale))
      return 'converged';
    if (highest > 2 * SANE.pressure) return 'runs away';
    const harder = softness * start.rate < hard ? 0 : softness * start.rate;
    let cut = 1;
    if (softness > 0 && norm <= 1e-3 * scale) {
      // Soft and in balance: nothing more to learn at this softness.
      cut = 1;
      softness = harder;
      trial(system, work, 1, harder);
    } else if (trial(system, work, 1, harder) <= 0.5 * Math.abs(slope)) softness = harder;
    else {
      cut = searchRay(system, work, slope);
      if (cut === 0) return finish(system, work, norm, scale);
      trial(system, work, cut, softness);
    }
    damping = cut === 1 ? Math.max(damping * 0.25, least) : Math.min(damping * 2, most);
    const { now } = work;
    work.now = work.next;
    work.next = now;
  }
  return 'stuck';
}

/** Moves `work.next` to `share` of the step and evaluates there; the slope of the co-content along the step. */
function trial(system: FlowSystem, work: Workspace, share: number, softness: number): number {
  const { n } = system;
  const { now, next, step } = work;
  for (let i = 0; i < n; i++) next.p[i] = (now.p[i] as number) + share * (step[i] as number);
  next.softness = softness;
  evaluate(system, next, now.x);
  work.counts.evaluations++;
  let sum = 0;
  for (let i = 0; i < n; i++) sum += (next.f[i] as number) * (step[i] as number);
  return sum;
}

/**
 * The last step is short: flows move along their slopes, which balances them better than to evaluate them
 * anew. False, and nothing is moved, if some branch would pass a corner of its law.
 */
function settle(system: FlowSystem, work: Workspace): boolean {
  const { p, x, slope } = work.now;
  const { step } = work;
  const { ends, law, active } = system;
  step[system.n] = 0;
  for (let pass = 0; pass < 2; pass++) {
    for (let i = 0; i < active.length; i++) {
      const j = active[i] as number;
      const s = slope[j] as number;
      if (s === 0) continue;
      const l = WIDTH * j;
      const du =
        (law[l] as number) * (step[ends[3 * j] as number] as number) +
        (law[l + 1] as number) * (step[ends[3 * j + 1] as number] as number);
      const before = x[j] as number;
      const after = before + s * du;
      if (pass === 1) x[j] = after;
      else if (after > (law[l + HI] as number) || after < (law[l + HI - 1] as number)) return false;
      else if ((before > 0 ? after < 0 : after > 0) && law[l + 2] !== law[l + 3]) return false;
    }
  }
  for (let i = 0; i < system.n; i++) p[i] = (p[i] as number) + (step[i] as number);
  return true;
}

/**
 * The same for a step that may bend a law or meet a corner: flows at its end, by the laws, against those along
 * the slopes. False, and nothing is moved, if one is off, or a line would begin or cease to fall below the tank.
 */
function settleShort(system: FlowSystem, work: Workspace, scale: number): boolean {
  const { n, ends, law, active } = system;
  const { now, next, step } = work;
  step[n] = 0;
  const { p, x, slope } = now;
  for (let i = 0; i < n; i++) {
    const before = p[i] as number;
    if (before < 0 !== before + (step[i] as number) < 0) return false;
  }
  const slack = OFF_LAW * scale;
  for (let i = 0; i < active.length; i++) {
    const j = active[i] as number;
    const l = WIDTH * j;
    const a = ends[3 * j] as number;
    const b = ends[3 * j + 1] as number;
    const ca = law[l] as number;
    const cb = law[l + 1] as number;
    const du = ca * (step[a] as number) + cb * (step[b] as number);
    const after = (x[j] as number) + (slope[j] as number) * du;
    const u = ca * (p[a] as number) + cb * (p[b] as number) + du;
    const exact = flowAt(law, l, u);
    const off = Math.abs(exact - after);
    if (off * Math.abs(ca) > slack || off * Math.abs(cb) > slack) return false;
    // At rest and at a bound the law itself stands, lest rounding set the flow beyond the corner.
    const bound = exact >= (law[l + HI] as number) || exact <= (law[l + HI - 1] as number);
    next.x[j] = bound || after * exact <= 0 ? exact : after;
  }
  for (let i = 0; i < active.length; i++) {
    const j = active[i] as number;
    x[j] = next.x[j] as number;
  }
  for (let i = 0; i < n; i++) p[i] = (p[i] as number) + (step[i] as number);
  return true;
}

/** Stagnation: good if what is left is rounding. */
function finish(system: FlowSystem, work: Workspace, norm: number, scale: number): Outcome {
  if (norm > 1e-7 * scale) return 'stuck';
  if (!settle(system, work) && norm > SLACK * scale) return 'stuck';
  return 'converged';
}

/** What rounding of the drives alone can make of the balance of a line. */
export function noise(system: FlowSystem, at: Point): number {
  const { ends, law, active } = system;
  let most = 0;
  for (let i = 0; i < active.length; i++) {
    const j = active[i] as number;
    const ca = Math.abs(law[WIDTH * j] as number),
      cb = Math.abs(law[WIDTH * j + 1] as number);
    const size =
      ca * Math.abs(at.p[ends[3 * j] as number] as number) + cb * Math.abs(at.p[ends[3 * j + 1] as number] as number);
    most = Math.max(most, (at.slope[j] as number) * size * Math.max(ca, cb));
  }
  return 16 * Number.EPSILON * most;
}
