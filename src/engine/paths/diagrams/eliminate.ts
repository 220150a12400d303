import type { Network } from '../../../network/network.ts';
import type { Adjacency } from '../edges.ts';
import type { Link } from '../field.ts';
import type { Diagram } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';
import { planFor } from './elimination-plan.ts';
import type { EliminationPlan, EliminationStep } from './elimination-plan.ts';
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
  /** In what set a way through an actuator is open, by the line it leads to; absent: in all. */
  readonly passes?: ((actuator: number, to: number) => Diagram) | undefined;
  readonly fromTank?: boolean | undefined;
}

/** What the operations of an elimination or a spread started from and gave, one by one. */
interface Trace {
  readonly start: ArrayLike<Diagram>;
  readonly after: Int32Array;
}

/**
 * All searches over the same ways at once: the least solution of "reached here, or reached there and a
 * way from there open" by elimination of one line after another (Kleene's algebra of paths; a loop adds
 * nothing to a set, so its star is ALL). A search that grows step by step makes many sets on its way to
 * the fixpoint that are none of the answer; here only ways between neighbours are ever joined.
 */
export class Elimination {
  readonly #sets: SetAlgebra;
  readonly #plan: EliminationPlan;
  readonly #ways: Ways;
  /** The set in which each way of the plan is open. */
  readonly #open: Int32Array;
  readonly #made: Trace;
  /** The latest spread, for searches without an actuator. */
  #spread: Trace | undefined;
  readonly #like: Elimination | undefined;
  /** 1 for each way that is open in another set than in the search that this one is like. */
  readonly #differs: Uint8Array;

  /** `like`: the same search with all its links; only what hangs on the difference is worked out again. */
  constructor(sets: SetAlgebra, net: Network, ways: Ways, like?: Elimination) {
    this.#sets = sets;
    this.#ways = ways;
    this.#like = like;
    this.#plan = like
      ? like.#plan
      : planFor(
          ways.edges,
          ways.links,
          net.lines.map(({ tank }) => tank),
          ways.fromTank ?? false,
        );
    const start = like ? this.#unlinked(like.#made.start as Int32Array) : this.#opened();
    this.#differs = new Uint8Array(start.length);
    if (like)
      for (let way = 0; way < start.length; way++) this.#differs[way] = start[way] === like.#made.start[way] ? 0 : 1;
    this.#open = start.slice();
    this.#made = { start, after: this.#eliminate(like === undefined ? undefined : like.#made.after) };
  }

  /** The same search without the links of one actuator. */
  without(net: Network, actuator: number): Elimination {
    return new Elimination(this.#sets, net, { ...this.#ways, without: actuator }, this);
  }

  #opened(): Int32Array {
    const found = new Int32Array(this.#plan.ways);
    this.#plan.edgeWay.forEach((way, e) => this.#openEdge(found, way, e));
    for (const { way, to, actuator } of this.#plan.links) this.#openWay(found, way, to, this.#passes(actuator, to));
    return found;
  }

  #unlinked(before: Int32Array): Int32Array {
    const { edgeWay, links } = this.#plan;
    const { without } = this.#ways;
    const found = before.slice();
    for (const { way, actuator } of links) {
      if (actuator !== without) continue;
      found[way] = NONE;
      for (let e = edgeWay.indexOf(way); e >= 0; e = edgeWay.indexOf(way, e + 1)) this.#openEdge(found, way, e);
      for (const other of links)
        if (other.way === way && other.actuator !== without)
          this.#openWay(found, way, other.to, this.#passes(other.actuator, other.to));
    }
    return found;
  }

  #passes(actuator: number, to: number): Diagram {
    return this.#ways.passes?.(actuator, to) ?? ALL;
  }

