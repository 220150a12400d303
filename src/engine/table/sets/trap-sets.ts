import type { Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { NONE } from '../../paths/diagrams/diagrams.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import type { SetAlgebra } from '../../paths/diagrams/set-algebra.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { LINE_CLASSES, TRAP_REASONS } from '../words.ts';
import type { LineOutcomeSets } from './line-sets.ts';
import { standingSets } from './standing-sets.ts';

const CUT_OFF = LINE_CLASSES.indexOf('cut off');
const FED = LINE_CLASSES.indexOf('fed');

/** What open paths say with the pumps running, or stopped. */
export interface PanelState<S extends SetAlgebra = SetAlgebra> {
  readonly paths: OpenPathSets<S>;
  readonly motions: MotionSets;
  readonly lines: LineOutcomeSets;
}

/**
 * Combinations in which pressure is trapped, by shown line and index of the reason. `oneMoveFrom`: those from which
 * one move of one lever leads into a set. `asked` is `running` itself where the pumps run.
 */
export function trapSets(
  net: Network,
  conditions: PathConditions,
  oneMoveFrom: (set: Diagram) => Diagram,
  running: PanelState,
  asked: PanelState,
): Diagram[][] {
  const { sets } = asked.paths;
  const kind = ({ lines }: PanelState, line: number, index: number): Diagram => lines.classes[line]?.[index] ?? NONE;
  const standing = standingSets(net, conditions, asked.paths, asked.motions, (line) => kind(asked, line, CUT_OFF));
  return standing.map(({ load, heat }, line) => {
    const under = running.motions.reach.leaves[line] as Diagram;
    const cutOff = kind(asked, line, CUT_OFF);
    const left = sets.and(kind(running, line, CUT_OFF), oneMoveFrom(under));
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
