import type { Network } from '../../../network/network.ts';
import { compileLinks, sourceLines } from '../reach.ts';
import type { Links, PathConditions } from '../reach.ts';
import type { Diagram } from './diagrams.ts';
import { ALL, Diagrams, NONE } from './diagrams.ts';
import type { DiagramOptions } from './diagrams.ts';
import { orderInputs } from './order.ts';
import { Elimination } from './eliminate.ts';
import type { Ways } from './eliminate.ts';
import type { SetAlgebra } from './set-algebra.ts';
import { compileSetEdges } from './set-edges.ts';
import type { LineSets, SetEdges, SetPositions } from './set-edges.ts';

/** What open paths say of every line in every combination, as exact sets, however many combinations there are. */
export interface OpenPathSets<S extends SetAlgebra = Diagrams> {
  readonly sets: S;
  /** From a running pump or charged accumulator by open paths. */
  readonly fromSource: LineSets;
  /** To a tank by open paths; by free (unthrottled) ones. */
  readonly toTank: LineSets;
  readonly freeToTank: LineSets;
  /** Under pressure by a source, or through an actuator that passes pressure on; empty without lock checks. */
  readonly underPressure: LineSets;
  readonly edges: SetEdges;
  /** Combinations in which no setting of the lock checks agrees with itself. */
  readonly hunts: Diagram;
}

/** The four classes that open paths alone tell apart; what carries displaced oil counts as cut off. */
export const PATH_CLASSES = ['fed', 'flows to tank', 'vented', 'cut off'] as const;
export type PathClass = (typeof PATH_CLASSES)[number];

/** The combinations in which a line is of a class. */
export function classSet(
  { sets, fromSource, toTank }: Pick<OpenPathSets<SetAlgebra>, 'sets' | 'fromSource' | 'toTank'>,
  line: number,
  name: PathClass,
): Diagram {
  const source = fromSource[line] as Diagram;
  const tank = toTank[line] as Diagram;
  switch (name) {
    case 'fed':
      return sets.minus(source, tank);
    case 'flows to tank':
      return sets.and(source, tank);
    case 'vented':
      return sets.minus(tank, source);
    case 'cut off':
      return sets.not(sets.or(source, tank));
  }
}

/**
 * Open paths of every combination, by the same rules as `reach` and `PathSolver` and so equal to the
 * enumeration, set by set. Throws `TooManyNodes` when the sets do not fit.
 */
export function openPathSets(net: Network, conditions: PathConditions, options: DiagramOptions = {}): OpenPathSets {
  const radices = net.inputs.map((input) => input.positions.length);
  return openPathsOver(
    net,
    conditions,
    new Diagrams(radices, { ...options, order: options.order ?? orderInputs(net) }),
  );
}

/** The same with sets of another kind. `positions`: where the dependent valves stand; throws if there are some and it is not given. */
export function openPathsOver<S extends SetAlgebra>(
  net: Network,
  conditions: PathConditions,
  sets: S,
  positions?: SetPositions,
): OpenPathSets<S> {
  const edges = compileSetEdges(net, sets, positions);
  const links = compileLinks(net, conditions.places);
  let hunts = NONE;
  // Each round can settle at least one more lock check, unless they chase each other; as in `PathSolver`.
  const rounds = 2 * edges.pilots.length + 2;
  for (let round = 0; ; round++) {
    const found = search(net, sets, edges, links, conditions);
    let changed = false;
    const next = edges.pilots.map(({ line, base, mask, vented }) => {
      const pressed = sets.or(found.fromSource[line] as Diagram, found.underPressure[line] as Diagram);
      const acts = vented
        ? sets.minus(found.toTank[line] as Diagram, pressed)
        : sets.minus(pressed, found.freeToTank[line] as Diagram);
      const open = sets.and(acts, base);
      const before = edges.open[mask] as Diagram;
      if (open !== before) {
        changed = true;
        if (round >= rounds) hunts = sets.or(hunts, sets.or(sets.minus(open, before), sets.minus(before, open)));
      }
      return open;
    });
    if (!changed || round >= rounds) return { sets, edges, ...found, hunts };
    edges.pilots.forEach(({ mask }, i) => (edges.open[mask] = next[i] as Diagram));
  }
}

function search(
  net: Network,
  sets: SetAlgebra,
  edges: SetEdges,
  links: Links,
  conditions: PathConditions,
): Omit<OpenPathSets, 'sets' | 'edges' | 'hunts'> {
  const sources = sourceLines(net, conditions).filter((line) => line >= 0);
  const none = (): LineSets => net.lines.map(() => NONE);
  const spread = (field: LineSets, ways: Omit<Ways, 'open'>): LineSets =>
    new Elimination(sets, net, { ...ways, open: edges.open }).spread(field);

  const fromSource = none();
  for (const line of sources) fromSource[line] = ALL;
  spread(fromSource, { edges: edges.forward });

  const freeToTank = net.lines.map((line) => (line.tank ? ALL : NONE));
  spread(freeToTank, { edges: edges.freeBackward, fromTank: true });

  const toTank = [...freeToTank];
  if (!conditions.pumpsRunning) {
    // A stopped pump leaks its outlet line down to tank, slowly.
    for (const pump of net.pumps) if (!pump.tightWhenStopped) toTank[pump.outlet] = ALL;
  }
  spread(toTank, { edges: edges.backward, fromTank: true });

  const underPressure = none();
  if (edges.pilots.length > 0) pressOn();
  return { fromSource, toTank, freeToTank, underPressure };

  /** Only lock checks ask for it. */
  function pressOn(): void {
    const gate = freeToTank.map((set) => sets.not(set));
    for (const line of sources) underPressure[line] = gate[line] as Diagram;
    spread(underPressure, { edges: edges.forward, gate });
    spread(underPressure, { edges: edges.forward, gate, links: links.push });
  }
}
