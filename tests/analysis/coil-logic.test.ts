import { expect, test } from 'vitest';
import { coilLogic } from '../../src/analysis/coil-logic.ts';
import type { CoilLogic } from '../../src/analysis/coil-logic-results.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import type { PlanStep } from '../../src/circuit/plan.ts';
import { StMachine } from '../engine/sequence/st-machine.ts';
import { circuit } from '../notation.ts';

/** Two cylinders on one pump: V1 and V2 with coils a and b, spring-centred; V3 a lever. */
const RIG = circuit(
  'P1 fixed-pump, RV relief-valve, T1 tank, V1 directional-valve:valve-4/3-shut, V2 directional-valve:valve-4/3-shut, ' +
    'V3 directional-valve:valve-4/3-shut, A cylinder{stroke=300 mm}, B cylinder{stroke=300 mm}, C cylinder' +
    ' | P1.P RV.P V1.P V2.P V3.P | RV.T T1.T V1.T V2.T V3.T | V1.A A.A | V1.B A.B | V2.A B.A | V2.B B.B | V3.A C.A | V3.B C.B',
);
const COILS = [
  { name: 'a', position: 0 },
  { name: 'b', position: 2 },
];
const coiled = (drawn: Circuit): Circuit => ({
  ...drawn,
  parts: drawn.parts.map((part) =>
    part.valve && part.id !== 'V3'
      ? { ...part, valve: { ...part.valve, left: ['coil', 'spring'], right: ['coil', 'spring'], coils: COILS } }
      : part,
  ),
});
const step = (id: string, coils: string[], expected: string, more: Partial<PlanStep> = {}): PlanStep => ({
  id,
  coils,
  expect: expected,
  ends: { by: 'motion' },
  ...more,
});
const withPlan = (steps: PlanStep[], rules: string[] = []): Circuit => ({
  ...coiled(RIG),
  plans: [{ id: 'p', name: 'clamp and press', steps }],
  rules: rules.map((text, i) => ({ id: `r${i}`, text })),
});
const logicOf = (drawn: Circuit): CoilLogic => {
  const found = coilLogic(drawn, 'p');
  if (!found.ok) throw new Error(found.problems.map((p) => `${p.where}: ${p.what}`).join(' '));
  return found.value;
};

const SQUARE = [
  step('1', ['V1.a'], 'A+'),
  step('2', ['V2.a'], 'B+'),
  step('3', ['V1.b'], 'A-'),
  step('4', ['V2.b'], 'B-'),
];

test('A+ B+ A- B-: each coil by its sensors, in words', () => {
  const found = logicOf(withPlan(SQUARE));
  expect(found.coils.map(({ name, on, bySignals }) => [name, on, bySignals?.words])).toEqual([
    ['V1.a', [0], 'B in and not A out'],
    ['V1.b', [2], 'B out and not A in'],
    ['V2.a', [1], 'A out and not B out'],
    ['V2.b', [3], 'A in and not B in'],
  ]);
  expect(found.steps.map(({ motions, ends }) => [motions, ends])).toEqual([
    ['A+', 'A out'],
    ['B+', 'B out'],
    ['A-', 'A in'],
    ['B-', 'B in'],
  ]);
  expect(found.groups).toMatchObject({ count: 2, opposed: [] });
  expect(found.warnings).toEqual([]);
});

test('A+ B+ B- A-: which steps clash, and two signal groups', () => {
  const found = logicOf(
    withPlan([
      step('1', ['V1.a'], 'A+'),
      step('2', ['V2.a'], 'B+'),
      step('3', ['V2.b'], 'B-'),
      step('4', ['V1.b'], 'A-'),
    ]),
  );
  expect(found.clashes).toEqual([
    { steps: [0, 3], signals: ['B in'], coils: ['V1.a', 'V1.b'] },
    { steps: [1, 2], signals: ['A out'], coils: ['V2.a', 'V2.b'] },
    { steps: [1, 3], signals: ['A out', 'B in'], coils: ['V1.b', 'V2.a'] },
  ]);
  expect(found.coils.map(({ bySteps }) => bySteps.words)).toEqual(['step 1', 'step 4', 'step 2', 'step 3']);
  // The law of the cascade method, from memory.
  expect(found.groups?.count).toBe(2);
  expect(found.groups?.opposed.map(({ text }) => text)).toEqual([
    'A+ is to start while the end of B-, which started A-, still stands.',
    'B- is to start while the end of A+, which started B+, still stands.',
  ]);
});

test('a rule becomes an interlock of coils and lever contacts, and the program keeps to it', () => {
  const found = logicOf(withPlan(SQUARE, ['never V1 at a and V3 at a', 'never V1.a on while V2.b on']));
  expect(found.unexpressed).toEqual([]);
  expect(found.interlocks).toEqual([
    { rule: 'never V1 at a and V3 at a', terms: ['V1.a on and V3 at a'] },
    { rule: 'never V1.a on while V2.b on', terms: ['V1.a on and V2.b on'] },
  ]);
  const machine = new StMachine(found.text.steps);
  machine.scan({ Start: true, A_in: true, B_in: true, V3_at_a: true }, 10);
  expect([machine.get('STEPNO'), machine.get('V1_A')]).toEqual([1, false]);
  machine.scan({ V3_at_a: false }, 10);
  expect(machine.get('V1_A')).toBe(true);
});

test('what coils cannot see to is said in the text, and a step against a rule in a warning', () => {
  const found = logicOf(
    withPlan(
      [step('1', ['V1.a'], 'A+', { levers: { V3: 'a' } }), step('2', ['V1.b'], 'A-')],
      ['never V1 at a and V3 at a', 'never every lever rests'],
    ),
  );
  expect(found.warnings.map(({ where, what }) => `${where}: ${what}`)).toEqual([
    'step 1: Its coils are a combination that the rule "never V1 at a and V3 at a" forbids, so the interlock leaves them off.',
  ]);
  expect(found.unexpressed.map(({ rule }) => rule)).toEqual(['never every lever rests']);
  expect(found.text.signals).toContain('No interlock for the rule "never every lever rests"');
  expect(found.text.signals).toContain('(* V3 is held at a by hand *)');
});

test('faults: no such plan, a label that is not there, an actuator there and back in one step', () => {
  const faults = (drawn: Circuit, id = 'p'): string[] => {
    const found = coilLogic(drawn, id);
    return found.ok ? [] : found.problems.map(({ what }) => what);
  };
  expect(faults(withPlan(SQUARE), 'q')).toEqual(['There is no step plan "q".']);
  expect(faults(withPlan([step('1', ['V1.a'], 'X+')]))).toEqual(['There is no actuator "X".']);
  expect(faults(withPlan([step('1', ['V1.a'], 'A+ A-')]))).toEqual([
    'A goes there and back in it, so no sensor tells when it is over.',
  ]);
});

test('a plan that does not come back says so, and has no groups', () => {
  const found = logicOf(withPlan([step('1', ['V1.a'], 'A+')]));
  expect(found.groups).toBeUndefined();
  expect(found.groupProblems.map(({ what }) => what).join()).toContain('The cycle is not closed');
  expect(found.warnings.map(({ what }) => what).join()).toContain('actuators end where the first step does not begin');
});
