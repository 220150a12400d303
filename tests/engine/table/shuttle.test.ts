import { describe, expect, test } from 'vitest';
import type { Circuit } from '../../../src/circuit/model.ts';
import { circuit } from '../../notation.ts';
import { Asked } from '../../table-of.ts';

/**
 * A brake set by its spring and let go through a shuttle valve from either side of its motor (common practice): it
 * must come on by itself once both sides are let down, so the centre has to let both down.
 */
const winch = (centre: string): Circuit =>
  circuit(
    `P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-${centre}, M1 motor{load=60 N·m;loadSense=resisting}, H1 shuttle-valve, B1 single-acting-cylinder{return=spring}, T1 tank | P1.P R1.P V1.P | a: V1.A M1.A H1.X | b: V1.B M1.B H1.Y | brake: H1.A B1.A | V1.T R1.T M1.L T1.T P1.S`,
  );

describe('a brake behind a shuttle valve', () => {
  test('is let go by either side, and comes on again where the centre lets both down', () => {
    for (const options of [{ pressureRows: 0 }, { pressureRows: 100 }]) {
      const asked = new Asked(winch('float'), { pumps: 'running' }, options);
      // Whether the pressure beats the spring is for the pressures.
      const off = options.pressureRows === 0 ? 'rests on pressure' : 'extends';
      expect([asked.actuator('B1', 'V1=a'), asked.actuator('B1', 'V1=b')]).toEqual([off, off]);
      expect(asked.actuator('B1', 'V1=0')).toBe('moved in by spring');
      expect(asked.trapped('brake', 'V1=0')).toEqual([]);
      // The way back opens to the side that is let down only: the other one is not let out through it.
      expect(asked.line('a', 'V1=a')).toBe('fed');
      expect(asked.line('brake', 'V1=a')).toBe('fed');
    }
    const findings = new Asked(winch('float')).findings().map(({ rule }) => rule);
    expect(findings).not.toContain('unventable-line');
  });

  test('stays off where the centre shuts both sides in', () => {
    const asked = new Asked(winch('shut'));
    expect(asked.actuator('B1', 'V1=0')).not.toBe('moved in by spring');
    expect(asked.trapped('brake', 'V1=0')).toEqual(['load', 'left behind', 'heat']);
  });

  test('why it comes on names the way back', () => {
    const said = new Asked(winch('float')).explain('V1=0');
    const steps = said.actuators[1]?.steps ?? [];
    expect(steps.map(({ text }) => text).join(' ')).toContain('nothing pressing at its other inlet');
  });
});

test('a chain of shuttle valves hands on the highest pressure, and lets it down again (load sensing, common practice)', () => {
  const chain = circuit(
    `P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-float, V2 directional-valve:valve-4/3-float, V3 directional-valve:valve-4/3-float, C1 cylinder, C2 cylinder, C3 cylinder, H1 shuttle-valve, H2 shuttle-valve, B1 single-acting-cylinder{return=spring}, T1 tank | P1.P R1.P V1.P V2.P V3.P | V1.A C1.A H1.X | V2.A C2.A H1.Y | one: H1.A H2.X | V3.A C3.A H2.Y | sensed: H2.A B1.A | V1.B C1.B | V2.B C2.B | V3.B C3.B | V1.T V2.T V3.T R1.T T1.T P1.S`,
  );
  const asked = new Asked(chain, { pumps: 'running' }, { pressureRows: 0 });
  for (const state of ['V1=a', 'V2=a', 'V3=a']) expect([state, asked.line('sensed', state)]).toEqual([state, 'fed']);
  expect(asked.line('sensed', 'V1=0')).toBe('vented');
  expect(asked.line('sensed', 'V1=b V2=b V3=b')).toBe('vented');
});
