import type { Diagram, Diagrams } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';

/** The combinations of a set that are the fewest moves away, a move putting one input into another position. */
export interface Nearest {
  /** Moves to any of them. */
  readonly moves: number;
  /** The first few, the inputs that do not matter standing as they do. */
  readonly list: readonly (readonly number[])[];
}

/** Undefined where the set is empty. One walk over its nodes, however many combinations they stand for. */
export function nearest(sets: Diagrams, set: Diagram, from: readonly number[], most = 1): Nearest | undefined {
  const known = new Map<Diagram, number>([
    [ALL, 0],
    [NONE, Infinity],
  ]);
  const stands = (level: number): number => from[sets.order[level] as number] as number;
  const movesFrom = (node: Diagram): number => {
    const before = known.get(node);
    if (before !== undefined) return before;
    const level = sets.level(node);
    let least = Infinity;
    for (let p = 0; p < sets.arity(level); p++) {
      const by = p === stands(level) ? 0 : 1;
      least = Math.min(least, by + movesFrom(sets.child(node, level, p)));
    }
    known.set(node, least);
    return least;
  };
  const moves = movesFrom(set);
  if (moves === Infinity) return undefined;

  const list: number[][] = [];
  const positions = [...from];
  const walk = (node: Diagram, left: number): void => {
    if (list.length >= most) return;
    if (node === ALL) {
      list.push([...positions]);
      return;
    }
    const level = sets.level(node);
    const input = sets.order[level] as number;
    const stood = stands(level);
    for (let p = 0; p < sets.arity(level); p++) {
      const rest = left - (p === stood ? 0 : 1);
      const kid = sets.child(node, level, p);
      if (movesFrom(kid) !== rest) continue;
      positions[input] = p;
      walk(kid, rest);
    }
    positions[input] = stood;
  };
  walk(set, moves);
  return { moves, list };
}
