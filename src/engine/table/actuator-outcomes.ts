import type { NetActuator } from '../../network/network.ts';
import type { SettledBlock } from '../paths/block.ts';
import { isEqualSided, pushes } from '../paths/actuator-bits.ts';
import type { Chambers } from '../paths/chambers.ts';
import type { PathConditions } from '../paths/reach.ts';
import { ACTUATOR_NOTES, ACTUATOR_VERDICTS } from './words.ts';
import type { ActuatorNote, ActuatorVerdict } from './words.ts';

/** Planes of one block for one actuator, by index of the verdict or note. */
export interface ActuatorOutcome {
  readonly verdicts: readonly Uint32Array[];
  readonly notes: readonly Uint32Array[];
  /** Where it may float, and be free one way, if nothing feeds it. */
  readonly unfed: { readonly floats: Uint32Array; readonly oneWay: Uint32Array };
}

/** Pa: what the atmosphere can push with where a chamber is sealed and stretched. */
const ATMOSPHERE = 101_325;

/**
 * The verdict of one actuator in every state of the block, decided in the binding order:
 * undetermined, moving, at stop, stalled, held, held one way, floats. Where open paths leave it to
 * loads, rivals or settings the verdict is `rests on pressure`.
 */
export function actuatorOutcome(
  index: number,
  actuator: NetActuator,
  block: SettledBlock,
  conditions: PathConditions,
): ActuatorOutcome {
  const { width, motion, all, hunts } = block;
  const verdicts = ACTUATOR_VERDICTS.map(() => new Uint32Array(width));
  const notes = ACTUATOR_NOTES.map(() => new Uint32Array(width));
  const planeOf = (verdict: ActuatorVerdict): Uint32Array =>
    verdicts[ACTUATOR_VERDICTS.indexOf(verdict)] as Uint32Array;
  const noteOf = (name: ActuatorNote): Uint32Array => notes[ACTUATOR_NOTES.indexOf(name)] as Uint32Array;
  const words = motionWords(actuator);
  const [goesOut, goesIn, pushedOut, pushedIn] = [
    planeOf(words.out),
    planeOf(words.in),
    planeOf(words.pushedOut),
    planeOf(words.pushedIn),
  ];
  const [undetermined, restsOnPressure, atStop] = [
    planeOf('undetermined'),
    planeOf('rests on pressure'),
    planeOf('at stop'),
  ];
  const [held, heldOneWay, floats] = [planeOf('held'), planeOf('held one way'), planeOf('floats')];
  const [suctionOut, suctionIn] = [noteOf('outward by suction only'), noteOf('inward by suction only')];
  const [voidForms, freeOutward, freeInward] = [noteOf('void forms'), noteOf('free outward'), noteOf('free inward')];
  let left = 0;
  /** Gives the verdict to those states that have none yet; returns them. */
  const decide = (plane: Uint32Array, w: number, bits: number): number => {
    const now = bits & left;
    plane[w] = (plane[w] as number) | now;
    left &= ~now;
    return now;
  };
  const ch = motion.chambers[index] as Chambers;
  const rests = motion.rests[index] as readonly Uint32Array[];
  const place = conditions.places[index];
  const notOut = place === 'out' ? 0 : -1;
  const notIn = place === 'in' ? 0 : -1;
  const equal = isEqualSided(actuator) ? -1 : 0;
  const push = (way: 'in' | 'out'): number => pushes(actuator, way);
  const unfed = { floats: new Uint32Array(width), oneWay: new Uint32Array(width) };
  const breaksVacuum = (area: number): number => (actuator.push.size > ATMOSPHERE * area ? -1 : 0);

  for (let w = 0; w < width; w++) {
    left = all[w] as number;
    const goOut = motion.out[index]?.[w] as number;
    const goIn = motion.in[index]?.[w] as number;
    const fedA = motion.fedA[index]?.[w] as number;
    const fedB = motion.fedB[index]?.[w] as number;
    const exitA = ch.exitA[w] as number;
    const exitB = ch.exitB[w] as number;
    const fillA = ch.fillA[w] as number;
    const fillB = ch.fillB[w] as number;
    const loopBA = ch.fromBtoA[w] as number;
    const loopAB = ch.fromAtoB[w] as number;
    let resting = 0;
    for (const plane of rests) resting |= plane[w] as number;

    decide(undetermined, w, hunts[w] as number);
    decide(restsOnPressure, w, resting);
    decide(goesOut, w, goOut);
    decide(goesIn, w, goIn);

    const fed = fedA | fedB;
    // Pressure may also come through another actuator that pushes against this one.
    const under = block.reach.underPressure;
    const underA = under[actuator.a * width + w] as number;
    const underB = actuator.b < 0 ? 0 : (under[actuator.b * width + w] as number);
    decide(atStop, w, (underA & ~underB & ~notOut) | (underB & ~underA & ~notIn));
    const balanced = equal & fedA & fedB & loopBA & loopAB;
    decide(held, w, fed & ~balanced);

    const freeOut = ((exitB & fillA) | (loopBA & (fillA | equal))) & notOut;
    const freeIn = ((exitA & (fillB | loopAB)) | (equal & loopAB)) & notIn;
    unfed.floats[w] = freeOut & freeIn;
    unfed.oneWay[w] = freeOut ^ freeIn;
    // A chamber that cannot fill holds by suction alone.
    const suckOut = (exitB | loopBA) & ~freeOut & notOut;
    const suckIn = exitA & ~freeIn & notIn;

    const opposed = actuator.push.way === 'both' ? -1 : 0;
    const movesOut = push('out') & ~opposed & (freeOut | (suckOut & breaksVacuum(actuator.areaA)));
    const movesIn = push('in') & ~opposed & (freeIn | (suckIn & breaksVacuum(actuator.areaB)));
    // A load that has to push its oil through another actuator: whether it can is for the pressures.
    const tank = block.reach.toTank;
    const tankA = tank[actuator.a * width + w] as number;
    const tankB = actuator.b < 0 ? -1 : (tank[actuator.b * width + w] as number);
    // Or against the back pressure of a pump that is open to tank.
    const source = block.reach.fromSource;
    const backA = source[actuator.a * width + w] as number;
    const backB = actuator.b < 0 ? 0 : (source[actuator.b * width + w] as number);
    decide(restsOnPressure, w, (movesIn & backA) | (movesOut & backB));
    decide(
      restsOnPressure,
      w,
      (opposed & (freeOut | freeIn)) | (movesOut & ~tankB & ~loopBA) | (movesIn & ~tankA & ~loopAB),
    );
    voidForms[w] = (decide(pushedOut, w, movesOut) & ~freeOut) | (decide(pushedIn, w, movesIn) & ~freeIn);

    const both = decide(held, w, ~freeOut & ~freeIn);
    const oneWay = decide(heldOneWay, w, freeOut ^ freeIn);
    suctionOut[w] = (both | (oneWay & freeIn)) & suckOut;
    suctionIn[w] = (both | (oneWay & freeOut)) & suckIn;
    freeOutward[w] = oneWay & freeOut;
    freeInward[w] = oneWay & freeIn;
    decide(floats, w, -1);
  }
  return { verdicts, notes, unfed };
}

interface MotionWords {
  readonly out: ActuatorVerdict;
  readonly in: ActuatorVerdict;
  readonly pushedOut: ActuatorVerdict;
  readonly pushedIn: ActuatorVerdict;
}

/** The trade's words for the two directions of a cylinder or a motor. */
export function motionWords(actuator: NetActuator): MotionWords {
  if (actuator.rotary) {
    return { out: 'turns A→B', in: 'turns B→A', pushedOut: 'driven A→B by load', pushedIn: 'driven B→A by load' };
  }
  return actuator.push.by === 'spring'
    ? { out: 'extends', in: 'retracts', pushedOut: 'moved out by spring', pushedIn: 'moved in by spring' }
    : { out: 'extends', in: 'retracts', pushedOut: 'moved out by load', pushedIn: 'moved in by load' };
}
