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
  /** The set in which each way of the plan is open. */
  readonly #open: Int32Array;

  constructor(sets: SetAlgebra, net: Network, ways: Ways) {
    const { edges, open, gate, links, without = -1, fromTank = false } = ways;
    const plan = planFor(
      edges,
      links,
      net.lines.map(({ tank }) => tank),
      fromTank,
    );
    const found = new Int32Array(plan.ways);
    const add = (way: number, to: number, set: Diagram): void => {
      const allowed = gate === undefined ? set : sets.and(set, gate[to] as Diagram);
      if (allowed !== NONE) found[way] = sets.or(found[way] as Diagram, allowed);
    };
    for (let e = 0; e < plan.edgeWay.length; e++) {
      const way = plan.edgeWay[e] as number;
      if (way >= 0) add(way, edges.to[e] as number, open[edges.mask[e] as number] as Diagram);
    }
    for (const { way, actuator, to } of plan.links) if (actuator !== without) add(way, to, ALL);

    for (const { into, outOf, joined } of plan.steps) {
      for (let i = 0; i < into.length; i++) {
        const before = found[into[i] as number] as Diagram;
        if (before === NONE) continue;
        for (let o = 0; o < outOf.length; o++) {
          const way = joined[i * outOf.length + o] as number;
          const after = found[outOf[o] as number] as Diagram;
          if (way < 0 || after === NONE) continue;
          const known = found[way] as Diagram;
          if (known !== ALL) found[way] = sets.or(known, sets.and(before, after));
        }
      }
    }
    this.#sets = sets;
    this.#plan = plan;
    this.#open = found;
  }

  /** What these seeds spread to, in `field` itself; with `wanted`, only those lines are brought up to date. */
  spread(field: LineSets, wanted?: readonly number[]): LineSets {
    const sets = this.#sets;
    const open = this.#open;
    const { steps } = this.#plan;
    for (const { line, outOf, to } of steps) {
      const seed = field[line] as Diagram;
      if (seed === NONE) continue;
      for (let o = 0; o < outOf.length; o++) {
        const way = open[outOf[o] as number] as Diagram;
        if (way === NONE) continue;
        const other = to[o] as number;
        field[other] = sets.or(field[other] as Diagram, sets.and(seed, way));
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
