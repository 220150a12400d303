import type { Network } from '../../../network/network.ts';
import { fullAt, gasPressure, gasStiffness, isEndless } from './machine.ts';
import type { Machine } from './machine.ts';
import type { Steady } from './steady.ts';

/** A travel at which something looks at an actuator. */
export interface Travel {
  readonly actuator: number;
  /** m from the inner stop. */
  readonly at: number;
}

/** How long the present motion goes on by itself, and what then ends it. */
export interface NextEvent {
  /** s; Infinity = for ever. */
  readonly after: number;
  /** Travels that are reached then, snapped to exactly; a stop is one of them. */
  readonly reached: readonly Travel[];
  /** Accumulators that run empty or full then. */
  readonly empty: readonly number[];
  readonly full: readonly number[];
  /** Nothing but a force or gas pressure that has changed enough to be taken anew. */
  readonly stage: boolean;
}

/** Events closer together than this, s, are one. */
export const TOGETHER = 1e-9;
/** Share of its pressure by which a gas may change within one interval, and of its stroke by which a sprung actuator may move. */
const GAS_SHARE = 0.025;
const SPRING_SHARE = 1 / 16;

/** The first thing to happen if everything goes on as in `steady`. */
export function nextEvent(net: Network, machine: Machine, steady: Steady, travels: readonly Travel[]): NextEvent {
  const reached: { readonly travel: Travel; readonly after: number }[] = [];
  const aim = (actuator: number, at: number, speed: number): void => {
    const way = at - (machine.strokes[actuator] ?? 0);
    if (way !== 0 && way > 0 === speed > 0) reached.push({ travel: { actuator, at }, after: way / speed });
  };
  let stage = Infinity;
  net.actuators.forEach(({ stroke, forces }, i) => {
    const speed = steady.speeds[i] ?? 0;
    if (speed === 0 || stroke === undefined) return;
    const end = speed > 0 ? stroke : 0;
    if (machine.strokes[i] === end) reached.push({ travel: { actuator: i, at: end }, after: 0 });
    else aim(i, end, speed);
    for (const travel of travels) if (travel.actuator === i) aim(i, travel.at, speed);
    if (forces.spring !== 0) stage = Math.min(stage, (SPRING_SHARE * stroke) / Math.abs(speed));
  });
  const empty: { readonly store: number; readonly after: number }[] = [];
  const full: { readonly store: number; readonly after: number }[] = [];
  net.accumulators.forEach((store, i) => {
    const flow = steady.stores[i] ?? 0;
    if (flow === 0 || isEndless(store)) return;
    const oil = machine.stored[i] ?? 0;
    if (flow < 0) empty.push({ store: i, after: oil / -flow });
    else full.push({ store: i, after: (fullAt(store) - oil) / flow });
    const change = Math.max(GAS_SHARE * gasPressure(store, oil), 1e4) / gasStiffness(store, oil);
    stage = Math.min(stage, change / Math.abs(flow));
  });
  const after = Math.min(stage, ...[...reached, ...empty, ...full].map((event) => event.after));
  const now = (event: { readonly after: number }): boolean => event.after <= after + TOGETHER;
  const found = {
    after,
    reached: reached.filter(now).map(({ travel }) => travel),
    empty: empty.filter(now).map(({ store }) => store),
    full: full.filter(now).map(({ store }) => store),
  };
  return { ...found, stage: found.reached.length + found.empty.length + found.full.length === 0 && after < Infinity };
}

/** Travels at which rollers trip and let go, a hair beyond which they stand otherwise. */
export function rollerTravels(net: Network): Travel[] {
  return net.dependents.flatMap(({ shifts }) =>
    shifts.flatMap((shift): Travel[] => {
      if (shift.by !== 'roller' || shift.actuator < 0 || 'at' in shift.trip) return [];
      const at = 'from' in shift.trip ? shift.trip.from : shift.trip.upTo;
      const beside = 'from' in shift.trip ? at - 2 * HAIR : at + 2 * HAIR;
      return [
        { actuator: shift.actuator, at },
        { actuator: shift.actuator, at: beside },
      ];
    }),
  );
}

/** m within which a roller still counts as tripped. */
const HAIR = 1e-6;
