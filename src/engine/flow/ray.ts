import { NEAR_IDEAL } from './laws.ts';
import { WIDTH } from './assemble.ts';
import type { FlowSystem } from './assemble.ts';
import type { Workspace } from './workspace.ts';

/**
 * The share of the step where the co-content stops falling, 0 if that cannot be told from rounding.
 * Along the step only the drives are followed, which costs a fraction of an evaluation.
 */
export function searchRay(system: FlowSystem, work: Workspace, slope: number): number {
  castRay(system, work);
  const enough = 0.5 * Math.abs(slope);
  const { ray } = work;
  const rise = 2 * system.m;
  let low = 0,
    high = 1;
  let slopeLow = slope;
  let slopeHigh = slopeOnRay(system, work, 1);
  if (slopeHigh <= enough) return 1;
  let share = 1 - slopeHigh / (ray[rise] as number);
  for (let round = 0; round < 40 && high - low > 1e-9 * high; round++) {
    // Tangent from the last point (exact on the stiff far side of a kink), else secant and middle in turn.
    if (!(share > low && share < high))
      share = (round & 1) === 1 ? 0.5 * (low + high) : low + ((high - low) * slopeLow) / (slopeLow - slopeHigh);
    if (!(share > low && share < high)) share = 0.5 * (low + high);
    work.counts.rays++;
    const reached = slopeOnRay(system, work, share);
    if (Math.abs(reached) <= enough) return share;
    if (reached > 0) {
      high = share;
      slopeHigh = reached;
    } else {
      low = share;
      slopeLow = reached;
    }
    share -= reached / (ray[rise] as number);
  }
  // A corner: its far side, where the branch that makes it takes part in the next step.
  return high;
}

/** Drives and their change per step into `work.ray`; after them what the leaks and pumps add to the slope. */
function castRay(system: FlowSystem, work: Workspace): void {
  const { n, m, ends, law, active } = system;
  const { now, step, ray } = work;
  let constant = 0,
    linear = 0;
  for (let i = 0; i < n; i++) {
    const d = step[i] as number;
    constant += d * (system.leak * (now.p[i] as number) - (system.source[i] as number));
    linear += d * d * system.leak;
  }
  ray[2 * m + 1] = constant;
  ray[2 * m + 2] = linear;
  for (let i = 0; i < active.length; i++) {
    const j = active[i] as number;
    const a = ends[3 * j] as number,
      b = ends[3 * j + 1] as number;
    const ca = law[WIDTH * j] as number,
      cb = law[WIDTH * j + 1] as number;
    ray[2 * i] = ca * (now.p[a] as number) + cb * (now.p[b] as number);
    ray[2 * i + 1] = ca * (step[a] as number) + cb * (step[b] as number);
  }
}

/** Slope of the co-content at `share` of the step; its own rise goes to `ray[2·m]`. */
function slopeOnRay(system: FlowSystem, work: Workspace, share: number): number {
  const { n, m, law, active } = system;
  const { now, step, ray } = work;
  const soft = now.softness;
  const voidSlope = 1 / (NEAR_IDEAL.void + soft);
  let rise = ray[2 * m + 2] as number;
  let sum = (ray[2 * m + 1] as number) + share * rise;
  for (let i = 0; i < n; i++) {
    const d = step[i] as number;
    const pressure = (now.p[i] as number) + share * d;
    if (pressure < 0) {
      sum += d * pressure * voidSlope;
      rise += d * d * voidSlope;
    }
  }
  for (let i = 0; i < active.length; i++) {
    const du = ray[2 * i + 1] as number;
    if (du === 0) continue;
    const l = WIDTH * (active[i] as number);
    const u = (ray[2 * i] as number) + share * du;
    let t = u - (law[l + 2] as number);
    let sign = 1;
    if (!(t > 0)) {
      t = (law[l + 3] as number) - u;
      if (!(t > 0)) continue;
      sign = -1;
    }
    const ca = law[l] as number;
    const cb = law[l + 1] as number;
    const r = (law[l + 4] as number) + soft * (ca * ca > cb * cb ? ca * ca : cb * cb);
    const k = law[l + 5] as number;
    const root = k === 0 ? r : Math.sqrt(r * r + 4 * k * t);
    const x = (sign * 2 * t) / (r + root);
    if (x >= (law[l + 7] as number)) sum += du * (law[l + 7] as number);
    else if (x <= (law[l + 6] as number)) sum += du * (law[l + 6] as number);
    else {
      sum += du * x;
      rise += (du * du) / root;
    }
  }
  ray[2 * m] = rise;
  return sum;
}
