import { add, countBits, emptySet, members } from '../../../base/bits.ts';
import type { BitSet } from '../../../base/bits.ts';
import type { Diagram, Diagrams } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import type { Cover, Cube } from './cube.ts';

/** Steps of the search; with more it stays with the best cover so far. */
const MOST_STEPS = 20_000;

/**
 * The fewest of `greatest` that cover the set, by branch and bound over its combinations; some least
 * cover consists of greatest cubes alone (Quine). Starts from `quick`, which is a cover.
 */
export function leastCover(sets: Diagrams, set: Diagram, greatest: readonly Cube[], quick: readonly Cube[]): Cover {
  const points = pointsOf(sets, set);
  const covers = greatest.map((cube) => {
    const bits = emptySet(points.length);
    points.forEach((point, i) => {
      if (cube.every((mask, input) => ((mask >>> (point[input] as number)) & 1) === 1)) add(bits, i);
    });
    return bits;
  });
  // Per point the cubes that cover it.
  const coveredBy = points.map((): number[] => []);
  covers.forEach((bits, c) => {
    for (const point of members(bits)) coveredBy[point]?.push(c);
  });

  let best: readonly number[] | undefined;
  let fewest = quick.length;
  let steps = 0;
  const chosen: number[] = [];
  const search = (open: BitSet): void => {
    steps += 1;
    if (steps > MOST_STEPS) return;
    const left = countBits(open);
    if (left === 0) {
      best = [...chosen];
      fewest = chosen.length;
      return;
    }
    if (chosen.length + leastMore(open, left, covers) >= fewest) return;
    // The point with the fewest ways to cover it decides.
    let hardest = -1;
    let ways = Infinity;
    for (const point of members(open)) {
      const count = coveredBy[point]?.length ?? 0;
      if (count < ways) [hardest, ways] = [point, count];
    }
    const ranked = (coveredBy[hardest] ?? [])
      .map((c) => ({ c, gain: countBits(meet(open, covers[c] as BitSet)) }))
      .sort((a, b) => b.gain - a.gain || a.c - b.c);
    for (const { c } of ranked) {
      chosen.push(c);
      search(without(open, covers[c] as BitSet));
      chosen.pop();
    }
  };
  const every = emptySet(points.length);
  points.forEach((_, i) => add(every, i));
  search(every);
  return { cubes: best?.map((c) => greatest[c] as Cube) ?? quick, least: steps <= MOST_STEPS };
}

/** Cubes that are needed at least: as many as the largest ones would take if they did not overlap. */
function leastMore(open: BitSet, left: number, covers: readonly BitSet[]): number {
  const gains = covers.map((bits) => countBits(meet(open, bits))).sort((a, b) => b - a);
  let rest = left;
  let needed = 0;
  for (const gain of gains) {
    if (rest <= 0) break;
    rest -= gain;
    needed += 1;
  }
  return needed;
}

const meet = (a: BitSet, b: BitSet): BitSet => a.map((word, i) => word & (b[i] as number));
const without = (a: BitSet, b: BitSet): BitSet => a.map((word, i) => word & ~(b[i] as number));

/** Every combination of the set. */
function pointsOf(sets: Diagrams, set: Diagram): number[][] {
  const points: number[][] = [];
  const at = new Array<number>(sets.radices.length).fill(0);
  const visit = (node: Diagram, level: number): void => {
    if (node === NONE) return;
    if (level === sets.order.length) {
      if (node === ALL) points.push([...at]);
      return;
    }
    for (let p = 0; p < sets.arity(level); p++) {
      at[sets.order[level] as number] = p;
      visit(sets.child(node, level, p), level + 1);
    }
  };
  visit(set, 0);
  return points;
}
