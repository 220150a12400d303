import { emptySet } from '../../base/bits.ts';
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
      for (let w = 0; w < width; w++) pressing[line * width + w] = sealed[line * width + w] as number;
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

/** A move of one lever: how far it shifts the row, and the rows from which it can come. */
interface Move {
  readonly by: number;
  readonly here: BitSet;
}

/** Every single move of one lever, seen from the state that it leads to. */
export function leverMoves(radices: readonly number[], states: number): Move[] {
  const moves: Move[] = [];
  let stride = 1;
  for (let input = radices.length - 1; input >= 0; input--) {
    const radix = radices[input] as number;
    for (let by = 1 - radix; by < radix; by++) {
      if (by === 0) continue;
      let positions = 0;
      for (let p = 0; p < radix; p++) if (p + by >= 0 && p + by < radix) positions |= 1 << p;
      moves.push({ by: by * stride, here: positionMask(radices, input, positions, states) });
    }
    stride *= radix;
  }
  return moves;
}

/**
 * States that one move of one lever leads to from a state with this line under pressure, and in which
 * it is cut off. A move from one end to the other passes the centre without stopping there.
 */
export function leftBehind(
  moves: readonly Move[],
  cutOff: BitSet | undefined,
  under: BitSet | undefined,
  states: number,
): BitSet {
  const found = emptySet(states);
  if (cutOff === undefined || under === undefined) return found;
  const last = under.length;
  for (const { by, here } of moves) {
    // found |= cutOff & here & (under shifted by `by`), without making the shifted set.
    const words = by >> 5;
    const bits = by & 31;
    for (let w = 0; w < last; w++) {
      const wanted = (cutOff[w] as number) & (here[w] as number) & ~(found[w] as number);
      if (wanted === 0) continue;
      const low = under[w + words] ?? 0;
      const before = bits === 0 ? low : (low >>> bits) | ((under[w + words + 1] ?? 0) << (32 - bits));
      found[w] = (found[w] as number) | (wanted & before);
    }
  }
  return found;
}
