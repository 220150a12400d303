import { Cancelled } from '../../../base/budget.ts';
import type { Budget } from '../../../base/budget.ts';
import type { Network } from '../../../network/network.ts';
import { Bench } from './bench.ts';
import { fullAt, stopAt } from './machine.ts';
import type { Machine } from './machine.ts';
import { MotionLog } from './motion-log.ts';
import type { Ledger } from './motion-log.ts';
import { nextEvent, rollerTravels, TOGETHER } from './next-event.ts';
import type { NextEvent, Travel } from './next-event.ts';
import { PressureMemory } from './pressure-memory.ts';
import { steadyNow, steadyOver } from './steady.ts';
import type { Steady, SteadyAnswer } from './steady.ts';
import type { TraceEvent, TraceSample } from './trace.ts';

/** What is commanded while it runs, and when it is over. */
export interface Run {
  readonly step: number;
  /** Positions of the commanded inputs. */
  readonly positions: readonly number[];
  readonly running: readonly boolean[];
  readonly coils: readonly boolean[];
  /** Travels that somebody looks at. */
  readonly travels: readonly Travel[];
  readonly done: (machine: Machine, steady: Steady) => boolean;
  /** s after which it is over; absent = it does not end by time. */
  readonly after?: number;
  /** s that it may take. */
  readonly limit: number;
}

export type RunEnd =
  | { readonly as: 'done' }
  /** Nothing moves or fills any more, and it is not done. */
  | { readonly as: 'at rest' }
  | { readonly as: 'too long' }
  | { readonly as: 'no steady state'; readonly words: string }
  /** Events without end in no time, or dependent valves that find no rest. */
  | { readonly as: 'chatter'; readonly hunts: boolean };

export interface RunResult {
  readonly end: RunEnd;
  /** Index of its first sample. */
  readonly first: number;
  readonly start: number;
  readonly stop: number;
  readonly ledger: Ledger;
}

/** Events of one run, and of one moment, beyond which it is taken to chatter. */
const MOST_EVENTS = 5_000;
const MOST_AT_ONCE = 40;
/** A mean flow below this share of the first one shows that the interval is long against what it settles in. */
const STIFF = 0.5;
/** Share of an interval by which a switch is overshot, so that rounding does not leave it short. */
const HAIR = 1e-4;

/** Plays commands through the circuit, event by event: steady state, constant speeds, next event. */
export class Player {
  readonly net: Network;
  readonly samples: TraceSample[] = [];
  readonly memory: PressureMemory;
  readonly #bench: Bench;
  readonly #rollers: readonly Travel[];
  readonly #budget: Budget;
  machine: Machine;
  time: number;
  /** Pressures at the switches one event ago, to see when they will turn. */
  #last: { readonly time: number; readonly pressures: readonly number[] } | undefined;

  constructor(net: Network, machine: Machine, budget: Budget, shared?: Player) {
    this.net = net;
    this.machine = machine;
    this.time = 0;
    this.memory = shared?.memory ?? new PressureMemory(net);
    this.#bench = shared?.bench ?? new Bench(net);
    this.#rollers = shared?.rollers ?? rollerTravels(net);
    this.#budget = budget;
  }

  get bench(): Bench {
    return this.#bench;
  }

  get rollers(): readonly Travel[] {
    return this.#rollers;
  }

  run(run: Run): RunResult {
    const first = this.samples.length;
    const start = this.time;
    const log = new MotionLog(this.net);
    this.machine = { ...this.machine, positions: run.positions, running: run.running };
    const events: TraceEvent[] = [{ kind: 'step', step: run.step }];
    const end = this.#play(run, start, log, events);
    return { end, first, start, stop: this.time, ledger: log.close(this.time, this.machine) };
  }

