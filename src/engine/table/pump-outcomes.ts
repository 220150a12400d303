import type { NetActuator, NetPump, Network } from '../../network/network.ts';
import type { SettledBlock } from '../paths/block.ts';
import type { Field } from '../paths/field.ts';
import { REST_REASONS } from '../paths/motion-bits.ts';
import type { PathConditions } from '../paths/reach.ts';
import { PUMP_VERDICTS } from './words.ts';
import type { PumpVerdict } from './words.ts';

const INDEX = Object.fromEntries(PUMP_VERDICTS.map((verdict, i) => [verdict, i])) as Record<PumpVerdict, number>;

/** The verdict of one pump in every state of the block; planes by index of the verdict. */
export function pumpOutcome(
  index: number,
  pump: NetPump,
  net: Network,
  block: SettledBlock,
  conditions: PathConditions,
): Uint32Array[] {
  const { width, all, reach: r, motion } = block;
  const verdicts = PUMP_VERDICTS.map(() => new Uint32Array(width));
  const pressed = r.pressed[index] as Field;
  const pressedFree = r.pressedFree[index] as Field;
  const at = (field: Field, line: number, w: number): number => (line < 0 ? -1 : (field[line * width + w] as number));

  for (let w = 0; w < width; w++) {
    let left = all[w] as number;
    const decide = (verdict: PumpVerdict, bits: number): void => {
      const plane = verdicts[INDEX[verdict]] as Uint32Array;
      plane[w] = (plane[w] as number) | (bits & left);
      left &= ~bits;
    };
    if (!conditions.pumpsRunning || pump.atRest) decide('stopped', -1);
    decide('rests on pressure', block.hunts[w] as number);

    let drives = 0;
    let certain = 0;
    let rivals = 0;
    let perhaps = 0;
    net.actuators.forEach((actuator: NetActuator, i) => {
      const out = motion.out[i]?.[w] as number;
      const inward = motion.in[i]?.[w] as number;
      const mine = (out & at(pressed, actuator.a, w)) | (inward & (actuator.b < 0 ? 0 : at(pressed, actuator.b, w)));
      const rests = restWords(motion.rests[i] as readonly Uint32Array[], w);
      // Nothing throttles it on the way there or back.
      const free =
        (out &
          at(pressedFree, actuator.a, w) &
          (at(r.freeExits, actuator.b, w) | (motion.chambers[i]?.fromBtoA[w] as number))) |
        (inward & (actuator.b < 0 ? 0 : at(pressedFree, actuator.b, w)) & at(r.freeExits, actuator.a, w));
      drives |= mine;
      certain |= mine & free & ~(rests.rivals | rests.other);
      rivals |= mine & free & rests.rivals & ~rests.other;
      // An actuator that may let go although open paths do not move it.
      perhaps |= rests.other & (at(pressed, actuator.a, w) | (actuator.b < 0 ? 0 : at(pressed, actuator.b, w)));
    });

    // An empty accumulator takes its flow until it is full.
    for (const store of net.accumulators) if (!store.charged) perhaps |= at(pressed, store.line, w);

    const outlet = pump.outlet;
    decide('unloaded', at(r.freeToTank, outlet, w));
    // A valve that pressures open may unload it, or let its oil on to something.
    const valves = r.valves ? at(r.valves.exits, outlet, w) & ~at(r.toTank, outlet, w) : 0;
    decide('rests on pressure', perhaps | valves);
    decide('working', certain | rivals);
    decide('rests on pressure', drives | at(r.toTank, outlet, w));
    decide('destroked', pump.compensated ? -1 : 0);
    decide('over relief', at(r.toRelief, outlet, w));
    decide('dead-headed', -1);
  }
  return verdicts;
}

const RIVALS = REST_REASONS.indexOf('rivals');

/** Between rivals the pump works whoever wins. */
function restWords(planes: readonly Uint32Array[], w: number): { rivals: number; other: number } {
  let other = 0;
  planes.forEach((plane, reason) => {
    if (reason !== RIVALS) other |= plane[w] as number;
  });
  return { rivals: planes[RIVALS]?.[w] as number, other };
}
