import { describe, expect, test } from 'vitest';
import type { Circuit } from '../../../src/circuit/model.ts';
import { circuit } from '../../notation.ts';
import { Asked } from '../../table-of.ts';

const PATHS_ALONE = { pressureRows: 0 };

/** Fixed pump, relief, one cylinder, one valve: the rig that most textbooks draw first. */
const rig = (valve: string, pump = 'fixed-pump', cylinder = ''): Asked =>
  new Asked(
    circuit(
      `P1 ${pump}, R1 relief-valve, V1 directional-valve:${valve}, C1 cylinder${cylinder}, T1 tank | P: P1.P R1.P V1.P | A: V1.A C1.A | B: V1.B C1.B | T: V1.T R1.T T1.T P1.S`,
    ),
  );

describe('centre conditions (common practice; published training sheets)', () => {
  test('closed centre holds the cylinder and blows the pump over its relief', () => {
    const t = rig('valve-4/3-shut');
    expect(t.actuator('C1', 'V1=0')).toBe('held');
    expect(t.pump('V1=0')).toBe('over relief');
    expect(t.line('P', 'V1=0')).toBe('fed');
    expect(t.blocked('P', 'V1=0')).toBe('under pressure');
    for (const line of ['A', 'B']) {
      expect(t.line(line, 'V1=0')).toBe('cut off');
      expect(t.blocked(line, 'V1=0')).toBe('cut off');
      expect(t.trapped(line, 'V1=0')).toEqual(['left behind', 'heat']);
    }
    const reasons = t.explain('V1=0').trapped.find((line) => line.name === 'A')?.reasons;
    expect(reasons?.[0]?.text).toContain('V1 from a to 0 (row 1)');
    expect(reasons?.[0]?.text).not.toContain('from b');
  });

  test('shifted valves move the cylinder and make the pump work', () => {
    const t = rig('valve-4/3-shut');
    expect([t.actuator('C1', 'V1=a'), t.pump('V1=a')]).toEqual(['extends', 'working']);
    expect([t.actuator('C1', 'V1=b'), t.pump('V1=b')]).toEqual(['retracts', 'working']);
    expect(['P', 'A', 'B', 'T'].map((line) => t.line(line, 'V1=a'))).toEqual(['fed', 'fed', 'vented', 'vented']);
    expect(['P', 'A', 'B', 'T'].map((line) => t.blocked(line, 'V1=a'))).toEqual([
      undefined,
      undefined,
      undefined,
      undefined,
    ]);
  });

  test('bypass centre holds and unloads', () => {
    const t = rig('valve-4/3-bypass');
    expect([t.actuator('C1', 'V1=0'), t.pump('V1=0')]).toEqual(['held', 'unloaded']);
    expect(['P', 'A', 'B', 'T'].map((line) => t.line(line, 'V1=0'))).toEqual([
      'flows to tank',
      'cut off',
      'cut off',
      'flows to tank',
    ]);
  });

  test('float centre floats, pump over relief', () => {
    const t = rig('valve-4/3-float');
    expect([t.actuator('C1', 'V1=0'), t.pump('V1=0')]).toEqual(['floats', 'over relief']);
    expect(t.line('A', 'V1=0')).toBe('vented');
    expect(t.trapped('A', 'V1=0')).toEqual([]);
  });

  test('open centre floats, pump unloaded', () => {
    const t = rig('valve-4/3-joined');
    expect([t.actuator('C1', 'V1=0'), t.pump('V1=0')]).toEqual(['floats', 'unloaded']);
    expect(t.line('A', 'V1=0')).toBe('flows to tank');
    // Both sides stand at what the way to tank takes away: p·Ar beats the friction (law).
    expect(t.notes('C1', 'V1=0')).toEqual([]);
    const easy = rig('valve-4/3-joined', 'fixed-pump', '{friction=0.01 kN}');
    expect([easy.actuator('C1', 'V1=0'), easy.notes('C1', 'V1=0')]).toEqual([
      'floats',
      ['creeps outward on back pressure'],
    ]);
  });

  test('compensated pump destrokes over a closed centre (US Army FM 5-499, from memory)', () => {
    const t = rig('valve-4/3-shut', 'compensated-pump');
    expect([t.actuator('C1', 'V1=0'), t.pump('V1=0')]).toEqual(['held', 'destroked']);
    expect([t.actuator('C1', 'V1=a'), t.pump('V1=a')]).toEqual(['extends', 'working']);
  });

  test('regenerative centre goes out: p·A beats p·a (law)', () => {
    const t = rig('valve-4/3-regenerative');
    expect(t.actuator('C1', 'V1=0')).toBe('extends');
    expect(t.blocked('B', 'V1=0')).toBeUndefined();
  });

  test('a regenerative centre balances equal areas', () => {
    const t = new Asked(
      circuit(
        'P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-regenerative, C1 double-rod-cylinder, T1 tank | P1.P R1.P V1.P | V1.A C1.A | V1.B C1.B | V1.T R1.T T1.T P1.S',
      ),
    );
    expect(t.actuator('C1', 'V1=0')).toBe('floats');
    expect(t.pump('V1=0')).toBe('over relief');
  });

  test('A–T centre leaves one way free', () => {
    const t = rig('valve-4/3-a-t');
    // The cap side is open to tank, the rod side sealed: outward needs the rod side to give, inward stretches it.
    expect(t.actuator('C1', 'V1=0')).toBe('held');
    expect(t.notes('C1', 'V1=0')).toEqual(['inward by suction only']);
  });
});

