import { bad, good } from '../../base/result.ts';
import type { Problem, Result } from '../../base/result.ts';
import { sayMotion } from './notation.ts';
import type { Motion, MotionStep, NotedActuator, Way } from './notation.ts';

/** Steps in a row, both ends counted; 0-based. */
export interface StepRange {
  readonly from: number;
  readonly to: number;
}

/** Where one group is switched off and the next one on. */
export interface ChangeOver {
  /** Step whose end calls it. */
  readonly after: number;
  /** Signal groups, 0-based. */
  readonly from: number;
  readonly to: number;
}

/** A motion is to start while the signal that started its opposite is still there. */
export interface OpposedSignals {
  readonly step: number;
  readonly motion: Motion;
  /** Step of the opposite motion. */
  readonly opposite: number;
  /** Motions whose end is that signal: all of the step before `opposite`. */
  readonly signal: readonly Motion[];
}

export interface SignalGroups {
  /** Way that each actuator last went before the first step; undefined = it does not take part. */
  readonly start: readonly (Way | undefined)[];
  /** The fewest runs of steps, from the first step on, with no actuator twice in one. */
  readonly division: readonly StepRange[];
  /** No actuator is both in the last run and in the first, so these two are one signal group. */
  readonly lastJoinsFirst: boolean;
  /** Signal groups that a cascade needs. */
  readonly count: number;
  readonly changeOvers: readonly ChangeOver[];
  readonly opposed: readonly OpposedSignals[];
}

/**
 * Signal groups and opposed signals of a cycle of motions, after the cascade method: steps are taken into one group
 * as long as no actuator comes twice in it; the group changes where one would. The cycle repeats, so the last run
 * may join the first. Every motion is started by the end of the step before it. Fails if an actuator would go where
 * it is already: then the cycle is not closed.
 */
export function signalGroups(steps: readonly MotionStep[], actuators: readonly NotedActuator[]): Result<SignalGroups> {
  const problems = cycleProblems(steps, actuators);
  if (problems.length > 0) return bad(...problems);
  const { division, lastJoinsFirst } = divide(steps);
  const count = division.length - (lastJoinsFirst ? 1 : 0);
  const changeOvers = division.flatMap(({ to }, i): ChangeOver[] =>
    lastJoinsFirst && i === division.length - 1 ? [] : [{ after: to, from: i % count, to: (i + 1) % count }],
  );
  return good({
    start: actuators.map((_, i) => wayBefore(steps, i, 0)),
    division,
    lastJoinsFirst,
    count,
    changeOvers,
    opposed: opposedSignals(steps, actuators),
  });
}

/** The way that an actuator last went before a step, the cycle repeating. */
function wayBefore(steps: readonly MotionStep[], actuator: number, step: number): Way | undefined {
  for (let back = 1; back <= steps.length; back++) {
    const found = stepAt(steps, step - back).find((motion) => motion.actuator === actuator);
    if (found) return found.way;
  }
  return undefined;
}

const stepAt = (steps: readonly MotionStep[], step: number): MotionStep =>
  steps[(step + steps.length) % steps.length] ?? [];

/** Empty if the cycle is closed: each actuator comes to where the next cycle needs it. */
export function cycleProblems(steps: readonly MotionStep[], actuators: readonly NotedActuator[]): Problem[] {
  if (steps.every((step) => step.length === 0))
    return [{ where: 'motions', what: 'Nothing moves.', remedy: 'Write a sequence such as "A+ B+ B- A-".' }];
  const problems: Problem[] = [];
  steps.forEach((step, i) => {
    for (const motion of step) {
      if (step.find(({ actuator }) => actuator === motion.actuator) !== motion) {
        problems.push({
          where: `step ${i + 1}`,
          what: `${nameOf(motion, actuators)} is to move twice at one time.`,
          remedy: 'Move it in a step of its own.',
        });
      } else if (wayBefore(steps, motion.actuator, i) === motion.way) {
        problems.push(repeated(steps, motion, i, actuators));
      }
    }
  });
  return problems;
}

const nameOf = ({ actuator }: Motion, actuators: readonly NotedActuator[]): string => actuators[actuator]?.label ?? '';

function repeated(
  steps: readonly MotionStep[],
  motion: Motion,
  step: number,
  actuators: readonly NotedActuator[],
): Problem {
  const label = nameOf(motion, actuators);
  const said = sayMotion(motion, actuators);
  const back =
    actuators[motion.actuator]?.rotary === true ? `"${label}-" or "${label}0"` : `"${sayBack(motion, actuators)}"`;
  const before = steps.slice(0, step).findLastIndex((s) => s.some((m) => m.actuator === motion.actuator));
  return before >= 0
    ? {
        where: `step ${step + 1}`,
        what: `${said} comes again, though ${label} went there in step ${before + 1} and nothing took it back.`,
        remedy: `Put ${back} between them, or leave one of them out.`,
      }
    : {
        where: `step ${step + 1}`,
        what: `The cycle is not closed: it ends with ${label} where ${said} is to take it, so the next cycle cannot start.`,
        remedy: `Add ${back} after the last ${said}.`,
      };
}

const sayBack = ({ actuator, way }: Motion, actuators: readonly NotedActuator[]): string =>
  sayMotion({ actuator, way: way === '+' ? '-' : '+' }, actuators);

/**
 * Going on as long as no actuator comes twice gives the fewest runs from a given start. In a ring one of the starts
 * gives the fewest of all; if that is fewer than from the first step, the group that runs over it is shown in two.
 */
function divide(steps: readonly MotionStep[]): { readonly division: StepRange[]; readonly lastJoinsFirst: boolean } {
  const written = runsFrom(steps, 0);
  for (let start = 1; start < steps.length; start++) {
    const ring = runsFrom(steps, start);
    if (ring.length >= written.length) continue;
    const last = steps.length - 1;
    const division = ring
      .flatMap(({ from, to }) =>
        to > last
          ? from > last
            ? [{ from: from - steps.length, to: to - steps.length }]
            : [
                { from, to: last },
                { from: 0, to: to - steps.length },
              ]
          : [{ from, to }],
      )
      .sort((a, b) => a.from - b.from);
    return { division, lastJoinsFirst: true };
  }
  return { division: written, lastJoinsFirst: false };
}

/** Steps are counted on past the last one. */
function runsFrom(steps: readonly MotionStep[], start: number): StepRange[] {
  const runs: StepRange[] = [];
  let from = start;
  let seen = new Set<number>();
  for (let at = start; at < start + steps.length; at++) {
    const step = stepAt(steps, at);
    if (step.some(({ actuator }) => seen.has(actuator))) {
      runs.push({ from, to: at - 1 });
      from = at;
      seen = new Set();
    }
    for (const { actuator } of step) seen.add(actuator);
  }
  runs.push({ from, to: start + steps.length - 1 });
  return runs;
}

/** A motor has no end stop that could give a lasting signal, nor has a step in which nothing moves. */
function opposedSignals(steps: readonly MotionStep[], actuators: readonly NotedActuator[]): OpposedSignals[] {
  return steps.flatMap((step, i) =>
    step.flatMap((motion) =>
      steps.flatMap((other, opposite): OpposedSignals[] => {
        const opposes = other.some(({ actuator, way }) => actuator === motion.actuator && way !== motion.way);
        const signal = stepAt(steps, opposite - 1);

        const there =
          signal.length > 0 &&
          signal.every(
            ({ actuator, way }) => actuators[actuator]?.rotary !== true && wayBefore(steps, actuator, i) === way,
          );
        return opposes && there ? [{ step: i, motion, opposite, signal }] : [];
      }),
    ),
  );
}
