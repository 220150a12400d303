import { addCouplers, coupledLines, layCouplers } from './couplers.ts';
import type { Couplers } from './couplers.ts';
import { NEAR_IDEAL } from './laws.ts';
import { contradictions } from './problem.ts';
import type { Branch, Contradiction, FlowProblem } from './problem.ts';
import { planElimination } from './sparse.ts';
import type { Plan } from './sparse.ts';

/** Numbers of one branch in `law`: areas, law, bounds. */
export const WIDTH = 8;
const CA = 0,
  CB = 1,
  FORWARD = 2,
  BACKWARD = 3,
  R = 4,
  K = 5,
  LO = 6;
/** Offset of the upper bound, which the treatment of pilot-sensed valves lowers. */
export const HI = 7;

/**
 * A problem laid out for the iteration: which branch meets which line, the elimination plan, and the
 * values. Built once per circuit; branches are switched on and off and pumps changed in place.
 */
export interface FlowSystem {
  readonly problem: FlowProblem;
  readonly contradictions: readonly Contradiction[];
  readonly n: number;
  readonly m: number;
  readonly plan: Plan;
  /** Three per branch: line a, line b (n = tank), slot of the entry that joins them. */
  readonly ends: Int32Array;
  readonly law: Float64Array;
  readonly on: Uint8Array;
  /** m³/s into each line at full stroke. */
  readonly source: Float64Array;
  readonly pumpFlow: Float64Array;
  /** m³/s per Pa; larger than the problem's own while a solve is carried along from leaky lines. */
  leak: number;
  readonly pilots: Pilots;
  readonly couplers: Couplers;
  /** Branches that are on: the first `plain` without pilot, the rest with one. */
  active: Int32Array;
  /** Where `active` lies. */
  readonly room: Int32Array;
  plain: number;
}

/** Pilot-sensed branches, numbered by `of`; signals of pilot i stand from start[i] to start[i + 1]. */
export interface Pilots {
  readonly branch: Int32Array;
  /** Branch → pilot number, −1 without. */
  readonly of: Int32Array;
  readonly setting: Float64Array;
  /** m³/s per Pa */
  readonly slope: Float64Array;
  readonly start: Int32Array;
  readonly line: Int32Array;
  readonly factor: Float64Array;
  /** Slots of (line a, signal line) and (line b, signal line). */
  readonly slotA: Int32Array;
  readonly slotB: Int32Array;
}

export function assemble(problem: FlowProblem): FlowSystem {
  const faults = contradictions(problem);
  const sound = faults.length === 0;
  const branches = sound ? problem.branches : [];
  const n = problem.lines.length;
  const m = branches.length;
  const tank = (line: number): number => (line < 0 ? n : line);
  const edges: [number, number][] = [];
  for (const b of branches) {
    edges.push([b.a, b.b]);
    for (const s of b.pilot?.signals ?? []) edges.push([b.a, s.line], [b.b, s.line]);
  }
  const couplers = sound ? (problem.couplers ?? []) : [];
  edges.push(...coupledLines(couplers, tank));
  const plan = planElimination(n, edges);
  const ends = new Int32Array(3 * m);
  const law = new Float64Array(WIDTH * m);
  branches.forEach((b, j) => {
    // Both chambers in one line: the net area drives it.
    const [a, e, ca, cb] = b.a === b.b ? [tank(b.a), n, b.ca + b.cb, 0] : [tank(b.a), tank(b.b), b.ca, b.cb];
    ends.set([a, e, Math.min(plan.at(a, e), plan.at(e, a))], 3 * j);
    law.set(
      [ca, cb, b.hi > 0 ? b.forward : Infinity, b.lo < 0 ? b.backward : -Infinity, b.r, b.k, b.lo, b.hi],
      WIDTH * j,
    );
  });
  const source = new Float64Array(n);
  if (sound) for (const pump of problem.pumps) source[pump.line] = (source[pump.line] as number) + pump.flow;
  const system: FlowSystem = {
    problem,
    contradictions: faults,
    n,
    m,
    plan,
    ends,
    law,
    source,
    on: Uint8Array.from(branches, (b) => (b.on ? 1 : 0)),
    pumpFlow: Float64Array.from(problem.pumps, (pump) => pump.flow),
    leak: problem.leak,
    pilots: layPilots(branches, plan, tank),
    couplers: layCouplers(couplers, plan, tank),
    active: new Int32Array(0),
    room: new Int32Array(m),
    plain: 0,
  };
  listActive(system);
  return system;
}

