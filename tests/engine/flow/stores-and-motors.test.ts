import { describe, expect, test } from 'vitest';
import { networkOf } from '../../../src/analysis/analyse.ts';
import { circuit } from '../../notation.ts';
import { Asked } from '../../table-of.ts';
import { NONE, SUPPLY, drawn, pump } from './drawn.ts';
import type { Drawn } from './drawn.ts';
import { LPM, near } from './rig.ts';

const rpm = (speed: number): number => (Math.abs(speed) * 60) / (2 * Math.PI);
/** 80 bar on 25 cm³: T = Δp·V/2π (handbook formula). */
const TORQUE = (80e5 * 25e-6) / (2 * Math.PI);

describe('motor', () => {
  /** Pump 20 L/min; each path of the valve takes q²/320 bar, that is 5 bar at 40 L/min. */
  const turning = (settings: string, more = '', lines = ''): Drawn =>
    drawn(
      `P1 fixed-pump{flow=20 L/min}, R1 relief-valve{setting=100 bar;fullFlowRise=10 bar;ratedFlow=60 L/min}, T1 tank, V1 directional-valve:valve-4/3-shut{ratedFlow=40 L/min;ratedDrop=5 bar}, M1 motor{displacement=25 cm³/rev;friction=0 N·m;load=${TORQUE} N·m;loadSense=resisting;${settings}}${more} | P: P1.P R1.P V1.P | A: V1.A M1.A | B: V1.B M1.B | T: ${SUPPLY} V1.T${lines}`,
      'a',
    );

  // Worked by hand: q through the motor = 20 − 0.005·80 L/min; 80 bar over it, 1.25 bar in each path of the valve.
  test('80 bar load and a leakage of 0.005 L/min per bar: 784 rpm', () => {
    const s = turning('leakage=0.5 L/min');
    near(rpm(s.actuator('M1').speed), 784);
    near(s.bar('A') - s.bar('B'), 80);
    near(s.bar('P'), 82.5);
  });

  test('the same straight to tank behind one path: 81.25 bar at the pump', () => {
    const s = drawn(
      `P1 fixed-pump{flow=20 L/min}, R1 relief-valve{setting=100 bar}, T1 tank, K1 filter{ratedFlow=40 L/min;ratedDrop=5 bar}, M1 motor{displacement=25 cm³/rev;friction=0 N·m;load=${TORQUE} N·m;loadSense=resisting;leakage=0.5 L/min} | P: P1.P R1.P K1.A | A: K1.B M1.A | T: ${SUPPLY} M1.B`,
    );
    near(rpm(s.actuator('M1').speed), 784);
    near(s.bar('P'), 81.25);
  });

  test('case leakage leaves by L and lowers the speed (law: 0.01 L/min per bar at 81.25 and 1.25 bar)', () => {
    const s = turning('caseLeakage=1 L/min', ', T2 tank', ' | L: M1.L T2.T');
    near(s.flow('M1 drain A'), s.bar('A') / 100);
    near(rpm(s.actuator('M1').speed), ((20 - s.bar('A') / 100) * 1000) / 25);
  });

  test('friction torque adds to the drop (law)', () => {
    const extra = (5e5 * 25e-6) / (2 * Math.PI);
    const s = turning(`friction=${extra} N·m`.replace('friction', 'leakage=0 L/min;friction'));
    near(s.bar('A') - s.bar('B'), 85);
  });

  test('a drain that nothing drains: the case fills to the pressure between the ports (law: half the sum)', () => {
    const s = turning('caseLeakage=1 L/min', ', K1 plug', ' | L: M1.L K1.A');
    near(s.bar('L'), (s.bar('A') + s.bar('B')) / 2);
  });

  const winch = (leakage: string): Asked =>
    new Asked(
      circuit(
        `P1 fixed-pump, R1 relief-valve, T1 tank, V1 directional-valve:valve-4/3-bypass, M1 motor{load=80 N·m;loadSense=drives B to A;${leakage}} | P1.P R1.P V1.P | A: V1.A M1.A | B: V1.B M1.B | T: ${SUPPLY} V1.T`,
      ),
    );

  test('a leaking motor on blocked lines is held, and its load turns it slowly (practice)', () => {
    expect(winch('leakage=0.5 L/min').actuator('M1', 'V1=0')).toBe('held');
    expect(winch('leakage=0.5 L/min').notes('M1', 'V1=0')).toContain('creeps through its own leakage');
    expect(winch('leakage=0.5 L/min').explain('V1=0').actuators[0]?.notes).toContain('creeps through its own leakage');
    expect(winch('leakage=0 L/min').notes('M1', 'V1=0')).not.toContain('creeps through its own leakage');
  });
});

