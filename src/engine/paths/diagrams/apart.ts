import type { Network } from '../../../network/network.ts';
import type { Diagram } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';
import type { Ways } from './eliminate.ts';
import { planFor } from './elimination-plan.ts';
import type { SetAlgebra } from './set-algebra.ts';
import type { LineSets } from './set-edges.ts';

/** What a search without one actuator finds at its two lines; NONE for a side that it has not. */
export type Ends = readonly [Diagram, Diagram];

/**
 * For each of these actuators the search over all ways but its own, at its own lines: `seeds` spread along
 * `ways`, and so do ALL at the lines that `swallows` names for other actuators (-1: none).
 *
 * All of them together, by halves: what does not concern one half of the actuators is eliminated once for all
 * in the other half. So n searches take some n·log n steps, and hardly a set is made that only one of them asks for.
 */
export function spreadApart(
  sets: SetAlgebra,
  net: Network,
  ways: Ways,
  seeds: LineSets,
  asked: readonly number[],
  swallows: (actuator: number) => number = () => -1,
): Map<number, Ends> {
  const found = new Map<number, Ends>();
  if (asked.length === 0) return found;
  const own = new Set(asked);
  const tank = net.lines.map((line) => line.tank);
  const whole = new Joined(
    sets,
    net.lines.map((_, line) => line),
    seeds,
  );
  const openTo = (to: number, set: Diagram): Diagram =>
    ways.gate === undefined ? set : sets.and(set, ways.gate[to] as Diagram);
  /** The ways through these actuators, and what they swallow. */
  const addOwn = (into: Joined, those: ReadonlySet<number>): void => {
    for (const actuator of those) {
      const { a, b } = net.actuators[actuator] as Network['actuators'][number];
      for (const from of b < 0 || a === b ? [a] : [a, b]) {
        if (tank[from] === true && ways.fromTank !== true) continue;
        for (const link of ways.links?.[from] ?? []) {
          if (link.actuator !== actuator || link.to === from) continue;
          into.open(from, link.to, openTo(link.to, ways.passes?.(actuator, link.to) ?? ALL));
        }
      }
      into.seed(swallows(actuator));
    }
  };
  const { start, to, mask } = ways.edges;
  for (let from = 0; from < tank.length; from++) {
    // Tanks absorb.
    if (tank[from] === true && ways.fromTank !== true) continue;
    for (let e = start[from] as number; e < (start[from + 1] as number); e++) {
      const other = to[e] as number;
      if (other !== from) whole.open(from, other, openTo(other, ways.open[mask[e] as number] as Diagram));
    }
  }
  addOwn(whole, new Set(net.actuators.map((_, i) => i).filter((i) => !own.has(i))));

  const place = new Int32Array(tank.length);
  planFor(ways.edges, ways.links, tank, ways.fromTank ?? false).steps.forEach(({ line }, step) => (place[line] = step));
  const firstStep = (actuator: number): number => {
    const { a, b } = net.actuators[actuator] as Network['actuators'][number];
    return Math.min(place[a] as number, b < 0 ? Infinity : (place[b] as number));
  };
  const near = [...asked].sort((x, y) => firstStep(x) - firstStep(y));
  halve(whole, near);
  return found;

  function halve(joined: Joined, list: readonly number[]): void {
    const needed = new Set(
      list.flatMap((actuator) => {
        const { a, b } = net.actuators[actuator] as Network['actuators'][number];
        return [a, b];
      }),
    );
    joined.eliminate(needed, list.length === 1);
    if (list.length === 1) {
      const actuator = list[0] as number;
      const { a, b } = net.actuators[actuator] as Network['actuators'][number];
      found.set(actuator, [joined.at(a, b), joined.at(b, a)]);
      return;
    }
    const middle = list.length >>> 1;
    const [first, second] = [list.slice(0, middle), list.slice(middle)];
    for (const [half, rest] of [
      [first, second],
      [second, first],
    ] as const) {
      const part = joined.copy();
      addOwn(part, new Set(rest));
      halve(part, half);
    }
  }
}

/** Some lines, the seeds that have got to them, and the ways between them, over all lines that are gone. */
class Joined {
  readonly #sets: SetAlgebra;
  /** Lines that are left when it was made; those eliminated since stay in it, as `gone`. */
  readonly #lines: readonly number[];
  readonly #place: Map<number, number>;
  readonly #seeds: Int32Array;
  /** From × to. */
  readonly #ways: Int32Array;
  readonly #into: Int32Array;
  readonly #outOf: Int32Array;
  readonly #gone: Uint8Array;

