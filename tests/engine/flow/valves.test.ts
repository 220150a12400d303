import { expect, test } from 'vitest';
import { FlowBuilder } from '../../../src/engine/flow/builder.ts';
import { TANK } from '../../../src/engine/flow/problem.ts';
import { BAR, CM2, DAN, LPM, circle, cylinder, near, open, rig, solve } from './rig.ts';
import type { Seen } from './rig.ts';

const areaA = circle(0.063);
const areaB = areaA - circle(0.045);

/** Flow of a lock check whose pilot stands at `pilot` bar, F = 20 kN on a 63/45 cylinder. */
function lock(side: 'cap' | 'rod', ratio: number, pilot: number): number {
  const b = new FlowBuilder();
  const held = b.line('held');
  const fed = b.line('fed');
  const valve = b.line('valve');
  b.accumulator('pilot pressure', fed, pilot * BAR, { laminar: 1e4 });
  b.lockCheck('lock', valve, held, fed, ratio, { loss: open });
  b.throttle('return', valve, TANK, { flow: 1000 * LPM, drop: 0.001 * BAR });
  const force = side === 'cap' ? 20e3 : -20e3;
  b.cylinder('C', side === 'cap' ? held : fed, side === 'cap' ? fed : held, {
    areaA,
    areaB,
    load: { pressing: force },
  });
  return solve(b.build()).lpm('lock');
}

// F18 (law): opens at F/(R·A − a).
for (const [ratio, opens] of [
  [2, 42.5],
  [3, 25.6],
  [4, 18.3],
] as const) {
  test(`F18: lock check ${ratio}:1 on the cap side opens at ${opens} bar`, () => {
    expect(Math.abs(lock('cap', ratio, opens * 0.99))).toBeLessThan(1e-4);
    expect(lock('cap', ratio, opens * 1.01)).toBeGreaterThan(0.1);
  });
}

// G14 (law; published as trade advice that R must be above the area ratio).
test('G14: lock check on the rod side with a pulling load', () => {
  expect(Math.abs(lock('rod', 2, 1000))).toBeLessThan(1e-3);
  for (const [ratio, opens] of [
    [3, 136.7],
    [4, 66.9],
  ] as const) {
    expect(Math.abs(lock('rod', ratio, opens * 0.99))).toBeLessThan(1e-3);
    expect(lock('rod', ratio, opens * 1.01)).toBeGreaterThan(0.1);
  }
});

// Published trade advice.
test('F19: a lock check 4:1 that holds 3000 psi opens just above 750 psi', () => {
  const flow = (pilot: number): number => {
    const b = new FlowBuilder();
    const held = b.line('held');
    const x = b.line('X');
    b.accumulator('load', held, 3000 * 0.0689476 * BAR);
    b.accumulator('pilot', x, pilot * 0.0689476 * BAR);
    b.lockCheck('lock', TANK, held, x, 4, { loss: open });
    return solve(b.build()).lpm('lock');
  };
  expect(flow(749)).toBe(0);
  expect(flow(751)).toBeGreaterThan(0);
});

/** Vertical cylinder, 1200 daN, counterbalance 100 bar 4:1 under it. G15 (published: FM 5-499). */
function vertical(state: 'centre' | 'down' | 'up'): Seen {
  const { b, p } = rig();
  const cap = b.line('cap');
  const rod = b.line('rod');
  const valve = b.line('valve');
  b.counterbalance('hold', cap, valve, rod, 4, { setting: 100 * BAR, loss: open });
  b.cylinder('C', cap, rod, cylinder({ pressing: 1200 * DAN }));
  if (state === 'centre') b.openPath('bypass', p, TANK, open);
  else if (state === 'down') {
    b.openPath('P-B', p, rod, open);
    b.openPath('A-T', valve, TANK, open);
  } else {
    b.openPath('P-A', p, valve, open);
    b.openPath('B-T', rod, TANK, open);
  }
  return solve(b.build());
}

