import type { NetPump, Network } from '../../../network/network.ts';
import type { ActuatorMotion } from '../../paths/diagrams/actuator-motion.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import { at, operations } from '../../paths/diagrams/reach-sets.ts';
import type { SetAlgebra } from '../../paths/diagrams/set-algebra.ts';
import type { LineSets } from '../../paths/diagrams/set-edges.ts';
import { REST_REASONS } from '../../paths/motion-bits.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { PUMP_VERDICTS } from '../words.ts';
import type { PumpVerdict } from '../words.ts';

const RIVALS = REST_REASONS.indexOf('rivals');

/** The combinations of each verdict of one pump, by the rules of `pumpOutcome`; by index of the verdict. */
export function pumpSets(
  index: number,
  pump: NetPump,
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra>,
  motions: MotionSets,
): Diagram[] {
  const { and, or, minus } = operations(paths);
  const { reach: r } = motions;
  const pressed = r.pressed[index] as LineSets;
  const pressedFree = r.pressedFree[index] as LineSets;
  const verdicts: Diagram[] = PUMP_VERDICTS.map(() => NONE);
  let left: Diagram = ALL;
  const decide = (verdict: PumpVerdict, set: Diagram): void => {
    const place = PUMP_VERDICTS.indexOf(verdict);
    verdicts[place] = or(verdicts[place] as Diagram, and(set, left));
    left = minus(left, set);
  };
  if (!conditions.pumpsRunning || pump.atRest) decide('stopped', ALL);
  decide('rests on pressure', paths.hunts);

  let drives: Diagram = NONE;
  let works: Diagram = NONE;
  let perhaps: Diagram = NONE;
  net.actuators.forEach(({ a, b }, i) => {
    const m = motions.actuators[i] as ActuatorMotion;
    const mine = or(and(m.out, at(pressed, a)), and(m.in, at(pressed, b)));
    // Between rivals the pump works whoever wins.
    const other = or(...m.why.filter((_, reason) => reason !== RIVALS));
    // Nothing throttles it on the way there or back.
    const free = or(
      and(m.out, at(pressedFree, a), or(b < 0 ? ALL : at(r.freeExits, b), m.fromBtoA)),
      and(m.in, at(pressedFree, b), at(r.freeExits, a)),
    );
    drives = or(drives, mine);
    works = or(works, minus(and(mine, free), other));
    // An actuator that may let go although open paths do not move it.
    perhaps = or(perhaps, and(other, or(at(pressed, a), at(pressed, b))));
  });

  // An empty accumulator takes its flow until it is full.
  for (const store of net.accumulators) if (!store.charged) perhaps = or(perhaps, at(pressed, store.line));

  const outlet = pump.outlet;
  const tank = at(paths.toTank, outlet);
  decide('unloaded', at(paths.freeToTank, outlet));
  // A valve that pressures open may unload it, or let its oil on to something.
  decide('rests on pressure', or(perhaps, r.valves ? minus(at(r.valves.exits, outlet), tank) : NONE));
  decide('working', works);
  decide('rests on pressure', or(drives, tank));
  if (pump.compensated) decide('destroked', ALL);
  decide('over relief', at(r.toRelief, outlet));
  decide('dead-headed', ALL);
  return verdicts;
}