describe('several valves', () => {
  const two = (valve: string, rest: string): Asked =>
    new Asked(
      circuit(
        `P1 fixed-pump, R1 relief-valve, V1 directional-valve:${valve}, V2 directional-valve:${valve}, C1 cylinder, C2 cylinder, T1 tank | V1.A C1.A | V1.B C1.B | V2.A C2.A | V2.B C2.B | ${rest}`,
      ),
    );

  test('bypass centres in parallel: 4 of 9 combinations move anything (published trade article)', () => {
    const t = two('valve-4/3-bypass', 'P1.P R1.P V1.P V2.P | V1.T V2.T R1.T T1.T P1.S');
    const moving = Array.from({ length: 9 }, (_, row) => row).filter((row) =>
      [0, 1].some((i) => !['held', 'floats'].includes(t.table.actuator(i, row))),
    );
    expect(moving.length).toBe(4);
    // Shifted alone, both chambers stand open to tank: one through V2, which is at rest.
    expect([t.actuator('C1', 'V1=a V2=0'), t.pump('V1=a V2=0')]).toEqual(['floats', 'unloaded']);
    // Both shifted: two cylinders for one flow, which open paths cannot share out.
    const paths = new Asked(t.circuit, t.conditions, PATHS_ALONE);
    expect(paths.actuator('C1', 'V1=a V2=b')).toBe('rests on pressure');
    expect(paths.rests('C1', 'V1=a V2=b')).toEqual(['rivals']);
    expect(paths.pump('V1=a V2=b')).toBe('working');
    // Nor can the pressures where the two are equal.
    expect([t.actuator('C1', 'V1=a V2=a'), t.actuator('C2', 'V1=a V2=a')]).toEqual(['undetermined', 'undetermined']);
    expect(t.findings().map((finding) => finding.rule)).toContain('idle-valve-unloads');
  });

  test('bypass centres in series: both move, each whenever its own lever is shifted (US Army FM 5-499, from memory)', () => {
    const t = two('valve-4/3-bypass', 'P1.P R1.P V1.P | S: V1.T V2.P | V2.T R1.T T1.T P1.S');
    expect([t.actuator('C1', 'V1=a V2=a'), t.actuator('C2', 'V1=a V2=a')]).toEqual(['extends', 'extends']);
    expect([t.actuator('C1', 'V1=b V2=a'), t.actuator('C2', 'V1=b V2=a')]).toEqual(['retracts', 'extends']);
    expect([t.actuator('C1', 'V1=a'), t.actuator('C2', 'V1=a')]).toEqual(['extends', 'held']);
    expect([t.actuator('C1', 'V2=b'), t.actuator('C2', 'V2=b')]).toEqual(['held', 'retracts']);
    expect(t.pump('')).toBe('unloaded');
    expect(t.line('S', 'V1=a V2=a')).toBe('carries displaced oil');
    expect(t.blocked('S', 'V1=a V2=a')).toBeUndefined();
    expect(t.findings().map((finding) => finding.rule)).not.toContain('idle-valve-unloads');
  });

  test('series with one at its stop: both stand, pump over relief (law)', () => {
    const c = circuit(
      'P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-bypass, V2 directional-valve:valve-4/3-bypass, C1 cylinder, C2 cylinder, T1 tank | V1.A C1.A | V1.B C1.B | V2.A C2.A | V2.B C2.B | P1.P R1.P V1.P | S: V1.T V2.P | V2.T R1.T T1.T P1.S',
    );
    const t = new Asked(c, { pumps: 'running', places: { C2: 'out' } });
    expect([t.actuator('C1', 'V1=a V2=a'), t.actuator('C2', 'V1=a V2=a')]).toEqual(['held', 'at stop']);
    expect(t.pump('V1=a V2=a')).toBe('over relief');
    expect(t.line('S', 'V1=a V2=a')).toBe('cut off');
    expect(t.trapped('S', 'V1=a V2=a')).toContain('load');
  });

  test('carry-over sections: neutral free to tank, one shifted takes the full flow (US Army FM 5-499, from memory)', () => {
    const t = two('valve-6/3-carry-over', 'P1.P R1.P V1.P V2.P V1.C1 | V1.C2 V2.C1 | V2.C2 V1.T V2.T R1.T T1.T P1.S');
    expect([t.pump(''), t.actuator('C1', ''), t.actuator('C2', '')]).toEqual(['unloaded', 'held', 'held']);
    expect([t.pump('V1=a'), t.actuator('C1', 'V1=a'), t.actuator('C2', 'V1=a')]).toEqual([
      'working',
      'extends',
      'held',
    ]);
    expect([t.pump('V2=b'), t.actuator('C1', 'V2=b'), t.actuator('C2', 'V2=b')]).toEqual([
      'working',
      'held',
      'retracts',
    ]);
  });

  test('counts: 3ⁿ, and three 4/3 with one 4/2 give 54 (counting)', () => {
    const t = new Asked(
      circuit(
        'V1 directional-valve:valve-4/3-shut, V2 directional-valve:valve-4/3-float, V3 directional-valve:valve-4/3-bypass, V4 directional-valve:valve-4/2-coil',
      ),
    );
    expect(t.table.count).toBe(54);
    expect(two('valve-4/3-shut', 'P1.P V1.P V2.P').table.count).toBe(9);
  });

  test('opposed coils are counted apart: two 4/3 with two coils each, 16 coil combinations of which 9 are permitted (counting)', () => {
    const t = two('valve-4/3-shut-coils', 'P1.P V1.P V2.P');
    expect([t.table.data.commandCombinations, t.table.data.notPermitted]).toEqual([16, 7]);
  });
});