test('G15: counterbalance holds at centre, needs pressure down, is free up', () => {
  const centre = vertical('centre');
  expect(Math.abs(centre.actuator('C').speed)).toBeLessThan(1e-6);
  near(centre.bar('cap'), 60);
  near(centre.bar('P'), 5.004);
  const down = vertical('down');
  near(down.actuator('C').speed, (-40 * LPM) / (10 * CM2));
  expect(down.bar('rod')).toBeGreaterThan(5);
  // Law of the valve: cap + 4·rod = setting + override·flow.
  near(down.bar('cap') + 4 * down.bar('rod'), 100 + (2 / 60) * 80, 5);
  expect(down.line('rod').voidFlow).toBe(0);
  const up = vertical('up');
  near(up.actuator('C').speed, 1 / 3);
  expect(up.lpm('hold')).toBe(0);
});

test('G16: meter-in: at relief against a resisting load, ahead of the pump and void with an overrunning one (practice)', () => {
  const run = (load: number): Seen => {
    const { b, p } = rig();
    const cap = b.line('cap');
    const rod = b.line('rod');
    b.throttle('meter', p, cap, { flow: 10 * LPM, drop: 60 * BAR });
    b.openPath('back', rod, TANK, open);
    b.cylinder('C', cap, rod, cylinder({ pressing: load * DAN }));
    return solve(b.build());
  };
  const resisting = run(800);
  expect(resisting.lpm('relief')).toBeGreaterThan(20);
  expect(resisting.line('cap').voidFlow).toBe(0);
  const overrunning = run(-800);
  expect(overrunning.line('cap').voidFlow / LPM).toBeGreaterThan(10);
  expect(overrunning.actuator('C').flowIn).toBeGreaterThan(overrunning.branch('meter').flow);
});

test('G17: meter-out controls an overrunning load and intensifies the rod side (practice)', () => {
  const { b, p } = rig();
  const cap = b.line('cap');
  const rod = b.line('rod');
  b.openPath('feed', p, cap, open);
  b.throttle('meter', rod, TANK, { flow: 10 * LPM, drop: 300 * BAR });
  b.cylinder('C', cap, rod, cylinder({ pressing: -800 * DAN }));
  const s = solve(b.build());
  expect(s.line('cap').voidFlow).toBe(0);
  expect(s.bar('rod')).toBeGreaterThan(2 * s.bar('cap'));
  near(s.bar('rod'), 2 * s.bar('cap') + 80, 5);
});

test('G18: bleed-off stands at load pressure with nothing over relief (practice)', () => {
  const { b, p } = rig();
  b.throttle('bleed', p, TANK, { flow: 20 * LPM, drop: 40 * BAR });
  b.cylinder('C', p, TANK, { areaA: 20 * CM2, areaB: 10 * CM2, load: { resisting: 800 * DAN } });
  const s = solve(b.build());
  near(s.bar('P'), 40, 3);
  near(s.actuator('C').flowIn / LPM, 20, 3);
  expect(s.lpm('relief')).toBe(0);
});

test('G21: pump stopped, 20 kN on a 63 mm cap: 64.2 bar trapped; the lever towards lower drops it (law)', () => {
  const run = (lower: boolean): Seen => {
    const b = new FlowBuilder();
    const p = b.line('P');
    const cap = b.line('A');
    const rod = b.line('B');
    b.pumpStopped('pump', p, (0.01 * LPM) / BAR);
    b.relief('relief', p, TANK, 200 * BAR);
    b.openPath('A-T', cap, TANK, { flow: 30 * LPM, drop: 5 * BAR }, lower);
    b.openPath('P-B', p, rod, open, lower);
    b.cylinder('C', cap, rod, { areaA, areaB, load: { pressing: 20e3 } });
    return solve(b.build());
  };
  near(run(false).bar('A'), 64.2, 3);
  expect(Math.abs(run(false).actuator('C').speed)).toBeLessThan(1e-6);
  const drop = run(true);
  expect(drop.actuator('C').speed).toBeLessThan(-0.1);
  expect(drop.line('B').voidFlow).toBeGreaterThan(0);
});

