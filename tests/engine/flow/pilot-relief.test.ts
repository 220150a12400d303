import { describe, expect, test } from 'vitest';
import { circuit } from '../../notation.ts';
import { Asked } from '../../table-of.ts';
import { drawn } from './drawn.ts';
import type { Drawn } from './drawn.ts';
import { near } from './rig.ts';

/**
 * Pilot-operated relief valve, 200 bar, 5 bar when vented, no rise: a bore feeds the pilot chamber X, whose pilot
 * stage lets at most the setting less the spring of the main stage stand there (common practice; numbers by law).
 */
const RELIEF = 'R1 pilot-relief-valve{setting=200 bar;vent=5 bar;fullFlowRise=0.001 bar;ratedFlow=60 L/min}';
const vented = (more: string, lines: string, position = ''): Drawn =>
  drawn(`P1 fixed-pump{flow=30 L/min}, ${RELIEF}, T1 tank${more} | P: P1.P R1.P${lines} | T: P1.S R1.T T1.T`, position);

describe('pilot-operated relief valve', () => {
  test('X plugged: all flow goes out at the setting', () => {
    const s = vented(', K1 plug', ' | X: R1.X K1.A');
    near(s.bar('P'), 200);
    near(s.bar('X'), 195);
    near(s.relief('R1') + s.relief('R1 pilot'), 30);
  });

  test('X left open counts as plugged', () => near(vented('', '').bar('P'), 200));

  test('X to tank: opens at its spring', () => {
    const s = vented(
      ', V1 shut-off-valve{ratedFlow=100 L/min;ratedDrop=0.001 bar}',
      ' | X: R1.X V1.A | V1.B T1.T',
      'open',
    );
    near(s.bar('P'), 5);
    expect(s.bar('X')).toBeLessThan(0.001);
  });

  test('a relief valve of 40 bar on X limits P to that and the spring', () => {
    const s = vented(', R2 relief-valve{setting=40 bar;fullFlowRise=0 bar}', ' | X: R1.X R2.P | R2.T T1.T');
    near(s.bar('P'), 45);
    expect(s.relief('R1 pilot')).toBe(0);
  });

  test('below its setting it is shut', () => {
    const s = vented(
      ', K1 plug, C1 cylinder{bore=63 mm;rod=45 mm;friction=0 kN;load=50 kN;loadSense=resisting}, T2 tank',
      ' C1.A | X: R1.X K1.A | C1.B T2.T',
    );
    near(s.bar('P'), 160.4);
    expect(s.relief('R1')).toBe(0);
  });
});

describe('its verdicts', () => {
  const rig = circuit(
    `P1 fixed-pump{flow=30 L/min}, ${RELIEF}, T1 tank, S1 shut-off-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder{load=5 kN;loadSense=resisting} | P: P1.P R1.P V1.P | T: P1.S R1.T T1.T S1.B V1.T | X: R1.X S1.A | A: V1.A C1.A | B: V1.B C1.B`,
  );
  const asked = new Asked(rig);

  test('unloaded while X is open to tank, whatever the lever; over relief or working while it is shut', () => {
    for (const lever of ['a', '0', 'b']) expect(asked.pump(`S1=open V1=${lever}`)).toBe('unloaded');
    expect(asked.pump('S1=shut V1=0')).toBe('over relief');
    expect(asked.pump('S1=shut V1=a')).toBe('working');
  });

  test('nothing moves against a load of 25 bar while the pump stands at 5', () => {
    expect(asked.actuator('C1', 'S1=open V1=a')).toBe('stalled');
    expect(asked.actuator('C1', 'S1=shut V1=a')).toBe('extends');
  });

  test('the reason names the vented relief valve', () => {
    const said = asked.explain('S1=open V1=0').pumps[0];
    expect(said?.steps.map((step) => step.text).join(' ')).toContain('R1 is vented: its pilot line X is let down');
  });

  test('open paths alone find the pump over relief where nothing vents it, and leave the rest to the pressures', () => {
    const paths = new Asked(rig, { pumps: 'running' }, { pressureRows: 0 });
    expect(paths.pump('S1=shut V1=0')).toBe('over relief');
    expect(paths.pump('S1=open V1=0')).toBe('rests on pressure');
    expect(paths.line('P', 'S1=open V1=0')).toBe('flows to tank');
  });
});
