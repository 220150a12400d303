import type { Network } from '../../../network/network.ts';
import type { Machine } from './machine.ts';
import type { Steady } from './steady.ts';

/** m or rad that count as a motion. */
const LEAST = 1e-6;
/** m³ of void in a chamber that is worth telling: 1 cm³. */
const LEAST_VOID = 1e-6;

export interface LoggedMotion {
  readonly actuator: number;
  readonly way: '+' | '-';
  readonly start: number;
  readonly end: number;
  readonly from: number;
  readonly to: number;
  readonly atStop: boolean;
  /** J that the oil gave it; below 0 it was driven from outside. */
  readonly work: number;
  /** m/s (rad/s) at most. */
  readonly fastest: number;
}

/** What a run has taken, moved and let happen. */
export interface Ledger {
  readonly motions: readonly LoggedMotion[];
  readonly energyIn: number;
  readonly energyLost: number;
  readonly volume: number;
  /** s and J over relief valves while nothing moved or was charged. */
  readonly idle: { readonly time: number; readonly energy: number };
  /** W over relief valves at the last moment, if nothing moved then. */
  readonly idleAtEnd: number;
  /** Actuators in which void formed. */
  readonly voids: readonly number[];
  /** Actuators that shared a flow by the losses alone. */
  readonly rivals: readonly number[];
}

interface Open {
  readonly way: '+' | '-';
  readonly start: number;
  readonly from: number;
  work: number;
  fastest: number;
}

/** Adds up a run while it is played. */
export class MotionLog {
  readonly #net: Network;
  readonly #open = new Map<number, Open>();
  readonly #motions: LoggedMotion[] = [];
  readonly #void: number[];
  readonly #rivals = new Set<number>();
  #energyIn = 0;
  #energyLost = 0;
  #volume = 0;
  #idle = { time: 0, energy: 0 };
  #idleAtEnd = 0;

  constructor(net: Network) {
    this.#net = net;
    this.#void = net.actuators.map(() => 0);
  }

  /** Motions that end or turn round at this moment are closed, new ones begun. */
  moment(time: number, machine: Machine, { speeds, rivals, relieved, stores }: Steady): void {
    speeds.forEach((speed, i) => {
      const open = this.#open.get(i);
      const way = speed > 0 ? '+' : speed < 0 ? '-' : undefined;
      if (open && open.way !== way) this.#shut(i, open, time, machine);
      if (way !== undefined && open?.way !== way)
        this.#open.set(i, { way, start: time, from: machine.strokes[i] ?? 0, work: 0, fastest: 0 });
    });
    for (const rival of rivals) this.#rivals.add(rival);
    this.#idleAtEnd = isIdle(speeds, stores) ? relieved : 0;
  }

  interval(span: number, _machine: Machine, mean: Steady): void {
    this.#energyIn += mean.powerIn * span;
    this.#energyLost += mean.powerLost * span;
    this.#volume += mean.delivered * span;
    mean.speeds.forEach((speed, i) => {
      const open = this.#open.get(i);
      if (!open) return;
      open.work += (mean.forces[i] ?? 0) * speed * span;
      open.fastest = Math.max(open.fastest, Math.abs(speed));
    });
    for (const i of mean.voids) {
      const { areaA, areaB } = this.#net.actuators[i] ?? { areaA: 0, areaB: 0 };
      const speed = mean.speeds[i] ?? 0;
      this.#void[i] = (this.#void[i] ?? 0) + Math.abs(speed) * (speed > 0 ? areaA : areaB) * span;
    }
    if (isIdle(mean.speeds, mean.stores) && mean.relieved > 0) {
      this.#idle.time += span;
      this.#idle.energy += mean.relieved * span;
    }
  }

  close(time: number, machine: Machine): Ledger {
    for (const [i, open] of [...this.#open]) this.#shut(i, open, time, machine);
    const motions = this.#motions.sort((a, b) => a.start - b.start || a.actuator - b.actuator);
    return {
      motions,
      energyIn: this.#energyIn,
      energyLost: this.#energyLost,
      volume: this.#volume,
      idle: { ...this.#idle },
      idleAtEnd: this.#idleAtEnd,
      voids: this.#void.flatMap((volume, i) => (volume > LEAST_VOID ? [i] : [])),
      rivals: [...this.#rivals].sort((a, b) => a - b),
    };
  }

  #shut(actuator: number, open: Open, end: number, { strokes, stops }: Machine): void {
    this.#open.delete(actuator);
    const { way, start, from, work, fastest } = open;
    const to = strokes[actuator] ?? 0;
    if (Math.abs(to - from) < LEAST) return;
    const atStop = stops[actuator] === (way === '+' ? 'out' : 'in');
    this.#motions.push({ actuator, way, start, end, from, to, atStop, work, fastest });
  }
}

const isIdle = (speeds: readonly number[], stores: readonly number[]): boolean =>
  speeds.every((speed) => speed === 0) && stores.every((flow) => flow <= 0);
