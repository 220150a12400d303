import { pull } from './couplers.ts';
import { NEAR_IDEAL } from './laws.ts';
import { WIDTH } from './assemble.ts';
import type { FlowSystem } from './assemble.ts';
import { PIECE } from './workspace.ts';
import type { Workspace } from './workspace.ts';

/**
 * The share of the step where the co-content stops falling, 0 if that cannot be told from rounding.
 * Along the step only the drives are followed, and only of branches that pass anything on it.
 */
export function searchRay(system: FlowSystem, work: Workspace, slope: number): number {
  castRay(system, work);
  const enough = 0.5 * Math.abs(slope);
  const { along } = work;
  let low = 0,
    high = 1;
  let slopeLow = slope;
  let slopeHigh = slopeOnRay(work, 1);
  if (slopeHigh <= enough) return 1;
  let share = 1 - slopeHigh / along.rise;
  for (let round = 0; round < 40 && high - low > 1e-9 * high; round++) {
    // Tangent from the last point (exact on the stiff far side of a kink), else secant and middle in turn.
    if (!(share > low && share < high))
      share = (round & 1) === 1 ? 0.5 * (low + high) : low + ((high - low) * slopeLow) / (slopeLow - slopeHigh);
    if (!(share > low && share < high)) share = 0.5 * (low + high);
    work.counts.rays++;
    const reached = slopeOnRay(work, share);
    if (Math.abs(reached) <= enough) return share;
    if (reached > 0) {
      high = share;
      slopeHigh = reached;
    } else {
      low = share;
      slopeLow = reached;
    }
    share -= reached / along.rise;
  }
  // A corner: its far side, where the branch that makes it takes part in the next step.
  return high;
}

/**
 * What the step meets, as pieces `x = (−r + √(r² + 4·k·t)) / 2k ≤ bound` for an excess t > 0: each direction of
 * each branch, and the void of each line. Pieces that stay straight all along the step go into two sums.
 */
function castRay(system: FlowSystem, work: Workspace): void {
  const { n, ends, law, active } = system;
  const { now, step, along } = work;
  const { p } = now;
  const soft = now.softness;
  const hollow = NEAR_IDEAL.void + soft;
  along.pieces = 0;
  along.constant = along.linear = 0;
  for (let i = 0; i < n; i++) {
    const d = step[i] as number;
    const pressure = p[i] as number;
    along.constant += d * (system.leak * pressure - (system.source[i] as number));
    along.linear += d * d * system.leak;
    if (pressure < 0 || pressure + d < 0) addPiece(work, -pressure, -d, hollow, 0, Infinity);
  }
  const { couplers } = system;
  for (let c = 0; c < couplers.count; c++) {
    const r = (couplers.r[c] as number) + soft * (couplers.square[c] as number);
    const du = pull(couplers, c, step);
    along.constant += (pull(couplers, c, p) * du) / r;
    along.linear += (du * du) / r;
  }
  for (let i = 0; i < active.length; i++) {
    const j = active[i] as number;
    const l = WIDTH * j;
    const a = ends[3 * j] as number;
    const b = ends[3 * j + 1] as number;
    const ca = law[l] as number;
    const cb = law[l + 1] as number;
    const du = ca * (step[a] as number) + cb * (step[b] as number);
    if (du === 0) continue;
    const u = ca * (p[a] as number) + cb * (p[b] as number);
    const over = u - (law[l + 2] as number);
    const under = (law[l + 3] as number) - u;
    const forth = over > 0 || over + du > 0;
    const back = under > 0 || under - du > 0;
    if (!forth && !back) continue;
    let r = law[l + 4] as number;
    if (soft !== 0) r += soft * (ca * ca > cb * cb ? ca * ca : cb * cb);
    const k = law[l + 5] as number;
    if (forth) addPiece(work, over, du, r, k, law[l + 7] as number);
    if (back) addPiece(work, under, -du, r, k, -(law[l + 6] as number));
  }
}

function addPiece(work: Workspace, t: number, dt: number, r: number, k: number, bound: number): void {
  const { ray, along } = work;
  if (k === 0 && t > 0 && t + dt > 0 && t <= bound * r && t + dt <= bound * r) {
    along.constant += (dt * t) / r;
    along.linear += (dt * dt) / r;
    return;
  }
  const at = PIECE * along.pieces++;
  ray[at] = t;
  ray[at + 1] = dt;
  ray[at + 2] = r;
  ray[at + 3] = k;
  ray[at + 4] = bound;
}

/** Slope of the co-content at `share` of the step; its own rise goes to `along.rise`. */
function slopeOnRay({ ray, along }: Workspace, share: number): number {
  let rise = along.linear;
  let sum = along.constant + share * rise;
  const end = PIECE * along.pieces;
  for (let at = 0; at < end; at += PIECE) {
    const dt = ray[at + 1] as number;
    const t = (ray[at] as number) + share * dt;
    if (!(t > 0)) continue;
    const r = ray[at + 2] as number;
    const k = ray[at + 3] as number;
    const root = k === 0 ? r : Math.sqrt(r * r + 4 * k * t);
    const x = (2 * t) / (r + root);
    if (x >= (ray[at + 4] as number)) sum += dt * (ray[at + 4] as number);
    else {
      sum += dt * x;
      rise += (dt * dt) / root;
    }
  }
  along.rise = rise;
  return sum;
}
