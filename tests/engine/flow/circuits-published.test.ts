import { describe, expect, test } from 'vitest';
import { SUPPLY, drawn } from './drawn.ts';
import type { Drawn, Place } from './drawn.ts';
import { GPM, HP, INCH, LBF, LPM, PSI, near } from './rig.ts';

/** The published figures again, through the parts as a user draws them: settings in the units of the source. */
const FT = 12 * INCH;
const rpm = (speed: number): number => (Math.abs(speed) * 60) / (2 * Math.PI);
const supply = (flow: string, setting: string): string =>
  `P1 fixed-pump{flow=${flow}}, R1 relief-valve{setting=${setting};fullFlowRise=0 bar}, T1 tank`;
const psi = (s: Drawn, line: string): number => (s.bar(line) * 1e5) / PSI;

describe('published examples', () => {
  // Esposito, Fluid Power with Applications, ex. 6-1.
  test('F1: 2 in bore, 1 in rod, 20 gpm, 1000 lb both ways', () => {
    const way = (fed: string, back: string): Drawn =>
      drawn(
        `${supply('20 gpm', '3000 psi')}, C1 cylinder{bore=2 in;rod=1 in;friction=0 kN;load=1000 lbf;loadSense=resisting} | P: P1.P R1.P C1.${fed} | T: ${SUPPLY} C1.${back}`,
      );
    const out = way('A', 'B');
    near(psi(out, 'P'), 318, 3);
    near(out.actuator('C1').speed / FT, 2.04, 3);
    near(out.actuator('C1').useful / HP, 3.72, 3);
    const back = way('B', 'A');
    near(psi(back, 'P'), 425, 3);
    near(-back.actuator('C1').speed / FT, 2.72, 3);
    near(back.actuator('C1').useful / HP, 4.96, 3);
  });

  // Same, ex. 9-1: 25 in² of piston, 7 in² of rod.
  test('F2: regenerative extension at 11.0 in/s, at most 7000 lb', () => {
    const regenerative = (load: number): Drawn =>
      drawn(
        `${supply('20 gpm', '1000 psi')}, C1 cylinder{bore=${Math.sqrt(100 / Math.PI)} in;rod=${Math.sqrt(28 / Math.PI)} in;friction=0 kN;load=${load} lbf;loadSense=resisting} | P: P1.P R1.P C1.A C1.B | T: ${SUPPLY}`,
      );
    near(regenerative(6900).actuator('C1').speed / INCH, 11.0, 3);
    expect(Math.abs(regenerative(7100).actuator('C1').speed)).toBeLessThan(1e-6);
    near(regenerative(7100).actuator('C1').force / LBF, 7000, 3);
  });

  // Same, ex. 8-2, 8-3 and 5-5.
  test.each([
    ['1000 psi', 11.7, 3],
    ['25 psi', 0.29, 2],
    ['1200 psi', 14.0, 3],
  ])('F3, F6: 20 gpm over a relief valve at %s', (setting, power, digits) => {
    const s = drawn(`${supply('20 gpm', setting)} | P: P1.P R1.P | T: ${SUPPLY}`);
    near(s.pump('P1').power / HP, power, digits);
    near(s.relief('R1'), (20 * GPM) / LPM);
  });

  // Same, ex. 7-2 and 7-5.
  test('F4, F5: ideal motors', () => {
    const motor = (flow: string, displacement: string, load: string): Drawn =>
      drawn(
        `${supply(flow, '3000 psi')}, M1 motor{displacement=${displacement};friction=0 N·m;load=${load};loadSense=resisting} | P: P1.P R1.P M1.A | T: ${SUPPLY} M1.B`,
      );
    const four = motor('10 gpm', '5 in³/rev', '795.8 lbf·in');
    near(rpm(four.actuator('M1').speed), 462, 3);
    near(psi(four, 'P'), 1000, 3);
    near(four.actuator('M1').useful / HP, 5.83, 3);
    const five = motor('36 L/min', '82 cm³/rev', '91.36 N·m');
    near(rpm(five.actuator('M1').speed), 439, 3);
    near(five.bar('P'), 70, 3);
    near(five.actuator('M1').useful, 4200, 3);
  });

  // Law: v = Q/A, Q/a and Q/(A − a); power p·Q.
  test('F9, F16: 50/36 cylinder, 30 L/min: 254.6, 528.8 and 491.2 mm/s; 200 bar are 10.0 kW', () => {
    const speed = (lines: string): number =>
      Math.abs(
        drawn(
          `${supply('30 L/min', '200 bar')}, C1 cylinder{bore=50 mm;rod=36 mm;friction=0 kN} | P: P1.P R1.P ${lines}`,
        ).actuator('C1').speed,
      ) * 1000;
    near(speed(`C1.A | T: ${SUPPLY} C1.B`), 254.6);
    near(speed(`C1.B | T: ${SUPPLY} C1.A`), 528.8);
    near(speed(`C1.A C1.B | T: ${SUPPLY}`), 491.2);
    near(drawn(`${supply('30 L/min', '200 bar')} | P: P1.P R1.P | T: ${SUPPLY}`).pump('P1').power, 10_000, 3);
  });

  // NAVEDTRA 14105, from memory: 20 psi on 6 in² and on the annulus beside 2 in² of rod.
  test('F17: a back pressure of 20 psi on both sides pushes out with 40 lbf', () => {
    const s = drawn(
      `${supply('10 L/min', '1000 psi')}, K1 check-valve{cracking=20 psi;ratedDrop=0.001 bar}, C1 cylinder{bore=${Math.sqrt(24 / Math.PI)} in;rod=${Math.sqrt(8 / Math.PI)} in;friction=1 kN} | P: P1.P R1.P K1.A C1.A C1.B | T: ${SUPPLY} K1.B`,
    );
    near(psi(s, 'P'), 20, 3);
    near(s.actuator('C1').force / LBF, 40, 2);
  });
});

