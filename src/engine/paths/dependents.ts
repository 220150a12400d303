import { emptySet, fullSet, has } from '../../base/bits.ts';
import type { BitSet } from '../../base/bits.ts';
import { trips } from '../../network/dependents.ts';
import type { NetDependent, NetPressureShift, Network } from '../../network/network.ts';
import { PathSolver } from './block.ts';
import type { SettledBlock } from './block.ts';
import { compileEdges, follow, positionMask } from './edges.ts';
import type { DependentPlanes, EdgeSet } from './edges.ts';
import type { PathConditions } from './reach.ts';

/** Where open paths put the dependent valves, row by row. */
export interface PathSettled {
  readonly planes: DependentPlanes;
  /** Rows in which no setting agrees with the open paths that it makes. */
  readonly hunts: BitSet;
  /** Rows with a further setting that agrees, by where each valve stands in it. */
  readonly others: DependentPlanes;
  /** Per valve: rows in which the pressures may put it elsewhere. */
  readonly open: readonly BitSet[];
  /** False where there were too many settings to look for others. */
  readonly searched: boolean;
}

/** One way to set a valve in every row at once: a plane for each position. */
export type Choice = readonly BitSet[];

/** Settings of all valves together that are tried for every row. */
const MOST_SETTINGS = 128;
const BLOCK = 128;

/** The same setting of the dependent valves in every row. */
export const constantPlanes = (net: Network, setting: readonly number[], states: number): Choice[] =>
  net.dependents.map(({ positions }, d) =>
    positions.map((_, p) => (p === setting[d] ? fullSet(states) : emptySet(states))),
  );

/** Position of every dependent valve in a row. Throws if there are some and `planes` is not given. */
export function settingOf(net: Network, planes: DependentPlanes | undefined, row: number): number[] {
  if (planes === undefined && net.dependents.length > 0)
    throw new Error('nobody says where the dependent valves stand');
  return (planes ?? []).map((positions) =>
    Math.max(
      0,
      positions.findIndex((plane) => plane !== undefined && has(plane, row)),
    ),
  );
}

/**
 * Dependent valves by open paths alone: a pilot acts while its line is fed and not freely open to tank,
 * and what is set against it is not. The pressures have the last word.
 */
export class PathDependents {
  readonly net: Network;
  readonly edges: EdgeSet;
  /** Rewritten block by block. */
  readonly planes: readonly (readonly BitSet[])[];
  readonly choices: readonly (readonly Choice[])[];
  readonly #solver: PathSolver;
  readonly #stages = new Map<NetPressureShift, BitSet>();
  readonly #tripped: readonly number[];

