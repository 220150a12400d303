import type { NetActuator, Network } from '../../network/network.ts';
import { chambersOf } from './chambers.ts';
import type { Chambers } from './chambers.ts';
import type { EdgeSet } from './edges.ts';
import type { Field, Spreader } from './field.ts';
import { and } from './reach.ts';
import type { Links, PathConditions, Reach } from './reach.ts';

/** Why open paths leave a motion to the pressures. */
export const REST_REASONS = [
  'load', // whether the pump lifts it depends on its pressure
  'rivals', // several actuators are offered the flow of one pump
  'bleed', // its fed line is also open to tank through a throttle
  'pressure valve', // the other chamber can only let out over a pressure valve
  'two feeds', // both chambers are fed
  'pressed line', // the other chamber can only let out into a line under pressure
  'upstream', // it is driven by displaced oil of one that rests on pressure
] as const;
export type RestReason = (typeof REST_REASONS)[number];

/** Motions of every actuator in the states of a block; a plane each. */
export interface Motion {
  readonly chambers: readonly Chambers[];
  /** Would go out / in: fed, and the other chamber lets out. */
  readonly out: readonly Uint32Array[];
  readonly in: readonly Uint32Array[];
  /** Only displaced oil feeds it. */
  readonly displaced: readonly Uint32Array[];
  /** Chamber A / B has oil under pressure behind it. */
  readonly fedA: readonly Uint32Array[];
  readonly fedB: readonly Uint32Array[];
  /** [actuator][reason] */
  readonly rests: readonly (readonly Uint32Array[])[];
  /** Lines that displaced oil gets to. */
  readonly pushed: Field;
}

export const isEqualSided = (actuator: NetActuator): boolean =>
  actuator.b >= 0 && Math.abs(actuator.areaA - actuator.areaB) <= 1e-9 * Math.max(actuator.areaA, actuator.areaB);

const reason = (name: RestReason): number => REST_REASONS.indexOf(name);

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
    const { way, by } = actuator.push;
    const against = (sense: 'in' | 'out'): number =>
      actuator.resisting || way === 'both' || (by === 'load' && way === sense) ? -1 : 0;
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
      set(rest, 'bleed', w, (goOut & tankA) | (goIn & tankB) | (stuckOut & tankA & (ch.fillB[w] as number)) | (stuckIn & tankB & (ch.fillA[w] as number)));
      set(rest, 'two feeds', w, a & b & ~regenerative & ~balanced & (exitA | exitB | (equal & (loopBA | loopAB))));
      set(rest, 'pressure valve', w, (stuckOut & ~b & reliefB) | (stuckIn & ~a & reliefA));
      set(rest, 'pressed line', w, (stuckOut & ~b & (ch.softExitB[w] as number)) | (stuckIn & ~a & (ch.softExitA[w] as number)));
      (out[i] as Uint32Array)[w] = goOut;
      (inward[i] as Uint32Array)[w] = goIn;
    }
  });

  markRivals(net, r, out, inward, rests, width);

  // Displaced oil: what a moving actuator pushes out may drive the next one, and so on.
  const pushed = s.field();
  for (let round = 0; round <= net.actuators.length; round++) {
    net.actuators.forEach((actuator, i) => {
      for (let w = 0; w < width; w++) {
        if (actuator.b >= 0) orWord(pushed, actuator.b, w, width, (out[i] as Uint32Array)[w] as number);
        orWord(pushed, actuator.a, w, width, (inward[i] as Uint32Array)[w] as number);
      }
    });
    and(pushed, r.notFreeToTank);
    s.spread(pushed, edges.forward, { gate: r.notFreeToTank });
    if (!driveByDisplaced()) break;
  }
  return { chambers, out, in: inward, displaced, fedA, fedB, rests, pushed };

  function driveByDisplaced(): boolean {
    let grown = 0;
    const doubtful = anyRest(rests, width);
    net.actuators.forEach((actuator, i) => {
      const ch = chambers[i] as Chambers;
      const place = conditions.places[i];
      for (let w = 0; w < width; w++) {
        const moving = ((out[i] as Uint32Array)[w] as number) | ((inward[i] as Uint32Array)[w] as number);
        const a = word(pushed, actuator.a, w, width) & ~((fedA[i] as Uint32Array)[w] as number) & ~moving;
        const b = (actuator.b < 0 ? 0 : word(pushed, actuator.b, w, width)) & ~((fedB[i] as Uint32Array)[w] as number) & ~moving;
        const goOut = place === 'out' ? 0 : a & ~b & (ch.exitB[w] as number);
        const goIn = place === 'in' ? 0 : b & ~a & (ch.exitA[w] as number);
        const both = a & b & ((ch.exitA[w] as number) | (ch.exitB[w] as number));
        const now = goOut | goIn;
        grown |= now;
        (out[i] as Uint32Array)[w] = ((out[i] as Uint32Array)[w] as number) | goOut;
        (inward[i] as Uint32Array)[w] = ((inward[i] as Uint32Array)[w] as number) | goIn;
        (displaced[i] as Uint32Array)[w] = ((displaced[i] as Uint32Array)[w] as number) | now;
        const rest = rests[i] as Uint32Array[];
        const { way, by } = actuator.push;
        const against = (sense: 'in' | 'out'): number =>
          actuator.resisting || way === 'both' || (by === 'load' && way === sense) ? -1 : 0;
        const bleeds =
          (goOut & word(r.toTank, actuator.a, w, width)) | (goIn & (actuator.b < 0 ? 0 : word(r.toTank, actuator.b, w, width)));
        set(rest, 'upstream', w, now & (doubtful[w] as number));
        set(rest, 'load', w, (goOut & against('in')) | (goIn & against('out')));
        set(rest, 'bleed', w, bleeds);
        set(rest, 'two feeds', w, both);
      }
    });
    return grown !== 0;
  }
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

function anyRest(rests: readonly (readonly Uint32Array[])[], width: number): Uint32Array {
  const any = new Uint32Array(width);
  for (const planes of rests) {
    for (const plane of planes) for (let w = 0; w < width; w++) any[w] = (any[w] as number) | (plane[w] as number);
  }
  return any;
}

const word = (field: Field, line: number, w: number, width: number): number => field[line * width + w] as number;

function orWord(field: Field, line: number, w: number, width: number, bits: number): void {
  field[line * width + w] = (field[line * width + w] as number) | bits;
}

function set(rest: readonly Uint32Array[], name: RestReason, w: number, bits: number): void {
  const plane = rest[reason(name)] as Uint32Array;
  plane[w] = (plane[w] as number) | bits;
}
