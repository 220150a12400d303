import { describe, expect, test } from 'vitest';
import { checkPlan } from '../../src/analysis/plan.ts';
import type { PlanReport } from '../../src/analysis/plan-results.ts';
import { Cancelled } from '../../src/base/budget.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import type { PlanStep, StepPlan } from '../../src/circuit/plan.ts';
import { circuit } from '../notation.ts';

const NO_LOSS = 'ratedFlow=10000 L/min;ratedDrop=0.001 bar';
const one = (notation: string): Circuit => circuit(notation.replace(/\s+/g, ' '));

/** Steps without ids, and a loss of power only where it is asked for. */
const check = (
  of: Circuit,
  steps: readonly Omit<PlanStep, 'id'>[],
  more: Partial<StepPlan> = {},
  powerLoss = false,
): PlanReport =>
  checkPlan(
    {
      ...of,
      plans: [{ id: 'p', name: 'Cycle', steps: steps.map((step, i) => ({ id: `s${i + 1}`, ...step })), ...more }],
    },
    'p',
    {},
    undefined,
    { powerLoss },
  );
const kinds = (report: PlanReport): string[][] => report.steps.map(({ problems }) => problems.map(({ kind }) => kind));
const moves = (report: PlanReport): string[] =>
  report.steps.map(({ motions }) => motions.map(({ label, way }) => `${label}${way}`).join(' '));

const sequenceValve = (setting: string, bypass = true): string =>
  `sequence-valve{setting=${setting};bypass=${bypass};fullFlowRise=50 bar;ratedFlow=250 L/min;ratedDrop=0.001 bar}`;

const twoSequenceValves = (first: string, bypass = true): Circuit =>
  one(`P1 fixed-pump{flow=20 L/min}, R1 relief-valve{setting=200 bar}, T1 tank, V1 directional-valve:valve-4/3-shut-coils{${NO_LOSS}},
    A cylinder{bore=50 mm;rod=35 mm;stroke=200 mm;load=300 daN;loadSense=resisting;friction=20 daN},
    B cylinder{bore=40 mm;rod=28 mm;stroke=150 mm;load=200 daN;loadSense=resisting;friction=15 daN},
    S1 ${sequenceValve(first, bypass)}, S2 ${sequenceValve('60 bar')}
    | P1.P R1.P V1.P | V1.T R1.T T1.T P1.S S1.Y S2.Y
    | out: V1.A A.A S1.P | S1.A B.A | back: V1.B B.B S2.P | S2.A A.B`);

const OUT_AND_BACK = [
  { coils: ['V1.a'], expect: 'A+ B+', ends: { by: 'sensor', actuator: 'B', at: 'out' } },
  { coils: ['V1.b'], expect: 'B- A-', ends: { by: 'sensor', actuator: 'A', at: 'in' } },
] as const;

