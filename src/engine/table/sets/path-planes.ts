import type { Budget } from '../../../base/budget.ts';
import { Cancelled } from '../../../base/budget.ts';
import type { Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { NONE, TooManyNodes } from '../../paths/diagrams/diagrams.ts';
import { motionSets } from '../../paths/diagrams/motion-sets.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import { openPathsOver } from '../../paths/diagrams/open-paths.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import { PackedSets } from '../../paths/diagrams/packed-sets.ts';
import type { PathConditions } from '../../paths/reach.ts';
import type { Plane, TableData } from '../table-data.ts';
import { LINE_CLASSES, TRAP_REASONS } from '../words.ts';
import { actuatorSets } from './actuator-sets.ts';
import { lineSets } from './line-sets.ts';
import type { LineOutcomeSets } from './line-sets.ts';
import { pumpSets } from './pump-sets.ts';
import { standingSets } from './standing-sets.ts';

/** The planes of a table that open paths decide. */
export type PathPlanes = Pick<
  TableData,
  'actuatorPlanes' | 'actuatorNotes' | 'actuatorRests' | 'pumpPlanes' | 'linePlanes' | 'blockedPlanes' | 'trapPlanes'
>;

const CUT_OFF = LINE_CLASSES.indexOf('cut off');
const FED = LINE_CLASSES.indexOf('fed');

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

interface Solved {
  readonly paths: OpenPathSets<PackedSets>;
  readonly motions: MotionSets;
  readonly lines: LineOutcomeSets;
}

function solve(net: Network, conditions: PathConditions, sets: PackedSets): Solved {
  const paths = openPathsOver(net, conditions, sets);
  const motions = motionSets(net, conditions, paths);
  return { paths, motions, lines: lineSets(net, conditions, paths, motions) };
}

function write(
  net: Network,
  conditions: PathConditions,
  sets: PackedSets,
  running: Solved,
  { paths, motions, lines }: Solved,
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
  const traps = trapSets(net, conditions, sets, running, { paths, motions, lines });
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

/** Reasons of every shown line, by index of the reason. */
function trapSets(
  net: Network,
  conditions: PathConditions,
  sets: PackedSets,
  running: Solved,
  asked: Solved,
): Diagram[][] {
  const kind = ({ lines }: Solved, line: number, index: number): Diagram => lines.classes[line]?.[index] ?? NONE;
  const standing = standingSets(net, conditions, asked.paths, asked.motions, (line) => kind(asked, line, CUT_OFF));
  return standing.map(({ load, heat }, line) => {
    const under = running.motions.underPressure[line] as Diagram;
    const cutOff = kind(asked, line, CUT_OFF);
    const left = sets.and(kind(running, line, CUT_OFF), sets.oneMoveFrom(under));
    const stopped = !conditions.pumpsRunning;
    const reasons: Record<(typeof TRAP_REASONS)[number], Diagram> = {
      load,
      heat,
      'left behind': sets.and(left, cutOff),
      stopped: stopped ? sets.and(cutOff, under) : NONE,
      // With the pumps stopped only a charged accumulator can feed a line.
      stored: stopped ? kind(asked, line, FED) : NONE,
    };
    return TRAP_REASONS.map((reason) => reasons[reason]);
  });
}
