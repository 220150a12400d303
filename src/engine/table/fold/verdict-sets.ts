import type { Network } from '../../../network/network.ts';
import type { Diagram, Diagrams } from '../../paths/diagrams/diagrams.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { actuatorSets } from '../sets/actuator-sets.ts';
import { ACTUATOR_VERDICTS } from '../words.ts';
import type { ActuatorVerdict } from '../words.ts';

/** The combinations of each verdict of one actuator, open paths alone; those that never occur are empty. */
export function verdictSets(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<Diagrams>,
  motions: MotionSets,
  index: number,
): ReadonlyMap<ActuatorVerdict, Diagram> {
  const { verdicts } = actuatorSets(net, conditions, paths, motions, index);
  return new Map(ACTUATOR_VERDICTS.map((verdict, i) => [verdict, verdicts[i] as Diagram]));
}
