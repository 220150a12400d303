import type { Chambers } from './chambers.ts';
import type { Field } from './field.ts';

/** Why open paths leave a motion to the pressures. */
export const REST_REASONS = [
  'load', // whether the pump lifts it depends on its pressure
  'rivals', // several actuators are offered the flow of one pump
  'bleed', // its fed line is also open to tank through a throttle
  'pressure valve', // the other chamber can only let out over a pressure valve
  'two feeds', // both chambers are fed
  'pressed line', // the other chamber can only let out into a line under pressure
  'upstream', // it is driven by displaced oil of one that rests on pressure
  'dependent valve', // where a valve that pressures move stands has not been computed
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

const REASON = Object.fromEntries(REST_REASONS.map((name, i) => [name, i])) as Record<RestReason, number>;

export const word = (field: Field, line: number, w: number, width: number): number => field[line * width + w] as number;

export function set(rest: readonly Uint32Array[], name: RestReason, w: number, bits: number): void {
  const plane = rest[REASON[name]] as Uint32Array;
  plane[w] = (plane[w] as number) | bits;
}
