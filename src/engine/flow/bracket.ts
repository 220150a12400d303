import type { Outcome } from './newton.ts';
import { gap, settleAt } from './piloted.ts';
import type { Pilotage } from './piloted.ts';

const SWEEPS = 25;
const HALVINGS = 60;

/**
 * Last resort for pilot-sensed valves: one flow after the other is bracketed between shut and `most`,
 * which for a single valve always ends: what the pilot asks less what passes changes sign between the two.
 */
export function bracketFlows(at: Pilotage, most: number): Outcome {
  const { h, scale, limits } = at;
  h.fill(0);
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    for (let v = 0; v < h.length; v++) {
      if (limits.cancelled()) return 'cancelled';
      let low = 0, high = most;
      for (let round = 0; round < HALVINGS && high - low > 1e-11 * scale; round++) {
        h[v] = round === 0 ? low : low > 0 ? 0.5 * (low + high) : high > scale ? scale : 0.25 * high;
        const outcome = settleAt(at);
        if (outcome === 'cancelled') return outcome;
        const excess = gap(at, v);
        if (outcome === 'converged' && Math.abs(excess) <= 1e-10 * scale) break;
        if (excess > 0) high = h[v] as number;
        else low = h[v] as number;
        if (round === 0 && low >= high) break;
      }
    }
    const outcome = settleAt(at);
    if (outcome !== 'converged') continue;
    if (h.every((_, v) => Math.abs(gap(at, v)) <= 1e-9 * scale)) return 'converged';
  }
  return 'stuck';
}
