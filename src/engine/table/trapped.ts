import { emptySet, isEmpty, shiftSet } from '../../base/bits.ts';
import type { BitSet } from '../../base/bits.ts';
import type { Network } from '../../network/network.ts';
import type { SettledBlock } from '../paths/block.ts';
import { positionMask } from '../paths/edges.ts';
import type { EdgeSet } from '../paths/edges.ts';
import type { PathConditions } from '../paths/reach.ts';

/** Reasons for trapped pressure that one state shows by itself: a plane of the block per line. */
export interface StandingReasons {
  readonly load: Uint32Array;
  readonly heat: Uint32Array;
}

/**
 * Cut-off lines on which a load or spring presses or that another chamber intensifies, and those that
 * are full of oil with nothing to let it out when it warms.
 */
export function standingReasons(
  net: Network,
  edges: EdgeSet,
  conditions: PathConditions,
  block: SettledBlock,
  cutOff: (line: number) => Uint32Array | undefined,
): StandingReasons[] {
  const { spreader: s, width, reach: r } = block;
  const sealed = s.field();
  for (let line = 0; line < net.shown; line++) {
    const plane = cutOff(line);
    if (plane) sealed.set(plane, line * width);
  }
  const pressing = s.field();
  net.actuators.forEach((actuator, i) => {
    const { way } = actuator.push;
    const place = conditions.places[i];
    const press = (line: number): void => {
      if (line < 0) return;
      for (let w = 0; w < width; w++) pressing[line * width + w] = (sealed[line * width + w] as number);
    };
    if ((way === 'in' || way === 'both') && place !== 'in') press(actuator.a);
    if ((way === 'out' || way === 'both') && place !== 'out') press(actuator.b);
  });
  s.spread(pressing, edges.forward, { gate: sealed });

  // An accumulator's gas gives way to warming oil.
  const cushioned = s.field();
  for (const store of net.accumulators) s.seed(cushioned, store.line);
  s.spread(cushioned, edges.backward);

  return Array.from({ length: net.shown }, (_, line) => {
    const load = new Uint32Array(width);
    const heat = new Uint32Array(width);
    for (let w = 0; w < width; w++) {
      const i = line * width + w;
      const shut = sealed[i] as number;
      load[w] = (pressing[i] as number) | (shut & (r.underPressure[i] as number));
      heat[w] = shut & ~(r.toRelief[i] as number) & ~(cushioned[i] as number);
    }
    return { load, heat };
  });
}

/**
 * States that one move of one lever leads to from a state with this line under pressure, and in which
 * it is cut off. A move from one end to the other passes the centre without stopping there.
 */
export function leftBehind(radices: readonly number[], cutOff: BitSet | undefined, under: BitSet | undefined, states: number): BitSet {
  const found = emptySet(states);
  if (cutOff === undefined || under === undefined || isEmpty(cutOff) || isEmpty(under)) return found;
  let stride = 1;
  for (let input = radices.length - 1; input >= 0; input--) {
    const radix = radices[input] as number;
    for (let by = 1 - radix; by < radix; by++) {
      if (by === 0) continue;
      const before = shiftSet(under, by * stride, states);
      const here = stepMask(radices, input, by, states);
      for (let w = 0; w < found.length; w++) {
        found[w] = (found[w] as number) | ((cutOff[w] as number) & (before[w] as number) & (here[w] as number));
      }
    }
    stride *= radix;
  }
  return found;
}

/** States from which `input` can stand `by` positions further on. */
function stepMask(radices: readonly number[], input: number, by: number, states: number): BitSet {
  const radix = radices[input] as number;
  let positions = 0;
  for (let p = 0; p < radix; p++) if (p + by >= 0 && p + by < radix) positions |= 1 << p;
  return positionMask(radices, input, positions, states);
}
