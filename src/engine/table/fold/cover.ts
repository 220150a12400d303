import type { Diagram, Diagrams } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import { anyPosition, bitsIn, compareCubes, cubeCount, cubeSet, cubeWithin } from './cube.ts';
import type { Cover, Cube } from './cube.ts';
import { leastCover } from './least.ts';
import { greatestCubes } from './primes.ts';

/** Sets with more greatest cubes than this are folded by the quick way alone. */
const MOST_GREATEST = 300;
/** The same for sets with more combinations. */
const MOST_LISTED = 4096n;

/** The set takes more cubes than were allowed. */
export class TooManyCubes extends Error {
  constructor(most: number) {
    super(`A description takes more than ${most.toLocaleString('en')} rows.`);
    this.name = 'TooManyCubes';
  }
}

/**
 * A description of the set by few cubes, checked to be equal to it. Throws `TooManyCubes` where the first one found
 * has more than `most`: letting them grow would take long, and leave many.
 */
export function coverOf(sets: Diagrams, set: Diagram, most = Infinity): Cover {
  if (set === NONE) return { cubes: [], least: true };
  if (set === ALL) return { cubes: [sets.radices.map(anyPosition)], least: true };
  const quick = irredundant(sets, set, expandAll(sets, set, dropOverlaps(sets, set, most)));
  const found = shortest(sets, set, quick);
  const cubes = [...found.cubes].sort(compareCubes);
  const together = cubes.reduce((all, cube) => sets.or(all, cubeSet(sets, cube)), NONE);
  if (together !== set) throw new Error('a folded description differs from its set');
  return { cubes, least: found.least };
}

function shortest(sets: Diagrams, set: Diagram, quick: readonly Cube[]): Cover {
  if (quick.length === 1) return { cubes: quick, least: true };
  if (sets.count(set) > MOST_LISTED) return { cubes: quick, least: false };
  const greatest = greatestCubes(sets, set, MOST_GREATEST);
  if (greatest === undefined) return { cubes: quick, least: false };
  return leastCover(sets, set, greatest.sort(compareCubes), quick);
}

/**
 * Cubes that make up the set, by branches: what all branches share comes first with any position, then
 * each group of equal branches with the rest of its own (Minato and Morreale, for several positions).
 */
function dropOverlaps(sets: Diagrams, set: Diagram, most: number): Cube[] {
  const any = sets.radices.map(anyPosition);
  const known = new Map<string, { readonly cubes: readonly Cube[]; readonly set: Diagram }>();
  /** Cubes that cover `must` and stay within `may`. */
  const between = (must: Diagram, may: Diagram): { readonly cubes: readonly Cube[]; readonly set: Diagram } => {
    if (must === NONE) return { cubes: [], set: NONE };
    if (may === ALL) return { cubes: [any], set: ALL };
    const key = `${must} ${may}`;
    const before = known.get(key);
    if (before) return before;
    const level = Math.min(sets.level(must), sets.level(may));
    const input = sets.order[level] as number;
    const arity = sets.arity(level);
    const musts = Array.from({ length: arity }, (_, p) => sets.child(must, level, p));
    const mays = Array.from({ length: arity }, (_, p) => sets.child(may, level, p));
    const everywhere = mays.reduce((all, one) => sets.and(all, one), ALL);
    const shared = between(
      musts.reduce((all, one) => sets.or(all, sets.and(one, everywhere)), NONE),
      everywhere,
    );
    const cubes: Cube[] = [...shared.cubes];
    const covered = musts.map(() => shared.set);
    for (let p = 0; p < arity; p++) {
      const missing = sets.minus(musts[p] as Diagram, covered[p] as Diagram);
      if (missing === NONE) continue;
      // The branches that allow all that is missing here take it together.
      let positions = 1 << p;
      let room = mays[p] as Diagram;
      for (let q = 0; q < arity; q++) {
        if (q === p || sets.minus(missing, mays[q] as Diagram) !== NONE) continue;
        positions |= 1 << q;
        room = sets.and(room, mays[q] as Diagram);
      }
      const part = between(missing, room);
      for (const cube of part.cubes) cubes.push(cube.map((mask, i) => (i === input ? positions : mask)));
      for (let q = 0; q < arity; q++)
        if (((positions >>> q) & 1) === 1) covered[q] = sets.or(covered[q] as Diagram, part.set);
    }
    if (cubes.length > most) throw new TooManyCubes(most);
    const answer = { cubes, set: sets.make(level, covered) };
    known.set(key, answer);
    return answer;
  };
  return [...between(set, set).cubes];
}

/** Lets every cube grow as far as the set goes: inputs to any position first, then position by position. */
function expandAll(sets: Diagrams, set: Diagram, cubes: readonly Cube[]): Cube[] {
  const bySize = [...cubes].sort((a, b) => compareSizes(b, a));
  const out: Cube[] = [];
  let covered: Diagram = NONE;
  for (const cube of bySize) {
    // A cube that others have swallowed needs no growing.
    if (cubeWithin(sets, cube, covered)) continue;
    const grown = expand(sets, set, cube);
    out.push(grown);
    covered = sets.or(covered, cubeSet(sets, grown));
  }
  return out;
}

function expand(sets: Diagrams, set: Diagram, cube: Cube): Cube {
  const grown = [...cube];
  const attempt = (input: number, mask: number): void => {
    const before = grown[input] as number;
    grown[input] = mask;
    if (!cubeWithin(sets, grown, set)) grown[input] = before;
  };
  const any = sets.radices.map(anyPosition);
  any.forEach((mask, input) => {
    if (grown[input] !== mask) attempt(input, mask);
  });
  any.forEach((mask, input) => {
    for (let p = 0; 1 << p <= mask; p++)
      if ((((grown[input] as number) >>> p) & 1) === 0) attempt(input, (grown[input] as number) | (1 << p));
  });
  return grown;
}

/** Leaves out every cube that the others cover, the smallest first. */
function irredundant(sets: Diagrams, set: Diagram, cubes: readonly Cube[]): Cube[] {
  const bySize = [...cubes].sort(compareSizes);
  // after[i]: what the cubes from i on cover.
  const after = new Array<Diagram>(bySize.length + 1).fill(NONE);
  for (let i = bySize.length - 1; i >= 0; i--)
    after[i] = sets.or(after[i + 1] as Diagram, cubeSet(sets, bySize[i] as Cube));
  if (after[0] !== set) throw new Error('grown cubes differ from their set');
  let kept: Diagram = NONE;
  return bySize.filter((cube, i) => {
    if (cubeWithin(sets, cube, sets.or(kept, after[i + 1] as Diagram))) return false;
    kept = sets.or(kept, cubeSet(sets, cube));
    return true;
  });
}

function compareSizes(a: Cube, b: Cube): number {
  const [x, y] = [cubeCount(a), cubeCount(b)];
  return x < y ? -1 : x > y ? 1 : allowed(b) - allowed(a) || compareCubes(a, b);
}

const allowed = (cube: Cube): number => cube.reduce((sum, mask) => sum + bitsIn(mask), 0);
