import fc from 'fast-check';
import { expect, test } from 'vitest';
import { coilConditions } from '../../../src/engine/sequence/coil-conditions.ts';
import { ContactTerms, isForbidden } from '../../../src/engine/sequence/interlocks.ts';
import type { Interlock } from '../../../src/engine/sequence/interlocks.ts';
import { StNames, stComment } from '../../../src/engine/sequence/st-names.ts';
import type { LogicPlan, Place } from '../../../src/engine/sequence/step-logic.ts';
import { structuredText } from '../../../src/engine/sequence/structured-text.ts';
import type { StProgram } from '../../../src/engine/sequence/structured-text.ts';
import { diceOf, plans } from './random-plan.ts';
import { StMachine } from './st-machine.ts';

const programOf = (logic: LogicPlan, more: Partial<StProgram> = {}): StProgram => ({
  circuit: 'rig',
  plan: 'press cycle',
  logic,
  conditions: coilConditions(logic),
  valves: [],
  interlocks: [],
  contacts: [],
  notes: [],
  stepNotes: [],
  ...more,
});

const DRILL: LogicPlan = {
  actuators: [
    { label: 'Clamp (left)', rotary: false },
    { label: '2 drill', rotary: false },
  ],
  start: ['in', 'in'],
  switches: ['PS 1'],
  coils: ['V1.a', 'V1.b', 'V2.a'],
  steps: [
    {
      name: 'clamp',
      coils: [0],
      motions: [{ actuator: 0, way: '+' }],
      end: { by: 'pressure', switch: 0, turns: 'on' },
    },
    {
      name: 'drill *) down',
      coils: [0, 2],
      motions: [{ actuator: 1, way: '+' }],
      end: { by: 'sensor', actuator: 1, at: 0.12 },
    },
    { name: 'dwell', coils: [0], motions: [], end: { by: 'time', after: 1.5 } },
    {
      name: 'back',
      coils: [1],
      motions: [
        { actuator: 0, way: '-' },
        { actuator: 1, way: '-' },
      ],
      end: { by: 'motion' },
    },
  ],
};

test('the whole text of a small plan', async () => {
  const text = structuredText(programOf(DRILL, { valves: [[0, 1], [2]] }), { coils: 'signals' });
  await expect(text).toMatchFileSnapshot('press-cycle.st');
  expect(text).toContain('replaces no safety function');
  expect(() => new StMachine(text)).not.toThrow();
});

/**
 * Runs the program against a machine that does what the plan expects, one scan every 100 ms, and compares step and
 * coils with the plan's chart after every scan.
 */
function run(logic: LogicPlan, coils: 'signals' | 'steps', dice: () => number): number {
  const program = programOf(logic);
  const text = structuredText(program, { coils });
  const machine = new StMachine(text);
  const { signals } = program.conditions;
  const names = machine.inputs.slice(2);
  const at = logic.actuators.map(() => 0);
  const place = (p: Place): number => (p === 'in' ? 0 : p === 'out' ? 40 : Math.round(p * 100));
  let [step, since, pressed, compared] = [-1, 0, false, 0];
  for (let tick = 0; tick < 1500; tick++) {
    const inputs = signals.map((s) => (s.type === 'sensor' ? at[s.actuator] === place(s.at) : pressed));
    const { end, motions } = logic.steps[step] ?? { end: undefined, motions: [] };
    const ended = (): boolean =>
      end?.by === 'motion'
        ? motions.every(({ actuator, way }) => at[actuator] === (way === '+' ? 40 : 0))
        : end?.by === 'sensor'
          ? at[end.actuator] === place(end.at)
          : end?.by === 'time'
            ? // The timer sees a step in the scan after the one that set it.
              tick - since >= 1 + end.after * 10
            : pressed === (end?.by === 'pressure' && end.turns === 'on');
    machine.scan({ Start: tick === 0, ...Object.fromEntries(names.map((name, i) => [name, inputs[i] === true])) }, 100);
    const before = step;
    if (step < 0 ? tick === 0 : ended()) [step, since] = [step + 1, tick];
    if (step === logic.steps.length) {
      expect(machine.get('STEPNO')).toBe(0);
      expect(machine.outputs.some((name) => machine.get(name))).toBe(false);
      return compared;
    }
    expect(machine.get('STEPNO')).toBe(step + 1);
    const now = logic.steps[step] as (typeof logic.steps)[number];
    // A step that is over as it begins has no states of its own; the scan that it takes is not compared.
    const instant = step !== before && isOver(now, at, place, pressed);
    if (!instant) {
      compared += 1;
      machine.outputs.forEach((name, coil) =>
        expect(machine.get(name), `${name} in step ${step + 1}`).toBe(now.coils.includes(coil)),
      );
    }
    for (const { actuator, way } of now.motions)
      if (dice() < 0.7) at[actuator] = Math.max(0, Math.min(40, (at[actuator] as number) + (way === '+' ? 1 : -1)));
    pressed = now.end.by === 'pressure' ? tick - since > 8 && dice() < 0.1 : dice() < 0.4;
  }
  // An actuator that a time stopped before its sensor waits for ever, in the plan as in the program.
  return compared;
}

