import { expect, test } from 'vitest';
import { circuit } from '../../notation.ts';
import { Asked } from '../../table-of.ts';

/** Series circuits whose last part stands straight on the tank line, without a valve between (FM 5-499: in series all move). */
const paths = (notation: string): Asked =>
  new Asked(circuit(notation), { pumps: 'running' }, { pressureRows: 0 });

test('a cylinder and a motor in series move, though the motor stands straight on the tank line', () => {
  const asked = paths(
    'P1 fixed-pump, R1 relief-valve, T1 tank, C1 cylinder, M1 motor | P1.P R1.P C1.A | C1.B M1.A | P1.S R1.T T1.T M1.B',
  );
  expect(asked.actuator('C1', '')).toBe('extends');
  expect(asked.actuator('M1', '')).toBe('turns A→B');
  expect(asked.pump('')).toBe('working');
});

test('a load lets itself down through a motor that stands straight on the tank line, if it can', () => {
  const asked = paths(
    'P1 fixed-pump, R1 relief-valve, T1 tank, C1 cylinder{load=20 kN;loadSense=pushes in}, M1 motor | P1.P R1.P | C1.A M1.A | P1.S R1.T T1.T M1.B C1.B',
  );
  expect(asked.actuator('C1', '')).toBe('rests on pressure');
});
