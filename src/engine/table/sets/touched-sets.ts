import type { Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { NONE } from '../../paths/diagrams/diagrams.ts';
import { motionSets } from '../../paths/diagrams/motion-sets.ts';
import { openPathsOver } from '../../paths/diagrams/open-paths.ts';
import { operations } from '../../paths/diagrams/reach-sets.ts';
import type { SetAlgebra } from '../../paths/diagrams/set-algebra.ts';
import type { SettledPaths } from '../../paths/diagrams/settled-paths.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { actuatorSets } from './actuator-sets.ts';
import { pumpSets } from './pump-sets.ts';

/** Combinations in which something would be said to do otherwise if a dependent valve stood elsewhere. */
export interface TouchedSets {
  readonly actuators: readonly Diagram[];
  readonly pumps: readonly Diagram[];
}

/** Verdicts of actuators, then pumps. */
export type VerdictSets = readonly (readonly Diagram[])[];

/** Tries every valve in its other positions, one valve at a time, by the rules of `TouchFinder`. */
export function touchedSets(
  net: Network,
  conditions: PathConditions,
  paths: SettledPaths<SetAlgebra>,
  base: VerdictSets,
): TouchedSets {
  const { sets, settled } = paths;
  const { and, or, minus } = operations(paths);
  const found: Diagram[] = base.map(() => NONE);
  settled?.choices.forEach((choices, d) => {
    const open = settled.open[d] as Diagram;
    const stands = settled.positions[d] ?? [];
    for (const choice of choices) {
      const elsewhere = or(...choice.map((set, p) => minus(set, stands[p] ?? NONE)));
      const where = and(elsewhere, open);
      if (where === NONE) continue;
      const other = verdictSets(
        net,
        conditions,
        openPathsOver(
          net,
          conditions,
          sets,
          settled.positions.map((positions, i) => (i === d ? choice : positions)),
        ),
      );
      other.forEach((verdicts, thing) =>
        verdicts.forEach((set, verdict) => {
          const before = base[thing]?.[verdict] ?? NONE;
          if (set === before) return;
          found[thing] = or(found[thing] as Diagram, and(or(minus(set, before), minus(before, set)), where));
        }),
      );
    }
  });
  return { actuators: found.slice(0, net.actuators.length), pumps: found.slice(net.actuators.length) };
}

function verdictSets(net: Network, conditions: PathConditions, paths: Parameters<typeof motionSets>[2]): VerdictSets {
  const motions = motionSets(net, conditions, paths);
  return [
    ...net.actuators.map((_, i) => actuatorSets(net, conditions, paths, motions, i).verdicts),
    ...net.pumps.map((pump, i) => pumpSets(i, pump, net, conditions, paths, motions)),
  ];
}
