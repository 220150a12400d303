import { changeCircuit } from './edit.ts';
import type { Edit } from './edit.ts';
import { solid } from './fields.ts';
import { names } from './ids.ts';
import { LIMITS } from './limits.ts';
import type { Circuit } from './model.ts';
import type { PlanStep, StepPlan } from './plan.ts';
import { RefusedEdit } from './refused.ts';

/**
 * Changes of step plans. They give edits and change nothing themselves; all of them throw `RefusedEdit` where the
 * plan or step is not there, or where there would be more of them than a file may hold.
 */

/** An edit that puts something new, and the id that it goes by. */
export interface Added {
  readonly edit: Edit;
  readonly id: string;
}

/** `undefined` takes the field away. */
type Open<T> = { readonly [K in keyof T]?: T[K] | undefined };
export type PlanFields = Open<Omit<StepPlan, 'id' | 'steps'>>;
export type StepFields = Open<Omit<PlanStep, 'id'>>;

/** A step that commands nothing, expects nothing, and is over once everything is at rest. */
export const EMPTY_STEP: Omit<PlanStep, 'id'> = { ends: { by: 'motion' } };

/** A plan at the end of the list; a name that another plan has gets a number. */
export function addPlan(circuit: Circuit, plan: Omit<StepPlan, 'id'>): Added {
  const plans = circuit.plans ?? [];
  return putPlan(circuit, plans.length, plan);
}

/** A copy of the plan right after it. */
export function duplicatePlan(circuit: Circuit, id: string): Added {
  const at = placeOf(circuit, id);
  const { id: _, ...plan } = plansOf(circuit)[at] as StepPlan;
  return putPlan(circuit, at + 1, plan);
}

export const changePlan = (circuit: Circuit, id: string, fields: PlanFields): Edit =>
  withPlan(circuit, id, (plan) => solid<StepPlan>({ ...plan, ...fields }));

export function removePlan(circuit: Circuit, id: string): Edit {
  placeOf(circuit, id);
  return put(plansOf(circuit).filter((plan) => plan.id !== id));
}

/** By so many places towards the end of the list; stays within it. */
export const movePlan = (circuit: Circuit, id: string, by: number): Edit =>
  put(moved(plansOf(circuit), placeOf(circuit, id), by));

/** A step before the one at `index`, or at the end. */
export function addStep(circuit: Circuit, planId: string, index: number, step = EMPTY_STEP): Added {
  const { steps } = plansOf(circuit)[placeOf(circuit, planId)] as StepPlan;
  if (steps.length >= LIMITS.steps)
    throw new RefusedEdit(planId, `A plan has at most ${LIMITS.steps} steps.`, 'Go on in another plan.');
  const id = names(steps.map((each) => each.id)).fresh('s');
  const edit = withPlan(circuit, planId, (plan) => ({
    ...plan,
    steps: plan.steps.toSpliced(index, 0, { id, ...step }),
  }));
  return { edit, id };
}

/** A copy of the step right after it. */
export function duplicateStep(circuit: Circuit, planId: string, stepId: string): Added {
  const { steps } = plansOf(circuit)[placeOf(circuit, planId)] as StepPlan;
  const at = stepPlace(steps, stepId);
  const { id: _, ...step } = steps[at] as PlanStep;
  return addStep(circuit, planId, at + 1, step);
}

export const removeStep = (circuit: Circuit, planId: string, stepId: string): Edit =>
  withPlan(circuit, planId, (plan) => ({ ...plan, steps: plan.steps.toSpliced(stepPlace(plan.steps, stepId), 1) }));

export const moveStep = (circuit: Circuit, planId: string, stepId: string, by: number): Edit =>
  withPlan(circuit, planId, (plan) => ({ ...plan, steps: moved(plan.steps, stepPlace(plan.steps, stepId), by) }));

export const changeStep = (circuit: Circuit, planId: string, stepId: string, fields: StepFields): Edit =>
  withPlan(circuit, planId, (plan) => {
    const at = stepPlace(plan.steps, stepId);
    return { ...plan, steps: plan.steps.with(at, solid<PlanStep>({ ...(plan.steps[at] as PlanStep), ...fields })) };
  });

/** Switches a coil of the step on or off; `coil` as in the file, `V1.a`. Several may be on at once: the check says so. */
export function toggleCoil(circuit: Circuit, planId: string, stepId: string, coil: string): Edit {
  return toggled(circuit, planId, stepId, 'coils', coil);
}

