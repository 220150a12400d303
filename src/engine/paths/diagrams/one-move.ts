import type { Diagram, Diagrams } from './diagrams.ts';
import { NONE } from './diagrams.ts';

/** Combinations from which one move of one lever leads into the set. */
export function oneMoveFrom(sets: Diagrams, set: Diagram): Diagram {
  let found: Diagram = NONE;
  for (let level = 0; level < sets.order.length; level++) found = sets.or(found, movedAt(sets, set, level));
  return found;
}

function movedAt(sets: Diagrams, set: Diagram, level: number): Diagram {
  const known = new Map<Diagram, Diagram>();
  const visit = (node: Diagram): Diagram => {
    const at = sets.level(node);
    // Where the lever does not matter, another position is as good; a lever with one position has none.
    if (at > level) return sets.arity(level) > 1 ? node : NONE;
    const before = known.get(node);
    if (before !== undefined) return before;
    const kids = Array.from({ length: sets.arity(at) }, (_, p) => sets.child(node, at, p));
    const next =
      at < level
        ? kids.map(visit)
        : kids.map((_, p) => kids.reduce((all: Diagram, kid, q) => (q === p ? all : sets.or(all, kid)), NONE));
    const made = sets.make(at, next);
    known.set(node, made);
    return made;
  };
  return visit(set);
}