describe('two sequence valves at 60 bar + 0.2 bar per L/min', () => {
  const report = check(twoSequenceValves('60 bar'), OUT_AND_BACK);

  test('A+ B+ B- A- takes 1.1781, 0.5655, 0.2884 and 0.6008 s (law: t = A·s/Q, 20 L/min)', () => {
    const times = report.steps.flatMap(({ motions }) => motions.map(({ start, end }) => end - start));
    [1.1781, 0.5655, 0.2884, 0.6008].forEach((expected, i) => expect(times[i]).toBeCloseTo(expected, 4));
    expect(report.time).toBeCloseTo(2.6328, 4);
    expect(report.good).toBe(true);
  });

  test('pump energy while moving is 3450.7 J (law: p·V of each motion)', () => {
    // By hand, pressures at the pump, no other losses, loads against both ways of motion:
    //   A+  (3000 + 200) N / 19.635 cm² = 16.297 bar · 392.70 cm³  =  640.0 J
    //   B+  60 + 0.2 · 20 = 64 bar (its own 17.1 bar are less)     · 188.50 cm³  = 1206.4 J
    //   B-  (2000 + 150) N / 6.4088 cm² = 33.548 bar · 96.13 cm³   =  322.5 J
    //   A-  64 bar (its own 31.955 bar are less)  · 200.28 cm³     = 1281.8 J
    // 3450.7 J together. A figure of 3435.5 J is told of this rig with loads that "both push outwards". It does not
    // follow from these data: were the loads to push the rods out, nothing would hold A back on its way out and it
    // would run ahead of the oil; were they to push them in, B would run away on its way back. Both times above
    // then do not come about either. So the sum by hand is the one tested, to what the near-ideal losses leave.
    expect(Math.abs(report.energyIn - 3450.7)).toBeLessThan(0.5);
    // Work on loads 2 · (3000 · 0.2 + 2000 · 0.15) J; friction and valves turn the rest into heat.
    expect(report.energyIn - report.energyLost).toBeCloseTo(1800, 1);
  });

  test('strokes end exactly at their stops, and it plays the same twice', () => {
    expect(report.trace.samples.at(-1)?.strokes).toEqual([0, 0]);
    expect(report.trace.samples.find(({ events }) => events.some(({ kind }) => kind === 'stop'))?.strokes[0]).toBe(0.2);
    expect(check(twoSequenceValves('60 bar'), OUT_AND_BACK).trace).toEqual(report.trace);
  });

  test('while A moves the valve is shut, at its stop the pressure climbs and stays over the setting (FM 5-499, NAVEDTRA 14105)', () => {
    const out = report.trace.lines.indexOf('out');
    const [first, , second] = report.trace.samples;
    expect((first?.pressures[out] ?? 0) / 1e5).toBeCloseTo(16.3, 1);
    expect(first?.speeds[1]).toBe(0);
    const later = report.trace.samples.find(({ speeds }) => (speeds[1] ?? 0) > 0) ?? second;
    expect((later?.pressures[out] ?? 0) / 1e5).toBeCloseTo(64, 1);
  });

  test('without its bypass check nothing returns through it: B does not come back (from memory)', () => {
    const blocked = check(twoSequenceValves('60 bar', false), OUT_AND_BACK);
    // B stands, so the pressure climbs, and A goes in over its own valve all the same.
    expect(kinds(blocked)[1]).toContain('did not move');
    expect(moves(blocked)[1]).toBe('A-');
    expect(blocked.good).toBe(false);
  });

  test('set below what A needs, it opens early: the order is lost (law)', () => {
    // A needs 16.3 bar, B behind the valve no more than its 5 + 4 bar.
    const early = check(
      {
        ...twoSequenceValves('5 bar'),
        parts: twoSequenceValves('5 bar').parts.map((part) =>
          part.id === 'B' ? { ...part, settings: { ...part.settings, load: '20 daN' } } : part,
        ),
      },
      [{ ...OUT_AND_BACK[0], ends: { by: 'motion' } }],
    );
    expect(kinds(early)[0]).toContain('wrong order');
    expect(early.good).toBe(false);
  });
});

const RIG = (valve: string, load = ''): Circuit =>
  one(`P1 fixed-pump{flow=30 L/min}, R1 relief-valve{setting=200 bar}, T1 tank, V1 directional-valve:${valve},
    C1 cylinder{bore=63 mm;rod=45 mm;stroke=300 mm${load}} | P1.P R1.P V1.P | V1.T R1.T T1.T P1.S | cap: V1.A C1.A | rod: V1.B C1.B`);

