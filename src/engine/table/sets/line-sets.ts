import type { Network } from '../../../network/network.ts';
import type { ActuatorMotion } from '../../paths/diagrams/actuator-motion.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import { at, eliminate, none, operations } from '../../paths/diagrams/reach-sets.ts';
import type { SetAlgebra } from '../../paths/diagrams/set-algebra.ts';
import type { LineSets, SetEdges } from '../../paths/diagrams/set-edges.ts';
import { sourceLines } from '../../paths/reach.ts';
import type { PathConditions } from '../../paths/reach.ts';

/** Sets of each shown line, by index of class and of kind of blockage. */
export interface LineOutcomeSets {
  readonly classes: readonly (readonly Diagram[])[];
  readonly blocked: readonly (readonly Diagram[])[];
}

/** The classes of all lines and where they are blocked, by the rules of `lineOutcomes`. */
export function lineSets(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra>,
  motions: MotionSets,
): LineOutcomeSets {
  const { and, or, minus, not } = operations(paths);
  const working = workingLines(net, conditions, paths, motions);
  const shown = Array.from({ length: net.shown }, (_, line) => {
    const [source, tank] = [at(paths.fromSource, line), at(paths.toTank, line)];
    const passes = at(motions.carries, line);
    const fed = minus(source, tank);
    const away = not(or(source, tank));
    const shut = minus(away, passes);
    return {
      // In the order of LINE_CLASSES and of BLOCKED_KINDS.
      classes: [fed, and(source, tank), minus(tank, source), shut, and(away, passes)],
      blocked: [minus(minus(fed, at(working, line)), passes), shut],
    };
  });
  return { classes: shown.map(({ classes }) => classes), blocked: shown.map(({ blocked }) => blocked) };
}

/** Lines with pump oil on its way to a moving chamber; as `working` of `carryingLines`. */
function workingLines(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra>,
  motions: MotionSets,
): LineSets {
  const { or, minus } = operations(paths);
  const taken = none(net);
  const ends = none(net);
  net.actuators.forEach(({ a, b }, i) => {
    const { out, in: inward, displaced } = motions.actuators[i] as ActuatorMotion;
    const moves = or(out, inward);
    taken[a] = or(at(taken, a), minus(out, displaced));
    ends[a] = or(at(ends, a), moves);
    if (b < 0) return;
    taken[b] = or(at(taken, b), minus(inward, displaced));
    ends[b] = or(at(ends, b), moves);
  });
  for (const line of sourceLines(net, conditions)) if (line >= 0) ends[line] = ALL;
  eliminate(net, paths, { edges: paths.edges.backward, gate: paths.fromSource }).spread(taken);
  pruneDeadEnds(taken, ends, neighbours(paths), paths);
  return taken;
}

interface Neighbour {
  readonly line: number;
  /** Some path between the two is open. */
  readonly open: Diagram;
}

/** Lines joined to each line by a path in either direction. */
function neighbours({ sets, edges }: OpenPathSets<SetAlgebra>): Neighbour[][] {
  const { start, to, mask }: SetEdges['forward'] = edges.forward;
  const found = Array.from({ length: start.length - 1 }, () => new Map<number, Diagram>());
  const note = (from: number, other: number, open: Diagram): void => {
    found[from]?.set(other, sets.or(found[from]?.get(other) ?? NONE, open));
  };
  found.forEach((_, line) => {
    for (let e = start[line] as number; e < (start[line + 1] as number); e++) {
      const open = edges.open[mask[e] as number] as Diagram;
      note(line, to[e] as number, open);
      note(to[e] as number, line, open);
    }
  });
  return found.map((map) => [...map].map(([line, open]) => ({ line, open })));
}

/** A line that is no end itself and has fewer than two open neighbours that carry oil carries none. */
function pruneDeadEnds(
  field: LineSets,
  ends: LineSets,
  near: readonly (readonly Neighbour[])[],
  { sets }: OpenPathSets<SetAlgebra>,
): void {
  const queue: number[] = near.map((_, line) => line);
  const queued = new Uint8Array(near.length).fill(1);
  while (queue.length > 0) {
    const line = queue.pop() as number;
    queued[line] = 0;
    const now = field[line] as Diagram;
    if (sets.minus(now, ends[line] as Diagram) === NONE) continue;
    let once: Diagram = NONE;
    let twice: Diagram = NONE;
    for (const { line: other, open } of near[line] as readonly Neighbour[]) {
      const reached = sets.and(open, field[other] as Diagram);
      twice = sets.or(twice, sets.and(once, reached));
      once = sets.or(once, reached);
    }
    const keep = sets.and(now, sets.or(twice, ends[line] as Diagram));
    if (keep === now) continue;
    field[line] = keep;
    for (const { line: other } of near[line] as readonly Neighbour[]) {
      if (queued[other] === 1) continue;
      queued[other] = 1;
      queue.push(other);
    }
  }
}
