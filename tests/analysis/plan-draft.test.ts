import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { checkPlan } from '../../src/analysis/plan.ts';
import { draftPlan } from '../../src/analysis/plan-draft.ts';
import type { PlanDraft } from '../../src/analysis/plan-results.ts';
import { Cancelled } from '../../src/base/budget.ts';
import type { Result } from '../../src/base/result.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { openCircuit } from '../../src/parts/open.ts';

function example(name: string): Circuit {
  const read = openCircuit(readFileSync(new URL(`../../examples/${name}.spool.json`, import.meta.url), 'utf8'));
  if (!read.ok) throw new Error(name);
  return read.value;
}
const PUSHER = example('crate-pusher');
const why = (result: Result<PlanDraft>): string =>
  result.ok ? '' : result.problems.map(({ where, what, remedy }) => `${where}: ${what} ${remedy}`).join(' ');

test('the sequence of the crate pusher gives the steps of its corrected plan, and they check out', () => {
  const drafted = draftPlan(PUSHER, 'LIFT+ PUSH+ PUSH- LIFT-');
  if (!drafted.ok) throw new Error(why(drafted));
  // Worked out by hand from the drawing; the same as the plan "Corrected" of the example, but for its names.
  const right = PUSHER.plans?.find(({ id }) => id === 'right');
  expect(drafted.value.steps).toEqual(right?.steps.map(({ id: _, name: __, ...step }) => step));
  expect(drafted.value.start).toEqual({});
  const steps = drafted.value.steps.map((step, i) => ({ ...step, id: `s${i}` }));
  const played = checkPlan({ ...PUSHER, plans: [{ id: 'd', name: 'drafted', steps }] }, 'd');
  expect(played.good).toBe(true);
});

test('whoever goes in first stands out at the start', () => {
  const drafted = draftPlan(PUSHER, 'PUSH- PUSH+');
  expect(drafted.ok && drafted.value.start).toEqual({ PUSH: 'out' });
});

test('a motion that nothing gives, or that cannot be read, is refused with its place and a remedy', () => {
  expect(why(draftPlan(PUSHER, 'LIFT+ LIFT+'))).toMatch(/motion 2: No combination moves LIFT\+ and nothing else/);
  expect(why(draftPlan(PUSHER, 'LIFT+ CRANE-'))).toMatch(/column 7: There is no actuator "CRANE"/);
  expect(why(draftPlan(PUSHER, ''))).toMatch(/No motion is given/);
});

test('a motor is left to be added by hand', () => {
  const winch = example('net-winch');
  const motor = winch.parts.find(({ kind }) => kind === 'motor');
  expect(why(draftPlan(winch, `${motor?.label ?? motor?.id ?? ''}+`))).toMatch(/is a motor/);
});

test('it can be given up', () => {
  expect(() => draftPlan(PUSHER, 'LIFT+', undefined, { cancelled: () => true, progress: () => {} })).toThrow(Cancelled);
});

test.each([
  ['bale-gate', 'GATE+ GATE-'],
  ['grain-tipper', 'BODY+ BODY-'],
  ['infeed-series', 'KICK+ STOP+ STOP- KICK-'],
  ['kiln-door', 'DOOR+ DOOR-'],
  ['log-deck', 'CLAMP+ LIFT+ LIFT- CLAMP-'],
  ['peg-drill', 'CLAMP+ DRILL+ DRILL- CLAMP-'],
])('what is drafted for %s, %s, does what it says when it is played', (name, text) => {
  const circuit = example(name);
  const drafted = draftPlan(circuit, text);
  if (!drafted.ok) throw new Error(why(drafted));
  const steps = drafted.value.steps.map((step, i) => ({ ...step, id: `s${i}` }));
  const played = checkPlan({ ...circuit, plans: [{ id: 'd', name: 'drafted', steps }] }, 'd', {}, undefined, {
    powerLoss: false,
  });
  const faults = played.steps.flatMap(({ problems }) => problems.filter(({ level }) => level === 'fault'));
  expect([played.good, faults]).toEqual([true, []]);
});