describe('coils and positions', () => {
  test('spring-centred: both off = centre, both on = not permitted, and played as centre (common practice)', () => {
    const report = check(RIG('valve-4/3-shut-coils'), [
      { coils: ['V1.a'], expect: 'C1+', ends: { by: 'motion' } },
      { ends: { by: 'time', after: '1 s' } },
      { coils: ['V1.a', 'V1.b'], ends: { by: 'time', after: '1 s' } },
    ]);
    const at = (step: number): number | undefined =>
      report.trace.samples.findLast((one) => one.step === step)?.positions[0];
    expect([at(0), at(1), at(2)]).toEqual([0, 1, 1]);
    expect(kinds(report)[2]).toContain('both coils on');
    expect(report.good).toBe(false);
  });

  test('a detented valve with both coils off keeps its last position and goes on (common practice)', () => {
    const report = check(RIG('valve-4/2-two-coils'), [
      { coils: ['V1.b'], ends: { by: 'motion' } },
      { coils: ['V1.a'], expect: 'C1+', ends: { by: 'sensor', actuator: 'C1', at: '100 mm' } },
      { expect: 'C1+', ends: { by: 'motion' } },
    ]);
    expect(report.good).toBe(true);
    expect(moves(report)).toEqual(['', 'C1+', 'C1+']);
    expect(report.steps[1]?.motions[0]?.to).toBe(0.1);
    expect(report.steps[2]?.motions[0]?.to).toBe(0.3);
  });

  test('a lever that is let go returns by its spring', () => {
    const report = check(RIG('valve-4/3-shut-lever', ';load=10 kN;loadSense=resisting'), [
      { levers: { V1: 'a' }, expect: 'C1+', ends: { by: 'time', after: '500 ms' } },
      { ends: { by: 'time', after: '1 s' } },
    ]);
    expect(moves(report)).toEqual(['C1+', '']);
    expect(kinds(report)[0]).toEqual(['not finished']);
    expect(kinds(report)[1]).toEqual(['over relief while idle', 'pressure left trapped']);
  });

  test('what cannot be read is told with its place and remedy, and nothing is played', () => {
    const report = check(
      RIG('valve-4/3-shut-coils'),
      [
        {
          coils: ['V9.a', 'V1.x'],
          levers: { V1: 'up' },
          expect: 'D+',
          ends: { by: 'sensor', actuator: 'C1', at: '400 mm' },
        },
        { ends: { by: 'pressure', switch: 'C1', turns: 'on' }, within: 'soon' },
      ],
      { start: { C1: '1 bar' }, loadCase: 'none' },
    );
    expect(report.good).toBe(false);
    expect(report.steps.map(({ outcome }) => outcome)).toEqual(['not played', 'not played']);
    expect(report.problems.map(({ where }) => where)).toEqual([
      'start of C1',
      'step 1, coil V9.a',
      'step 1, coil V1.x',
      'step 1, lever V1',
      'step 1, motions, column 1',
      'step 1, sensor',
      'step 2, pressure switch',
      'step 2, time limit',
      'load case',
    ]);
    for (const { what, remedy } of report.problems) expect(`${what} ${remedy}`).toMatch(/\. .*\.$/);
  });

  test('a plan that is not there is a fault of the caller, and a plan can be given up', () => {
    expect(() => checkPlan(RIG('valve-4/3-shut-coils'), 'x')).toThrow('no step plan');
    const budget = { cancelled: () => true, progress: () => {} };
    const of = {
      ...RIG('valve-4/3-shut-coils'),
      plans: [{ id: 'p', name: 'x', steps: [{ id: 's', ends: { by: 'motion' } as const }] }],
    };
    expect(() => checkPlan(of, 'p', {}, budget)).toThrow(Cancelled);
  });
});