/**
 * States worked by hand: pump 40 L/min; relief p = 100 + q/6; each path of the valve q²/320 bar, that is 5 bar at
 * 40 L/min; cylinder 20/10 cm²; forces in daN (law of the piston, law of the orifice).
 */
describe('worked by hand', () => {
  const BORE = 20 * Math.sqrt(20 / Math.PI);
  const ROD = 20 * Math.sqrt(10 / Math.PI);
  const cylinder = (load: number, sense = 'resisting', friction = 0): string =>
    `C1 cylinder{bore=${BORE} mm;rod=${ROD} mm;friction=${friction} daN;load=${load} daN;loadSense=${sense}}`;
  const rig = (
    position: string,
    load: string,
    more = '',
    a = 'A: V1.A C1.A',
    b = 'B: V1.B C1.B',
    place?: Place,
  ): Drawn =>
    drawn(
      `P1 fixed-pump{flow=40 L/min}, R1 relief-valve{setting=100 bar;fullFlowRise=10 bar;ratedFlow=60 L/min}, T1 tank, V1 directional-valve:valve-4/3-float{ratedFlow=40 L/min;ratedDrop=5 bar}, ${load}${more} | P: P1.P R1.P V1.P | ${a} | ${b} | T: ${SUPPLY} V1.T`,
      position,
      place ? { C1: place } : {},
    );

  test('extend, 800: v 0.33333, cap 40.627, rod 1.252, pump 45.631', () => {
    const s = rig('a', cylinder(800));
    near(s.actuator('C1').speed, 0.33333);
    near(s.bar('A'), 40.627);
    near(s.bar('B'), 1.252, 3);
    near(s.bar('P'), 45.631);
  });

  test('retract, 300 resisted: v −0.66667, cap 20.008, rod 70.02, pump 75.02', () => {
    const s = rig('b', cylinder(300));
    near(s.actuator('C1').speed, -0.66667);
    near(s.bar('A'), 20.008);
    near(s.bar('B'), 70.02);
    near(s.bar('P'), 75.02);
  });

  test('2600 resisted: 40 over relief at 106.667; as gravity it sinks against the pump at 0.5312', () => {
    const still = rig('a', cylinder(2600));
    expect(Math.abs(still.actuator('C1').speed)).toBeLessThan(1e-6);
    near(still.relief('R1'), 40);
    near(still.bar('P'), 106.667);
    const sinks = rig('a', cylinder(2600, 'pushes in'));
    near(sinks.actuator('C1').speed, -0.5312);
    near(sinks.relief('R1'), 103.75);
    near(sinks.bar('P'), 117.29);
    near(sinks.bar('A'), 130);
  });

  test('meter-out, 40 bar at 10 L/min, 500: v 0.31391, relief 2.331, rod side 141.90', () => {
    const s = rig(
      'a',
      cylinder(500),
      ', K1 throttle{ratedFlow=10 L/min;ratedDrop=40 bar}, K2 plug, T2 tank',
      'A: V1.A C1.A',
      // Straight to tank, as it was worked: the return takes no path of the valve.
      'rod: C1.B K1.A | K1.B T2.T | V1.B K2.A',
    );
    near(s.actuator('C1').speed, 0.31391);
    near(s.relief('R1'), 2.331);
    near(s.bar('rod'), 141.9);
  });

  test('needle shut on the rod side, 400: cap 106.667, rod 173.333; with 100 of friction 163.333', () => {
    const shut = (friction: number): Drawn =>
      rig(
        'a',
        cylinder(400, 'resisting', friction),
        ', K1 throttle{shut=true}',
        'A: V1.A C1.A',
        'rod: C1.B K1.A | K1.B V1.B',
      );
    near(shut(0).bar('A'), 106.667);
    near(shut(0).bar('rod'), 173.333);
    near(shut(100).bar('rod'), 163.333);
  });

  test('a single-acting pair, 600 and 400: the lighter moves at 0.33333, the pump stands at 25.005', () => {
    const single = (id: string, load: number): string =>
      `${id} single-acting-cylinder{return=load;bore=${BORE} mm;friction=0 kN;load=${load} daN;loadSense=resisting}`;
    const s = rig('a', `${single('C1', 600)}, ${single('C2', 400)}`, ', K1 plug', 'A: V1.A C1.A C2.A', 'B: V1.B K1.A');
    near(s.actuator('C2').speed, 0.33333);
    expect(Math.abs(s.actuator('C1').speed)).toBeLessThan(1e-6);
    near(s.bar('P'), 25.005);
  });

  test('lock check 3:1 at rest with A and B to tank, 1200: held, 60 on the cap side', () => {
    const s = rig(
      '0',
      cylinder(1200, 'pushes in'),
      ', L1 lock-check{ratio=3}',
      'A: V1.A L1.V | cap: L1.C C1.A',
      'B: V1.B C1.B L1.X',
    );
    expect(Math.abs(s.actuator('C1').speed)).toBeLessThan(1e-6);
    near(s.bar('cap'), 60);
  });

  test('flow control 12 L/min, 800: v 0.1, 28 over relief, pump 104.667', () => {
    const s = rig('a', cylinder(800), ', F1 flow-control{flow=12 L/min}', 'V1.A F1.A | A: F1.B C1.A');
    near(s.actuator('C1').speed, 0.1);
    near(s.relief('R1'), 28);
    near(s.bar('P'), 104.667);
  });
});
