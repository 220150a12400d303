import type { Problem } from '../../base/result.ts';
import type { MotionStep, NotedActuator } from './notation.ts';
import { sayMotion } from './notation.ts';

/** Where an actuator stands: at an end, or so many metres from in. */
export type Place = 'in' | 'out' | number;

/** A step plan as a control sees it: everything by number. */
export interface LogicPlan {
  readonly actuators: readonly NotedActuator[];
  /** Of each actuator, before the first step. */
  readonly start: readonly Place[];
  /** Labels of the pressure switches. */
  readonly switches: readonly string[];
  readonly coils: readonly string[];
  readonly steps: readonly LogicStep[];
}

export interface LogicStep {
  readonly name: string;
  /** Coils that are on. */
  readonly coils: readonly number[];
  readonly motions: MotionStep;
  /** Actuators that come to their stop before another motion of the step begins. */
  readonly earlier?: readonly number[];
  readonly end: LogicEnd;
}

export type LogicEnd =
  | { readonly by: 'motion' }
  | { readonly by: 'sensor'; readonly actuator: number; readonly at: Place }
  | { readonly by: 'pressure'; readonly switch: number; readonly turns: 'on' | 'off' }
  /** Seconds. */
  | { readonly by: 'time'; readonly after: number };

/** A signal that a condition can read. A sensor is on only while its actuator stands at its place. */
export type Signal =
  | { readonly type: 'sensor'; readonly actuator: number; readonly at: Place }
  | { readonly type: 'switch'; readonly switch: number };

/** What the signals may be in each step, until it ends: bit i = signal i. */
export interface SignalStates {
  readonly signals: readonly Signal[];
  readonly steps: readonly (readonly number[])[];
  /** Actuators stand at the end where they stood at the start, so the cycle can repeat. */
  readonly closed: boolean;
}

/** States looked at, over all steps. */
const MOST_STATES = 60_000;

/** Places of one actuator along its stroke: sensors at even numbers, what lies between at odd ones. */
class Course {
  readonly #distances: readonly number[];

  constructor(distances: readonly number[]) {
    this.#distances = [...new Set(distances)].toSorted((a, b) => a - b);
  }