  #openEdge(found: Int32Array, way: number, edge: number): void {
    const { edges, open } = this.#ways;
    if (way >= 0) this.#openWay(found, way, edges.to[edge] as number, open[edges.mask[edge] as number] as Diagram);
  }

  #openWay(found: Int32Array, way: number, to: number, set: Diagram): void {
    const { gate } = this.#ways;
    const allowed = gate === undefined ? set : this.#sets.and(set, gate[to] as Diagram);
    if (allowed !== NONE) found[way] = this.#sets.or(found[way] as Diagram, allowed);
  }

  /** `known`: what each operation gave in the search that this one is like; it holds where nothing differs. */
  #eliminate(known: Int32Array | undefined): Int32Array {
    const sets = this.#sets;
    const open = this.#open;
    const differs = this.#differs;
    const after = new Int32Array(this.#plan.operations);
    let op = 0;
    for (const { into, outOf, joined } of this.#plan.steps) {
      let pair = 0;
      for (let i = 0; i < into.length; i++) {
        const first = into[i] as number;
        const before = open[first] as Diagram;
        for (let o = 0; o < outOf.length; o++, op++) {
          const way = joined[pair++] as number;
          if (way < 0) continue;
          const second = outOf[o] as number;
          if (known && (differs[first] as number) + (differs[second] as number) + (differs[way] as number) === 0) {
            open[way] = known[op] as Diagram;
          } else if (before !== NONE && open[second] !== NONE && open[way] !== ALL) {
            open[way] = sets.or(open[way] as Diagram, sets.and(before, open[second] as Diagram));
          }
          after[op] = open[way] as Diagram;
          if (known) differs[way] = open[way] === known[op] ? 0 : 1;
        }
      }
    }
    return after;
  }

  /** What these seeds spread to, in `field` itself; with `wanted`, only those lines are brought up to date. */
  spread(field: LineSets, wanted?: readonly number[]): LineSets {
    this.#spread = { start: [...field], after: this.#down(field) };
    const sets = this.#sets;
    const open = this.#open;
    const { steps } = this.#plan;
    const need = wanted && this.#needed(wanted);
    for (let s = steps.length - 1; s >= 0; s--) {
      const { line, into, from } = steps[s] as EliminationStep;
      if (need && need[line] === 0) continue;
      let found = field[line] as Diagram;
      for (let i = 0; i < into.length && found !== ALL; i++) {
        const way = open[into[i] as number] as Diagram;
        const seed = field[from[i] as number] as Diagram;
        if (way !== NONE && seed !== NONE) found = sets.or(found, sets.and(seed, way));
      }
      field[line] = found;
    }
    return field;
  }

  /** From each line to those that are eliminated later. */
  #down(field: LineSets): Int32Array {
    const sets = this.#sets;
    const open = this.#open;
    const known = this.#like === undefined ? undefined : this.#like.#spread;
    const differs = Uint8Array.from(field, (set, line) => (known && known.start[line] === set ? 0 : 1));
    const after = new Int32Array(this.#plan.ways);
    let op = 0;
    for (const { line, outOf, to } of this.#plan.steps) {
      const seed = field[line] as Diagram;
      for (let o = 0; o < outOf.length; o++, op++) {
        const way = outOf[o] as number;
        const other = to[o] as number;
        if (known && (differs[line] as number) + (differs[other] as number) + (this.#differs[way] as number) === 0) {
          field[other] = known.after[op] as Diagram;
        } else if (seed !== NONE && open[way] !== NONE) {
          field[other] = sets.or(field[other] as Diagram, sets.and(seed, open[way] as Diagram));
        }
        after[op] = field[other] as Diagram;
        if (known) differs[other] = field[other] === known.after[op] ? 0 : 1;
      }
    }
    return after;
  }

  #needed(wanted: readonly number[]): Uint8Array {
    const { steps } = this.#plan;
    const need = new Uint8Array(steps.length);
    for (const line of wanted) need[line] = 1;
    for (const { line, into, from } of steps) {
      if (need[line] === 0) continue;
      for (let i = 0; i < into.length; i++) if (this.#open[into[i] as number] !== NONE) need[from[i] as number] = 1;
    }
    return need;
  }
}
