import { expect, test } from 'vitest';
import { TANK } from '../../../src/engine/flow/problem.ts';
import { BAR, CM2, DAN, LPM, cylinder, near, open, rig, solve } from './rig.ts';
import type { Seen } from './rig.ts';
import type { Load } from '../../../src/engine/flow/problem.ts';

// Source of every expected figure: worked by hand from the stated laws (law), with the rig of rig.ts:
// pump 40 L/min, relief 100 + q/6 bar, open paths q²/320 + 10⁻⁴·q bar, cylinder 20/10 cm².

function valve(way: 'extend' | 'retract', load: Load): Seen {
  const { b, p } = rig();
  const cap = b.line('cap');
  const rod = b.line('rod');
  b.openPath('feed', p, way === 'extend' ? cap : rod, open);
  b.openPath('back', way === 'extend' ? rod : cap, TANK, open);
  b.cylinder('C', cap, rod, cylinder(load));
  return solve(b.build());
}

test('extends against 800 daN', () => {
  const s = valve('extend', { pressing: 800 * DAN });
  near(s.actuator('C').speed, 0.33333);
  near(s.bar('cap'), 40.627);
  near(s.bar('rod'), 1.252);
  near(s.bar('P'), 45.631);
  expect(s.branch('relief').flow).toBe(0);
});

test('retracts; 300 daN resist it', () => {
  const s = valve('retract', { resisting: 300 * DAN });
  near(s.actuator('C').speed, -0.66667);
  near(s.bar('cap'), 20.008);
  near(s.bar('rod'), 70.02);
  near(s.bar('P'), 75.02);
});

test('a resisting load of 2600 daN stalls it, all flow over relief', () => {
  const s = valve('extend', { resisting: 2600 * DAN });
  expect(Math.abs(s.actuator('C').speed)).toBeLessThan(1e-6);
  near(s.lpm('relief'), 40);
  near(s.bar('P'), 106.667);
});

test('the same load as gravity sinks against the pump', () => {
  const s = valve('extend', { pressing: 2600 * DAN });
  near(s.actuator('C').speed, -0.5312);
  near(s.bar('cap'), 130);
  near(s.bar('P'), 117.29);
  near(100 + s.lpm('relief') / 6, 117.29);
  near(s.lpm('relief'), 103.75);
  expect(s.line('rod').voidFlow / LPM).toBeGreaterThan(31);
});

test('meter-out throttle of 40 bar at 10 L/min', () => {
  const { b, p } = rig();
  const cap = b.line('cap');
  const rod = b.line('rod');
  b.openPath('feed', p, cap, open);
  b.throttle('needle', rod, TANK, { flow: 10 * LPM, drop: 40 * BAR, laminar: (1e-4 * BAR) / LPM });
  b.cylinder('C', cap, rod, cylinder({ pressing: 500 * DAN }));
  const s = solve(b.build());
  near(s.actuator('C').speed, 0.31391);
  near(s.lpm('relief'), 2.331, 3);
  near(s.bar('rod'), 141.9);
});

for (const [friction, rodSide] of [
  [0, 173.333],
  [100, 163.333],
] as const) {
  test(`needle shut on the rod side, friction ${friction} daN: intensified`, () => {
    const { b, p } = rig();
    const cap = b.line('cap');
    const rod = b.line('rod');
    b.openPath('feed', p, cap, open);
    b.throttle('needle', rod, TANK, undefined);
    b.cylinder('C', cap, rod, cylinder({ pressing: 400 * DAN, friction: friction * DAN }));
    const s = solve(b.build());
    near(s.bar('cap'), 106.667);
    near(s.bar('rod'), rodSide);
    expect(Math.abs(s.actuator('C').speed)).toBeLessThan(1e-6);
  });
}

test('of two single-acting cylinders the lighter moves, the other stands', () => {
  const { b, p } = rig();
  const one = b.line('one');
  const two = b.line('two');
  b.openPath('to one', p, one, open);
  b.openPath('to two', p, two, open);
  b.cylinder('heavy', one, TANK, { areaA: 20 * CM2, areaB: 0, load: { resisting: 600 * DAN } });
  b.cylinder('light', two, TANK, { areaA: 20 * CM2, areaB: 0, load: { resisting: 400 * DAN } });
  const s = solve(b.build());
  near(s.actuator('light').speed, 0.33333);
  expect(Math.abs(s.actuator('heavy').speed)).toBeLessThan(1e-6);
  near(s.bar('P'), 25.005);
});

test('lock check 3:1, valve side to tank, 1200 daN: held, 60 bar on the cap side', () => {
  const { b, p } = rig();
  const valveSide = b.line('V');
  const cap = b.line('cap');
  const rod = b.line('rod');
  b.lockCheck('lock', valveSide, cap, rod, 3, { loss: open });
  b.openPath('centre A', valveSide, TANK, open);
  b.openPath('centre B', rod, TANK, open);
  b.openPath('centre P', p, TANK, open);
  b.cylinder('C', cap, rod, cylinder({ pressing: 1200 * DAN }));
  const s = solve(b.build());
  near(s.bar('cap'), 60);
  expect(Math.abs(s.actuator('C').speed)).toBeLessThan(1e-6);
});

test('motor 25 cm³ against 80 bar, leaking 0.005 L/min per bar, pump 20 L/min', () => {
  const { b, p } = rig(20);
  const a = b.line('A');
  const out = b.line('B');
  const displacement = 25e-6 / (2 * Math.PI);
  b.openPath('feed', p, a, open);
  b.openPath('back', out, TANK, { laminar: (1e-4 * BAR) / LPM });
  b.motor('M', a, out, { displacement, load: { resisting: 80 * BAR * displacement }, leakage: (0.005 * LPM) / BAR });
  const s = solve(b.build());
  near((s.actuator('M').speed * 60) / (2 * Math.PI), 784);
  near(s.bar('P'), 81.252);
});

test('flow control 12 L/min, 800 daN', () => {
  const { b, p } = rig();
  const cap = b.line('cap');
  const rod = b.line('rod');
  b.flowControl('control', p, cap, 12 * LPM, open);
  b.openPath('back', rod, TANK, open);
  b.cylinder('C', cap, rod, cylinder({ pressing: 800 * DAN }));
  const s = solve(b.build());
  near(s.actuator('C').speed, 0.1);
  near(s.lpm('relief'), 28);
  near(s.bar('P'), 104.667);
});