function isOver(
  { end, motions }: LogicPlan['steps'][number],
  at: readonly number[],
  place: (p: Place) => number,
  pressed: boolean,
): boolean {
  if (end.by === 'motion') return motions.every(({ actuator, way }) => at[actuator] === (way === '+' ? 40 : 0));
  if (end.by === 'sensor') return at[end.actuator] === place(end.at);
  return end.by === 'pressure' && pressed === (end.turns === 'on');
}

test.each(['signals', 'steps'] as const)(
  'run against the plan, the program gives its coil chart (coils by %s)',
  (coils) => {
    let compared = 0;
    fc.assert(
      fc.property(plans, fc.nat(), (logic, seed) => {
        compared += run(logic, coils, diceOf(seed));
      }),
      { numRuns: 25 },
    );
    expect(compared).toBeGreaterThan(1000);
  },
);

test('Stop takes every coil off, and the cycle waits for its start again', () => {
  const machine = new StMachine(structuredText(programOf(DRILL), { coils: 'steps' }));
  const home = { Clamp_left_in: true, X_2_drill_in: true };
  machine.scan({ ...home, Start: true }, 10);
  expect(machine.get('V1_A')).toBe(true);
  machine.scan({ ...home, Start: false, Stop: true }, 10);
  expect([machine.get('STEPNO'), machine.get('V1_A')]).toEqual([0, false]);
  machine.scan({ Stop: false, Start: true, Clamp_left_in: false }, 10);
  expect(machine.get('STEPNO')).toBe(0);
});

/** One step for each set of coils, so that every combination is asked for. */
const everySet = (count: number): LogicPlan => ({
  actuators: [],
  start: [],
  switches: [],
  coils: Array.from({ length: count }, (_, i) => `Y${i + 1}`),
  steps: Array.from({ length: 1 << count }, (_, set) => ({
    name: '',
    coils: Array.from({ length: count }, (_, i) => i).filter((i) => ((set >>> i) & 1) === 1),
    motions: [],
    end: { by: 'motion' },
  })),
});

const index = fc.uniqueArray(fc.nat({ max: 3 }), { maxLength: 3 });
const term = fc
  .record({
    on: index,
    off: index,
    contacts: fc.array(fc.record({ contact: fc.nat({ max: 1 }), closed: fc.boolean() }), { maxLength: 1 }),
  })
  .filter(({ on, off }) => on.length > 0 && off.every((coil) => !on.includes(coil)));

