import { expect, test } from 'vitest';
import { circuit } from '../../notation.ts';
import { Asked } from '../../table-of.ts';

/** A load behind a shut valve, with a relief valve on its line (law: p = F/A; held up to the force at which a valve lets go). */
const rig = (load: number): Asked =>
  new Asked(
    circuit(
      `P1 fixed-pump, R1 relief-valve, T1 tank, R2 relief-valve{setting=100 bar}, V1 directional-valve:valve-4/3-bypass, C1 cylinder{bore=63 mm;rod=45 mm;load=${load} kN;loadSense=pushes in} | P1.P R1.P V1.P | A: V1.A C1.A R2.P | B: V1.B C1.B | P1.S T1.T R1.T R2.T V1.T`,
    ),
  );

test('64 bar of load behind a relief valve of 100 bar is held; 128 bar gives way over it', () => {
  expect(rig(20).actuator('C1', 'V1=0')).toBe('held');
  const heavy = rig(40);
  expect(heavy.actuator('C1', 'V1=0')).toBe('moved in by load');
  expect(heavy.notes('C1', 'V1=0')).toContain('void forms');
  const said = heavy.explain('V1=0').actuators[0];
  expect(said?.verdict).toBe('moved in by load');
  expect(said?.steps.map((step) => step.text).join(' ')).toContain('Its load presses harder than R2 allows');
});
