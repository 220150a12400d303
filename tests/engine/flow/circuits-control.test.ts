import { describe, expect, test } from 'vitest';
import { BAR, LPM, near } from './rig.ts';
import { A63, NONE, SUPPLY, a63, cyl, drawn, pump, valve } from './drawn.ts';
import type { Drawn, Place } from './drawn.ts';

/**
 * Drawn circuits with speed control, unloading, reducing and shuttle valves against laws. Losses of 0.001 bar at
 * the rated flow stand for none, friction is 0, reliefs have no rise.
 */
describe('speed control', () => {
  /** `where`: what stands in the supply, return or bleed line; 63/45 cylinder, pump 30 L/min at 200 bar. */
  const control = (
    part: string,
    where: 'in' | 'out' | 'bleed',
    load: number,
    sense = 'resisting',
    loss = NONE,
  ): Drawn => {
    const lines = {
      in: 'P: P1.P R1.P V1.P | metered: V1.A K1.A | A: K1.B C1.A | B: C1.B V1.B',
      out: 'P: P1.P R1.P V1.P | A: V1.A C1.A | B: C1.B K1.A | metered: K1.B V1.B',
      bleed: 'P: P1.P R1.P V1.P | A: V1.A C1.A | B: C1.B V1.B',
    }[where];
    return drawn(
      `${pump(30, 200)}, V1 directional-valve:valve-4/3-shut{${loss}}, K1 ${part}, ${cyl('C1', 63, 45, load, sense)} | ${lines} | T: ${SUPPLY} V1.T${where === 'bleed' ? ' K1.B | P1.P K1.A' : ''}`,
      'a',
    );
  };
  /** q = flow·√(Δp/40 bar). */
  const orifice = (flow: number): string => `throttle{ratedFlow=${flow} L/min;ratedDrop=40 bar}`;

  test('G16: meter-in, resisting load: pump at relief with the rest over it (practice; numbers by law)', () => {
    const s = control(orifice(10), 'in', 8);
    const metered = 10 * Math.sqrt((200 - 8e3 / A63 / BAR) / 40);
    near(s.bar('P'), 200, 4);
    near(s.actuator('C1').flowIn / LPM, metered, 3);
    near(s.relief('R1'), 30 - metered, 3);
  });

  test('G16: meter-in, overrunning load: runs ahead, the cap side voids (practice)', () => {
    const s = control(orifice(10), 'in', 8, 'pulls out', 'ratedDrop=5 bar');
    expect(s.voids('A')).toBeGreaterThan(0);
    // What the load pushes out is limited by the valve alone: 40·√(p/5 bar) at p = F/a.
    near(s.actuator('C1').flowOut / LPM, 40 * Math.sqrt(8e3 / a63 / BAR / 5), 3);
    expect(s.actuator('C1').flowIn / LPM).toBeGreaterThan(10 * Math.sqrt(200 / 40));
  });

  test('G17: meter-out, overrunning load: controlled, rod side intensified (practice; numbers by law)', () => {
    const s = control(orifice(4), 'out', 8, 'pulls out');
    const rod = (200 * A63 + 8e3 / BAR) / a63;
    near(s.bar('B'), rod, 3);
    near(s.actuator('C1').flowOut / LPM, 4 * Math.sqrt(rod / 40), 3);
    expect(s.voids('A')).toBe(0);
  });

  test('G18: bleed-off, resisting load: pump at load pressure, nothing over relief (practice; numbers by law)', () => {
    const s = control(orifice(10), 'bleed', 8);
    const bar = 8e3 / A63 / BAR;
    near(s.bar('P'), bar, 3);
    near(s.actuator('C1').flowIn / LPM, 30 - 10 * Math.sqrt(bar / 40), 3);
    expect(s.relief('R1')).toBe(0);
  });

  const fixed = 'flow-control{flow=12 L/min;leastDrop=1 bar}';
  test.each([8, 40])(
    'a flow control keeps the speed at %i kN: in by q/A, out by q/a, bleed by (Q − q)/A (law)',
    (load) => {
      near(control(fixed, 'in', load).actuator('C1').speed, (12 * LPM) / A63);
      near(control(fixed, 'out', load).actuator('C1').speed, (12 * LPM) / a63);
      near(control(fixed, 'bleed', load).actuator('C1').speed, (18 * LPM) / A63);
      near(control(fixed, 'in', load).bar('P'), 200, 4);
      near(control(fixed, 'bleed', load).bar('P'), (load * 1e3) / A63 / BAR, 3);
    },
  );

  test('below its least drop it is a plain throttle: q = flow·√(Δp/least drop) (law)', () => {
    // 195 bar of load leave 5 bar of the 20 bar that it needs.
    const s = control('flow-control{flow=12 L/min;leastDrop=20 bar}', 'in', (195 * BAR * A63) / 1000);
    near(s.actuator('C1').flowIn / LPM, 6, 3);
  });

  test('towards A it throttles, unless it has a reverse check', () => {
    const back = (form: string): Drawn =>
      drawn(
        `${pump(30, 200)}, ${valve('valve-4/3-shut')}, K1 flow-control:${form}{flow=12 L/min;leastDrop=40 bar}, ${cyl('C1', 63, 45, 2)} | P: P1.P R1.P V1.P | V1.A K1.A | A: K1.B C1.A | B: C1.B V1.B | T: ${SUPPLY} V1.T`,
        'b',
      );
    // Law of the piston at relief: (200 bar · a − 2 kN)/A behind the throttle, and its own law.
    const bar = (200 * a63 - 2e3 / BAR) / A63;
    near(back('flow-control').bar('A'), bar, 3);
    near(back('flow-control').actuator('C1').flowIn / LPM, -12 * Math.sqrt(bar / 40), 3);
    // The check takes 2 bar at 40 L/min.
    expect(back('flow-control-check').bar('A')).toBeLessThan(2 * (62 / 40) ** 2);
  });
});

