import type { Outcome } from './workspace.ts';
import { couple, gap, settleAt } from './pilotage.ts';
import type { Pilotage } from './pilotage.ts';

const SWEEPS = 12;
const HALVINGS = 45;
/** Newton iterations that the search may take in all: about a fifth of a second. */
const SPEND = 50_000;

/**
 * Last resort for pilot-sensed valves: one flow after the other is bracketed between shut and `most`,
 * which for a single valve always ends: what the pilot asks less what passes changes sign between the two.
 * Where pressures jump between the two ends of a bracket, the answer lies between them at the same flow:
 * the coupled iteration is then started from in between.
 */
export function bracketFlows(at: Pilotage, most: number): Outcome {
  const { h, scale, limits, work, system } = at;
  const below = new Float64Array(system.n),
    above = new Float64Array(system.n);
  const end = work.counts.iterations + SPEND;
  h.fill(0);
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    for (let v = 0; v < h.length; v++) {
      if (limits.cancelled()) return 'cancelled';
      let low = 0,
        high = most;
      let excessLow = 0,
        excessHigh = 0;
      for (let round = 0; round < HALVINGS && high - low > 1e-9 * scale; round++) {
        h[v] = round === 0 ? 0 : round === 1 ? most : low > 0 ? 0.5 * (low + high) : Math.min(scale, 0.25 * high);
        if (work.counts.iterations > end) return 'stuck';
        const outcome = settleAt(at);
        if (outcome === 'cancelled') return outcome;
        const excess = gap(at, v);
        if (outcome === 'converged' && Math.abs(excess) <= 1e-10 * scale) break;
        if (excess > 0) {
          high = h[v] as number;
          excessHigh = excess;
          keep(above, work.now.p);
        } else {
          low = h[v] as number;
          excessLow = excess;
          keep(below, work.now.p);
        }
        if (round > 20 && round % 6 === 0 && excessHigh > excessLow) {
          const found = between(at, below, above, excessLow / (excessLow - excessHigh));
          if (found !== 'stuck') return found;
        }
      }
    }
    const outcome = settleAt(at);
    if (outcome === 'converged' && h.every((_, v) => Math.abs(gap(at, v)) <= 1e-10 * scale)) return 'converged';
    const found = couple(at);
    if (found !== 'stuck') return found;
  }
  return 'stuck';
}

function keep(into: Float64Array, p: Float64Array): void {
  for (let i = 0; i < into.length; i++) into[i] = p[i] as number;
}

/** Coupled iteration from the pressures that lie the given share of the way from `below` to `above`. */
function between(at: Pilotage, below: Float64Array, above: Float64Array, share: number): Outcome {
  const { p } = at.work.now;
  for (let i = 0; i < below.length; i++)
    p[i] = (below[i] as number) + share * ((above[i] as number) - (below[i] as number));
  const found = couple(at);
  if (found === 'stuck') keep(p.subarray(0, below.length), below);
  return found;
}
