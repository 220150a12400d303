import { FlowBuilder } from '../../../src/engine/flow/builder.ts';
import { TANK } from '../../../src/engine/flow/problem.ts';
import type { FlowProblem } from '../../../src/engine/flow/problem.ts';

/** Small reproducible generator (mulberry32). */
export function dice(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

export const LPM = 1e-3 / 60;
export const BAR = 1e5;

export interface Recipe {
  readonly lines: number;
  readonly cylinders: number;
  /** Pilot-sensed valves among the joints. */
  readonly piloted?: number;
  /** Straight-line losses only, and a larger leak: what a QP solver can check. */
  readonly linear?: boolean;
}

/**
 * A random but plausible circuit: a pump line with its relief, a tree of lines behind it joined by
 * paths, checks, throttles, flow controls and reliefs, some returns to tank, and cylinders between
 * random lines.
 */
export function randomCircuit(seed: number, recipe: Recipe): FlowProblem {
  const roll = dice(seed);
  const between = (low: number, high: number): number => low + (high - low) * roll();
  const pick = (count: number): number => Math.floor(roll() * count);
  const linear = recipe.linear === true;
  const b = linear ? new FlowBuilder((1e-4 * LPM) / BAR) : new FlowBuilder();
  const n = recipe.lines;
  for (let i = 0; i < n; i++) b.line(`L${i}`);
  const loss = (): { flow?: number; drop?: number; laminar?: number } =>
    linear
      ? { laminar: (between(0.02, 0.3) * BAR) / LPM }
      : { flow: between(20, 80) * LPM, drop: between(0.5, 5) * BAR };
  const tight = (): { flow?: number; drop?: number; laminar?: number } =>
    linear ? { laminar: (between(1, 20) * BAR) / LPM } : { flow: between(2, 20) * LPM, drop: between(20, 60) * BAR };
  const setting = between(100, 250) * BAR;
  const flow = between(5, 80) * LPM;
  if (roll() < 0.75) {
    b.pumpFixed('pump', 0, flow);
    b.relief('relief', 0, TANK, setting, (between(0.05, 0.5) * BAR) / LPM);
  } else b.pumpCompensated('pump', 0, flow, setting, between(1, 10) * BAR);
  let left = recipe.piloted ?? 0;
  const join = (id: string, from: number, to: number): void => {
    const kind = roll();
    if (left > 0 && roll() < 0.5) {
      left--;
      piloted(id, from, to);
    } else if (kind < 0.5) b.openPath(id, from, to, loss());
    else if (kind < 0.65) b.check(id, from, to, between(0, 3) * BAR, loss());
    else if (kind < 0.72) b.check(id, to, from, between(0, 3) * BAR, loss());
    else if (kind < 0.82) b.throttle(id, from, to, tight());
    else if (kind < 0.9) b.flowControl(id, from, to, between(3, 30) * LPM, loss());
    else if (kind < 0.95) b.relief(id, from, to, between(20, 120) * BAR, (between(0.05, 0.5) * BAR) / LPM);
    else b.openPath(id, from, to, loss(), false);
  };
  const piloted = (id: string, from: number, to: number): void => {
    const gradient = (between(0.05, 0.5) * BAR) / LPM;
    const data = { setting: between(20, 120) * BAR, gradient, loss: loss() };
    const kind = pick(5);
    const pilot = pick(n);
    if (kind === 0) b.sequenceValve(id, from, to, data);
    else if (kind === 1) b.unloadingValve(id, from, to, pilot, data);
    else if (kind === 2)
      b.counterbalance(id, to, from, pilot, between(2, 8), { ...data, setting: between(80, 200) * BAR });
    else if (kind === 3) b.reducingValve(id, from, to, data);
    else
      b.lockCheck(id, from, to, pilot, between(2, 5), {
        cracking: between(0, 2) * BAR,
        gradient: gradient * 0.5,
        loss: loss(),
      });
  };
  for (let i = 1; i < n; i++) join(`J${i}`, pick(Math.min(i, 1 + pick(i))), i);
  const extra = pick(1 + Math.floor(n / 4));
  for (let e = 0; e < extra; e++) {
    const from = pick(n);
    join(`X${e}`, from, (from + 1 + pick(n - 1)) % n);
  }
  const returns = 1 + pick(Math.max(1, Math.floor(n / 3)));
  for (let t = 0; t < returns; t++) {
    const from = 1 + pick(n - 1);
    if (roll() < 0.6) b.openPath(`T${t}`, from, TANK, loss());
    else b.throttle(`T${t}`, from, TANK, tight());
  }
  for (let c = 0; c < recipe.cylinders; c++) {
    const from = pick(n);
    const to = (from + 1 + pick(n - 1)) % n;
    const bore = between(0.03, 0.12);
    const areaA = (Math.PI / 4) * bore * bore;
    const areaB = areaA * between(0.4, 0.85);
    const force = areaA * between(0, 120) * BAR;
    const sense = pick(3);
    const friction = roll() < 0.5 ? 0 : areaA * between(0, 5) * BAR;
    const load =
      sense === 0
        ? { resisting: force, friction }
        : sense === 1
          ? { pressing: force, friction }
          : { pressing: -force, friction };
    const place = pick(8);
    const at = place === 0 ? ({ at: 'in' } as const) : place === 1 ? ({ at: 'out' } as const) : {};
    b.cylinder(`C${c}`, from, to, {
      areaA,
      areaB,
      load,
      ...at,
      ...(linear ? { drag: areaA * between(0.5, 5) * BAR } : { ports: loss() }),
    });
  }
  return b.build();
}
