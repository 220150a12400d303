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
  const levels = sets.radices.length;
  let count = sets.radices.reduce((n, radix) => n * radix, 1);
  if (levels === 0) return has(plane, 0) ? ALL : NONE;
  // The last input has few patterns of bits, so their nodes are looked up.
  const last = sets.arity(levels - 1);
  const patterns = Int32Array.from({ length: 1 << last }, (_, bits) =>
    sets.make(
      levels - 1,
      Array.from({ length: last }, (_unused, p) => ((bits >>> p) & 1 ? ALL : NONE)),
    ),
  );
  count /= last;
  let nodes = new Int32Array(count);
  for (let i = 0, row = 0; i < count; i++, row += last) {
    const at = row & 31;
    let bits = (plane[row >>> 5] as number) >>> at;
    if (at + last > 32) bits |= (plane[(row >>> 5) + 1] as number) << (32 - at);
    nodes[i] = patterns[bits & (patterns.length - 1)] as number;
  }
  for (let level = levels - 2; level >= 0; level--) {
    const arity = sets.arity(level);
    count /= arity;
    const next = new Int32Array(count);
    for (let i = 0; i < count; i++) next[i] = sets.make(level, nodes, i * arity);
    nodes = next;
  }
  return nodes[0] as Diagram;
}