  constructor(net: Network, conditions: PathConditions, maxWidth: number) {
    const states = net.inputs.reduce((n, input) => n * input.positions.length, 1);
    const places = conditions.places.map((stop) => ({ stop }));
    this.net = net;
    this.planes = constantPlanes(
      net,
      net.dependents.map(({ rest }) => rest ?? 0),
      states,
    );
    this.edges = compileEdges(net, this.planes);
    this.#solver = new PathSolver(net, this.edges, conditions, maxWidth);
    const radices = net.inputs.map((input) => input.positions.length);
    for (const { shifts } of net.dependents)
      for (const shift of shifts) {
        if (shift.by === 'pressure')
          this.#stages.set(
            shift,
            shift.input < 0 ? fullSet(states) : positionMask(radices, shift.input, shift.stages, states),
          );
      }
    this.#tripped = net.dependents.map(
      ({ shifts }) => shifts.find((shift) => shift.by === 'roller' && trips(shift, places))?.position ?? -1,
    );
    this.choices = net.dependents.map((valve, d) => this.#choicesOf(valve, d, states));
  }

  /** Sets words `at` … of the planes to these. */
  put(settings: readonly Choice[], at: number, width: number): void {
    settings.forEach((choice, d) =>
      choice.forEach((plane, p) => this.planes[d]?.[p]?.set(plane.subarray(at, at + width), at)),
    );
  }

  /** The block with the planes as they stand. */
  solve(at: number, width: number): SettledBlock {
    follow(this.edges.masks, this.edges.follows, this.planes, at, width);
    return this.#solver.solve(at, width);
  }

  /** Where each valve goes from the planes as they stand: [dependent][position], words of the block. */
  next({ at, width, all, reach: r }: SettledBlock): Uint32Array[][] {
    return this.net.dependents.map((valve, d) => {
      const to = valve.positions.map(() => new Uint32Array(width));
      const tripped = this.#tripped[d] as number;
      for (let w = 0; w < width; w++) {
        let left = all[w] as number;
        const give = (position: number, bits: number): void => {
          const plane = to[position];
          if (plane) plane[w] = (plane[w] as number) | (bits & left);
          left &= ~bits;
        };
        if (tripped >= 0) give(tripped, -1);
        for (const shift of valve.shifts) {
          if (shift.by !== 'pressure') continue;
          let acts = (this.#stages.get(shift)?.[at + w] as number) & left;
          for (const { line, factor } of shift.signals) {
            const i = line * width + w;
            const pressed =
              ((r.fromSource[i] as number) | (r.underPressure[i] as number)) & (r.notFreeToTank[i] as number);
            acts &= factor > 0 ? pressed : ~pressed;
          }
          give(shift.position, acts);
        }
        if (valve.rest !== undefined) give(valve.rest, -1);
        else valve.positions.forEach((_, p) => give(p, this.planes[d]?.[p]?.[at + w] as number));
      }
      return to;
    });
  }

  /** Rows of a block in which a pressure that open paths do not rule out could shift the valve. */
  mayShift({ at, width, reach: r }: SettledBlock, d: number): Uint32Array {
    const out = new Uint32Array(width);
    if ((this.#tripped[d] as number) >= 0) return out;
    for (const shift of this.net.dependents[d]?.shifts ?? []) {
      if (shift.by !== 'pressure') continue;
      for (let w = 0; w < width; w++) {
        let may = this.#stages.get(shift)?.[at + w] as number;
        for (const { line, factor } of shift.signals) {
          if (factor <= 0) continue;
          const i = line * width + w;
          const pressed = (r.fromSource[i] as number) | (r.valves?.pressed[i] ?? 0);
          may &= pressed | ~(r.toTank[i] as number);
        }
        out[w] = (out[w] as number) | may;
      }
    }
    return out;
  }

  /** Rows in which a valve has a shift that its pilot stage lets act. */
  staged(d: number, w: number): number {
    let shifted = 0;
    for (const shift of this.net.dependents[d]?.shifts ?? [])
      if (shift.by === 'pressure') shifted |= this.#stages.get(shift)?.[w] as number;
    return (this.#tripped[d] as number) >= 0 ? 0 : shifted;
  }

  #choicesOf(valve: NetDependent, d: number, states: number): Choice[] {
    const constant = (position: number): Choice =>
      valve.positions.map((_, p) => (p === position ? fullSet(states) : emptySet(states)));
    const tripped = this.#tripped[d] as number;
    if (tripped >= 0) return [constant(tripped)];
    if (valve.rest === undefined) return valve.positions.map((_, p) => constant(p));
    const rest = constant(valve.rest);
    const shifts = valve.shifts.filter((shift) => shift.by === 'pressure');
    const piloted = shifts.filter((shift) => shift.input < 0).map((shift) => constant(shift.position));
    const commanded = shifts.filter((shift) => shift.input >= 0);
    if (commanded.length === 0) return [rest, ...piloted];
    // A pilot stage leaves the main spool two choices: where it leads, and rest.
    const led = valve.positions.map(() => emptySet(states));
    const still = fullSet(states);
    for (const shift of commanded) {
      const stage = this.#stages.get(shift) as BitSet;
      const plane = led[shift.position] as BitSet;
      for (let w = 0; w < stage.length; w++) {
        plane[w] = (plane[w] as number) | ((stage[w] as number) & (still[w] as number));
        still[w] = (still[w] as number) & ~(stage[w] as number);
      }
    }
    const plane = led[valve.rest] as BitSet;
    for (let w = 0; w < plane.length; w++) plane[w] = (plane[w] as number) | (still[w] as number);
    return [rest, ...piloted, led];
  }
}

/** Rows in which two settings put some valve differently, words of a block. */
function differ(a: readonly (readonly Uint32Array[])[], b: readonly Choice[], at: number, width: number): Uint32Array {
  const out = new Uint32Array(width);
  a.forEach((planes, d) =>
    planes.forEach((plane, p) => {
      const other = b[d]?.[p] as BitSet;
      for (let w = 0; w < width; w++) out[w] = (out[w] as number) | ((plane[w] as number) ^ (other[at + w] as number));
    }),
  );
  return out;
}

/** Rows of a word with a further setting that agrees. */
const elsewhere = (others: readonly Choice[], w: number): number =>
  (others[0] ?? []).reduce((sum, plane) => sum | (plane[w] as number), 0);

/** Settles every row by open paths. `heartbeat` may throw. */
export function settleByPaths(net: Network, conditions: PathConditions, heartbeat: () => void = () => {}): PathSettled {
  const states = net.inputs.reduce((n, input) => n * input.positions.length, 1);
  const words = fullSet(states).length;
  const solver = new PathDependents(net, conditions, Math.min(BLOCK, words));
  const hunts = emptySet(states);
  const empty = (): BitSet[][] => net.dependents.map(({ positions }) => positions.map(() => emptySet(states)));
  const chosen = empty();
  const others = empty();
  const open = net.dependents.map(() => emptySet(states));
  const settings = solver.choices.reduce((n, list) => n * list.length, 1);
  const searched = settings <= MOST_SETTINGS;
  const all = searched
    ? solver.choices.reduce<Choice[][]>((sofar, list) => sofar.flatMap((one) => list.map((c) => [...one, c])), [[]])
    : [];
  const rest = constantPlanes(
    net,
    net.dependents.map((valve) => valve.rest ?? 0),
    states,
  );
  for (let at = 0; at < words; at += BLOCK) {
    const width = Math.min(BLOCK, words - at);
    heartbeat();
    const rounds = Math.min(settings, 4 * net.dependents.length) + 2;
    solver.put(rest, at, width);
    let moving: Uint32Array = new Uint32Array(width);
    for (let round = 0; round < rounds; round++) {
      const next = solver.next(solver.solve(at, width));
      moving = differ(next, solver.planes, at, width);
      next.forEach((planes, d) => planes.forEach((plane, p) => solver.planes[d]?.[p]?.set(plane, at)));
      if (moving.every((word) => word === 0)) break;
    }
    const mine = solver.planes.map((planes) => planes.map((plane) => plane.slice(at, at + width)));
    const agreeing = all.map((setting) => {
      if (all.length === 1) return new Uint32Array(width);
      solver.put(setting, at, width);
      const block = solver.solve(at, width);
      const off = differ(solver.next(block), solver.planes, at, width);
      return off.map((word, w) => ~word & (block.all[w] as number));
    });
    // Rows that came to no end take the first setting that agrees.
    all.forEach((setting, i) => {
      const agree = agreeing[i] as Uint32Array;
      for (let w = 0; w < width; w++) {
        const take = (moving[w] as number) & (agree[w] as number);
        if (take === 0) continue;
        moving[w] = (moving[w] as number) & ~take;
        mine.forEach((planes, d) =>
          planes.forEach((plane, p) => {
            plane[w] = ((plane[w] as number) & ~take) | ((setting[d]?.[p]?.[at + w] as number) & take);
          }),
        );
      }
    });
    hunts.set(moving, at);
    all.forEach((setting, i) => {
      const other = differ(mine, setting, at, width);
      for (let w = 0; w < width; w++) {
        const rows = (other[w] as number) & (agreeing[i]?.[w] as number);
        if (rows === 0) continue;
        setting.forEach((choice, d) =>
          choice.forEach((plane, p) => {
            const target = others[d]?.[p] as BitSet;
            target[at + w] = (target[at + w] as number) | ((plane[at + w] as number) & rows);
          }),
        );
      }
    });
    mine.forEach((planes, d) => planes.forEach((plane, p) => chosen[d]?.[p]?.set(plane, at)));
    solver.put(chosen, at, width);
    const block = solver.solve(at, width);
    // It has moved, or could have been elsewhere before, or a pressure may yet move it.
    const any = differ(mine, rest, at, width).map((word, w) => word | elsewhere(others, at + w));
    net.dependents.forEach((_, d) =>
      solver.mayShift(block, d).forEach((word, w) => (any[w] = (any[w] as number) | word)),
    );
    // Where one valve may stand elsewhere, so may every one that its pilot could reach by then.
    open.forEach((plane, d) => any.forEach((word, w) => (plane[at + w] = word & solver.staged(d, at + w))));
  }
  return { planes: chosen, hunts, others, open, searched };
}