/** Two sequence valves at 60 bar + 0.2 bar per L/min, pump 20 L/min (law: v = Q over area; times are stroke over speed). */
function clampAndDrill(way: 'out' | 'back', a: 'in' | 'out' | undefined, bAt: 'in' | 'out' | undefined): Seen {
  const b = new FlowBuilder();
  const p = b.line('P');
  b.pumpFixed('pump', p, 20 * LPM);
  b.relief('relief', p, TANK, 150 * BAR);
  const lines = ['A cap', 'A rod', 'B cap', 'B rod'].map((name) => b.line(name)) as [number, number, number, number];
  const valve = { setting: 60 * BAR, gradient: (0.2 * BAR) / LPM, loss: { laminar: 1e6 } };
  const [ac, ar, bc, br] = lines;
  const side = way === 'out' ? { first: ac, second: bc, free: [ar, br] } : { first: br, second: ar, free: [bc, ac] };
  b.openPath('feed', p, side.first);
  b.sequenceValve('sequence', p, side.second, valve);
  side.free.forEach((line, i) => b.openPath(`return ${i}`, line, TANK));
  b.cylinder('A', ac, ar, {
    areaA: 19.635 * CM2,
    areaB: 10.014 * CM2,
    load: { resisting: 300 * DAN, friction: 20 * DAN },
    ...(a ? { at: a } : {}),
  });
  b.cylinder('B', bc, br, {
    areaA: 12.566 * CM2,
    areaB: 6.409 * CM2,
    load: { resisting: 200 * DAN, friction: 15 * DAN },
    ...(bAt ? { at: bAt } : {}),
  });
  return solve(b.build());
}

test('G9 and the event check: A+ B+ B− A− in 1.1781, 0.5655, 0.2884, 0.6008 s', () => {
  const steps = [
    [0.2 / clampAndDrill('out', undefined, undefined).actuator('A').speed, 1.1781],
    [0.15 / clampAndDrill('out', 'out', undefined).actuator('B').speed, 0.5655],
    [-0.15 / clampAndDrill('back', undefined, undefined).actuator('B').speed, 0.2884],
    [-0.2 / clampAndDrill('back', undefined, 'in').actuator('A').speed, 0.6008],
  ] as const;
  for (const [time, expected] of steps) near(time, expected);
  const open = clampAndDrill('out', 'out', undefined);
  near(open.bar('P'), 64);
  near(open.lpm('sequence'), 20);
});

test('reducing valve, unloading valve and relief with a reference keep their laws', () => {
  const { b, p } = rig();
  const low = b.line('low');
  b.reducingValve('reducing', p, low, { setting: 30 * BAR, gradient: (0.5 * BAR) / LPM, loss: open });
  b.throttle('user', low, TANK, { flow: 10 * LPM, drop: 25 * BAR });
  const s = solve(b.build());
  near(s.bar('low') + 0.5 * s.lpm('reducing'), 30, 5);
  const { b: c, p: pump } = rig();
  const x = c.line('X');
  c.accumulator('stored', x, 80 * BAR);
  c.unloadingValve('unload', pump, TANK, x, { setting: 70 * BAR, gradient: (0.1 * BAR) / LPM, loss: open });
  near(solve(c.build()).bar('P'), 5.004);
  const { b: d, p: vented } = rig();
  const y = d.line('Y');
  d.accumulator('remote', y, 20 * BAR);
  d.sequenceValve('remote-controlled', vented, TANK, {
    setting: 50 * BAR,
    gradient: (0.1 * BAR) / LPM,
    reference: y,
    loss: { laminar: 1e6 },
  });
  near(solve(d.build()).bar('P'), 74);
});