describe('what goes wrong', () => {
  test('G21: with the pump stopped, the lever towards lower drops 20 kN; at rest 64.2 bar stand in the cap (law: F/A)', () => {
    const lift = RIG('valve-4/3-shut-coils', ';load=20 kN;loadSense=pushes in;friction=0 N');
    const report = check(
      lift,
      [
        { stopped: ['P1'], ends: { by: 'time', after: '1 s' } },
        { stopped: ['P1'], coils: ['V1.b'], ends: { by: 'time', after: '5 s' } },
      ],
      { start: { C1: '200 mm' } },
    );
    const cap = report.trace.lines.indexOf('cap');
    expect((report.trace.samples[0]?.pressures[cap] ?? 0) / 1e5).toBeCloseTo(64.2, 0);
    expect(moves(report)).toEqual(['', 'C1-']);
    expect(kinds(report)[1]).toContain('load unsecured');
    expect(report.steps[1]?.motions[0]).toMatchObject({ by: 'load', atStop: true, to: 0 });
  });

  test('a step that waits for a switch above the relief setting never ends, and the figures are told', () => {
    const of = one(`P1 fixed-pump, R1 relief-valve{setting=100 bar}, T1 tank, V1 directional-valve:valve-4/3-shut-coils,
      C1 cylinder, PS pressure-switch{setting=120 bar} | P1.P R1.P V1.P PS.M | V1.T R1.T T1.T P1.S | V1.A C1.A | V1.B C1.B`);
    const step = (turns: 'on' | 'off') => ({
      coils: ['V1.a'],
      expect: 'C1+',
      ends: { by: 'pressure', switch: 'PS', turns } as const,
    });
    const report = check(of, [step('on')]);
    expect(report.steps[0]?.outcome).toBe('never ended');
    expect(report.steps[0]?.problems.find(({ kind }) => kind === 'never ended')?.what).toMatch(
      /105 bar stand at it, and it turns at 120 bar/,
    );
    const raised = {
      ...of,
      parts: of.parts.map((part) => (part.id === 'R1' ? { ...part, settings: { setting: '150 bar' } } : part)),
    };
    const ended = check(raised, [step('on')]);
    expect(ended.good).toBe(true);
    expect(ended.steps[0]?.motions[0]?.atStop).toBe(true);
  });

  test('both of two equal rivals move, but their split is not certain', () => {
    const of =
      one(`P1 fixed-pump, R1 relief-valve, T1 tank, V1 directional-valve:valve-4/3-shut-coils, C1 cylinder{load=5 kN;loadSense=resisting},
      C2 cylinder{load=5 kN;loadSense=resisting} | P1.P R1.P V1.P | V1.T R1.T T1.T P1.S | V1.A C1.A C2.A | V1.B C1.B C2.B`);
    const report = check(of, [{ coils: ['V1.a'], expect: '(C1+ C2+)', ends: { by: 'motion' } }]);
    expect(kinds(report)[0]).toContain('undetermined');
    expect(report.good).toBe(true);
  });

  test('the lighter of two rivals goes first (FM 5-499): asked in the other order, it is the wrong one', () => {
    const of =
      one(`P1 fixed-pump, R1 relief-valve, T1 tank, V1 directional-valve:valve-4/3-shut-coils, C1 cylinder{load=10 kN;loadSense=resisting},
      C2 cylinder{load=20 kN;loadSense=resisting} | P1.P R1.P V1.P | V1.T R1.T T1.T P1.S | V1.A C1.A C2.A | V1.B C1.B C2.B`);
    const step = (expected: string) => [
      { coils: ['V1.a'], expect: expected, ends: { by: 'sensor', actuator: 'C2', at: 'out' } as const },
    ];
    expect(check(of, step('C1+ C2+')).good).toBe(true);
    expect(kinds(check(of, step('C2+ C1+')))[0]).toContain('wrong order');
    expect(kinds(check(of, step('C2+')))[0]).toEqual(['moved unasked', 'over relief while idle']);
  });

  test('a motor turns for its time: turns = Q·t/V (law)', () => {
    const of =
      one(`P1 fixed-pump{flow=30 L/min}, R1 relief-valve, T1 tank, V1 directional-valve:valve-4/3-bypass-coils, M1 motor{displacement=50 cm³/rev}
      | P1.P R1.P V1.P | V1.T R1.T T1.T P1.S M1.L | V1.A M1.A | V1.B M1.B`);
    const report = check(of, [
      { coils: ['V1.a'], expect: 'M1+', ends: { by: 'time', after: '2 s' } },
      { expect: 'M10', ends: { by: 'motion' } },
    ]);
    expect(report.good).toBe(true);
    // 30 L/min for 2 s are 1 L, at 50 cm³ a turn 20 turns.
    expect((report.steps[0]?.motions[0]?.to ?? 0) / (2 * Math.PI)).toBeCloseTo(20, 3);
    expect(report.steps[0]?.end).toBe(2);
  });
});