  constructor(sets: SetAlgebra, lines: readonly number[], seeds: ArrayLike<Diagram>) {
    this.#sets = sets;
    this.#lines = lines;
    this.#place = new Map(lines.map((line, at) => [line, at]));
    this.#seeds = Int32Array.from(seeds);
    this.#ways = new Int32Array(lines.length * lines.length);
    this.#into = new Int32Array(lines.length);
    this.#outOf = new Int32Array(lines.length);
    this.#gone = new Uint8Array(lines.length);
  }

  /** Oil may also get from one line to another in these combinations. */
  open(from: number, to: number, set: Diagram): void {
    this.#open(this.#place.get(from) as number, this.#place.get(to) as number, set);
  }

  #open(from: number, to: number, set: Diagram): void {
    if (set === NONE) return;
    const way = from * this.#lines.length + to;
    const before = this.#ways[way] as Diagram;
    if (before === NONE) {
      this.#outOf[from] = (this.#outOf[from] as number) + 1;
      this.#into[to] = (this.#into[to] as number) + 1;
    }
    this.#ways[way] = this.#sets.or(before, set);
  }

  /** A seed in all combinations; -1: none. */
  seed(line: number): void {
    if (line >= 0) this.#seeds[this.#place.get(line) as number] = ALL;
  }

  /** What gets to a line when at most one other line is left. */
  at(line: number, other: number): Diagram {
    const here = this.#place.get(line);
    if (here === undefined) return NONE;
    const there = this.#place.get(other);
    const seed = this.#seeds[here] as Diagram;
    if (there === undefined || there === here) return seed;
    const way = this.#ways[there * this.#lines.length + here] as Diagram;
    return this.#sets.or(seed, this.#sets.and(this.#seeds[there] as Diagram, way));
  }

  /** The lines that are left, by themselves. */
  copy(): Joined {
    const left = this.#lines.map((_, at) => at).filter((at) => this.#gone[at] === 0);
    const made = new Joined(
      this.#sets,
      left.map((at) => this.#lines[at] as number),
      left.map((at) => this.#seeds[at] as Diagram),
    );
    const width = this.#lines.length;
    left.forEach((from, i) => {
      left.forEach((to, o) => {
        const set = this.#ways[from * width + to] as Diagram;
        if (set !== NONE) made.#open(i, o, set);
      });
    });
    return made;
  }

  /** Lines that are not needed go, as long as that makes no more ways than it takes away; with `all`, every one. */
  eliminate(needed: ReadonlySet<number>, all: boolean): void {
    const into = this.#into;
    const outOf = this.#outOf;
    const free: number[] = [];
    this.#lines.forEach((line, at) => {
      if (this.#gone[at] === 0 && !needed.has(line)) free.push(at);
    });
    while (free.length > 0) {
      let best = 0;
      let least = Infinity;
      for (let i = 0; i < free.length; i++) {
        const at = free[i] as number;
        const through = (into[at] as number) * (outOf[at] as number);
        if (through >= least) continue;
        least = through;
        best = i;
      }
      const at = free[best] as number;
      if (!all && least > 2 * ((into[at] as number) + (outOf[at] as number))) return;
      free[best] = free[free.length - 1] as number;
      free.pop();
      this.#join(at);
    }
  }

  /** A line goes: every way into it is joined to every way out of it. */
  #join(at: number): void {
    const sets = this.#sets;
    const ways = this.#ways;
    const width = this.#lines.length;
    const seed = this.#seeds[at] as Diagram;
    const outs: number[] = [];
    for (let to = 0; to < width; to++) if (ways[at * width + to] !== NONE && this.#gone[to] === 0) outs.push(to);
    this.#gone[at] = 1;
    for (const to of outs) {
      this.#into[to] = (this.#into[to] as number) - 1;
      if (seed !== NONE && this.#seeds[to] !== ALL)
        this.#seeds[to] = sets.or(this.#seeds[to] as Diagram, sets.and(seed, ways[at * width + to] as Diagram));
    }
    for (let from = 0; from < width; from++) {
      const first = ways[from * width + at] as Diagram;
      if (first === NONE || this.#gone[from] === 1) continue;
      this.#outOf[from] = (this.#outOf[from] as number) - 1;
      for (const to of outs) {
        if (to === from || ways[from * width + to] === ALL) continue;
        this.#open(from, to, sets.and(first, ways[at * width + to] as Diagram));
      }
    }
  }
}