  #play(run: Run, start: number, log: MotionLog, events: TraceEvent[]): RunEnd {
    const travels = [...run.travels, ...this.#rollers];
    this.#last = undefined;
    let atOnce = 0;
    let before: Steady | undefined;
    for (let count = 0; count < MOST_EVENTS; count++) {
      if (this.#budget.cancelled()) throw new Cancelled();
      const answer = this.#settle(events);
      if (!answer.ok) {
        this.#sample(run, undefined, events);
        return { as: 'no steady state', words: answer.words };
      }
      const { steady } = answer;
      if (steady.hunts) {
        this.#sample(run, steady, events);
        return { as: 'chatter', hunts: true };
      }
      noteSpeeds(before, steady, events);
      log.moment(this.time, this.machine, steady);
      const elapsed = this.time - start;
      if (run.done(this.machine, steady) || (run.after !== undefined && elapsed >= run.after - TOGETHER)) {
        events.push({ kind: 'step end', step: run.step });
        this.#sample(run, steady, events);
        return { as: 'done' };
      }
      const left = Math.min(run.limit - elapsed, (run.after ?? Infinity) - elapsed);
      const { mean, next } = this.#ahead(steady, travels, left);
      this.#sample(run, mean, events);
      if (next.after === Infinity && run.after === undefined) return { as: 'at rest' };
      if (next.after > left && run.after === undefined) {
        this.#advance(mean, { ...next, after: left, reached: [], empty: [], full: [] }, log, events);
        return { as: 'too long' };
      }
      if (next.after > left)
        this.#advance(mean, { ...next, after: left, reached: [], empty: [], full: [] }, log, events);
      else this.#advance(mean, next, log, events);
      // The clock is set to the very end, so that rounding does not leave a sliver of an interval.
      if (run.after !== undefined && next.after > left) this.time = start + run.after;
      atOnce = Math.min(next.after, left) > 0 ? 0 : atOnce + 1;
      if (atOnce > MOST_AT_ONCE) return { as: 'chatter', hunts: false };
      before = steady;
    }
    return { as: 'chatter', hunts: false };
  }

  /** The steady state of this moment; valves, switches and remembered pressures follow it. */
  #settle(events: TraceEvent[]): SteadyAnswer {
    let answer = steadyNow(this.#bench, this.machine);
    if (answer.ok && this.#leavesStop(answer.steady)) answer = steadyNow(this.#bench, this.machine);
    if (!answer.ok) return answer;
    const { steady } = answer;
    const { dependents, switches } = this.machine;
    steady.dependents.forEach((position, dependent) => {
      if (position !== dependents[dependent]) events.push({ kind: 'valve', dependent, position });
    });
    this.machine = { ...this.machine, dependents: steady.dependents };
    const kept = this.memory.keep(this.machine, steady);
    const turned = this.net.switches.map(({ line, on, off }, i) => {
      const pressure = kept.pressures[line] ?? 0;
      return pressure >= on ? true : pressure <= off ? false : (switches[i] ?? false);
    });
    turned.forEach((is, i) => {
      if (is !== switches[i]) events.push({ kind: 'switch', switch: i, on: is });
    });
    this.machine = { ...this.machine, ...kept, switches: turned };
    return answer;
  }

  /** An actuator on its way lets go of the roller at its stop before it has gone any way at all. */
  #leavesStop({ speeds }: Steady): boolean {
    const leaves = this.machine.stops.map(
      (stop, i) =>
        ((stop === 'in' && (speeds[i] ?? 0) > 0) || (stop === 'out' && (speeds[i] ?? 0) < 0)) &&
        this.#hasRoller(i, stop),
    );
    if (!leaves.includes(true)) return false;
    this.machine = { ...this.machine, stops: this.machine.stops.map((stop, i) => (leaves[i] ? 'between' : stop)) };
    return true;
  }

  #hasRoller(actuator: number, stop: 'in' | 'out'): boolean {
    return this.net.dependents.some(({ shifts }) =>
      shifts.some(
        (shift) => shift.by === 'roller' && shift.actuator === actuator && 'at' in shift.trip && shift.trip.at === stop,
      ),
    );
  }

