import { expect, test } from 'vitest';
import { SUPPLY, drawn } from './drawn.ts';
import type { Drawn } from './drawn.ts';
import { near } from './rig.ts';

/** Force balance p·A = F (law), A = 31.17 cm² and a = 15.27 cm² of a 63/45 cylinder; no losses. */
const A = (Math.PI / 4) * 6.3 ** 2;
const a = A - (Math.PI / 4) * 4.5 ** 2;
const BAR_OF_KN = (kN: number, cm2: number): number => (kN * 1000) / cm2 / 10;

const rig = (settings: string, fed: 'A' | 'B', kind = 'cylinder{bore=63 mm;rod=45 mm;'): Drawn =>
  drawn(
    `P1 fixed-pump{flow=20 L/min}, R1 relief-valve{setting=250 bar;fullFlowRise=0 bar}, T1 tank, C1 ${kind}${settings}} | P: P1.P R1.P C1.${fed} | T: ${SUPPLY}${kind.startsWith('cyl') ? ` C1.${fed === 'A' ? 'B' : 'A'}` : ''}`,
  );

test('a weight that presses in, work against motion and friction add up on the way out', () => {
  const s = rig('load=12 kN;loadSense=pushes in;work=6 kN;friction=1 kN', 'A');
  near(s.bar('P'), BAR_OF_KN(19, A), 4);
  expect(s.actuator('C1').speed).toBeGreaterThan(0);
});

test('on the way in the weight helps, and work and friction are still against it', () => {
  const s = rig('load=4 kN;loadSense=pushes in;work=6 kN;friction=1 kN', 'B');
  near(s.bar('P'), BAR_OF_KN(3, a), 4);
  expect(s.actuator('C1').speed).toBeLessThan(0);
});

test('work alone never drives the rod, however much it is', () => {
  const s = rig('work=200 kN;friction=1 kN', 'A');
  expect(Math.abs(s.actuator('C1').speed)).toBeLessThan(1e-9);
});

test('a spring in a double-acting cylinder works with one way and against the other', () => {
  const spring = 'spring=pushes in;springForce=5 kN;friction=1 kN;load=10 kN;loadSense=resisting';
  near(rig(spring, 'A').bar('P'), BAR_OF_KN(16, A), 4);
  near(rig(spring, 'B').bar('P'), BAR_OF_KN(6, a), 4);
});

test('the oil works on the full section of a plunger', () => {
  const s = rig(
    'form=plunger;bore=63 mm;return=load;load=10 kN;loadSense=pushes in;friction=0 kN',
    'A',
    'single-acting-cylinder{',
  );
  near(s.bar('P'), BAR_OF_KN(10, A), 4);
});
