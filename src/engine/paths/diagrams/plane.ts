import type { BitSet } from '../../../base/bits.ts';
import { has } from '../../../base/bits.ts';
import type { Diagram, Diagrams } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';

/**
 * A bit plane of a table (rows in mixed radix, the first input slowest) as a diagram whose order is the
 * table's own. From the last input upwards: the rows of one level are the children of the next.
 */
export function planeToDiagram(sets: Diagrams, plane: BitSet | undefined): Diagram {
  if (plane === undefined) return NONE;
  if (sets.order.some((input, level) => input !== level)) throw new RangeError('planes have the order of the table');
  let count = sets.radices.reduce((n, radix) => n * radix, 1);
  let nodes = new Int32Array(count);
  for (let row = 0; row < count; row++) nodes[row] = has(plane, row) ? ALL : NONE;
  for (let level = sets.radices.length - 1; level >= 0; level--) {
    const arity = sets.arity(level);
    count /= arity;
    const next = new Int32Array(count);
    for (let i = 0; i < count; i++) next[i] = sets.make(level, nodes, i * arity);
    nodes = next;
  }
  return nodes[0] as Diagram;
}
