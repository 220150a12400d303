import { describe, expect, test } from 'vitest';
import { BAR, LPM, circle, near } from './rig.ts';
import { A63, NONE, SUPPLY, a63, cyl, drawn, pump, valve } from './drawn.ts';
import type { Drawn, Place } from './drawn.ts';

/**
 * Drawn circuits against laws. Losses of 0.001 bar at the rated flow stand for none, friction is 0, reliefs have no
 * rise: what is printed to three or four digits in the laws is met to these digits.
 */
const A50 = circle(0.05);
const a50 = A50 - circle(0.036);

describe('plain actuators', () => {
  test('F8: 100/70 cylinder, 200 bar, 40 L/min (law)', () => {
    const s = drawn(
      `${pump(40, 300)}, ${valve('valve-4/3-shut')}, ${cyl('C1', 100, 70, (circle(0.1) * 200 * BAR) / 1000)} | P: P1.P R1.P V1.P | T: ${SUPPLY} V1.T | A: V1.A C1.A | B: V1.B C1.B`,
      'a',
    );
    near(s.bar('P'), 200, 4);
    near(s.actuator('C1').force / 1000, 157.1);
    near(s.actuator('C1').speed * 1000, 84.9, 3);
    near(s.actuator('C1').flowOut / LPM, 20.4, 3);
    near(s.actuator('C1').useful / 1000, 13.33);
  });

  test.each([
    [50, 36, 0, 415],
    [63, 45, 0, 408],
    [63, 45, 20, 539],
  ])(
    'F12: rod port of a %i/%i cylinder blocked, cap at 200 bar, %i kN pulling: %i bar (law: p_rod = (p·A + F)/a)',
    (bore, rod, pull, bar) => {
      const s = drawn(
        `${pump(30, 200)}, ${cyl('C1', bore, rod, pull, 'pulls out')}, X1 plug | P: P1.P R1.P C1.A | T: ${SUPPLY} | B: C1.B X1.A`,
      );
      near(s.bar('B'), bar, 3);
      near(s.relief('R1'), 30, 3);
      expect(Math.abs(s.actuator('C1').speed)).toBeLessThan(1e-6);
    },
  );

  test('F13, G6: two 63/45 cylinders in series, 10 kN each (law; that pressures add is published in US Army FM 5-499)', () => {
    const series = (place: Place): Drawn =>
      drawn(
        `${pump(30, 200)}, ${cyl('C1', 63, 45, 10)}, ${cyl('C2', 63, 45, 10)} | P: P1.P R1.P C1.A | between: C1.B C2.A | T: ${SUPPLY} C2.B`,
        '',
        { C2: place },
      );
    const s = series('between');
    near(s.bar('between'), 32.1, 3);
    near(s.bar('P'), 47.8, 3);
    near(s.actuator('C2').speed / s.actuator('C1').speed, 0.49, 3);
    near(series('out').bar('P'), 200, 3);
  });

  test('F14: two 50 mm bores in parallel, 10 and 20 kN, relief 160 bar (law; least pressure first is published in FM 5-499)', () => {
    const run = (light: Place, heavy: Place): Drawn =>
      drawn(
        `${pump(30, 160)}, ${cyl('C1', 50, 36, 10)}, ${cyl('C2', 50, 36, 20)} | P: P1.P R1.P C1.A C2.A | T: ${SUPPLY} C1.B C2.B`,
        '',
        { C1: light, C2: heavy },
      );
    const first = run('between', 'between');
    near(first.bar('P'), 50.9, 3);
    near(first.actuator('C1').flowIn / LPM, 30);
    const then = run('out', 'between');
    near(then.bar('P'), 101.9);
    near(then.actuator('C2').flowIn / LPM, 30);
    const both = run('out', 'out');
    near(both.bar('P'), 160);
    near(both.relief('R1'), 30);
  });

  test('G21: closed centre, pump stopped, 20 kN on a 63 mm cap: 64.2 bar in A; towards lower it drops (law)', () => {
    const stopped = (position: string): Drawn =>
      drawn(
        `${pump(30, 200)}, V1 directional-valve:valve-4/3-shut, ${cyl('C1', 63, 45, 20, 'pushes in')} | P: P1.P R1.P V1.P | T: ${SUPPLY} V1.T | A: V1.A C1.A | B: V1.B C1.B`,
        position,
        {},
        false,
      );
    near(stopped('0').bar('A'), 64.2, 3);
    expect(Math.abs(stopped('0').actuator('C1').speed)).toBeLessThan(1e-6);
    expect(stopped('b').actuator('C1').speed).toBeLessThan(-0.1);
  });
});

describe('lock check, 63/45 cylinder, 20 kN', () => {
  // A pump of 1 L/min, so that what the valve needs to open wide does not show.
  const lock = (side: 'cap' | 'rod', ratio: number): Drawn => {
    const check = `L1 lock-check{ratio=${ratio};cracking=0 bar;${NONE}}`;
    const load = cyl('C1', 63, 45, 20, side === 'cap' ? 'pushes in' : 'pulls out');
    const [held, fed] = side === 'cap' ? ['C1.A', 'C1.B'] : ['C1.B', 'C1.A'];
    return drawn(
      `${pump(1, 200)}, ${check}, ${load} | P: P1.P R1.P ${fed} L1.X | held: L1.C ${held} | T: ${SUPPLY} L1.V`,
    );
  };

  test.each([
    [2, 42.5],
    [3, 25.6],
    [4, 18.3],
  ])('F18: ratio %i on the cap side opens at %f bar (law: F/(R·A − a))', (ratio, bar) => {
    const s = lock('cap', ratio);
    near(s.bar('P'), bar, 3);
    near(s.actuator('C1').speed, -LPM / a63, 3);
  });

  test.each([
    [3, 136.7],
    [4, 66.9],
  ])('G14: ratio %i on the rod side, load pulling, opens at %f bar (law: F/(a·(R − A/a)))', (ratio, bar) => {
    const s = lock('rod', ratio);
    near(s.bar('P'), bar, 3);
    near(s.actuator('C1').speed, LPM / A63, 3);
  });

  test('G14: ratio 2, below the area ratio, never opens: pump over relief (law; the rule is published as trade advice)', () => {
    const s = lock('rod', 2);
    expect(Math.abs(s.actuator('C1').speed)).toBeLessThan(1e-6);
    near(s.bar('P'), 200, 4);
    near(s.relief('R1'), 1, 3);
  });
});

