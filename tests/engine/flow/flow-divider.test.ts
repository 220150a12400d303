import { describe, expect, test } from 'vitest';
import { FlowSolver } from '../../../src/engine/flow/solver.ts';
import { FlowBuilder } from '../../../src/engine/flow/builder.ts';
import { TANK } from '../../../src/engine/flow/problem.ts';
import { circuit } from '../../notation.ts';
import { Asked } from '../../table-of.ts';
import { A63, NONE, SUPPLY, cyl, drawn, pump, valve } from './drawn.ts';
import type { Drawn, Place } from './drawn.ts';
import { BAR, LPM, near, solve } from './rig.ts';

/** Pump 30 L/min at 200 bar over a divider to two 63/45 cylinders with loads in kN. */
const divided = (
  settings: string,
  loads: readonly [number, number],
  places: Readonly<Record<string, Place>> = {},
  position = 'a',
  sense = 'resisting',
): Drawn =>
  drawn(
    `${pump(30, 200)}, ${valve('valve-4/3-shut')}, F1 flow-divider{ratedFlow=30 L/min;${settings}}, ${cyl('C1', 63, 45, loads[0], sense)}, ${cyl('C2', 63, 45, loads[1], sense)} | P: P1.P R1.P V1.P | in: V1.A F1.P | A: F1.A C1.A | B: F1.B C2.A | back: C1.B C2.B V1.B | T: ${SUPPLY} V1.T`,
    position,
    places,
  );
const ratio = (s: Drawn): number => s.actuator('C1').flowIn / s.actuator('C2').flowIn;

describe('spool', () => {
  test('two different loads get the same flow, at the pressure of the heavier (practice)', () => {
    const s = divided('ratedDrop=6 bar', [10, 30]);
    expect(Math.abs(ratio(s) - 1)).toBeLessThan(0.005);
    near(s.actuator('C1').flowIn / LPM + s.actuator('C2').flowIn / LPM, 30);
    // The heavier load, what returns, and the loss at the rated flow.
    near(s.bar('in'), s.bar('B') + 6, 3);
    near(s.bar('B'), (30e3 / BAR + s.bar('back') * (A63 - (Math.PI / 4) * 0.045 ** 2)) / A63, 3);
  });

  test('a third to A, two thirds to B', () => {
    const s = divided('ratedDrop=6 bar;share=33.333 %', [30, 10]);
    expect(Math.abs(ratio(s) - 0.5)).toBeLessThan(0.005);
  });

  test('one at its stop: the other passes its share when blocked, the rest goes over relief', () => {
    const s = divided('ratedDrop=6 bar;synchronising=5 %', [10, 10], { C2: 'out' });
    expect(s.actuator('C1').flowIn / LPM).toBeGreaterThan(0.05 * 15 * 0.9);
    expect(s.actuator('C1').flowIn / LPM).toBeLessThan(0.05 * 15 * 1.1);
    near(s.bar('in'), 200, 3);
    near(s.relief('R1'), 30 - s.actuator('C1').flowIn / LPM, 3);
  });

  test('combines on the way back: loads of 5 and 20 kN come down at the same speed', () => {
    const s = divided('ratedDrop=6 bar', [5, 20], {}, 'b', 'pushes in');
    expect(s.actuator('C1').speed).toBeLessThan(-0.01);
    expect(Math.abs(ratio(s) - 1)).toBeLessThan(0.02);
  });

  test('freely back over checks the heavier runs ahead; shut, nothing comes back', () => {
    expect(ratio(divided('ratedDrop=6 bar;back=free', [5, 20], {}, 'b', 'pushes in'))).toBeLessThan(0.9);
    expect(
      Math.abs(divided('ratedDrop=6 bar;back=shut', [5, 20], {}, 'b', 'pushes in').actuator('C1').speed),
    ).toBeLessThan(1e-6);
  });
});

