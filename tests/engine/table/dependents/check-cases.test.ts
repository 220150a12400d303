import { describe, expect, test } from 'vitest';
import { circuit } from '../../../notation.ts';
import { Asked } from '../../../table-of.ts';

/** What a dependent valve does in a row: its position, and those that other settings would give it. */
function stands(asked: Asked, label: string, state: string): string {
  const d = asked.table.data.dependents.findIndex((valve) => valve.label === label);
  const positions = asked.table.data.dependents[d]?.positions ?? [];
  const row = asked.row(state);
  if (asked.table.hunts(row)) return 'hunts';
  const others = asked.table.dependentOthers(d, row).map((p) => positions[p]);
  return [positions[asked.table.dependent(d, row)], ...others].join(' or ');
}

const SUPPLY = 'P1 fixed-pump{flow=40 L/min}, R1 relief-valve{setting=100 bar}, T1 tank';
const CYLINDER = 'C1 cylinder{bore=50 mm;rod=36 mm}';
const LOADED = 'C1 cylinder{bore=50 mm;rod=36 mm;load=5 kN;loadSense=resisting}';

describe('two-stage valve with a bypass centre (G20, practice: the pilot needs 4 to 6 bar)', () => {
  test('internal pilot without a check in the tank line: coil a does not shift it, the unloaded pump gives only the loss of the valve', () => {
    const asked = new Asked(
      circuit(
        `${SUPPLY}, V1 two-stage-valve:two-stage-4/3-bypass-coils, ${CYLINDER} | P1.P R1.P V1.P | R1.T V1.T T1.T | V1.A C1.A | V1.B C1.B`,
      ),
    );
    expect(asked.table.count).toBe(3);
    expect(stands(asked, 'V1 main spool', 'V1=0')).toBe('0');
    // An idle cylinder takes no more than the loss of the spool either, so nothing holds it shifted.
    expect(stands(asked, 'V1 main spool', 'V1=a')).toBe('0');
    expect(asked.actuator('C1', 'V1=a')).toBe('held');
    expect(asked.pump('V1=a')).toBe('unloaded');
  });

  test('with a load on the cylinder it would stay shifted once it is, so the row depends on what came before', () => {
    const asked = new Asked(
      circuit(
        `${SUPPLY}, V1 two-stage-valve:two-stage-4/3-bypass-coils, ${LOADED} | P1.P R1.P V1.P | R1.T V1.T T1.T | V1.A C1.A | V1.B C1.B`,
      ),
    );
    expect(stands(asked, 'V1 main spool', 'V1=a')).toBe('0 or a');
    expect(asked.actuator('C1', 'V1=a')).toBe('held');
  });

  const checked = (drain: string, lines: string, cylinder = LOADED): Asked =>
    new Asked(
      circuit(
        `${SUPPLY}, CV1 check-valve{cracking=5 bar}, V1 two-stage-valve:two-stage-4/3-bypass-coils{pilotDrain=${drain}}, ${cylinder} | P1.P R1.P V1.P | V1.T CV1.A | CV1.B R1.T T1.T${lines} | V1.A C1.A | V1.B C1.B`,
      ),
    );

  test('with a 5 bar check in the tank line and the pilot drained past it, it shifts', () => {
    const asked = checked('external', ' V1.Y');
    expect(stands(asked, 'V1 main spool', 'V1=a')).toBe('a');
    expect(asked.actuator('C1', 'V1=a')).toBe('extends');
    expect(stands(asked, 'V1 main spool', 'V1=b')).toBe('b');
    expect(asked.actuator('C1', 'V1=b')).toBe('retracts');
    expect(stands(asked, 'V1 main spool', 'V1=0')).toBe('0');
  });

  test('an internal drain stands at the pressure of the same tank line, and the check is of no help', () => {
    expect(stands(checked('internal', '', CYLINDER), 'V1 main spool', 'V1=a')).toBe('0');
  });

  test('an idle cylinder with half the area on the rod side turns 5 bar there into less than 5 bar at P: the valve hunts', () => {
    // Force balance: p·A1 = 5 bar·A2 and A2 = 0.48·A1 (law).
    const asked = checked('external', ' V1.Y', CYLINDER);
    expect(stands(asked, 'V1 main spool', 'V1=a')).toBe('hunts');
    expect(asked.actuator('C1', 'V1=a')).toBe('undetermined');
    expect(asked.rests('C1', 'V1=a')).toContain('dependent valve');
    expect(asked.pump('V1=a')).toBe('rests on pressure');
    expect(stands(asked, 'V1 main spool', 'V1=b')).toBe('b');
  });
});