describe('lock checks', () => {
  const locked = (valve: string): Asked =>
    new Asked(
      circuit(
        `P1 fixed-pump, R1 relief-valve, V1 directional-valve:${valve}, L1 double-lock-check, C1 cylinder, T1 tank | P1.P R1.P V1.P | A: V1.A L1.V1 | B: V1.B L1.V2 | CA: L1.C1 C1.A | CB: L1.C2 C1.B | V1.T R1.T T1.T P1.S`,
      ),
    );

  test('with a float centre both sides lock and the lines before the checks are vented (published training sheets)', () => {
    const t = locked('valve-4/3-float');
    expect(t.actuator('C1', 'V1=0')).toBe('held');
    expect([t.line('A', 'V1=0'), t.line('B', 'V1=0'), t.line('CA', 'V1=0'), t.line('CB', 'V1=0')]).toEqual([
      'vented',
      'vented',
      'cut off',
      'cut off',
    ]);
    expect([t.actuator('C1', 'V1=a'), t.actuator('C1', 'V1=b')]).toEqual(['extends', 'retracts']);
    expect(t.findings().map((finding) => finding.rule)).not.toContain('lock-check-not-vented');
  });

  test('with a closed centre the pilots are not vented: a finding (common practice)', () => {
    const t = locked('valve-4/3-shut');
    expect(t.actuator('C1', 'V1=0')).toBe('held');
    expect(t.trapped('A', 'V1=0')).toContain('left behind');
    expect(t.findings().map((finding) => finding.rule)).toContain('lock-check-not-vented');
  });

  test('behind a bypass-centre series valve the pilot is pressed on through the first cylinder (law)', () => {
    const t = new Asked(
      circuit(
        'P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-bypass, V2 directional-valve:valve-4/3-bypass, L1 double-lock-check, C1 cylinder, C2 cylinder, T1 tank | P1.P R1.P V1.P | V1.A C1.A | V1.B C1.B | V1.T V2.P | V2.A L1.V1 | V2.B L1.V2 | L1.C1 C2.A | L1.C2 C2.B | V2.T R1.T T1.T P1.S',
      ),
    );
    expect([t.actuator('C1', 'V1=a V2=a'), t.actuator('C2', 'V1=a V2=a')]).toEqual(['extends', 'extends']);
  });
});

const paths = (c: Circuit): Asked => new Asked(c, { pumps: 'running' }, PATHS_ALONE);

