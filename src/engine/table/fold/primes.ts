import type { Diagram, Diagrams } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import { anyPosition } from './cube.ts';
import type { Cube } from './cube.ts';

/**
 * Every cube of the set that no larger cube of the set contains; undefined if there are more than `most`.
 * By input: a cube that allows positions S there is a greatest cube of the meet of those branches, and
 * of no meet with one branch more.
 */
export function greatestCubes(sets: Diagrams, set: Diagram, most: number): Cube[] | undefined {
  const any = sets.radices.map(anyPosition);
  const known = new Map<Diagram, Cube[] | undefined>([
    [NONE, []],
    [ALL, [any]],
  ]);
  let made = 0;
  const within = (cube: Cube, at: Diagram): boolean => {
    if (at <= ALL) return at === ALL;
    const level = sets.level(at);
    const positions = cube[sets.order[level] as number] as number;
    for (let p = 0; p < sets.arity(level); p++) {
      if (((positions >>> p) & 1) === 1 && !within(cube, sets.child(at, level, p))) return false;
    }
    return true;
  };
  const of = (at: Diagram): Cube[] | undefined => {
    if (known.has(at)) return known.get(at);
    const level = sets.level(at);
    const input = sets.order[level] as number;
    const full = anyPosition(sets.arity(level));
    const meets: Diagram[] = [ALL];
    const found: Cube[] = [];
    for (let positions = 1; positions <= full; positions++) {
      const lowest = positions & -positions;
      const p = 31 - Math.clz32(lowest);
      meets[positions] = sets.and(sets.child(at, level, p), meets[positions ^ lowest] as Diagram);
    }
    for (let positions = 1; positions <= full; positions++) {
      const below = of(meets[positions] as Diagram);
      if (below === undefined) return undefined;
      for (const cube of below) {
        let greatest = true;
        for (let p = 0; greatest && p < sets.arity(level); p++) {
          if (((positions >>> p) & 1) === 0 && within(cube, meets[positions | (1 << p)] as Diagram)) greatest = false;
        }
        if (!greatest) continue;
        made += 1;
        if (made > 20 * most) return undefined;
        found.push(cube.map((mask, i) => (i === input ? positions : mask)));
      }
    }
    const kept = found.length > most ? undefined : found;
    known.set(at, kept);
    return kept;
  };
  return of(set);
}
