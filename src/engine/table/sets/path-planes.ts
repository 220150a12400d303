import type { Budget } from '../../../base/budget.ts';
import { Cancelled } from '../../../base/budget.ts';
import type { Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { NONE, TooManyNodes } from '../../paths/diagrams/diagrams.ts';
import { motionSets } from '../../paths/diagrams/motion-sets.ts';
import { openPathsOver } from '../../paths/diagrams/open-paths.ts';
import { PackedSets } from '../../paths/diagrams/packed-sets.ts';
import type { PathConditions } from '../../paths/reach.ts';
import type { Plane, TableData } from '../table-data.ts';
import { actuatorSets } from './actuator-sets.ts';
import { lineSets } from './line-sets.ts';
import { pumpSets } from './pump-sets.ts';
import { trapSets } from './trap-sets.ts';
import type { PanelState } from './trap-sets.ts';

/** The planes of a table that open paths decide. */
export type PathPlanes = Pick<
  TableData,
  'actuatorPlanes' | 'actuatorNotes' | 'actuatorRests' | 'pumpPlanes' | 'linePlanes' | 'blockedPlanes' | 'trapPlanes'
>;

/** Nodes that are cheaper than to go through the rows: so many, and so many for each 32 rows. */
const FREE_NODES = 20_000;
const NODES_PER_WORD = 4;

/**
 * All planes of a table by open paths, found as sets and then written out. Undefined where the sets get so
 * entangled that going through the rows is faster; the planes are equal either way.
 */
export function pathPlanes(net: Network, conditions: PathConditions, budget: Budget): PathPlanes | undefined {
  const radices = net.inputs.map((input) => input.positions.length);
  const rows = radices.reduce((n, radix) => n * radix, 1);
  const sets = new PackedSets(radices, FREE_NODES + (NODES_PER_WORD * rows) / 32, () => {
    if (budget.cancelled()) throw new Cancelled();
  });
  try {
    const running = solve(net, { ...conditions, pumpsRunning: true }, sets);
    const asked = conditions.pumpsRunning ? running : solve(net, conditions, sets);
    return write(net, conditions, sets, running, asked);
  } catch (error) {
    if (error instanceof TooManyNodes) return undefined;
    throw error;
  }
}

function solve(net: Network, conditions: PathConditions, sets: PackedSets): PanelState {
  const paths = openPathsOver(net, conditions, sets);
  const motions = motionSets(net, conditions, paths);
  return { paths, motions, lines: lineSets(net, conditions, paths, motions) };
}

function write(
  net: Network,
  conditions: PathConditions,
  sets: PackedSets,
  running: PanelState,
  { paths, motions, lines }: PanelState,
): PathPlanes {
  const written = new Map<Diagram, Plane>();
  const plane = (set: Diagram): Plane | undefined => {
    if (set === NONE) return undefined;
    let found = written.get(set);
    if (found === undefined) {
      found = sets.plane(set);
      written.set(set, found);
    }
    return found;
  };
  const each = (list: readonly Diagram[]): (Plane | undefined)[] => list.map(plane);
  const actuators = net.actuators.map((_, i) => actuatorSets(net, conditions, paths, motions, i));
  const pumps = net.pumps.map((pump, i) => pumpSets(i, pump, net, conditions, paths, motions));
  const traps = trapSets(net, conditions, (set) => sets.oneMoveFrom(set), running, { paths, motions, lines });
  return {
    actuatorPlanes: actuators.map(({ verdicts }) => each(verdicts)),
    actuatorNotes: actuators.map(({ notes }) => each(notes)),
    actuatorRests: motions.actuators.map(({ why }) => each(why)),
    pumpPlanes: pumps.map(each),
    linePlanes: lines.classes.map(each),
    blockedPlanes: lines.blocked.map(each),
    trapPlanes: traps.map(each),
  };
}
