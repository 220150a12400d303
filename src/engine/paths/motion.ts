import type { Network } from '../../network/network.ts';
import { chambersOf } from './chambers.ts';
import type { Chambers } from './chambers.ts';
import type { EdgeSet } from './edges.ts';
import type { Field, Spreader } from './field.ts';
import { driveByDisplaced } from './displaced.ts';
import type { Motion } from './motion-bits.ts';
import { isEqualSided, loadAgainst, pushes } from './actuator-bits.ts';
import { REST_REASONS, set, word } from './motion-bits.ts';
import type { Links, PathConditions, Reach } from './reach.ts';

export function findMotion(
  net: Network,
  edges: EdgeSet,
  links: Links,
  conditions: PathConditions,
  r: Reach,
  s: Spreader,
): Motion {
  const { width } = s;
  const plane = (): Uint32Array => new Uint32Array(width);
  const each = <T>(make: () => T): T[] => net.actuators.map(make);
  const chambers = net.actuators.map((actuator, i) => chambersOf(i, actuator, net, edges, links, conditions, r, s));
  const out = each(plane);
  const inward = each(plane);
  const displaced = each(plane);
  const fedA = each(plane);
  const fedB = each(plane);
  const rests = each(() => REST_REASONS.map(plane));

  net.actuators.forEach((actuator, i) => {
    const ch = chambers[i] as Chambers;
    const place = conditions.places[i];
    const notOut = place === 'out' ? 0 : -1;
    const notIn = place === 'in' ? 0 : -1;
    const equal = isEqualSided(actuator) ? -1 : 0;
    const rest = rests[i] as Uint32Array[];
    const against = loadAgainst(actuator);
    for (let w = 0; w < width; w++) {
      const a = word(r.anyPressed, actuator.a, w, width);
      const b = actuator.b < 0 ? 0 : word(r.anyPressed, actuator.b, w, width);
      const tankA = word(r.toTank, actuator.a, w, width);
      const tankB = actuator.b < 0 ? 0 : word(r.toTank, actuator.b, w, width);
      const exitA = ch.exitA[w] as number;
      const exitB = ch.exitB[w] as number;
      const loopBA = ch.fromBtoA[w] as number;
      const loopAB = ch.fromAtoB[w] as number;
      const reliefB = actuator.b < 0 ? 0 : word(r.toRelief, actuator.b, w, width);
      const reliefA = word(r.toRelief, actuator.a, w, width);

      // Both chambers on one pump line: the larger side wins and takes the oil of the smaller one
      // (regenerative); equal sides balance.
      const regenerative = a & loopBA & ~equal;
      const balanced = equal & a & b & loopBA & loopAB;
      const goOut = a & (exitB | regenerative) & ~balanced & notOut;
      const goIn = b & exitA & ~balanced & ~goOut & notIn;
      (fedA[i] as Uint32Array)[w] = a;
      (fedB[i] as Uint32Array)[w] = b;

      const stuckOut = a & ~exitB & ~regenerative & ~balanced & notOut;
      const stuckIn = b & ~exitA & ~balanced & notIn & ~goOut;
      set(rest, 'load', w, ((goOut | stuckOut) & against('in')) | ((goIn | stuckIn) & against('out')));
      set(
        rest,
        'bleed',
        w,
        (goOut & tankA) |
          (goIn & tankB) |
          (stuckOut & tankA & (ch.fillB[w] as number)) |
          (stuckIn & tankB & (ch.fillA[w] as number)),
      );
      set(rest, 'two feeds', w, a & b & ~regenerative & ~balanced & (exitA | exitB | (equal & (loopBA | loopAB))));
      set(rest, 'pressure valve', w, (stuckOut & ~b & reliefB) | (stuckIn & ~a & reliefA));
      set(
        rest,
        'pressed line',
        w,
        (stuckOut & ~b & (ch.softExitB[w] as number)) | (stuckIn & ~a & (ch.softExitA[w] as number)),
      );
      if (r.valves) {
        const line = (field: Field, at: number): number => (at < 0 ? 0 : word(field, at, w, width));
        const { exits, pressed } = r.valves;
        const wayOutB = actuator.b < 0 ? -1 : line(exits, actuator.b);
        const wayOutA = line(exits, actuator.a);
        // Fed, let out, bled or let go only over a valve that pressures open.
        const viaValve =
          (a & ~goOut & wayOutB & notOut) |
          (b & ~goIn & wayOutA & notIn) |
          (line(pressed, actuator.a) & ~a & (wayOutB | (loopBA & ~equal)) & notOut) |
          (line(pressed, actuator.b) & ~b & wayOutA & notIn) |
          (goOut & wayOutA) |
          (goIn & line(exits, actuator.b)) |
          (pushes(actuator, 'in') & ~exitA & wayOutA & notIn) |
          (pushes(actuator, 'out') & ~exitB & wayOutB & notOut);
        set(rest, 'pressure valve', w, viaValve & ~balanced);
      }
      (out[i] as Uint32Array)[w] = goOut;
      (inward[i] as Uint32Array)[w] = goIn;
    }
  });

  markRivals(net, r, out, inward, rests, width);

  const pushed = driveByDisplaced(net, edges, conditions, r, s, {
    chambers,
    out,
    in: inward,
    displaced,
    fedA,
    fedB,
    rests,
  });
  return { chambers, out, in: inward, displaced, fedA, fedB, rests, pushed };
}

/** Two actuators that one source could move at once: which goes first, only pressures tell. */
function markRivals(
  net: Network,
  r: Reach,
  out: readonly Uint32Array[],
  inward: readonly Uint32Array[],
  rests: readonly (readonly Uint32Array[])[],
  width: number,
): void {
  for (const field of r.pressed) {
    const offered = net.actuators.map((actuator, i) => {
      const plane = new Uint32Array(width);
      for (let w = 0; w < width; w++) {
        const goOut = ((out[i] as Uint32Array)[w] as number) & word(field, actuator.a, w, width);
        const goIn = actuator.b < 0 ? 0 : ((inward[i] as Uint32Array)[w] as number) & word(field, actuator.b, w, width);
        plane[w] = goOut | goIn;
      }
      return plane;
    });
    for (let w = 0; w < width; w++) {
      let once = 0;
      let twice = 0;
      for (const plane of offered) {
        twice |= once & (plane[w] as number);
        once |= plane[w] as number;
      }
      offered.forEach((plane, i) => set(rests[i] as Uint32Array[], 'rivals', w, (plane[w] as number) & twice));
    }
  }
}