  /** Where springs and gas give way on the way, the interval is taken with their mean force. */
  #ahead(
    steady: Steady,
    travels: readonly Travel[],
    left: number,
  ): { readonly mean: Steady; readonly next: NextEvent } {
    const { net, machine } = this;
    const free = nextEvent(net, machine, steady, travels);
    const turn = this.#switchAhead();
    const first = turn < free.after ? { ...free, after: turn, reached: [], empty: [], full: [], stage: true } : free;
    const elastic =
      steady.stores.some((flow) => flow !== 0) ||
      net.actuators.some(({ forces }, i) => forces.spring !== 0 && steady.speeds[i] !== 0);
    if (!elastic || first.after === Infinity) return { mean: steady, next: first };
    let mean = steady;
    let next = first;
    let whole = false;
    for (let round = 0; round < 8; round++) {
      const span = Math.min(next.after, left);
      const answer = steadyOver(this.#bench, machine, whole ? span : span / 2);
      if (!answer.ok) return { mean: steady, next: first };
      mean = answer.steady;
      if (!whole && mean.stores.some((flow, i) => Math.abs(flow) < STIFF * Math.abs(steady.stores[i] ?? 0))) {
        whole = true;
        continue;
      }
      const found = nextEvent(net, machine, mean, travels);
      // A slower mean makes no longer interval than the one that it was taken over.
      next =
        found.after > first.after
          ? { ...found, after: first.after, reached: [], empty: [], full: [], stage: true }
          : found;
      if (Math.abs(Math.min(next.after, left) - span) <= 1e-12 * span) break;
    }
    return { mean: { ...mean, rivals: steady.rivals }, next };
  }

  /** s until a switch turns, if the pressures go on as they have come; a hair longer, so that it has turned then. */
  #switchAhead(): number {
    const { net, machine, time } = this;
    const now = net.switches.map(({ line }) => machine.pressures[line] ?? 0);
    const last = this.#last;
    this.#last = { time, pressures: now };
    if (!last || last.time >= time) return Infinity;
    const spans = net.switches.flatMap(({ on, off }, i) => {
      const pressure = now[i] ?? 0;
      const slope = (pressure - (last.pressures[i] ?? 0)) / (time - last.time);
      const wanted = machine.switches[i] ? off : on;
      const span = (wanted - pressure) / slope;
      return Number.isFinite(span) && span > 0 && slope > 0 === !machine.switches[i]
        ? [span * (1 + HAIR) + TOGETHER]
        : [];
    });
    return Math.min(Infinity, ...spans);
  }

  #advance(mean: Steady, next: NextEvent, log: MotionLog, events: TraceEvent[]): void {
    const { net, machine } = this;
    const span = next.after;
    log.interval(span, machine, mean);
    const strokes = net.actuators.map(({ stroke = Infinity }, i) => {
      const hit = next.reached.find(({ actuator }) => actuator === i);
      const speed = mean.speeds[i] ?? 0;
      const gone = (machine.strokes[i] ?? 0) + speed * span;
      if (hit) return hit.at;
      return stroke === Infinity ? gone : Math.min(stroke, Math.max(0, gone));
    });
    const stops = net.actuators.map((actuator, i) =>
      mean.speeds[i] === 0 ? (machine.stops[i] ?? 'between') : stopAt(actuator, strokes[i] ?? 0),
    );
    const stored = net.accumulators.map((store, i) => {
      if (next.empty.includes(i)) return 0;
      if (next.full.includes(i)) return fullAt(store);
      return Math.max(0, (machine.stored[i] ?? 0) + (mean.stores[i] ?? 0) * span);
    });
    for (const { actuator, at } of next.reached) {
      const stop = stops[actuator];
      const isStop = (stop === 'in' || stop === 'out') && at === strokes[actuator];
      events.push(isStop ? { kind: 'stop', actuator, at: stop } : { kind: 'travel', actuator });
    }
    for (const accumulator of next.empty) events.push({ kind: 'accumulator', accumulator, is: 'empty' });
    for (const accumulator of next.full) events.push({ kind: 'accumulator', accumulator, is: 'full' });
    if (next.stage) events.push({ kind: 'stage' });
    this.machine = { ...machine, strokes, stops, stored };
    this.time += span;
  }

  #sample({ step, coils }: Run, steady: Steady | undefined, events: TraceEvent[]): void {
    const { machine, net } = this;
    this.samples.push({
      time: this.time,
      step,
      events: events.splice(0),
      strokes: machine.strokes,
      speeds: steady?.speeds ?? net.actuators.map(() => 0),
      pressures: steady ? machine.pressures.slice(0, net.shown) : [],
      positions: [...machine.positions, ...machine.dependents],
      coils,
      running: machine.running,
      stored: machine.stored,
      switches: machine.switches,
      powerIn: steady?.powerIn ?? 0,
      powerLost: steady?.powerLost ?? 0,
    });
  }
}

function noteSpeeds(before: Steady | undefined, now: Steady, events: TraceEvent[]): void {
  now.speeds.forEach((speed, actuator) => {
    const was = before?.speeds[actuator] ?? 0;
    if (Math.abs(speed - was) > 1e-9 * Math.max(Math.abs(speed), Math.abs(was)))
      events.push({ kind: 'speed', actuator });
  });
}