describe('unloading and reducing', () => {
  /** Large pump 40 L/min through a check, small one 5 L/min beside it; the large one unloads at 60 bar. */
  const twoPumps = (load: number): Drawn =>
    drawn(
      `${pump(5, 160)}, P2 fixed-pump{flow=40 L/min}, K1 check-valve{cracking=0 bar;${NONE}}, U1 unloading-valve{setting=60 bar;fullFlowRise=1 bar;${NONE}}, ${cyl('C1', 63, 45, load)} | P: P1.P R1.P K1.B U1.X C1.A | large: P2.P K1.A U1.P | T: ${SUPPLY} P2.S U1.T C1.B`,
    );

  test('two pumps: both below the setting, the small one alone above it, the large one at no pressure (practice; numbers by law)', () => {
    const fast = twoPumps(10);
    near(fast.actuator('C1').speed, (45 * LPM) / A63);
    near(fast.bar('large'), 32.1, 3);
    const slow = twoPumps(30);
    near(slow.actuator('C1').speed, (5 * LPM) / A63);
    near(slow.bar('P'), 30e3 / A63 / BAR);
    expect(slow.bar('large')).toBeLessThan(0.01);
    near(slow.flow('U1 P–T'), 40);
  });

  /** Closes over 4 bar at 40 L/min: outlet = setting − q/10. */
  const reduced = (more: string, user: string, ports: string, place: Place = 'between'): Drawn =>
    drawn(
      `${pump(30, 160)}, D1 reducing-valve{setting=50 bar;fullFlowRise=4 bar;${NONE}${more}}, ${user} | P: P1.P R1.P D1.P | low: D1.A ${ports} | T: ${SUPPLY} D1.Y`,
      '',
      { C1: place },
    );

  test('a reducing valve holds its outlet at the setting less its override; the pump stands at relief (law)', () => {
    const flowing = reduced('', 'K1 throttle{ratedFlow=10 L/min;ratedDrop=46 bar}, T2 tank', 'K1.A | K1.B T2.T');
    // q = 10·√((50 − q/10)/46) has the root 10.31.
    near(flowing.bar('low') + flowing.flow('D1 P–A') / 10, 50, 5);
    near(flowing.flow('D1 P–A'), 10.31, 3);
    near(flowing.bar('P'), 160, 4);
    const still = reduced('', `${cyl('C1', 63, 45)}, T2 tank`, 'C1.A | C1.B T2.T', 'out');
    near(still.bar('low'), 50, 4);
    near(still.bar('P'), 160, 4);
  });

  test('below the setting it passes all; the outlet follows the load (law)', () => {
    const s = reduced('', `${cyl('C1', 63, 45, 10)}, T2 tank`, 'C1.A | C1.B T2.T');
    near(s.actuator('C1').speed, (30 * LPM) / A63);
    near(s.bar('low'), 32.1, 3);
  });

  test('a load of 64.2 bar behind 50 bar: held, or let out through Y if relieving (law: q = 10·(p − 50))', () => {
    const load = `${cyl('C1', 63, 45, 20, 'pushes in')}, T2 tank`;
    const held = reduced('', load, 'C1.A | C1.B T2.T');
    expect(Math.abs(held.actuator('C1').speed)).toBeLessThan(1e-6);
    near(held.bar('low'), 64.2, 3);
    const sinks = reduced(';relieving=true', load, 'C1.A | C1.B T2.T');
    near(sinks.flow('D1 A–Y'), 10 * (20e3 / A63 / BAR - 50), 3);
    near(sinks.actuator('C1').flowIn / LPM, -10 * (20e3 / A63 / BAR - 50), 3);
  });
});

test('a shuttle gives its outlet the side that is fed, and does not join the two (practice)', () => {
  for (const [position, from, other] of [
    ['a', 'X', 'b side'],
    ['b', 'Y', 'a side'],
  ] as const) {
    const s = drawn(
      `${pump(10, 100)}, ${valve('valve-4/3-shut')}, H1 shuttle-valve{${NONE}}, C1 single-acting-cylinder{return=load;bore=63 mm;load=10 kN;loadSense=pushes in;friction=0 kN} | P: P1.P R1.P V1.P | a side: V1.A H1.X | b side: V1.B H1.Y | brake: H1.A C1.A | T: ${SUPPLY} V1.T`,
      position,
    );
    near(s.flow(`H1 ${from}–A`), 10);
    near(s.bar('brake'), 32.1, 3);
    expect(s.bar(other)).toBeLessThan(0.01);
  }
});