  get sensors(): readonly Place[] {
    return ['in', ...this.#distances, 'out'];
  }

  get last(): number {
    return 2 * (this.#distances.length + 1);
  }

  number(at: Place): number {
    if (at === 'in') return 0;
    if (at === 'out') return this.last;
    const found = this.#distances.indexOf(at);
    return found >= 0 ? 2 * (found + 1) : 2 * this.#distances.filter((d) => d < at).length + 1;
  }
}

const bit = (place: number): number => 1 << place;
const range = (from: number, to: number): number => (bit(to + 1) - 1) & ~(bit(from) - 1);
const lowest = (set: number): number => 31 - Math.clz32(set & -set);
const highest = (set: number): number => 31 - Math.clz32(set);

/** Signals that the ends of the steps need, and both end sensors of every cylinder that moves. */
export function signalsOf(plan: LogicPlan): Signal[] {
  const courses = coursesOf(plan);
  const sensors = plan.actuators.flatMap((_, actuator): Signal[] =>
    (courses[actuator]?.sensors ?? []).map((at) => ({ type: 'sensor', actuator, at })),
  );
  const switches = plan.switches.flatMap((_, i): Signal[] =>
    plan.steps.some(({ end }) => end.by === 'pressure' && end.switch === i) ? [{ type: 'switch', switch: i }] : [],
  );
  return [...sensors, ...switches];
}

function coursesOf({ actuators, steps }: LogicPlan): (Course | undefined)[] {
  return actuators.map(({ rotary }, i) => {
    const named = steps.flatMap(({ end }) => (end.by === 'sensor' && end.actuator === i ? [end.at] : []));
    const moves = steps.some(({ motions }) => motions.some(({ actuator }) => actuator === i));
    return !rotary && (moves || named.length > 0)
      ? new Course(named.filter((at) => typeof at === 'number'))
      : undefined;
  });
}

/** Steps that never end by what is said of them, as far as the motions show it. */
export function endProblems({ actuators, steps }: LogicPlan): Problem[] {
  return steps.flatMap(({ motions, end }, i): Problem[] => {
    const where = `step ${i + 1}`;
    if (end.by === 'motion') {
      const twice = motions.find(({ actuator }, k) => motions.findIndex((m) => m.actuator === actuator) < k);
      if (twice) {
        return [
          {
            where,
            what: `${actuators[twice.actuator]?.label ?? ''} goes there and back in it, so no sensor tells when it is over.`,
            remedy: 'Make a step of each motion.',
          },
        ];
      }
      const motor = motions.find(({ actuator }) => actuators[actuator]?.rotary === true);
      if (motor === undefined) return [];
      return [
        {
          where,
          what: `It ends when ${sayMotion(motor, actuators)} comes to its end stop, and a motor has none.`,
          remedy: 'End it by a time, a pressure switch or a sensor of another actuator.',
        },
      ];
    }
    if (end.by === 'sensor' && actuators[end.actuator]?.rotary === true) {
      const label = actuators[end.actuator]?.label ?? '';
      return [
        { where, what: `It ends by a sensor on ${label}, which is a motor.`, remedy: 'End it by something else.' },
      ];
    }
    return [];
  });
}

/**
 * Every state that the signals can have in each step, from the motions that the plan expects: an actuator on its way
 * may stand at any place between, those that move together in any order. A pressure switch is known only in a step
 * that it ends. Undefined if there are too many signals or states.
 */
export function signalStates(plan: LogicPlan, mostSignals: number): SignalStates | undefined {
  const courses = coursesOf(plan);
  const signals = signalsOf(plan);
  if (signals.length > mostSignals || courses.some((course) => course && course.last > 28)) return undefined;
  const begin = courses.map((course, i) => (course ? bit(course.number(plan.start[i] ?? 'in')) : 0));
  let stand = begin;
  let room = MOST_STATES;
  const steps: (readonly number[])[] = [];
  for (const step of plan.steps) {
    const during = [...stand];
    const after = [...stand];
    for (const { actuator, way } of step.motions) {
      const course = courses[actuator];
      if (!course) continue;
      const from = during[actuator] as number;
      const reach = from | (way === '+' ? range(lowest(from), course.last) : range(0, highest(from)));
      during[actuator] = reach;
      const comesToStop = step.end.by === 'motion' || step.earlier?.includes(actuator) === true;
      after[actuator] = comesToStop ? bit(way === '+' ? course.last : 0) : reach;
    }
    if (step.end.by === 'sensor') {
      const course = courses[step.end.actuator];
      if (course) after[step.end.actuator] = bit(course.number(step.end.at));
    }
    const states = statesOf(step, signals, courses, during, after, room);
    if (!states) return undefined;
    room -= states.length;
    steps.push(states);
    stand = after;
  }
  return { signals, steps, closed: stand.every((set, i) => set === begin[i]) };
}

function statesOf(
  { end, motions }: LogicStep,
  signals: readonly Signal[],
  courses: readonly (Course | undefined)[],
  during: readonly number[],
  after: readonly number[],
  room: number,
): number[] | undefined {
  const ends = endingActuators(end, motions, courses);
  // A step that ends with its motions and has none takes no time.
  if (end.by === 'motion' && ends.length === 0) return [];
  /** By whether an actuator that ends the step is still away from there, or none of those so far is. */
  let [away, there] = [new Set<number>(), new Set([0])];
  courses.forEach((course, actuator) => {
    if (!course) return;
    const [nextAway, nextThere] = [new Set<number>(), new Set<number>()];
    for (let place = 0; place <= course.last; place++) {
      if (((during[actuator] as number) & bit(place)) === 0) continue;
      const lit = signals.findIndex(
        (s) => s.type === 'sensor' && s.actuator === actuator && course.number(s.at) === place,
      );
      const add = lit < 0 ? 0 : bit(lit);
      const arrived = !ends.includes(actuator) || ((after[actuator] as number) & bit(place)) !== 0;
      for (const state of there) (arrived ? nextThere : nextAway).add(state | add);
      for (const state of away) nextAway.add(state | add);
    }
    [away, there] = [nextAway, nextThere];
  });
  let found = ends.length > 0 ? away : there;
  signals.forEach((signal, i) => {
    if (signal.type !== 'switch') return;
    const known = end.by === 'pressure' && end.switch === signal.switch ? [end.turns === 'off'] : [false, true];
    found = new Set([...found].flatMap((state) => known.map((on) => (on ? state | bit(i) : state))));
  });
  return found.size > room ? undefined : [...found];
}

/** Actuators whose standing at the end of the step ends it; none where something else does. */
function endingActuators(
  end: LogicEnd,
  motions: MotionStep,
  courses: readonly (Course | undefined)[],
): readonly number[] {
  if (end.by === 'sensor') return courses[end.actuator] ? [end.actuator] : [];
  return end.by === 'motion' ? motions.map(({ actuator }) => actuator).filter((actuator) => courses[actuator]) : [];
}
