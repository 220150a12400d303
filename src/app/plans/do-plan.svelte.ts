import type { Edit } from '../../circuit/edit.ts';
import type { Added, PlanFields, StepFields } from '../../circuit/edit-plan.ts';
import * as edits from '../../circuit/edit-plan.ts';
import type { PlanStep, StepPlan } from '../../circuit/plan.ts';
import { tryChecked } from '../panels/checked.ts';
import { editor } from '../state/editor.svelte.ts';
import { plans } from '../state/plans.svelte.ts';

/** Changes of the plan on show, each one undo; what a file could not hold is refused, and said in `refused`. */
class DoPlan {
  /** Why the last change was not made. */
  refused = $state<string | undefined>();
  /** What was done, for those who do not see it. */
  said = $state('');

  add(name: string, more: Omit<StepPlan, 'id' | 'name'> = { steps: [] }): void {
    const id = this.#added(() => edits.addPlan(editor.circuit, { name, ...more }));
    if (id !== undefined) plans.pick(id);
  }

  duplicate(plan: StepPlan): void {
    const id = this.#added(() => edits.duplicatePlan(editor.circuit, plan.id));
    if (id !== undefined) plans.pick(id);
  }

  remove(plan: StepPlan): void {
    if (this.#try(() => edits.removePlan(editor.circuit, plan.id))) this.said = `Plan ${plan.name} deleted.`;
  }

  move(plan: StepPlan, by: 1 | -1): void {
    this.#try(() => edits.movePlan(editor.circuit, plan.id, by));
  }

  change(fields: PlanFields): void {
    const { plan } = plans;
    if (plan) this.#try(() => edits.changePlan(editor.circuit, plan.id, fields));
  }

  start(part: string, place: string | undefined): void {
    const { plan } = plans;
    if (plan) this.#try(() => edits.setStart(editor.circuit, plan.id, part, place));
  }

  standing(part: string, position: string | undefined): void {
    const { plan } = plans;
    if (plan) this.#try(() => edits.setStanding(editor.circuit, plan.id, part, position));
  }

  /** A step after this one, or at the end; gives its id. */
  insert(after: number = plans.steps.length - 1): string | undefined {
    const { plan } = plans;
    if (!plan) return undefined;
    const id = this.#added(() => edits.addStep(editor.circuit, plan.id, after + 1));
    if (id !== undefined) this.#landed(id, `Step ${after + 2} inserted.`);
    return id;
  }

  duplicateStep(step: PlanStep, index: number): string | undefined {
    const { plan } = plans;
    if (!plan) return undefined;
    const id = this.#added(() => edits.duplicateStep(editor.circuit, plan.id, step.id));
    if (id !== undefined) this.#landed(id, `Step ${index + 1} duplicated as step ${index + 2}.`);
    return id;
  }

  removeStep(step: PlanStep, index: number): void {
    const { plan } = plans;
    if (!plan) return;
    const next = plan.steps[index + 1] ?? plan.steps[index - 1];
    if (!this.#try(() => edits.removeStep(editor.circuit, plan.id, step.id))) return;
    this.said = `Step ${index + 1} deleted.`;
    if (next) plans.pickStep(next.id, false);
  }

  moveStep(step: PlanStep, index: number, by: 1 | -1): void {
    const { plan } = plans;
    const to = index + by;
    if (!plan || to < 0 || to >= plan.steps.length) return;
    if (!this.#try(() => edits.moveStep(editor.circuit, plan.id, step.id, by))) return;
    this.#landed(step.id, `Step ${index + 1} is step ${to + 1} now.`);
  }

  changeStep(step: PlanStep, fields: StepFields): void {
    const { plan } = plans;
    if (plan) this.#try(() => edits.changeStep(editor.circuit, plan.id, step.id, fields));
  }

  toggle(step: PlanStep, of: 'coil' | 'pump', ref: string): void {
    const { plan } = plans;
    if (!plan) return;
    const edit = of === 'coil' ? edits.toggleCoil : edits.toggleStopped;
    this.#try(() => edit(editor.circuit, plan.id, step.id, ref));
  }

  lever(step: PlanStep, part: string, position: string | undefined): void {
    const { plan } = plans;
    if (plan) this.#try(() => edits.setLever(editor.circuit, plan.id, step.id, part, position));
  }

  #landed(id: string, words: string): void {
    plans.pickStep(id, false);
    this.said = words;
  }

  #added(make: () => Added): string | undefined {
    let id: string | undefined;
    const done = this.#try(() => {
      const added = make();
      ({ id } = added);
      return added.edit;
    });
    return done ? id : undefined;
  }

  #try(edit: () => Edit): boolean {
    this.refused = tryChecked(edit);
    return this.refused === undefined;
  }
}

export const doPlan = new DoPlan();
