import type { Diagram, Diagrams } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';

/** Per input the positions that it may stand in (bit p = position p); all bits = any. */
export type Cube = readonly number[];

export interface Cover {
  /** Sorted; together they are the set, no cube can grow, and none is superfluous. */
  readonly cubes: readonly Cube[];
  /** No cover has fewer cubes. Where false it is not known whether one has. */
  readonly least: boolean;
}

export const anyPosition = (radix: number): number => (1 << radix) - 1;

export function cubeSet(sets: Diagrams, cube: Cube): Diagram {
  let set: Diagram = ALL;
  const kids: number[] = [];
  for (let level = sets.order.length - 1; level >= 0; level--) {
    const positions = cube[sets.order[level] as number] as number;
    for (let p = 0; p < sets.arity(level); p++) kids[p] = ((positions >>> p) & 1) === 1 ? set : NONE;
    set = sets.make(level, kids);
  }
  return set;
}

/** Combinations in a cube. */
export const cubeCount = (cube: Cube): bigint => cube.reduce((n, positions) => n * BigInt(bitsIn(positions)), 1n);

export function bitsIn(mask: number): number {
  let n = 0;
  for (let rest = mask; rest !== 0; rest &= rest - 1) n += 1;
  return n;
}

/** True if every combination of the cube is in the set. */
export function cubeWithin(sets: Diagrams, cube: Cube, set: Diagram): boolean {
  if (set === ALL) return true;
  if (set === NONE) return false;
  const seen = new Set<Diagram>([set]);
  const stack = [set];
  for (let node = stack.pop(); node !== undefined; node = stack.pop()) {
    const level = sets.level(node);
    const positions = cube[sets.order[level] as number] as number;
    for (let p = 0; p < sets.arity(level); p++) {
      if (((positions >>> p) & 1) === 0) continue;
      const kid = sets.child(node, level, p);
      if (kid === NONE) return false;
      if (kid === ALL || seen.has(kid)) continue;
      seen.add(kid);
      stack.push(kid);
    }
  }
  return true;
}

/** By the first input in which they differ: fewer positions first, then the earlier ones. */
export function compareCubes(a: Cube, b: Cube): number {
  for (let i = 0; i < a.length; i++) {
    const [x, y] = [a[i] as number, b[i] as number];
    if (x === y) continue;
    const more = bitsIn(x) - bitsIn(y);
    if (more !== 0) return more;
    // The lowest position that only one of them has decides.
    const lowest = (x ^ y) & -(x ^ y);
    return (x & lowest) !== 0 ? -1 : 1;
  }
  return 0;
}
