import type { BitSet } from '../../../base/bits.ts';
import { bitsAt, sameRange } from '../../../base/bits.ts';
import type { Diagram, Diagrams } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';

/** Rows that one number holds. */
const MOST_BITS = 30;

/**
 * A bit plane of a table (rows in mixed radix, the first input slowest) as a diagram whose order is the
 * table's own. Stretches of rows that are the same for two positions of an input are compared word by word and
 * gone through once, so the cost is that of what differs.
 */
export function planeToDiagram(sets: Diagrams, plane: BitSet | undefined): Diagram {
  if (plane === undefined) return NONE;
  if (sets.order.some((input, level) => input !== level)) throw new RangeError('planes have the order of the table');
  const { radices } = sets;
  const levels = radices.length;
  /** Level → rows of one position of its input. */
  const strides = new Array<number>(levels).fill(1);
  for (let level = levels - 2; level >= 0; level--)
    strides[level] = (strides[level + 1] as number) * (radices[level + 1] as number);
  const rowsFrom = (level: number): number =>
    level === levels ? 1 : (strides[level] as number) * (radices[level] as number);
  let low = levels;
  while (low > 0 && rowsFrom(low - 1) <= MOST_BITS) low -= 1;
  const bits = rowsFrom(low);
  const words = new Map<number, Diagram>();
  const width = Math.max(1, ...radices);
  // Every level has its own stretch of scratch, since the walk only goes down.
  const kids = new Int32Array((levels + 1) * width);

  const ofWord = (level: number, word: number): Diagram => {
    if (level === levels) return (word & 1) === 1 ? ALL : NONE;
    const stride = strides[level] as number;
    const mask = (1 << stride) - 1;
    for (let p = 0; p < (radices[level] as number); p++)
      kids[level * width + p] = ofWord(level + 1, (word >>> (p * stride)) & mask);
    return sets.make(level, kids, level * width);
  };
  const visit = (level: number, at: number): Diagram => {
    if (level === low) {
      const word = bitsAt(plane, at, bits);
      let found = words.get(word);
      if (found === undefined) words.set(word, (found = ofWord(low, word)));
      return found;
    }
    const stride = strides[level] as number;
    for (let p = 0; p < (radices[level] as number); p++) {
      let same = 0;
      while (same < p && !sameRange(plane, at + same * stride, at + p * stride, stride)) same += 1;
      kids[level * width + p] = same < p ? (kids[level * width + same] as number) : visit(level + 1, at + p * stride);
    }
    return sets.make(level, kids, level * width);
  };
  return visit(0, 0);
}
