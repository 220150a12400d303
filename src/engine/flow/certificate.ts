import { WIDTH, flowScale } from './assemble.ts';
import type { FlowSystem } from './assemble.ts';
import { pull } from './couplers.ts';
import { NEAR_IDEAL } from './laws.ts';

/** Evidence that pressures and flows belong together. Flows are relative to the largest pump flow (at least 1 L/min). */
export interface Certificate {
  /**
   * Largest natural residual of a branch: x less its clamp(x + (u − f′(x)) / f″(x), lo, hi). Divided by the
   * branch's own stiffness, it is a flow error, so that a stiff branch cannot hide behind soft ones.
   */
  readonly residual: number;
  readonly worstBranch: number;
  /** Largest imbalance of a line. */
  readonly balance: number;
  readonly worstLine: number;
  /** |pump power − Σ drive · flow| over the largest of both sums' terms. */
  readonly power: number;
  readonly iterations: number;
}

export const GOOD_RESIDUAL = 1e-8;
export const GOOD_POWER = 1e-7;

export const isGood = (c: Certificate): boolean =>
  c.residual <= GOOD_RESIDUAL && c.balance <= GOOD_RESIDUAL && c.power <= GOOD_POWER;

/** Most that the pilot pressures let pass through pilot number `i`; m³/s. */
export function pilotLimit(system: FlowSystem, i: number, p: ArrayLike<number>): number {
  const { start, line, factor, setting, slope } = system.pilots;
  let signal = -(setting[i] as number);
  for (let s = start[i] as number; s < (start[i + 1] as number); s++)
    signal += (factor[s] as number) * (p[line[s] as number] as number);
  return Math.max(0, signal * (slope[i] as number));
}

/** Drive that the law at `l` asks for at `x`; at rest the nearest one to `u`. */
function driveAt(law: Float64Array, l: number, x: number, u: number): number {
  const forward = law[l + 2] as number;
  const backward = law[l + 3] as number;
  if (x === 0) return Math.min(forward, Math.max(backward, u));
  return (x > 0 ? forward : backward) + (law[l + 4] as number) * x + (law[l + 5] as number) * x * Math.abs(x);
}

/** Slope du/dx of it, away from its bounds. */
const stiffness = (law: Float64Array, l: number, x: number): number =>
  (law[l + 4] as number) + 2 * (law[l + 5] as number) * Math.abs(x);

/** Checks `p` (n + 1 pressures, the tank's last) and `x` against the problem as it now stands in `system`. */
export function certify(
  system: FlowSystem,
  p: ArrayLike<number>,
  x: ArrayLike<number>,
  iterations: number,
): Certificate {
  const { n, law, ends, active, source, leak, pilots } = system;
  const scale = flowScale(system);
  const net = new Float64Array(n + 1);
  let input = 0,
    used = 0,
    largest = 0;
  for (let i = 0; i < n; i++) {
    const pressure = p[i] as number;
    const drained = pressure * leak + Math.min(0, pressure) / NEAR_IDEAL.void;
    net[i] = drained - (source[i] as number);
    input += pressure * (source[i] as number);
    used += pressure * drained;
    largest = Math.max(largest, Math.abs(pressure * (source[i] as number)), Math.abs(pressure * drained));
  }
  let residual = 0,
    worstBranch = -1;
  for (const j of active) {
    const a = ends[3 * j] as number,
      b = ends[3 * j + 1] as number;
    const at = WIDTH * j;
    const ca = law[at] as number,
      cb = law[at + 1] as number;
    const pilot = pilots.of[j] as number;
    const cap = pilot === -1 ? Infinity : pilotLimit(system, pilot, p);
    const lo = law[at + 6] as number,
      hi = Math.min(cap, law[at + 7] as number);
    const flow = x[j] as number;
    const u = ca * (p[a] as number) + cb * (p[b] as number);
    const moved = flow + (u - driveAt(law, at, flow, u)) / stiffness(law, at, flow);
    const area = Math.max(Math.abs(ca), Math.abs(cb));
    const wrong = (area * Math.abs(flow - Math.min(hi, Math.max(lo, moved)))) / scale;
    if (!(wrong <= residual)) {
      residual = wrong;
      worstBranch = j;
    }
    net[a] = (net[a] as number) + ca * flow;
    net[b] = (net[b] as number) + cb * flow;
    used += u * flow;
    largest = Math.max(largest, Math.abs(u * flow));
  }
  const { couplers } = system;
  for (let c = 0; c < couplers.count; c++) {
    const u = pull(couplers, c, p);
    const flow = u / (couplers.r[c] as number);
    for (let e = couplers.start[c] as number; e < (couplers.start[c + 1] as number); e++) {
      const i = couplers.line[e] as number;
      net[i] = (net[i] as number) + (couplers.factor[e] as number) * flow;
    }
    used += u * flow;
    largest = Math.max(largest, Math.abs(u * flow));
  }
  let balance = 0,
    worstLine = -1;
  for (let i = 0; i < n; i++) {
    const wrong = Math.abs(net[i] as number) / scale;
    if (!(wrong <= balance)) {
      balance = wrong;
      worstLine = i;
    }
  }
  const power = largest > 0 ? Math.abs(input - used) / Math.max(largest, input) : 0;
  return { residual, worstBranch, balance, worstLine, power, iterations };
}