/** Lets a pump stand still in the step, or run. */
export function toggleStopped(circuit: Circuit, planId: string, stepId: string, pump: string): Edit {
  return toggled(circuit, planId, stepId, 'stopped', pump);
}

/** Holds a lever in a position during the step; undefined = nobody holds it. */
export function setLever(
  circuit: Circuit,
  planId: string,
  stepId: string,
  part: string,
  position: string | undefined,
): Edit {
  const { levers = {} } = stepOf(circuit, planId, stepId);
  const { [part]: _, ...others } = levers;
  const now = position === undefined ? others : { ...others, [part]: position };
  return changeStep(circuit, planId, stepId, { levers: Object.keys(now).length > 0 ? now : undefined });
}

/** Where an actuator stands before the first step; undefined = in. */
export function setStart(circuit: Circuit, planId: string, part: string, place: string | undefined): Edit {
  const { start = {} } = plansOf(circuit)[placeOf(circuit, planId)] as StepPlan;
  return changePlan(circuit, planId, { start: entries(start, part, place) });
}

/** Where a valve without a rest stands before the first step; undefined = its first position. */
export function setStanding(circuit: Circuit, planId: string, part: string, position: string | undefined): Edit {
  const { standing = {} } = plansOf(circuit)[placeOf(circuit, planId)] as StepPlan;
  return changePlan(circuit, planId, { standing: entries(standing, part, position) });
}

function entries(
  all: Readonly<Record<string, string>>,
  key: string,
  value: string | undefined,
): Readonly<Record<string, string>> | undefined {
  const { [key]: _, ...others } = all;
  const now = value === undefined ? others : { ...others, [key]: value };
  return Object.keys(now).length > 0 ? now : undefined;
}

function toggled(circuit: Circuit, planId: string, stepId: string, field: 'coils' | 'stopped', name: string): Edit {
  const list = stepOf(circuit, planId, stepId)[field] ?? [];
  const now = list.includes(name) ? list.filter((each) => each !== name) : [...list, name];
  return changeStep(circuit, planId, stepId, { [field]: now.length > 0 ? now : undefined });
}

const plansOf = (circuit: Circuit): readonly StepPlan[] => circuit.plans ?? [];

/** The last plan takes the list with it, so that a circuit without plans is written as before. */
const put = (plans: readonly StepPlan[]): Edit => changeCircuit({ plans: plans.length > 0 ? plans : undefined });

function putPlan(circuit: Circuit, index: number, plan: Omit<StepPlan, 'id'>): Added {
  const plans = plansOf(circuit);
  if (plans.length >= LIMITS.plans)
    throw new RefusedEdit('plans', `A circuit has at most ${LIMITS.plans} step plans.`, 'Remove one first.');
  const id = names(plans.map((each) => each.id)).fresh('plan');
  const name = names(plans.map((each) => each.name)).like(plan.name);
  return { edit: put(plans.toSpliced(index, 0, { id, ...plan, name })), id };
}

function withPlan(circuit: Circuit, id: string, change: (plan: StepPlan) => StepPlan): Edit {
  const at = placeOf(circuit, id);
  const plans = plansOf(circuit);
  return put(plans.with(at, change(plans[at] as StepPlan)));
}

function placeOf(circuit: Circuit, id: string): number {
  const at = plansOf(circuit).findIndex((plan) => plan.id === id);
  if (at < 0)
    throw new RefusedEdit('plans', `There is no step plan "${id}".`, 'It may have been removed; pick another.');
  return at;
}

function stepPlace(steps: readonly PlanStep[], id: string): number {
  const at = steps.findIndex((step) => step.id === id);
  if (at < 0) throw new RefusedEdit('steps', `There is no step "${id}".`, 'It may have been removed; pick another.');
  return at;
}

function stepOf(circuit: Circuit, planId: string, stepId: string): PlanStep {
  const { steps } = plansOf(circuit)[placeOf(circuit, planId)] as StepPlan;
  return steps[stepPlace(steps, stepId)] as PlanStep;
}

function moved<T>(list: readonly T[], from: number, by: number): readonly T[] {
  const to = Math.min(list.length - 1, Math.max(0, from + by));
  return list.toSpliced(from, 1).toSpliced(to, 0, list[from] as T);
}
