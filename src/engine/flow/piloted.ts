import { WIDTH, HI, flowScale } from './assemble.ts';
import type { FlowSystem } from './assemble.ts';
import { bracketFlows } from './bracket.ts';
import { certify, isGood } from './certificate.ts';
import { continueFromLeaky } from './leaky.ts';
import { nestBrackets } from './nested.ts';
import { newtonOnFlows } from './pilot-newton.ts';
import { couple, sense, settleAt } from './pilotage.ts';
import type { Pilotage } from './pilotage.ts';
import type { Limits, Outcome, Workspace } from './workspace.ts';

export function solvePiloted(
  system: FlowSystem,
  work: Workspace,
  limits: Limits,
  warm: ArrayLike<number> | undefined,
): Outcome {
  const { pilots, active, plain, law, n } = system;
  const count = active.length - plain;
  const valves = Int32Array.from(active.subarray(plain), (j) => pilots.of[j] as number);
  const bounds = Float64Array.from(valves, (i) => law[WIDTH * (pilots.branch[i] as number) + HI] as number);
  const scale = flowScale(system);
  const most = 100 * scale;
  const at: Pilotage = {
    system,
    work,
    limits,
    valves,
    h: new Float64Array(count),
    open: new Float64Array(count),
    scale,
  };
  const restore = (): void =>
    valves.forEach((i, v) => (law[WIDTH * (pilots.branch[i] as number) + HI] = bounds[v] as number));
  let outcome: Outcome = 'stuck';
  /** True if this ends the search: answers count only with their evidence. */
  const ends = (found: Outcome): boolean => {
    outcome = found;
    for (let polish = 0; polish < 2 && outcome === 'converged'; polish++) {
      restore();
      if (isGood(certify(system, work.now.p, work.now.x, 0))) return true;
      outcome = polish === 0 ? couple(at) : 'stuck';
    }
    return outcome === 'cancelled';
  };
  try {
    for (let start = warm ? 0 : 1; start < 4; start++) {
      if (start === 0 && warm) {
        for (let i = 0; i < n; i++) work.now.p[i] = warm[i] as number;
        sense(at);
        at.h.set(at.open);
      } else at.h.fill(start === 1 ? most : start === 2 ? 0 : 0.3 * scale);
      // What has no way out with every valve wide open has none with any of them less open.
      if (start === 1 && settleAt(at) === 'runs away') return 'runs away';
      if (ends(newtonOnFlows(at)) || (outcome === 'stuck' && ends(couple(at)))) return outcome;
    }
    for (const attempt of [continueFromLeaky, nestBrackets, bracketFlows]) if (ends(attempt(at, most))) return outcome;
    for (let start = 0; start < 6; start++) {
      at.h.fill(start % 3 === 0 ? most : start % 3 === 1 ? 0 : 0.3 * scale);
      if (settleAt(at) === 'cancelled') return 'cancelled';
      if (ends(couple(at, (start < 3 ? 1e-8 : 1e-10) * (scale / 1e-3)))) return outcome;
    }
    return outcome;
  } finally {
    restore();
  }
}
