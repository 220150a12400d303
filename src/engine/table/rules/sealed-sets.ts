import type { Network } from '../../../network/network.ts';
import type { Diagram, Diagrams } from '../../paths/diagrams/diagrams.ts';
import { NONE } from '../../paths/diagrams/diagrams.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import { classSet } from '../../paths/diagrams/open-paths.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import { pushes } from '../../paths/actuator-bits.ts';
import type { PathConditions } from '../../paths/reach.ts';
import type { TrapReason } from '../words.ts';
import type { Truth } from './evaluate.ts';

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

/**
 * Trapped lines of a panel too large to list: what open paths are sure of, and what they do not rule
 * out. Sure bounds of what a table says from open paths; where it would search further, the answer stays open.
 */
export interface SealedSets {
  readonly trapped: (line: number, reasons: readonly TrapReason[]) => Truth<Diagram>;
}

export function sealedSets(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets,
  moving: () => MotionSets,
): SealedSets {
  const { sets } = paths;
  const union = (list: readonly Diagram[]): Diagram => list.reduce((a, b) => sets.or(a, b), NONE);
  let some: Diagram | undefined;
  /** Something moves, or may move by pressures: oil may then flow where open paths alone see a dead end. */
  const moves = (): Diagram =>
    (some ??= union([paths.hunts, ...moving().actuators.flatMap((m) => [m.out, m.in, m.rests])]));
  const shut = (line: number): Diagram =>
    sets.minus(classSet(paths, line, 'cut off'), moving().carries[line] as Diagram);
  const sureOf = (set: Diagram): Truth<Diagram> => ({ sure: sets.minus(set, moves()), maybe: set });
  const both = (a: Truth<Diagram>, b: Truth<Diagram>): Truth<Diagram> => ({
    sure: sets.or(a.sure, b.sure),
    maybe: sets.or(a.maybe, b.maybe),
  });
  const none: Truth<Diagram> = { sure: NONE, maybe: NONE };
  /** A load or spring presses on this very line at rest. */
  const loaded = (line: number): boolean =>
    net.actuators.some(
      (actuator, i) =>
        (actuator.a === line && pushes(actuator, 'in') !== 0 && conditions.places[i] !== 'in') ||
        (actuator.b === line && pushes(actuator, 'out') !== 0 && conditions.places[i] !== 'out'),
    );
  return {
    trapped: (line, reasons) => {
      const cut = shut(line);
      const maybe: Truth<Diagram> = { sure: NONE, maybe: cut };
      const found = reasons.map((reason): Truth<Diagram> => {
        if (reason === 'load') return loaded(line) ? sureOf(cut) : maybe;
        if (reason === 'heat') return maybe;
        if (conditions.pumpsRunning) {
          if (reason !== 'left behind') return none;
          return sureOf(sets.and(cut, oneMoveFrom(sets, moving().underPressure[line] as Diagram)));
        }
        // Both speak of the pumps running before they stopped, which is another table.
        return reason === 'stored' ? sureOf(classSet(paths, line, 'fed')) : maybe;
      });
      return found.reduce(both, none);
    },
  };
}
