import { newtonOnFlows } from './pilot-newton.ts';
import { couple, sense } from './pilotage.ts';
import type { Pilotage } from './pilotage.ts';
import type { Outcome } from './workspace.ts';

/** Times its own leak with which the continuation begins: about 10 L/min at 100 bar. */
const FIRST = 1e6;
const STEPS = 60;

/**
 * Lines that nothing but their leak drains answer a hair of flow with hundreds of bar, and a pilot on such a
 * line swings its valve from shut to open. So the circuit is solved with leaky lines first, and the answer is
 * carried along while the leak shrinks to its own size, in shorter strides where it is lost.
 */
export function continueFromLeaky(at: Pilotage, most: number): Outcome {
  const { system, h } = at;
  const own = system.leak;
  const good = new Float64Array(h.length);
  const pressures = new Float64Array(system.n);
  try {
    for (const start of [most, 0, 0.3 * at.scale]) {
      h.fill(start);
      let factor = FIRST;
      let stride = 0.1;
      let last = 0;
      for (let step = 0; step < STEPS; step++) {
        system.leak = own * factor;
        let outcome = newtonOnFlows(at);
        if (outcome === 'stuck') {
          outcome = couple(at);
          if (outcome === 'converged') {
            sense(at);
            h.set(at.open);
          }
        }
        if (outcome === 'cancelled' || (outcome === 'converged' && factor === 1)) return outcome;
        if (outcome === 'converged') {
          last = factor;
          good.set(h);
          for (let i = 0; i < system.n; i++) pressures[i] = at.work.now.p[i] as number;
          stride = Math.max(0.03, stride * stride);
        } else {
          stride = Math.sqrt(stride);
          if (last === 0 || stride > 0.9) break;
          h.set(good);
          for (let i = 0; i < system.n; i++) at.work.now.p[i] = pressures[i] as number;
        }
        factor = Math.max(1, last * stride);
      }
    }
    return 'stuck';
  } finally {
    system.leak = own;
  }
}