describe('loss of power', () => {
  test('Q7: an open-at-rest 2/2 valve discharges the accumulator to tank when its coil goes off (published practice)', () => {
    const of =
      one(`P1 fixed-pump{flow=20 L/min}, R1 relief-valve{setting=150 bar}, T1 tank, CV check-valve, DV directional-valve:valve-2/2-open-coil,
      ACC accumulator{charge=empty;volume=2 L;precharge=60 bar}, PS pressure-switch{setting=120 bar}
      | supply: P1.P R1.P CV.A | store: CV.B ACC.A DV.P PS.M | DV.A R1.T T1.T P1.S`);
    const report = check(of, [{ coils: ['DV.a'], ends: { by: 'pressure', switch: 'PS', turns: 'on' } }], {}, true);
    // Isothermal (law): 2 L · (1 − 61.013/121.013) = 0.9916 L at 20 L/min.
    expect(report.steps[0]?.end).toBeCloseTo((2 * (1 - 61.01325 / 121.01325)) / (20 / 60), 2);
    const at = (lost: string) => report.powerLoss.find((loss) => loss.at === 'step end' && loss.lost === lost);
    expect(at('coils off, pumps stopped')?.underPressure).toEqual([]);
    expect(at('pumps stopped')?.underPressure).toEqual(['store']);
  });

  test('a load in mid-lift holds on a shut centre, and drops where the valve is not shut by the loss; both are told', () => {
    const of = (valve: string): PlanReport =>
      check(
        RIG(valve, ';load=20 kN;loadSense=pushes in'),
        [{ coils: ['V1.a'], expect: 'C1+', ends: { by: 'motion' } }],
        {},
        true,
      );
    const outcomes = (report: PlanReport): string[] =>
      report.powerLoss.filter(({ at }) => at === 'mid-motion').map(({ actuators }) => actuators[0]?.comes ?? '');
    // Pumps stopped with the coil on: the load sinks back through the pump, as slowly as that leaks.
    expect(outcomes(of('valve-4/3-shut-coils'))).toEqual(['holds', 'holds', 'creeps']);
    // Spring offset to P–B, A–T: with the pump it is driven in, without it drops.
    expect(outcomes(of('valve-4/2-coil'))[1]).toBe('drops');
  });

  test('it goes on where it stopped, unless what came down is in the way of the rest', () => {
    const steps = [
      { coils: ['V1.a'], expect: 'C1+', ends: { by: 'motion' } },
      { coils: ['V1.b'], expect: 'C1-', ends: { by: 'motion' } },
    ] as const;
    const held = check(RIG('valve-4/3-shut-coils', ';load=20 kN;loadSense=pushes in'), steps, {}, true);
    expect(held.powerLoss.every(({ resumes }) => resumes)).toBe(true);
    const dropped = check(
      RIG('valve-4/2-coil', ';load=20 kN;loadSense=pushes in'),
      [steps[0], { expect: 'C1-', ends: { by: 'motion' } }],
      {},
      true,
    );
    const stop = dropped.powerLoss.find(
      ({ step, at, lost }) => step === 0 && at === 'step end' && lost === 'coils off, pumps stopped',
    );
    expect(stop).toMatchObject({ resumes: true });
    const other = check(
      RIG('valve-4/2-coil', ';load=20 kN;loadSense=pushes in'),
      [steps[0], { coils: ['V1.a'], ends: { by: 'time', after: '1 s' } }],
      {},
      true,
    );
    const gone = other.powerLoss.find(
      ({ step, at, lost }) => step === 0 && at === 'step end' && lost === 'coils off, pumps stopped',
    );
    expect(gone?.resumes).toBe(false);
    expect(gone?.why).toMatch(/^Step 2: C1 moves out/);
  });
});
