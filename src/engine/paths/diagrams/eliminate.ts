import type { Network } from '../../../network/network.ts';
import type { Adjacency } from '../edges.ts';
import type { Link } from '../field.ts';
import type { Diagram } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';
import type { SetAlgebra } from './set-algebra.ts';
import type { LineSets } from './set-edges.ts';

/** The ways of a search: open paths and ways through actuators, and what may be set in the line arrived at. */
export interface Ways {
  readonly edges: Adjacency;
  /** By mask number. */
  readonly open: readonly Diagram[];
  readonly gate?: LineSets | undefined;
  /** [line] → ways through actuators, except those of actuator `without`. */
  readonly links?: readonly (readonly Link[])[] | undefined;
  readonly without?: number | undefined;
  readonly fromTank?: boolean | undefined;
}

interface Way {
  readonly line: number;
  readonly set: Diagram;
}

/**
 * All searches over the same ways at once: the least solution of "reached here, or reached there and a
 * way from there open" by elimination of one line after another (Kleene's algebra of paths; a loop adds
 * nothing to a set, so its star is ALL). A search that grows step by step makes many sets on its way to
 * the fixpoint that are none of the answer; here only ways between neighbours are ever joined.
 */
export class Elimination {
  readonly #sets: SetAlgebra;
  readonly #order: readonly number[];
  readonly #into: Way[][] = [];
  readonly #outOf: Way[][] = [];

  constructor(sets: SetAlgebra, net: Network, ways: Ways) {
    this.#sets = sets;
    const rows = waysBetween(sets, net, ways);
    this.#order = leastFirst(rows);
    const rank = new Int32Array(rows.length);
    this.#order.forEach((line, at) => (rank[line] = at));
    const columns: Map<number, Diagram>[] = rows.map(() => new Map());
    rows.forEach((row, from) => row.forEach((set, to) => columns[to]?.set(from, set)));
    for (const line of this.#order) {
      const at = rank[line] as number;
      const later = (map: ReadonlyMap<number, Diagram>): Way[] =>
        [...map].flatMap(([other, set]) => ((rank[other] as number) > at ? [{ line: other, set }] : []));
      const into = later(columns[line] as Map<number, Diagram>);
      const outOf = later(rows[line] as Map<number, Diagram>);
      this.#into[line] = into;
      this.#outOf[line] = outOf;
      for (const before of into) {
        const row = rows[before.line] as Map<number, Diagram>;
        for (const after of outOf) {
          if (after.line === before.line) continue;
          const through = sets.and(before.set, after.set);
          if (through === NONE) continue;
          const known = row.get(after.line) ?? NONE;
          const joined = sets.or(known, through);
          if (joined === known) continue;
          row.set(after.line, joined);
          columns[after.line]?.set(before.line, joined);
        }
      }
    }
  }

  /** What these seeds spread to, in `field` itself; with `wanted`, only those lines are brought up to date. */
  spread(field: LineSets, wanted?: readonly number[]): LineSets {
    const sets = this.#sets;
    for (const line of this.#order) {
      const seed = field[line] as Diagram;
      if (seed === NONE) continue;
      for (const { line: to, set } of this.#outOf[line] as Way[]) {
        field[to] = sets.or(field[to] as Diagram, sets.and(seed, set));
      }
    }
    const need = wanted && this.#needed(wanted);
    for (let at = this.#order.length - 1; at >= 0; at--) {
      const line = this.#order[at] as number;
      if (need && need[line] === 0) continue;
      let found = field[line] as Diagram;
      for (const { line: from, set } of this.#into[line] as Way[]) {
        const seed = field[from] as Diagram;
        if (seed !== NONE && found !== ALL) found = sets.or(found, sets.and(seed, set));
      }
      field[line] = found;
    }
    return field;
  }

  #needed(wanted: readonly number[]): Uint8Array {
    const need = new Uint8Array(this.#order.length);
    for (const line of wanted) need[line] = 1;
    for (const line of this.#order) {
      if (need[line] === 1) for (const { line: from } of this.#into[line] as Way[]) need[from] = 1;
    }
    return need;
  }
}

/** [from] → the lines one step ahead, each with the set in which that step is open. */
function waysBetween(sets: SetAlgebra, net: Network, ways: Ways): Map<number, Diagram>[] {
  const { edges, open, gate, links, without = -1, fromTank = false } = ways;
  return net.lines.map(({ tank }, from) => {
    const row = new Map<number, Diagram>();
    // Tanks absorb.
    if (tank && !fromTank) return row;
    const add = (to: number, set: Diagram): void => {
      const allowed = gate === undefined ? set : sets.and(set, gate[to] as Diagram);
      if (allowed !== NONE && to !== from) row.set(to, sets.or(row.get(to) ?? NONE, allowed));
    };
    for (let e = edges.start[from] as number; e < (edges.start[from + 1] as number); e++) {
      add(edges.to[e] as number, open[edges.mask[e] as number] as Diagram);
    }
    for (const link of links?.[from] ?? []) if (link.actuator !== without) add(link.to, ALL);
    return row;
  });
}

/** Lines in an order of elimination that joins few ways: always the one with the fewest ways through it. */
function leastFirst(rows: readonly ReadonlyMap<number, Diagram>[]): number[] {
  const ahead = rows.map((row) => new Set(row.keys()));
  const back = rows.map(() => new Set<number>());
  ahead.forEach((set, from) => set.forEach((to) => back[to]?.add(from)));
  const left = new Set(rows.keys());
  const order: number[] = [];
  while (left.size > 0) {
    let best = -1;
    let least = Infinity;
    for (const line of left) {
      const through = (ahead[line] as Set<number>).size * (back[line] as Set<number>).size;
      if (through < least) {
        least = through;
        best = line;
      }
    }
    left.delete(best);
    order.push(best);
    const into = back[best] as Set<number>;
    const outOf = ahead[best] as Set<number>;
    for (const from of into) ahead[from]?.delete(best);
    for (const to of outOf) back[to]?.delete(best);
    for (const from of into) {
      for (const to of outOf) {
        if (from === to) continue;
        ahead[from]?.add(to);
        back[to]?.add(from);
      }
    }
  }
  return order;
}
