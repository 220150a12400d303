import type { Diagram } from './diagrams.ts';

/**
 * What the rules of open paths ask of sets of combinations: equal sets have equal numbers, NONE and ALL
 * are as in `diagrams.ts`. `Diagrams` keeps sets of any number of inputs; `PackedSets` those of a table.
 */
export interface SetAlgebra {
  and(a: Diagram, b: Diagram): Diagram;
  or(a: Diagram, b: Diagram): Diagram;
  /** In `a` and not in `b`. */
  minus(a: Diagram, b: Diagram): Diagram;
  not(a: Diagram): Diagram;
  /** "Input stands in one of `positions`" (bit p = position p). */
  literal(input: number, positions: number): Diagram;
}
