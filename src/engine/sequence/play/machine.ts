import type { NetAccumulator, NetActuator, Network } from '../../../network/network.ts';

export type Stop = 'between' | 'in' | 'out';

/** Everything that a machine remembers from one moment to the next. Lists run as in the network; SI. */
export interface Machine {
  /** m from the inner stop; a motor: rad turned. */
  readonly strokes: readonly number[];
  readonly stops: readonly Stop[];
  /** Of the commanded inputs, and of the dependent valves. */
  readonly positions: readonly number[];
  readonly dependents: readonly number[];
  readonly running: readonly boolean[];
  /** m³ of oil in each accumulator. */
  readonly stored: readonly number[];
  readonly switches: readonly boolean[];
  /** 1 = pressure stands in the line, fed or shut in. */
  readonly held: Uint8Array;
  /** 1 = the pressure in it is shut in: no pump and no accumulator stands behind it. */
  readonly shut: Uint8Array;
  /** Pa; of a line that is shut in, the highest that it was left with. */
  readonly pressures: readonly number[];
}

/** Where things stand before the first step. */
export interface MachineStart {
  /** m from the inner stop, per actuator. */
  readonly strokes: readonly number[];
  readonly positions: readonly number[];
  readonly running: readonly boolean[];
}

export function machineAt(net: Network, start: MachineStart): Machine {
  return {
    strokes: start.strokes,
    stops: net.actuators.map((actuator, i) => stopAt(actuator, start.strokes[i] ?? 0)),
    positions: start.positions,
    dependents: net.dependents.map((valve) => valve.rest ?? 0),
    running: start.running,
    stored: net.accumulators.map((store) => (store.charged ? oilAt(store, store.pressure) : 0)),
    switches: net.switches.map(() => false),
    held: new Uint8Array(net.lines.length),
    shut: new Uint8Array(net.lines.length),
    pressures: net.lines.map(() => 0),
  };
}

export function stopAt({ stroke }: NetActuator, travel: number): Stop {
  if (stroke === undefined) return 'between';
  return travel <= 0 ? 'in' : travel >= stroke ? 'out' : 'between';
}

/** Pa of the atmosphere, for the gas law. */
const ATMOSPHERE = 101_325;
/** A bladder is squeezed to a quarter of its gas volume at most (compression ratio 4:1, common practice). */
const COMPRESSION = 4;

/** True where the gas volume is not given: it then keeps its pressure, and is never empty or full. */
export const isEndless = ({ volume }: NetAccumulator): boolean => !((volume ?? 0) > 0);

/**
 * Gas pressure, Pa gauge, with so much oil in it: isothermal, (p + atmosphere) · gas volume stays the same.
 * Slow charging follows this; a discharge within seconds is steeper.
 */
export function gasPressure(store: NetAccumulator, oil: number): number {
  if (isEndless(store)) return store.charged ? store.pressure : store.precharge;
  const volume = store.volume ?? 0;
  return ((store.precharge + ATMOSPHERE) * volume) / (volume - oil) - ATMOSPHERE;
}

/** Pa per m³ of oil by which the gas pressure rises. */
export function gasStiffness(store: NetAccumulator, oil: number): number {
  if (isEndless(store)) return 0;
  return (gasPressure(store, oil) + ATMOSPHERE) / ((store.volume ?? 0) - oil);
}

/** m³ of oil at a gas pressure; 0 below the pre-charge, and where the volume is not given. */
export function oilAt(store: NetAccumulator, pressure: number): number {
  if (isEndless(store)) return 0;
  return Math.max(0, (store.volume ?? 0) * (1 - (store.precharge + ATMOSPHERE) / (pressure + ATMOSPHERE)));
}

/** m³ of oil when full: the more of compression ratio and the pressure that it is said to be charged to. */
export function fullAt(store: NetAccumulator): number {
  if (isEndless(store)) return Infinity;
  const most = (store.volume ?? 0) * (1 - 1 / COMPRESSION);
  return store.charged ? Math.max(most, oilAt(store, store.pressure)) : most;
}

/** Share of its force at mid stroke by which a return spring is weaker at one end and stronger at the other (assumed). */
const SPRING_SPREAD = 0.25;

/** N with which the spring pushes in (out: negative) at this travel; the part gives its force at mid stroke. */
export function springForce({ forces, stroke }: NetActuator, travel: number): number {
  if (forces.spring === 0 || stroke === undefined) return forces.spring;
  return forces.spring + springRate({ forces, stroke }) * (travel - stroke / 2);
}

/** N per m; a spring is stronger the further it is squeezed, whichever way it pushes. */
export const springRate = ({ forces, stroke }: Pick<NetActuator, 'forces' | 'stroke'>): number =>
  stroke === undefined ? 0 : (2 * SPRING_SPREAD * Math.abs(forces.spring)) / stroke;