describe('accumulator', () => {
  const store = (settings: string, load: number, pumpsRunning = false): Drawn =>
    drawn(
      `${pump(30, 200)}, A1 accumulator{precharge=90 bar;volume=4 L;${settings}}, K1 check-valve{${NONE}}, C1 cylinder{bore=63 mm;rod=45 mm;friction=0 kN;load=${load} kN;loadSense=resisting}, F1 flow-control{flow=12 L/min;leastDrop=1 bar} | P: P1.P R1.P K1.A | S: K1.B A1.A F1.A | A: F1.B C1.A | T: ${SUPPLY} C1.B`,
      '',
      {},
      pumpsRunning,
    );

  test('charged, it stands at its pressure and gives what is taken from it', () => {
    const s = store('pressure=150 bar', 20);
    near(s.bar('S'), 150);
    near(s.actuator('C1').flowIn / LPM, 12);
    near(s.flow('A1'), -12);
  });

  test('against a load above its pressure it gives nothing', () => {
    const s = store('pressure=150 bar', 50);
    expect(Math.abs(s.actuator('C1').speed)).toBeLessThan(1e-6);
    expect(Math.abs(s.flow('A1'))).toBeLessThan(1e-4);
  });

  test('full, it takes none: the pump goes to relief over it', () => {
    const s = store('pressure=150 bar', 50, true);
    // The check takes 0.5 bar to open.
    near(s.bar('S'), 199.5);
    near(s.relief('R1'), 18);
    expect(Math.abs(s.flow('A1'))).toBeLessThan(1e-4);
  });

  test('empty, it takes what is left over at its pre-charge, and holds back what needs more', () => {
    const light = store('charge=empty', 20, true);
    near(light.actuator('C1').flowIn / LPM, 12);
    near(light.flow('A1'), 18);
    near(light.bar('S'), 90);
    expect(Math.abs(store('charge=empty', 50, true).actuator('C1').speed)).toBeLessThan(1e-6);
    expect(Math.abs(store('charge=empty', 20).flow('A1'))).toBeLessThan(1e-4);
  });

  test('a pump that charges an empty one works; with a full one it is over relief', () => {
    const rig = (charge: string): Asked =>
      new Asked(
        circuit(
          `P1 fixed-pump, R1 relief-valve, T1 tank, A1 accumulator{charge=${charge}}, V1 directional-valve:valve-4/3-shut, C1 cylinder | P1.P R1.P A1.A V1.P | V1.A C1.A | V1.B C1.B | ${SUPPLY} V1.T`,
        ),
      );
    expect(rig('empty').pump('V1=0')).toBe('working');
    expect(rig('charged').pump('V1=0')).toBe('over relief');
  });

  test('the network holds volume, pre-charge and pressure, and no pressure below the pre-charge', () => {
    const of = (settings: string): unknown =>
      networkOf(circuit(`A1 accumulator{${settings}}, G1 gauge | A1.A G1.M`)).accumulators[0];
    expect(of('volume=10 L;precharge=80 bar;pressure=140 bar')).toMatchObject({
      charged: true,
      volume: 0.01,
      precharge: 80e5,
      pressure: 140e5,
    });
    expect(of('precharge=200 bar')).toMatchObject({ pressure: 200e5 });
  });
});

describe('filter', () => {
  const through = (settings: string): Drawn =>
    drawn(
      `${pump(30, 200)}, K1 filter{ratedFlow=30 L/min;ratedDrop=1 bar;${settings}}, T2 tank | P: P1.P R1.P K1.A | K1.B T2.T | T: ${SUPPLY}`,
    );

  test('half clogged it takes four times the drop (law of the orifice)', () => {
    near(through('clogged=0 %').bar('P'), 1);
    near(through('clogged=50 %').bar('P'), 4);
  });

  test('its bypass opens over its cracking pressure; fully clogged without one it lets nothing through', () => {
    near(through('clogged=100 %;bypass=true;cracking=2 bar').bar('P'), 3);
    near(through('clogged=100 %').bar('P'), 200);
  });
});

describe('hand pump', () => {
  const jack = (settings: string): string =>
    `H1 hand-pump{stroke=0.02 L;strokes=30;${settings}}, R1 relief-valve{setting=200 bar;fullFlowRise=0 bar}, T1 tank, S1 shut-off-valve, C1 single-acting-cylinder{return=load;bore=63 mm;load=20 kN;loadSense=pushes in;friction=0 kN} | P: H1.P R1.P C1.A S1.A | T: H1.S T1.T R1.T S1.B`;

  test('worked, it delivers stroke by strokes (law); at rest it holds', () => {
    const asked = new Asked(circuit(jack('worked=worked')));
    expect(asked.actuator('C1', 'S1=shut')).toBe('extends');
    expect(asked.pump('S1=shut')).toBe('working');
    near(networkOf(asked.circuit).pumps[0]?.flow ?? 0, 0.6 * LPM);
    const rest = new Asked(circuit(jack('worked=at rest')));
    // Pulled out, it would suck itself full through the checks.
    expect(rest.actuator('C1', 'S1=shut')).toBe('held one way');
    expect(rest.notes('C1', 'S1=shut')).toContain('free outward');
    expect(rest.pump('S1=shut')).toBe('stopped');
    expect(rest.line('P', 'S1=shut')).toBe('cut off');
    expect(rest.explain('S1=shut').pumps[0]?.steps[0]?.text).toBe('Nobody works it: its checks let nothing back.');
  });

  test('with the pumps stopped it is at rest and lets nothing down, though it was worked', () => {
    const asked = new Asked(circuit(jack('worked=worked')), { pumps: 'stopped' });
    expect(asked.pump('S1=shut')).toBe('stopped');
    expect(asked.actuator('C1', 'S1=shut')).toBe('held one way');
    expect(asked.trapped('P', 'S1=shut')).toContain('load');
    expect(asked.actuator('C1', 'S1=open')).toBe('moved in by load');
  });
});