describe('single acting, motors, loads', () => {
  const single = (place?: 'in' | 'out'): Asked =>
    new Asked(
      circuit(
        'P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-3/2-coil, C1 single-acting-cylinder, T1 tank | P1.P R1.P V1.P | V1.A C1.A | V1.T R1.T T1.T P1.S',
      ),
      { pumps: 'running', ...(place && { places: { C1: place } }) },
    );

  test('3/2 valve and a spring-return cylinder (published training notes)', () => {
    expect([single().actuator('C1', 'V1=0'), single().pump('V1=0')]).toEqual(['moved in by spring', 'over relief']);
    expect([single().actuator('C1', 'V1=a'), single().pump('V1=a')]).toEqual(['extends', 'working']);
    expect([single('out').actuator('C1', 'V1=a'), single('out').pump('V1=a')]).toEqual(['at stop', 'over relief']);
  });

  test('a motor with both ports open to tank floats, with both shut it is held', () => {
    const t = (valve: string): Asked =>
      new Asked(
        circuit(
          `P1 fixed-pump, R1 relief-valve, V1 directional-valve:${valve}, M1 motor, T1 tank | P1.P R1.P V1.P | V1.A M1.A | V1.B M1.B | V1.T R1.T T1.T P1.S M1.L`,
        ),
      );
    expect(t('valve-4/3-float').actuator('M1', 'V1=0')).toBe('floats');
    expect(t('valve-4/3-shut').actuator('M1', 'V1=0')).toBe('held');
    expect([t('valve-4/3-shut').actuator('M1', 'V1=a'), t('valve-4/3-shut').actuator('M1', 'V1=b')]).toEqual([
      'turns A→B',
      'turns B→A',
    ]);
  });

  test('a load that presses in drops through an open valve, and lifting it rests on pressure', () => {
    const t = paths(
      circuit(
        'P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-float, C1 cylinder:cylinder-lifting, T1 tank | P1.P R1.P V1.P | A: V1.A C1.A | B: V1.B C1.B | V1.T R1.T T1.T P1.S',
      ),
    );
    expect(t.actuator('C1', 'V1=0')).toBe('moved in by load');
    expect(t.actuator('C1', 'V1=a')).toBe('rests on pressure');
    expect(t.rests('C1', 'V1=a')).toEqual(['load']);
    expect(t.findings().map((finding) => finding.rule)).toContain('load-not-held');
  });

  test('a load on a closed centre is trapped under the piston (law)', () => {
    const t = new Asked(
      circuit(
        'P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder:cylinder-lifting, T1 tank | P1.P R1.P V1.P | A: V1.A C1.A | B: V1.B C1.B | V1.T R1.T T1.T P1.S',
      ),
      { pumps: 'stopped' },
    );
    expect(t.actuator('C1', 'V1=0')).toBe('held');
    expect(t.trapped('A', 'V1=0')).toContain('load');
    expect(t.trapped('B', 'V1=0')).not.toContain('load');
    // The lever towards "lower" lets the load down.
    expect(t.actuator('C1', 'V1=b')).toBe('moved in by load');
    expect(t.pump('V1=0')).toBe('stopped');
  });

  test('no relief and nowhere to go: dead-headed, always a danger', () => {
    const t = new Asked(
      circuit(
        'P1 fixed-pump, V1 directional-valve:valve-4/3-shut, C1 cylinder, T1 tank | P1.P V1.P | V1.A C1.A | V1.B C1.B | V1.T T1.T P1.S',
      ),
    );
    expect(t.pump('V1=0')).toBe('dead-headed');
    expect(t.findings().find((finding) => finding.rule === 'dead-headed-pump')?.level).toBe('danger');
  });
});

describe('throttles', () => {
  const through = (parts: string, lines: string): Asked =>
    paths(
      circuit(
        `P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder, T1 tank, ${parts} | ${lines}`,
      ),
    );

  test('bleed-off leaves it to the pressures', () => {
    const t = through('Q1 throttle', 'P1.P R1.P V1.P | V1.A C1.A Q1.A | V1.B C1.B | V1.T R1.T T1.T P1.S Q1.B');
    expect(t.rests('C1', 'V1=a')).toEqual(['bleed']);
    expect(t.pump('V1=a')).toBe('rests on pressure');
  });

  test('meter-in moves; what goes over the relief rests on pressure', () => {
    const t = through('Q1 throttle', 'P1.P R1.P V1.P | V1.A Q1.A | Q1.B C1.A | V1.B C1.B | V1.T R1.T T1.T P1.S');
    expect([t.actuator('C1', 'V1=a'), t.pump('V1=a')]).toEqual(['extends', 'rests on pressure']);
  });

  test('a shut throttle is no path', () => {
    const t = through(
      'Q1 throttle{shut=true}',
      'P1.P R1.P V1.P | V1.A C1.A | V1.B Q1.A | Q1.B C1.B | V1.T R1.T T1.T P1.S',
    );
    expect([t.actuator('C1', 'V1=a'), t.pump('V1=a')]).toEqual(['held', 'over relief']);
  });
});
