import type { Problem } from '../base/result.ts';
import { solid } from './fields.ts';
import type { Extra } from './model.ts';
import { KNOWN_ENDS, type FilePlan, type FileStep, type FileStepEnd } from './plan-schema.ts';
import type { PlanStep, StepEnd, StepPlan } from './plan.ts';
import { KNOWN } from './schema.ts';

/** Keeps what is not known of an object of the file, and warns of it. */
export type ExtraOf = (
  object: Record<string, unknown>,
  known: ReadonlySet<string>,
  path: readonly PropertyKey[],
) => Extra | undefined;

/** Parts, positions and coils that it names are not looked up: a plan may speak of what is drawn later. */
export function toPlan(file: FilePlan, i: number, extraOf: ExtraOf): StepPlan {
  const path = ['plans', i];
  return solid<Required<StepPlan>>({
    id: file.id,
    name: file.name,
    start: file.start,
    standing: file.standing,
    loadCase: file.loadCase,
    steps: file.steps.map((step, n) => toStep(step, [...path, 'steps', n], extraOf)),
    extra: extraOf(file, KNOWN.plan, path),
  });
}

const toStep = (file: FileStep, path: readonly PropertyKey[], extraOf: ExtraOf): PlanStep =>
  solid<Required<PlanStep>>({
    id: file.id,
    name: file.name,
    coils: file.coils,
    levers: file.levers,
    stopped: file.stopped,
    expect: file.expect,
    ends: toEnd(file.ends, [...path, 'ends'], extraOf),
    within: file.within,
    extra: extraOf(file, KNOWN.step, path),
  });

function toEnd(file: FileStepEnd, path: readonly PropertyKey[], extraOf: ExtraOf): StepEnd {
  const extra = extraOf(file, KNOWN_ENDS[file.by], path);
  const kept = extra && { extra };
  switch (file.by) {
    case 'motion':
      return { by: file.by, ...kept };
    case 'sensor':
      return { by: file.by, actuator: file.actuator, at: file.at, ...kept };
    case 'pressure':
      return { by: file.by, switch: file.switch, turns: file.turns, ...kept };
    case 'time':
      return { by: file.by, after: file.after, ...kept };
  }
}

/** Steps are told apart by their ids, within their plan. */
export function checkStepIds(plans: readonly StepPlan[]): Problem[] {
  return plans.flatMap(({ steps }, p) => {
    const first = new Map<string, number>();
    return steps.flatMap(({ id }, i) => {
      const before = first.get(id);
      if (before === undefined) {
        first.set(id, i);
        return [];
      }
      return [
        {
          where: `plans[${p}].steps[${i}].id`,
          what: `The id "${id}" is taken by plans[${p}].steps[${before}].`,
          remedy: 'Give it another id.',
        },
      ];
    });
  });
}
