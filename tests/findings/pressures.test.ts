import { describe, expect, test } from 'vitest';
import type { Circuit } from '../../src/circuit/model.ts';
import type { Finding } from '../../src/findings/finding.ts';
import { circuit } from '../notation.ts';
import { Asked } from '../table-of.ts';

const SUPPLY = 'P1 fixed-pump{flow=30 L/min}, R1 relief-valve{setting=200 bar}, T1 tank';
const rulesOf = (c: Circuit): string[] => new Asked(c).findings().map((finding) => finding.rule);
const find = (c: Circuit, rule: string): Finding | undefined =>
  new Asked(c).findings().find((finding) => finding.rule === rule);

/** Each faulty circuit, and its neighbour without the fault. */
describe('ratings', () => {
  const direct = (setting: string, rating: string): Circuit =>
    circuit(
      `P1 fixed-pump, R1 relief-valve{setting=${setting}}, T1 tank, V1 directional-valve:valve-4/3-shut, C1 cylinder{load=45 kN;loadSense=resisting${rating}} | P1.P R1.P V1.P | V1.A C1.A | V1.B C1.B | P1.S R1.T T1.T V1.T`,
    );

  test('pump pressure beyond a rating; danger where somebody entered it, caution where it is assumed', () => {
    const entered = find(direct('240 bar', ';rating=160 bar'), 'over-rating');
    expect(entered).toMatchObject({ level: 'danger', parts: ['C1'] });
    // 45 kN on 50 mm are 229 bar; the return of 14 L/min over the valve adds a little.
    expect(entered?.what).toContain('is built for 160 bar');
    const assumed = find(
      circuit(
        'P1 fixed-pump, R1 relief-valve{setting=300 bar}, T1 tank, V1 directional-valve:valve-4/3-shut, C1 cylinder{load=52 kN;loadSense=resisting} | P1.P R1.P V1.P | V1.A C1.A | V1.B C1.B | P1.S R1.T T1.T V1.T',
      ),
      'over-rating',
    );
    expect(assumed?.level).toBe('caution');
    expect(assumed?.what).toContain('assumed');
    expect(rulesOf(direct('240 bar', ''))).not.toContain('over-rating');
  });

  // Law: p(rod side) = (p·A + pull)/a; 50/36 has φ 2.076, so 200 bar become 415.
  const metered = (where: 'in' | 'out'): Circuit => {
    const lines = where === 'out' ? 'V1.A C1.A | C1.B K1.A | K1.B V1.B' : 'V1.A K1.A | K1.B C1.A | C1.B V1.B';
    return circuit(
      `${SUPPLY}, V1 directional-valve:valve-4/3-shut, C1 cylinder, K1 flow-control{flow=3 L/min;reverseCheck=true} | P1.P R1.P V1.P | ${lines} | P1.S R1.T T1.T V1.T`,
    );
  };

  test('the rod side stands above every pump where it is metered out, not where it is metered in (law)', () => {
    const found = find(metered('out'), 'intensified');
    expect(found?.parts).toEqual(['C1']);
    expect(found?.what).toMatch(/C1\.B stands at 4\d\d bar/);
    expect(rulesOf(metered('in'))).not.toContain('intensified');
  });

  test('the tank port of the first valve in series carries the load of the second (pressures add, FM 5-499)', () => {
    const series = (rating: string): Circuit =>
      circuit(
        `${SUPPLY}, V1 directional-valve:valve-4/3-bypass{tankRating=${rating}}, V2 directional-valve:valve-4/3-bypass, C1 cylinder, C2 cylinder{load=8 kN;loadSense=resisting} | P1.P R1.P V1.P | V1.T V2.P | V1.A C1.A | V1.B C1.B | V2.A C2.A | V2.B C2.B | P1.S R1.T T1.T V2.T`,
      );
    expect(find(series('30 bar'), 'tank-port-pressure')?.parts).toEqual(['V1']);
    expect(rulesOf(series('210 bar'))).not.toContain('tank-port-pressure');
  });
});

test('a sequence valve that drains into what it feeds (practice)', () => {
  const rig = (drain: string, y: string): Circuit =>
    circuit(
      `${SUPPLY}, C1 cylinder, C2 cylinder, S1 sequence-valve{bypass=true;drain=${drain}}, V1 directional-valve:valve-4/3-shut | P1.P R1.P V1.P | V1.A C1.A S1.P | S1.A C2.A | C1.B C2.B V1.B | P1.S R1.T T1.T V1.T${y}`,
    );
  expect(find(rig('internal', ''), 'sequence-drain')?.parts).toEqual(['S1']);
  expect(rulesOf(rig('external', ' S1.Y'))).not.toContain('sequence-drain');
});

test('a check that holds the pump back', () => {
  const rig = (from: string, to: string): Circuit =>
    circuit(
      `${SUPPLY}, K1 check-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder | P1.P R1.P K1.${from} | K1.${to} V1.P | V1.A C1.A | V1.B C1.B | P1.S R1.T T1.T V1.T`,
    );
  expect(find(rig('B', 'A'), 'wrong-way-round')?.parts).toEqual(['K1']);
  expect(rulesOf(rig('A', 'B'))).not.toContain('wrong-way-round');
});

describe('lowering', () => {
  const lift = (between: string, lines: string, form = 'valve-4/3-shut-coils', sense = 'pushes in'): Circuit =>
    circuit(
      `${SUPPLY}, V1 directional-valve:${form}, C1 cylinder{load=20 kN;loadSense=${sense}}${between} | P1.P R1.P V1.P | ${lines} | V1.B C1.B | P1.S R1.T T1.T V1.T`,
    );

  test('a coil valve alone does not control how a load comes down; a hand on a lever does (practice)', () => {
    expect(find(lift('', 'V1.A C1.A'), 'lowering-not-controlled')).toMatchObject({ level: 'caution', parts: ['C1'] });
    expect(rulesOf(lift('', 'V1.A C1.A', 'valve-4/3-shut'))).not.toContain('lowering-not-controlled');
    expect(rulesOf(lift('', 'V1.A C1.A', 'valve-4/3-shut-coils', 'resisting'))).not.toContain(
      'lowering-not-controlled',
    );
  });

  test('neither does a lock check; a throttle on what the load pushes out, or a counterbalance valve, does', () => {
    const lock = lift(', L1 lock-check', 'V1.A L1.V | L1.C C1.A | V1.B L1.X');
    expect(rulesOf(lock)).toContain('lowering-not-controlled');
    const metered = lift(', K1 one-way-throttle', 'V1.A K1.A | K1.B C1.A');
    expect(rulesOf(metered)).not.toContain('lowering-not-controlled');
    const counterbalanced = lift(', B1 counterbalance-valve', 'V1.A B1.V | B1.C C1.A | V1.B B1.X');
    expect(rulesOf(counterbalanced)).not.toContain('lowering-not-controlled');
  });

  test('a one-way throttle that lets the load down through its check stands the wrong way round', () => {
    expect(find(lift(', K1 one-way-throttle', 'V1.A K1.B | K1.A C1.A'), 'wrong-way-round')?.parts).toEqual(['K1']);
    expect(rulesOf(lift(', K1 one-way-throttle', 'V1.A K1.A | K1.B C1.A'))).not.toContain('wrong-way-round');
  });
});
