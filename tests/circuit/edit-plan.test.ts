import fc from 'fast-check';
import { expect, test } from 'vitest';
import { applyEdit, invertEdit } from '../../src/circuit/edit.ts';
import type { Edit } from '../../src/circuit/edit.ts';
import * as plans from '../../src/circuit/edit-plan.ts';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import { LIMITS } from '../../src/circuit/limits.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { RefusedEdit } from '../../src/circuit/refused.ts';

const BARE: Circuit = { name: 'rig', parts: [], connections: [] };
const step = (id: string) => ({ id, ...plans.EMPTY_STEP });
const RIG: Circuit = {
  ...BARE,
  plans: [
    {
      id: 'p',
      name: 'Cycle',
      steps: [step('s1'), { ...step('s2'), coils: ['V1.a'], levers: { V2: 'in' } }, step('s3')],
    },
    { id: 'q', name: 'Back', steps: [] },
  ],
};
const ids = (circuit: Circuit, plan = 0): string => (circuit.plans?.[plan]?.steps ?? []).map(({ id }) => id).join(' ');
const after = (edit: Edit, circuit = RIG): Circuit => applyEdit(circuit, edit);

test('a plan comes with an id and a name of its own, and the last one takes the list with it', () => {
  const first = plans.addPlan(BARE, { name: 'Cycle', steps: [] });
  const one = applyEdit(BARE, first.edit);
  expect(one.plans).toEqual([{ id: first.id, name: 'Cycle', steps: [] }]);
  const two = applyEdit(one, plans.addPlan(one, { name: 'Cycle', steps: [] }).edit);
  expect(two.plans?.map(({ name }) => name)).toEqual(['Cycle', 'Cycle 2']);
  const none = [...(two.plans ?? [])].reduce((now, { id }) => applyEdit(now, plans.removePlan(now, id)), two);
  expect(none).toEqual(BARE);
});

test('a copy stands right after what it was made of, with all that is in it', () => {
  const { edit, id } = plans.duplicatePlan(RIG, 'p');
  const copied = after(edit);
  expect(copied.plans?.map(({ name }) => name)).toEqual(['Cycle', 'Cycle 2', 'Back']);
  expect(copied.plans?.[1]?.id).toBe(id);
  expect(copied.plans?.[1]?.steps).toEqual(RIG.plans?.[0]?.steps);
  const again = plans.duplicateStep(RIG, 'p', 's2');
  const steps = after(again.edit).plans?.[0]?.steps;
  expect(steps?.map(({ id: each }) => each)).toEqual(['s1', 's2', again.id, 's3']);
  expect(steps?.[2]).toEqual({ ...steps?.[1], id: again.id });
});

test('steps go in where they are put, and move within their list', () => {
  expect(ids(after(plans.addStep(RIG, 'p', 1).edit))).toBe('s1 s4 s2 s3');
  expect(ids(after(plans.moveStep(RIG, 'p', 's1', 1)))).toBe('s2 s1 s3');
  expect(ids(after(plans.moveStep(RIG, 'p', 's3', -9)))).toBe('s3 s1 s2');
  expect(ids(after(plans.moveStep(RIG, 'p', 's3', 1)))).toBe('s1 s2 s3');
  expect(ids(after(plans.removeStep(RIG, 'p', 's2')))).toBe('s1 s3');
  expect(after(plans.movePlan(RIG, 'q', -1)).plans?.map(({ id }) => id)).toEqual(['q', 'p']);
});

test('coils, levers and pumps go on and off, and leave no empty list behind', () => {
  const on = after(plans.toggleCoil(RIG, 'p', 's2', 'V1.b'));
  expect(on.plans?.[0]?.steps[1]?.coils).toEqual(['V1.a', 'V1.b']);
  const off = [on].map((now) => applyEdit(now, plans.toggleCoil(now, 'p', 's2', 'V1.a')))[0] as Circuit;
  const none = applyEdit(off, plans.toggleCoil(off, 'p', 's2', 'V1.b'));
  expect(none.plans?.[0]?.steps[1]).toEqual({ ...step('s2'), levers: { V2: 'in' } });
  expect(after(plans.setLever(RIG, 'p', 's2', 'V2', undefined)).plans?.[0]?.steps[1]).not.toHaveProperty('levers');
  expect(after(plans.setLever(RIG, 'p', 's1', 'V3', 'up')).plans?.[0]?.steps[0]?.levers).toEqual({ V3: 'up' });
  expect(after(plans.toggleStopped(RIG, 'p', 's1', 'P1')).plans?.[0]?.steps[0]?.stopped).toEqual(['P1']);
  const started = after(plans.setStart(RIG, 'p', 'C1', 'out'));
  expect(started.plans?.[0]?.start).toEqual({ C1: 'out' });
  expect(applyEdit(started, plans.setStart(started, 'p', 'C1', undefined))).toEqual(RIG);
  expect(after(plans.setStanding(RIG, 'p', 'V2', 'up')).plans?.[0]?.standing).toEqual({ V2: 'up' });
});

test('what is not there, and what a file could not hold, is refused in words', () => {
  expect(() => plans.removePlan(RIG, 'x')).toThrow(RefusedEdit);
  expect(() => plans.changeStep(RIG, 'p', 'x', { expect: 'A+' })).toThrow(/no step "x"/);
  const many: Circuit = {
    ...BARE,
    plans: Array.from({ length: LIMITS.plans }, (_, i) => ({ id: `p${i}`, name: `${i}`, steps: [] })),
  };
  expect(() => plans.addPlan(many, { name: 'one more', steps: [] })).toThrow(/at most 100/);
  const long: Circuit = {
    ...BARE,
    plans: [{ id: 'p', name: 'p', steps: Array.from({ length: LIMITS.steps }, (_, i) => step(`s${i}`)) }],
  };
  expect(() => plans.addStep(long, 'p', 0)).toThrow(/at most 500/);
});

const anyEdit = fc.oneof(
  fc.constantFrom('s1', 's2', 's3').map((s) => () => plans.removeStep(RIG, 'p', s)),
  fc.tuple(fc.constantFrom('s1', 's2', 's3'), fc.integer({ min: -4, max: 4 })).map(
    ([s, by]) =>
      () =>
        plans.moveStep(RIG, 'p', s, by),
  ),
  fc.tuple(fc.constantFrom('s1', 's2', 's3'), fc.constantFrom('V1.a', 'V1.b')).map(
    ([s, coil]) =>
      () =>
        plans.toggleCoil(RIG, 'p', s, coil),
  ),
  fc.integer({ min: 0, max: 3 }).map((at) => () => plans.addStep(RIG, 'p', at).edit),
  fc.constantFrom('p', 'q').map((p) => () => plans.duplicatePlan(RIG, p).edit),
  fc.constantFrom(undefined, '20 s').map((within) => () => plans.changeStep(RIG, 'p', 's1', { within })),
);

test('every edit can be taken back, and what it leaves goes through a file', () => {
  fc.assert(
    fc.property(anyEdit, (make) => {
      const edit = make();
      const changed = applyEdit(RIG, edit);
      expect(applyEdit(changed, invertEdit(RIG, edit))).toEqual(RIG);
      const read = readCircuit(writeCircuit(changed));
      expect(read.ok && read.value.plans).toEqual(changed.plans);
    }),
    { numRuns: 60 },
  );
});
