import type { Network } from '../../network/network.ts';
import type { Chambers } from './chambers.ts';
import type { EdgeSet } from './edges.ts';
import type { Field, Spreader } from './field.ts';
import { loadAgainst, pushes } from './actuator-bits.ts';
import { REST_REASONS, set, word } from './motion-bits.ts';
import type { Motion } from './motion-bits.ts';
import type { PathConditions, Reach } from './reach.ts';

const PRESSED_LINE = REST_REASONS.indexOf('pressed line');

/**
 * Displaced oil: what a moving actuator pushes out may drive the next one, and so on. Adds those motions
 * to `m` and returns the lines that displaced oil gets to.
 */
export function driveByDisplaced(
  net: Network,
  edges: EdgeSet,
  conditions: PathConditions,
  r: Reach,
  s: Spreader,
  m: Omit<Motion, 'pushed'>,
): Field {
  const { width } = s;
  const pushed = s.field();
  const doubtful = anyRest(m.rests, width);
  const touched = new Uint8Array(net.lines.length);
  /** States in which its load pushes oil out of it: its own oil does not drive it back. */
  const yielding = net.actuators.map(() => new Uint32Array(width));
  const yields = new Uint8Array(net.actuators.length);
  pushByLoads();
  let moved = net.actuators.map((_, i) => i);
  while (moved.length > 0) {
    const fresh = moved.flatMap((i) => {
      const { a, b } = net.actuators[i] as { a: number; b: number };
      return [pushOut(b, m.out[i] as Uint32Array), pushOut(a, m.in[i] as Uint32Array)].filter((line) => line >= 0);
    });
    for (const line of fresh) touched[line] = 1;
    s.spread(pushed, edges.forward, { gate: r.notFreeToTank, from: fresh, touched });
    moved = net.actuators
      // One that a load pushes may also be driven back once others have moved.
      .flatMap(({ a, b }, i) => (touched[a] === 1 || (b >= 0 && touched[b] === 1) || yields[i] === 1 ? [i] : []))
      .filter(drive);
    touched.fill(0);
  }
  markRings();
  return pushed;

  /** A load whose oil has no free way to tank may drive other actuators with it, if it is strong enough. */
  function pushByLoads(): void {
    const seeded: number[] = [];
    net.actuators.forEach((actuator, i) => {
      const ch = m.chambers[i] as Chambers;
      for (const [way, line, exit, fed] of [
        ['in', actuator.a, ch.exitA, m.fedA[i]],
        ['out', actuator.b, ch.exitB, m.fedB[i]],
      ] as const) {
        if (line < 0 || pushes(actuator, way) === 0) continue;
        const plane = new Uint32Array(width);
        let any = 0;
        for (let w = 0; w < width; w++) {
          const bits = (exit[w] as number) & word(r.notFreeToTank, line, w, width) & ~(fed?.[w] as number);
          plane[w] = bits;
          any |= bits;
          const mine = yielding[i] as Uint32Array;
          mine[w] = (mine[w] as number) | bits;
          doubtful[w] = (doubtful[w] as number) | bits;
        }
        if (any === 0) continue;
        yields[i] = 1;
        if (pushOut(line, plane) >= 0) seeded.push(line);
      }
    });
    if (seeded.length > 0) s.spread(pushed, edges.forward, { gate: r.notFreeToTank, from: seeded, touched });
    for (const line of seeded) touched[line] = 1;
  }

  /** Oil forced back into a line under pressure may turn a whole ring of actuators. */
  function markRings(): void {
    const ring = new Uint32Array(width);
    for (const rest of m.rests) {
      const plane = rest[PRESSED_LINE] as Uint32Array;
      for (let w = 0; w < width; w++) ring[w] = (ring[w] as number) | (plane[w] as number);
    }
    net.actuators.forEach(({ a, b }, i) => {
      for (let w = 0; w < width; w++) {
        const bits = ring[w] as number;
        if (bits === 0) continue;
        const under = word(r.underPressure, a, w, width) | (b < 0 ? 0 : word(r.underPressure, b, w, width));
        set(
          m.rests[i] as readonly Uint32Array[],
          'upstream',
          w,
          bits & under & ~(m.out[i]?.[w] as number) & ~(m.in[i]?.[w] as number),
        );
      }
    });
  }

  /** The line, if it got oil that it did not have yet. */
  function pushOut(line: number, motion: Uint32Array): number {
    if (line < 0) return -1;
    let grown = 0;
    for (let w = 0; w < width; w++) {
      const at = line * width + w;
      const before = pushed[at] as number;
      const after = before | ((motion[w] as number) & (r.notFreeToTank[at] as number));
      grown |= before ^ after;
      pushed[at] = after;
    }
    return grown === 0 ? -1 : line;
  }

  /** States in which some other actuator pushes oil out. */
  function othersPush(i: number, w: number): number {
    let bits = 0;
    for (let j = 0; j < net.actuators.length; j++) {
      if (j !== i) bits |= (yielding[j]?.[w] as number) | (m.out[j]?.[w] as number) | (m.in[j]?.[w] as number);
    }
    return bits;
  }

  function drive(i: number): boolean {
    const actuator = net.actuators[i] as Network['actuators'][number];
    const ch = m.chambers[i] as Chambers;
    const rest = m.rests[i] as readonly Uint32Array[];
    const [out, inward, displaced] = [m.out[i], m.in[i], m.displaced[i]] as [Uint32Array, Uint32Array, Uint32Array];
    const place = conditions.places[i];
    const against = loadAgainst(actuator);
    let grown = 0;
    for (let w = 0; w < width; w++) {
      const moving = (out[w] as number) | (inward[w] as number) | ((yielding[i]?.[w] as number) & ~othersPush(i, w));
      const a = word(pushed, actuator.a, w, width) & ~(m.fedA[i]?.[w] as number) & ~moving;
      const b = actuator.b < 0 ? 0 : word(pushed, actuator.b, w, width) & ~(m.fedB[i]?.[w] as number) & ~moving;
      const goOut = place === 'out' ? 0 : a & ~b & (ch.exitB[w] as number);
      const goIn = place === 'in' ? 0 : b & ~a & (ch.exitA[w] as number);
      const both = a & b & ((ch.exitA[w] as number) | (ch.exitB[w] as number));
      const now = goOut | goIn;
      if ((now | both) === 0) continue;
      grown |= now;
      out[w] = (out[w] as number) | goOut;
      inward[w] = (inward[w] as number) | goIn;
      displaced[w] = (displaced[w] as number) | now;
      const bleeds =
        (goOut & word(r.toTank, actuator.a, w, width)) |
        (goIn & (actuator.b < 0 ? 0 : word(r.toTank, actuator.b, w, width)));
      const loaded = (goOut & against('in')) | (goIn & against('out'));
      set(rest, 'upstream', w, now & (doubtful[w] as number));
      set(rest, 'load', w, loaded);
      set(rest, 'bleed', w, bleeds);
      set(rest, 'two feeds', w, both);
      doubtful[w] = (doubtful[w] as number) | loaded | bleeds | both;
    }
    return grown !== 0;
  }
}

function anyRest(rests: readonly (readonly Uint32Array[])[], width: number): Uint32Array {
  const any = new Uint32Array(width);
  for (const planes of rests) {
    for (const plane of planes) for (let w = 0; w < width; w++) any[w] = (any[w] as number) | (plane[w] as number);
  }
  return any;
}