describe('sequence valve between two cylinders', () => {
  /** Opens 3 bar at 30 L/min past its setting; first 63/45 with 10 kN (32.1 bar), second 50/36 with 5 kN (25.5 bar). */
  const order = (setting: number, places: Readonly<Record<string, Place>>, position = 'a', more = ''): Drawn =>
    drawn(
      `${pump(30, 200)}, ${valve('valve-4/3-shut')}, S1 sequence-valve{setting=${setting} bar;ratedFlow=30 L/min;fullFlowRise=3 bar;${NONE}${more}}, ${cyl('C1', 63, 45, 10)}, ${cyl('C2', 50, 36, 5)} | P: P1.P R1.P V1.P | A: V1.A C1.A S1.P | second: S1.A C2.A | B: V1.B C1.B C2.B | T: ${SUPPLY} V1.T${more.includes('internal') ? '' : ' S1.Y'}`,
      position,
      places,
    );

  test('G9: shut while the first moves; opens at the setting when it is at its stop; the first line stays there (published: FM 5-499, NAVEDTRA 14105)', () => {
    const first = order(80, {});
    near(first.bar('A'), 32.1, 3);
    expect(first.flow('S1 P–A')).toBe(0);
    expect(first.actuator('C2').speed).toBe(0);
    const second = order(80, { C1: 'out' });
    near(second.bar('A'), 83, 4);
    near(second.bar('second'), 25.46, 3);
    near(second.actuator('C2').speed * 1000, 254.6);
    near(order(80, { C1: 'out', C2: 'out' }).bar('second'), 200, 3);
  });

  test('drained inside, the outlet pressure adds to the setting (law)', () => {
    near(order(80, { C1: 'out' }, 'a', ';drain=internal').bar('A'), 83 + 25.46, 4);
  });

  test('G10: without a bypass check the return through it is blocked (memory)', () => {
    const shut = order(80, { C1: 'in' }, 'b');
    expect(Math.abs(shut.actuator('C2').speed)).toBeLessThan(1e-6);
    near(shut.relief('R1'), 30, 3);
    // Law of the piston: (200 bar · a − 5 kN)/A behind the shut valve.
    near(shut.bar('second'), (200 * a50 - 5e3 / BAR) / A50, 3);
    const back = order(80, { C1: 'in' }, 'b', ';bypass=true');
    near(back.actuator('C2').speed * 1000, -528.8);
  });

  test('G11: set below what the first cylinder needs, it opens early and the second goes first (law)', () => {
    const early = order(20, {});
    near(early.bar('A'), 25.46, 3);
    near(early.actuator('C2').flowIn / LPM, 30, 4);
    expect(Math.abs(early.actuator('C1').speed)).toBeLessThan(1e-6);
  });
});

describe('counterbalance valve under a vertical 63/45 cylinder with 20 kN, bypass centre, pump 30 L/min', () => {
  const run = (position: string, more = '', back = 0): Drawn =>
    drawn(
      `${pump(30, 200)}, ${valve('valve-4/3-bypass')}, K1 check-valve{cracking=${back} bar;${NONE}}, B1 counterbalance-valve{setting=100 bar;ratio=3;ratedFlow=60 L/min;fullFlowRise=3 bar;${NONE}${more}}, ${cyl('C1', 63, 45, 20, 'pushes in')} | P: P1.P R1.P V1.P | valve: V1.A B1.V | A: B1.C C1.A | B: V1.B C1.B B1.X | return: V1.T K1.A | T: ${SUPPLY} K1.B`,
      position,
    );
  // cap + 3·rod = 100 + (3/60)·q with q = 30·A/a, and cap = F/A + rod·a/A.
  const needed = (added: number): number =>
    (100 + (3 / 60) * ((30 * A63) / a63) + added - 20e3 / A63 / BAR) / (3 + a63 / A63);

  test('G15: centred: held, pump unloaded (published: FM 5-499)', () => {
    const s = run('0');
    expect(Math.abs(s.actuator('C1').speed)).toBeLessThan(1e-6);
    near(s.bar('A'), 64.2, 3);
    expect(s.bar('P')).toBeLessThan(0.01);
  });

  test('G15: down only as fast as the pump feeds, with pressure on the rod side (published: FM 5-499; numbers by law)', () => {
    const s = run('b');
    near(s.actuator('C1').speed, (-30 * LPM) / a63);
    near(s.bar('B'), needed(0), 4);
    near(s.bar('B'), 11.1, 3);
    expect(s.voids('B')).toBe(0);
  });

  test('G15: up freely through the check', () => {
    const s = run('a');
    near(s.actuator('C1').speed, (30 * LPM) / A63);
    near(s.bar('P'), 64.2, 3);
    expect(s.flow('B1 C–V')).toBe(0);
  });

  test('back pressure of 5 bar counts (ratio + 1) times, unless the spring chamber is vented (law)', () => {
    near(run('b', '', 5).bar('B'), needed(4 * 5), 4);
    near(run('b', ';springChamber=vented', 5).bar('B'), needed(0), 4);
  });
});
