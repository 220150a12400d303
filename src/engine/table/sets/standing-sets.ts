import type { Network } from '../../../network/network.ts';
import { pushes } from '../../paths/actuator-bits.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import { at, eliminate, none, operations } from '../../paths/diagrams/reach-sets.ts';
import type { SetAlgebra } from '../../paths/diagrams/set-algebra.ts';
import type { PathConditions } from '../../paths/reach.ts';

/** Reasons for trapped pressure that one state shows by itself, by the rules of `standingReasons`; a set per shown line. */
export function standingSets(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra>,
  motions: MotionSets,
  cutOff: (line: number) => Diagram,
): { readonly load: Diagram; readonly heat: Diagram }[] {
  const { and, or, minus } = operations(paths);
  const sealed = net.lines.map((_, line) => (line < net.shown ? cutOff(line) : NONE));
  const pressing = none(net);
  net.actuators.forEach((actuator, i) => {
    const { a, b } = actuator;
    if (pushes(actuator, 'in') !== 0 && conditions.places[i] !== 'in') pressing[a] = at(sealed, a);
    if (b >= 0 && pushes(actuator, 'out') !== 0 && conditions.places[i] !== 'out') pressing[b] = at(sealed, b);
  });
  eliminate(net, paths, { edges: paths.edges.forward, gate: sealed }).spread(pressing);

  // An accumulator's gas gives way to warming oil.
  const cushioned = none(net);
  for (const store of net.accumulators) cushioned[store.line] = ALL;
  if (net.accumulators.length > 0) eliminate(net, paths, { edges: paths.edges.backward }).spread(cushioned);

  return sealed.slice(0, net.shown).map((shut, line) => ({
    load: or(at(pressing, line), and(shut, at(motions.underPressure, line))),
    heat: minus(shut, or(at(motions.reach.toRelief, line), at(cushioned, line))),
  }));
}
