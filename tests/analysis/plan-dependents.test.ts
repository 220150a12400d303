import { describe, expect, test } from 'vitest';
import { checkPlan } from '../../src/analysis/plan.ts';
import type { PlanReport } from '../../src/analysis/plan-results.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import type { PlanStep } from '../../src/circuit/plan.ts';
import { circuit } from '../notation.ts';

const check = (of: Circuit, ...steps: Omit<PlanStep, 'id'>[]): PlanReport =>
  checkPlan(
    { ...of, plans: [{ id: 'p', name: 'x', steps: steps.map((step, i) => ({ id: `s${i}`, ...step })) }] },
    'p',
    {},
    undefined,
    { powerLoss: false },
  );

const SUPPLY = 'P1 fixed-pump{flow=40 L/min}, R1 relief-valve{setting=100 bar}, T1 tank';
const OUT = { coils: ['V1.a'], expect: 'C1+', ends: { by: 'motion' } } as const;

describe('G20: two-stage valve with a bypass centre (practice: the pilot needs 4 to 6 bar)', () => {
  const LOADED = 'C1 cylinder{load=5 kN;loadSense=resisting}';
  test('the unloaded pump does not shift it: the step never ends', () => {
    const report = check(
      circuit(
        `${SUPPLY}, V1 two-stage-valve:two-stage-4/3-bypass-coils, ${LOADED} | P1.P R1.P V1.P | R1.T V1.T T1.T | V1.A C1.A | V1.B C1.B`,
      ),
      OUT,
    );
    expect(report.steps[0]?.outcome).toBe('never ended');
    expect(report.trace.samples.at(-1)?.positions).toEqual([0, 1]);
  });

  test('with a 5 bar check in the tank line, past which the pilot is drained, it shifts, and back when the coil goes off', () => {
    const report = check(
      circuit(
        `${SUPPLY}, CV1 check-valve{cracking=5 bar}, V1 two-stage-valve:two-stage-4/3-bypass-coils{pilotDrain=external}, ${LOADED}
         | P1.P R1.P V1.P | V1.T CV1.A | CV1.B R1.T T1.T V1.Y | V1.A C1.A | V1.B C1.B`.replace(/\s+/g, ' '),
      ),
      OUT,
      { ends: { by: 'time', after: '1 s' } },
    );
    expect(report.good).toBe(true);
    const shifts = report.trace.samples.flatMap(({ step, events }) =>
      events.flatMap((event) => (event.kind === 'valve' ? [[step, event.position]] : [])),
    );
    expect(shifts).toEqual([
      [0, 0],
      [1, 1],
    ]);
  });
});

describe('roller valves', () => {
  test('one that shuts from a travel on leaves the rest of the stroke to the throttle beside it', () => {
    const report = check(
      circuit(
        `${SUPPLY}, V1 directional-valve:valve-4/3-bypass-coils, F1 flow-control{flow=4 L/min},
         RO roller-valve:roller-2/2-open{actuator=C1;trips=from a travel outwards;travel=250 mm}, C1 cylinder{bore=63 mm;rod=45 mm;stroke=300 mm}
         | P1.P R1.P V1.P | R1.T V1.T T1.T P1.S | V1.A RO.P F1.A | RO.A F1.B C1.A | V1.B C1.B`.replace(/\s+/g, ' '),
      ),
      OUT,
    );
    expect(report.good).toBe(true);
    const slow = report.trace.samples.find(({ events }) => events.some(({ kind }) => kind === 'valve'));
    expect(slow?.strokes[0]).toBe(0.25);
    // 4 L/min on 31.17 cm² (law: v = Q/A).
    expect(slow?.speeds[0]).toBeCloseTo(4e-3 / 60 / 31.1725e-4, 4);
  });

  test('one that turns its own actuator round at the stop switches to and fro without end, and is told', () => {
    const report = check(
      circuit(
        `${SUPPLY}, RO roller-valve:roller-4/2-roller{actuator=C1;trips=out}, C1 cylinder
         | P1.P R1.P RO.P | R1.T RO.T T1.T P1.S | RO.B C1.A | RO.A C1.B`.replace(/\s+/g, ' '),
      ),
      { expect: 'C1+ C1-', ends: { by: 'sensor', actuator: 'C1', at: 'in' }, within: '60 s' },
      { expect: 'C1+ C1-', ends: { by: 'time', after: '60 s' } },
    );
    expect(report.steps[1]?.problems.map(({ kind }) => kind)).toContain('chatter');
    expect(report.good).toBe(false);
  });
});

describe('springs', () => {
  test('a spring return takes the time of its force, which falls on the way: between those of its ends (law)', () => {
    const of = circuit(
      `P1 fixed-pump{flow=10 L/min}, R1 relief-valve, T1 tank, V1 directional-valve:valve-3/2-coil, TH throttle, C1 single-acting-cylinder{friction=0 N}
       | P1.P R1.P V1.P | R1.T V1.T T1.T P1.S | V1.A TH.A | TH.B C1.A`.replace(/\s+/g, ' '),
    );
    const report = check(of, OUT, { expect: 'C1-', ends: { by: 'motion' } });
    expect(report.good).toBe(true);
    const speeds = report.trace.samples
      .filter(({ step, speeds: [v = 0] }) => step === 1 && v < 0)
      .map(({ speeds }) => -(speeds[0] ?? 0));
    expect(speeds.length).toBeGreaterThan(8);
    expect(speeds).toEqual(speeds.toSorted((a, b) => b - a));
    // Turbulent throttle: v ∝ √F, from 1.25 to 0.75 of the force at mid stroke.
    expect((speeds[0] ?? 0) / (speeds.at(-1) ?? 1)).toBeCloseTo(Math.sqrt(1.25 / 0.75), 1);
  });
});