function layPilots(branches: readonly Branch[], plan: Plan, tank: (line: number) => number): Pilots {
  const list = branches.flatMap((b, j) => (b.pilot ? [{ b, j, pilot: b.pilot }] : []));
  const start = [0];
  const line: number[] = [],
    factor: number[] = [],
    slotA: number[] = [],
    slotB: number[] = [];
  for (const { b, pilot } of list) {
    for (const s of pilot.signals) {
      const q = tank(s.line);
      line.push(q);
      factor.push(s.factor);
      slotA.push(q === plan.n ? plan.n : plan.at(tank(b.a), q));
      slotB.push(q === plan.n ? plan.n : plan.at(tank(b.b), q));
    }
    start.push(line.length);
  }
  const of = new Int32Array(branches.length).fill(-1);
  list.forEach(({ j }, i) => (of[j] = i));
  return {
    branch: Int32Array.from(list, (e) => e.j),
    of,
    setting: Float64Array.from(list, (e) => e.pilot.setting),
    slope: Float64Array.from(list, (e) => 1 / e.pilot.gradient),
    start: Int32Array.from(start),
    line: Int32Array.from(line),
    factor: Float64Array.from(factor),
    slotA: Int32Array.from(slotA),
    slotB: Int32Array.from(slotB),
  };
}

/** To be called after `on` was changed. */
export function listActive(system: FlowSystem): void {
  const { m, on, pilots, room } = system;
  let count = 0;
  for (let j = 0; j < m; j++) if (on[j] === 1 && pilots.of[j] === -1) room[count++] = j;
  system.plain = count;
  for (const j of pilots.branch) if (on[j] === 1) room[count++] = j;
  if (system.active.length !== count) system.active = room.subarray(0, count);
}

/** Largest part of the flow scale: residuals are measured against it. m³/s. */
export function flowScale(system: FlowSystem): number {
  let scale = 1e-3 / 60;
  for (let i = 0; i < system.n; i++) scale = Math.max(scale, system.source[i] as number);
  return scale;
}

/** One evaluation: net outflow of each line, its slope, and every branch's through-put. */
export interface Point {
  /** Added to every r per square of area, Pa per m³/s: 0 at the end, more while the iteration finds its way. */
  softness: number;
  /** Pressures; entry n is the tank's 0. */
  readonly p: Float64Array;
  /** Net flow out of each line; entry n collects the tank's. */
  readonly f: Float64Array;
  /** ∂f/∂p in the slots of the plan. */
  readonly v: Float64Array;
  readonly x: Float64Array;
  /** dx/du of each branch. */
  readonly slope: Float64Array;
}

export function newPoint(system: FlowSystem): Point {
  const { n, m, plan } = system;
  return {
    softness: 0,
    p: new Float64Array(n + 1),
    f: new Float64Array(n + 1),
    v: new Float64Array(plan.size),
    x: new Float64Array(m),
    slope: new Float64Array(m),
  };
}

/** Every branch with its bounds as they stand in `law`; `v` above the diagonal only. */
export function evaluate(system: FlowSystem, at: Point, before: Float64Array): void {
  balance(system, at);
  branchFlows(system, at, before, 0, system.active.length);
}

