import { WIDTH } from './assemble.ts';
import { gap, settleAt, signalOf } from './pilotage.ts';
import type { Pilotage } from './pilotage.ts';
import { solveSymmetric } from './sparse.ts';
import type { Outcome } from './workspace.ts';

const ROUNDS = 40;
/** h − T as a share of the flow scale. */
const ENOUGH = 1e-10;

function largestGap(at: Pilotage): number {
  let most = 0;
  for (let v = 0; v < at.h.length; v++) most = Math.max(most, Math.abs(gap(at, v)));
  return most;
}

/** Newton's method on the most flows `h`, from those that stand there; damped where the largest gap does not shrink. */
export function newtonOnFlows(at: Pilotage): Outcome {
  const { h, scale } = at;
  const count = h.length;
  const step = new Float64Array(count);
  const from = new Float64Array(count);
  let outcome = settleAt(at);
  let worst = largestGap(at);
  for (let round = 0; round < ROUNDS; round++) {
    if (outcome === 'cancelled') return outcome;
    if (outcome === 'converged' && worst <= ENOUGH * scale) return 'converged';
    if (outcome !== 'converged' || !direction(at, step)) return 'stuck';
    for (let v = 0; v < count; v++)
      from[v] = Math.min(
        h[v] as number,
        at.work.now.x[at.system.pilots.branch[at.valves[v] as number] as number] as number,
      );
    const before = worst;
    for (let share = 1; ; share *= 0.4) {
      for (let v = 0; v < count; v++) h[v] = Math.max(0, (from[v] as number) + share * (step[v] as number));
      outcome = settleAt(at);
      worst = largestGap(at);
      if (outcome === 'cancelled' || worst <= (1 - 0.2 * share) * before || share < 0.02) break;
    }
    if (worst > before) return 'stuck';
  }
  return 'stuck';
}

/** Newton step on the flows: (I − ∂T/∂h)·step = T − h, by elimination with row exchange. False if it has none. */
function direction(at: Pilotage, step: Float64Array): boolean {
  const { system, work, valves, h } = at;
  const { pilots, ends, law, n, plan } = system;
  const count = valves.length;
  const rhs = work.step;
  const matrix = Array.from({ length: count }, () => new Float64Array(count + 1));
  for (let v = 0; v < count; v++) {
    const j = pilots.branch[valves[v] as number] as number;
    const row = matrix[v] as Float64Array;
    row[v] = 1 + (row[v] as number);
    row[count] = -gap(at, v);
    if (work.now.slope[j] !== 0 || (work.now.x[j] as number) < (h[v] as number)) continue;
    rhs.fill(0);
    rhs[ends[3 * j] as number] = -(law[WIDTH * j] as number);
    rhs[ends[3 * j + 1] as number] = -(law[WIDTH * j + 1] as number);
    rhs[n] = 0;
    solveSymmetric(plan, work.now.v, rhs);
    rhs[n] = 0;
    for (let w = 0; w < count; w++) {
      const i = valves[w] as number;
      if (signalOf(system, i, work.now.p) < 0) continue;
      let sum = 0;
      for (let s = pilots.start[i] as number; s < (pilots.start[i + 1] as number); s++) {
        sum += (pilots.factor[s] as number) * (rhs[pilots.line[s] as number] as number);
      }
      const other = matrix[w] as Float64Array;
      other[v] = (other[v] as number) - sum * (pilots.slope[i] as number);
    }
  }
  return eliminate(matrix, step);
}

function eliminate(matrix: Float64Array[], out: Float64Array): boolean {
  const count = matrix.length;
  for (let k = 0; k < count; k++) {
    let best = k;
    for (let i = k + 1; i < count; i++)
      if (Math.abs(matrix[i]?.[k] as number) > Math.abs(matrix[best]?.[k] as number)) best = i;
    const row = matrix[best] as Float64Array;
    matrix[best] = matrix[k] as Float64Array;
    matrix[k] = row;
    const pivot = row[k] as number;
    if (!(Math.abs(pivot) > 1e-14)) return false;
    for (let i = k + 1; i < count; i++) {
      const other = matrix[i] as Float64Array;
      const share = (other[k] as number) / pivot;
      if (share !== 0) for (let c = k; c <= count; c++) other[c] = (other[c] as number) - share * (row[c] as number);
    }
  }
  for (let k = count - 1; k >= 0; k--) {
    const row = matrix[k] as Float64Array;
    let sum = row[count] as number;
    for (let c = k + 1; c < count; c++) sum -= (row[c] as number) * (out[c] as number);
    out[k] = sum / (row[k] as number);
  }
  return out.every((value) => Number.isFinite(value));
}
