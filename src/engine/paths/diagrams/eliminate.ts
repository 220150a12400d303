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
  /** [line] → ways through actuators. */
  readonly links?: readonly (readonly Link[])[] | undefined;
  /** In what set a way through an actuator is open, by the line it leads to; absent: in all. */
  readonly passes?: ((actuator: number, to: number) => Diagram) | undefined;
  readonly fromTank?: boolean | undefined;
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

  constructor(sets: SetAlgebra, net: Network, ways: Ways) {
    this.#sets = sets;
    this.#ways = ways;
    this.#plan = planFor(
      ways.edges,
      ways.links,
      net.lines.map(({ tank }) => tank),
      ways.fromTank ?? false,
    );
    this.#open = new Int32Array(this.#plan.ways);
    this.#plan.edgeWay.forEach((way, e) => this.#openEdge(way, e));
    for (const { way, to, actuator } of this.#plan.links) this.#openWay(way, to, this.#passes(actuator, to));
    this.#eliminate();
  }

  #passes(actuator: number, to: number): Diagram {
    return this.#ways.passes?.(actuator, to) ?? ALL;
  }

  #openEdge(way: number, edge: number): void {
    const { edges, open } = this.#ways;
    if (way >= 0) this.#openWay(way, edges.to[edge] as number, open[edges.mask[edge] as number] as Diagram);
  }

  #openWay(way: number, to: number, set: Diagram): void {
    const { gate } = this.#ways;
    const allowed = gate === undefined ? set : this.#sets.and(set, gate[to] as Diagram);
    if (allowed !== NONE) this.#open[way] = this.#sets.or(this.#open[way] as Diagram, allowed);
  }

  #eliminate(): void {
    const sets = this.#sets;
    const open = this.#open;
    for (const { into, outOf, joined } of this.#plan.steps) {
      let pair = 0;
      for (let i = 0; i < into.length; i++) {
        const before = open[into[i] as number] as Diagram;
        for (let o = 0; o < outOf.length; o++) {
          const way = joined[pair++] as number;
          const second = open[outOf[o] as number] as Diagram;
          if (way < 0 || before === NONE || second === NONE || open[way] === ALL) continue;
          open[way] = sets.or(open[way] as Diagram, sets.and(before, second));
        }
      }
    }
  }

  /** What these seeds spread to, in `field` itself; with `wanted`, only those lines are brought up to date. */
  spread(field: LineSets, wanted?: readonly number[]): LineSets {
    const sets = this.#sets;
    const open = this.#open;
    const { steps } = this.#plan;
    // From each line to those that are eliminated later, and back.
    for (const { line, outOf, to } of steps) {
      const seed = field[line] as Diagram;
      if (seed === NONE) continue;
      for (let o = 0; o < outOf.length; o++) {
        const way = open[outOf[o] as number] as Diagram;
        const other = to[o] as number;
        if (way !== NONE && field[other] !== ALL) field[other] = sets.or(field[other] as Diagram, sets.and(seed, way));
      }
    }
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