describe('gear', () => {
  const GEAR = 'form=gear;ratedDrop=0.01 bar;synchronising=0.5 %';

  test('the inlet stands at the mean of the outlets (law of the shaft): half for half', () => {
    const s = divided(GEAR, [10, 30]);
    near(s.bar('in'), (s.bar('A') + s.bar('B')) / 2, 3);
    near(s.pump('P1').pressure / BAR, s.bar('in'), 3);
  });

  test('an outlet to tank lifts the other to twice the inlet pressure (law): intensified', () => {
    const b = new FlowBuilder();
    const p = b.line('P');
    const a = b.line('A');
    b.pumpFixed('pump', p, 30 * LPM);
    b.relief('relief', p, TANK, 100 * BAR);
    b.relief('stop', a, TANK, 190 * BAR);
    b.divider('gear', p, [a, TANK], 0.5, 1e6);
    const s = solve(b.build());
    near(s.lpm('stop'), 15);
    near(s.bar('A'), 190);
    near(s.bar('P'), 95, 3);
    near(s.all.power.lost, s.all.power.pumps, 6);
    expect(new FlowSolver(b.build()).solve().status).toBe('solved');
  });

  test('a blocked outlet blocks the other but for its slip', () => {
    const s = divided('form=gear;ratedDrop=6 bar;synchronising=2 %', [10, 10], { C2: 'out' });
    expect(s.relief('R1')).toBeGreaterThan(28);
    expect(s.actuator('C1').flowIn / LPM).toBeLessThan(2 * 0.02 * 15 * 2);
  });
});

test('a gear divider is given its flows and its loss like any part', () => {
  const asked = new Asked(
    circuit(
      `P1 fixed-pump{flow=30 L/min}, R1 relief-valve, T1 tank, F1 flow-divider{form=gear;ratedFlow=30 L/min;ratedDrop=6 bar}, C1 cylinder{load=10 kN;loadSense=resisting}, C2 cylinder{load=30 kN;loadSense=resisting} | P1.P R1.P F1.P | F1.A C1.A | F1.B C2.A | C1.B C2.B ${SUPPLY}`,
    ),
  );
  const { flows, shares, power, actuators } = asked.explain('').numbers;
  const through = flows.filter(({ part }) => part === 'F1');
  expect(through.map(({ to }) => to)).toEqual(['A', 'B']);
  // What goes through each outlet is what its cylinder takes: half of the pump's flow but for the slip.
  through.forEach(({ flow }, i) => near(flow, actuators[i]?.flow ?? 0, 5));
  for (const { flow } of through) expect(Math.abs(flow / LPM - 15)).toBeLessThan(0.5);
  // The parts' losses add up to all of them.
  expect(shares.find(({ part }) => part === 'F1')?.lost).toBeGreaterThan(0.9 * 30 * LPM * 6 * BAR);
  near(
    shares.reduce((sum, share) => sum + share.lost, 0),
    power.lost,
    3,
  );
});

test('in the table two cylinders behind a divider move together; straight from the pump the lighter goes first', () => {
  const rig = (kinds: string, lines: string): Asked =>
    new Asked(
      circuit(
        `P1 fixed-pump, R1 relief-valve, T1 tank, V1 directional-valve:valve-4/3-shut{${NONE}}, C1 cylinder{load=10 kN;loadSense=resisting}, C2 cylinder{load=20 kN;loadSense=resisting}${kinds} | P1.P R1.P V1.P | ${lines} | C1.B C2.B V1.B | ${SUPPLY} V1.T`,
      ),
    );
  const together = rig(', F1 flow-divider', 'V1.A F1.P | F1.A C1.A | F1.B C2.A');
  expect([together.actuator('C1', 'V1=a'), together.actuator('C2', 'V1=a')]).toEqual(['extends', 'extends']);
  const alone = rig('', 'V1.A C1.A C2.A');
  expect([alone.actuator('C1', 'V1=a'), alone.actuator('C2', 'V1=a')]).toEqual(['extends', 'stalled']);
  const blocked = rig(', F1 flow-divider, K1 plug', 'V1.A F1.P | F1.A C1.A C2.A | F1.B K1.A');
  expect(blocked.pump('V1=a')).toBe('working, part over relief');
});