/** Leak, void and pump of every line. */
export function balance(system: FlowSystem, at: Point): void {
  const { n, source, leak } = system;
  const { p, f, v } = at;
  const voidSlope = 1 / (NEAR_IDEAL.void + at.softness);
  v.fill(0, n);
  f[n] = 0;
  for (let i = 0; i < n; i++) {
    const pressure = p[i] as number;
    const slope = pressure < 0 ? leak + voidSlope : leak;
    f[i] = pressure * slope - (source[i] as number);
    v[i] = slope;
  }
  if (system.couplers.count > 0) addCouplers(system.couplers, p, f, v, at.softness);
}

/** Through-put by the law that stands at `l`, as it is without softness. */
export function flowAt(law: Float64Array, l: number, u: number): number {
  let t = u - (law[l + FORWARD] as number);
  let flow = 0;
  if (t > 0) {
    const r = law[l + R] as number;
    flow = (2 * t) / (r + Math.sqrt(r * r + 4 * (law[l + K] as number) * t));
  } else {
    t = (law[l + BACKWARD] as number) - u;
    if (t > 0) {
      const r = law[l + R] as number;
      flow = (-2 * t) / (r + Math.sqrt(r * r + 4 * (law[l + K] as number) * t));
    }
  }
  if (flow >= (law[l + HI] as number)) flow = law[l + HI] as number;
  return flow <= (law[l + LO] as number) ? (law[l + LO] as number) : flow;
}

/** Active branches from `first` to before `end`. `before`: through-puts at the last point, to tell where a flow turned. */
export function branchFlows(system: FlowSystem, at: Point, before: Float64Array, first: number, end: number): void {
  const { ends, law, active } = system;
  const { p, f, v, x, slope } = at;
  const soft = at.softness;
  for (let i = first; i < end; i++) {
    const j = active[i] as number;
    const e = 3 * j;
    const l = WIDTH * j;
    const a = ends[e] as number;
    const b = ends[e + 1] as number;
    const ca = law[l + CA] as number;
    const cb = law[l + CB] as number;
    const u = ca * (p[a] as number) + cb * (p[b] as number);
    let t = u - (law[l + FORWARD] as number);
    let flow = 0;
    let s = 0;
    if (t > 0) {
      let r = law[l + R] as number;
      if (soft !== 0) r += soft * (ca * ca > cb * cb ? ca * ca : cb * cb);
      const k = law[l + K] as number;
      if (k === 0) {
        s = 1 / r;
        flow = t * s;
      } else {
        const root = Math.sqrt(r * r + 4 * k * t);
        s = 1 / root;
        flow = (2 * t) / (r + root);
        if ((before[j] as number) <= 0) s = flow / t;
      }
    } else {
      t = (law[l + BACKWARD] as number) - u;
      if (t > 0) {
        let r = law[l + R] as number;
        if (soft !== 0) r += soft * (ca * ca > cb * cb ? ca * ca : cb * cb);
        const k = law[l + K] as number;
        const root = k === 0 ? r : Math.sqrt(r * r + 4 * k * t);
        s = 1 / root;
        flow = (-2 * t) / (r + root);
        if ((before[j] as number) >= 0) s = -flow / t;
      }
    }
    if (flow >= (law[l + HI] as number)) {
      flow = law[l + HI] as number;
      s = 0;
    }
    if (flow <= (law[l + LO] as number)) {
      flow = law[l + LO] as number;
      s = 0;
    }
    x[j] = flow;
    slope[j] = s;
    if (flow !== 0) {
      f[a] = (f[a] as number) + ca * flow;
      f[b] = (f[b] as number) + cb * flow;
    }
    if (s !== 0) {
      const as = ca * s;
      v[a] = (v[a] as number) + as * ca;
      v[b] = (v[b] as number) + cb * cb * s;
      const slot = ends[e + 2] as number;
      v[slot] = (v[slot] as number) + as * cb;
    }
  }
}