test('interlocks: what is allowed passes, what is forbidden never comes out', () => {
  fc.assert(
    fc.property(fc.array(term, { minLength: 1, maxLength: 4 }), fc.boolean(), fc.boolean(), (terms, c0, c1) => {
      const interlocks: Interlock[] = [{ reason: 'a rule', terms }];
      const contacts = [0, 1].map((position) => ({ input: 0, position, name: `V9 at ${position}` }));
      const logic = everySet(4);
      const machine = new StMachine(structuredText(programOf(logic, { interlocks, contacts }), { coils: 'steps' }));
      const closed = new Set([...(c0 ? [0] : []), ...(c1 ? [1] : [])]);
      for (const { coils } of logic.steps) {
        machine.scan({ Start: true, V9_at_0: c0, V9_at_1: c1 }, 10);
        const out = new Set(machine.outputs.flatMap((name, i) => (machine.get(name) === true ? [i] : [])));
        expect(isForbidden(interlocks, out, closed)).toBe(false);
        const asked = new Set(coils);
        if (!isForbidden(interlocks, asked, closed)) expect(out).toEqual(asked);
        expect([...out].every((coil) => asked.has(coil))).toBe(true);
      }
    }),
    { numRuns: 60 },
  );
});

test('both coils of a valve never come out together', () => {
  const logic = everySet(3);
  const machine = new StMachine(structuredText(programOf(logic, { valves: [[0, 2], [1]] }), { coils: 'steps' }));
  for (const { coils } of logic.steps) {
    machine.scan({ Start: true }, 10);
    const both = coils.includes(0) && coils.includes(2);
    expect(machine.outputs.map((name) => machine.get(name))).toEqual(
      [0, 1, 2].map((c) => coils.includes(c) && !(both && c !== 1)),
    );
  }
});

test('combinations in coils and lever contacts, and what cannot be told in them', () => {
  const inputs = [
    {
      label: 'V1',
      positions: ['a', '0', 'b'],
      rest: 1,
      coils: [
        { coil: 0, position: 0 },
        { coil: 1, position: 2 },
      ],
    },
    { label: 'V2', positions: ['raise', 'hold', 'lower'], rest: 1, coils: [] },
    {
      label: 'V3',
      positions: ['a', 'b'],
      coils: [
        { coil: 2, position: 0 },
        { coil: 3, position: 1 },
      ],
    },
  ];
  const terms = new ContactTerms(inputs);
  expect(
    terms.terms(
      new Map([
        [0, 0b001],
        [1, 0b100],
      ]),
    ),
  ).toEqual([{ on: [0], off: [], contacts: [{ contact: 0, closed: true }] }]);
  expect(
    terms.terms(
      new Map([
        [0, 0b101],
        [1, 0b101],
      ]),
    ),
  ).toEqual([
    { on: [0], off: [], contacts: [{ contact: 1, closed: false }] },
    { on: [1], off: [], contacts: [{ contact: 1, closed: false }] },
  ]);
  expect(terms.contacts).toEqual([
    { input: 1, position: 2 },
    { input: 1, position: 1 },
  ]);
  expect(terms.terms(new Map([[0, 0b011]]))).toMatch('some of these combinations have no coil on');
  expect(terms.terms(new Map([[2, 0b01]]))).toMatch('V3 keeps its last position');
});

test('identifiers are legal and unlike, comments cannot be left', () => {
  const names = new StNames();
  const said = ['Kühler+', 'step', 'Step', '2nd', 'a__b_', 'A_B', '→', '', 'TON'].map((text) => names.fresh(text));
  expect(said).toEqual(
    ['Kuhler_plus', 'X_step', 'X_Step_2', 'X_2nd', 'a_b', 'A_B_2', 'X', 'X_3', 'X_TON'].map((n) =>
      n === 'X_3' ? 'X_2' : n,
    ),
  );
  fc.assert(
    fc.property(fc.array(fc.string({ unit: 'binary', maxLength: 60 }), { maxLength: 8 }), (texts) => {
      const fresh = new StNames();
      const all = texts.map((text) => fresh.fresh(text));
      for (const name of all) expect(name).toMatch(/^[A-Za-z](?:_?[A-Za-z0-9])*$/);
      expect(new Set(all.map((name) => name.toUpperCase())).size).toBe(all.length);
    }),
  );
  fc.assert(
    fc.property(fc.string({ unit: fc.constantFrom('(', '*', ')', '/', '{', '}', ' ', 'a', '\n', '$') }), (text) => {
      const comment = stComment(text);
      expect(comment.slice(2, -2)).not.toMatch(/\(\*|\*\)|\/\*|\*\/|\/\/|[{}\n]/);
    }),
    { numRuns: 500 },
  );
});
