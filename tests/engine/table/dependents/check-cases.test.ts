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

describe('external pilot supply', () => {
  const circuitOf = (pilot: string): string =>
    `${SUPPLY}, V1 two-stage-valve:two-stage-4/3-bypass-external, ${CYLINDER}${pilot} | V1.A C1.A | V1.B C1.B`;

  test('a pump of its own shifts it whatever the main pump does', () => {
    const asked = new Asked(
      circuit(
        circuitOf(
          ', P2 fixed-pump{flow=5 L/min}, R2 relief-valve{setting=30 bar} | P1.P R1.P V1.P | P2.P R2.P V1.X | R1.T R2.T V1.T V1.Y T1.T',
        ),
      ),
    );
    expect(stands(asked, 'V1 main spool', 'V1=a')).toBe('a');
    expect(asked.actuator('C1', 'V1=a')).toBe('extends');
    expect(asked.explain('V1=a').dependents[0]?.steps[0]?.text).toContain('against 5.0 bar needed');
  });

  test('X without a line never shifts it, and that is said', () => {
    const asked = new Asked(circuit(circuitOf(' | P1.P R1.P V1.P | R1.T V1.T V1.Y T1.T')));
    expect(stands(asked, 'V1 main spool', 'V1=b')).toBe('0');
    expect(asked.explain('V1=b').dependents[0]?.steps[0]?.text).toBe(
      'V1 main spool stays at rest (0): pilot 0.0 bar against 5.0 bar needed.',
    );
    expect(asked.findings().map(({ rule }) => rule)).toContain('two-stage-no-pilot');
  });
});

describe('memory', () => {
  test('a detented pilot valve stands wherever it was left while no pilot acts', () => {
    const asked = new Asked(
      circuit(
        `${SUPPLY}, V1 directional-valve:valve-4/3-float, V2 pilot-valve:pilot-4/2-pilots-detent, ${CYLINDER} | P1.P R1.P V1.P V2.P | R1.T V1.T V2.T T1.T | V1.A V2.X | V1.B V2.Y | V2.A C1.A | V2.B C1.B`,
      ),
    );
    expect(stands(asked, 'V2', 'V1=a')).toBe('a');
    expect(stands(asked, 'V2', 'V1=b')).toBe('b');
    expect(stands(asked, 'V2', 'V1=0')).toBe('a or b');
    expect(asked.table.history(asked.row('V1=0'))).toBe(true);
    expect(asked.explain('V1=0').dependents[0]?.others).toEqual(['b']);
  });

  test('a pilot valve that feeds its own pilot holds itself', () => {
    const asked = new Asked(
      circuit(
        `${SUPPLY}, V1 directional-valve:valve-2/2-shut-button, V2 pilot-valve:pilot-2/2-shut, ${LOADED} | P1.P R1.P V1.P V2.P | R1.T T1.T | V1.A V2.A V2.X C1.A | C1.B T1.T`,
      ),
    );
    // It starts shut; held down, the button fills the pilot; let go, the valve could have stayed open by its own oil.
    expect(stands(asked, 'V2', 'V1=a')).toBe('a');
    expect(stands(asked, 'V2', 'V1=0')).toBe('0 or a');
    expect(asked.actuator('C1', 'V1=0')).not.toBe('extends');
  });
});

describe('roller valve', () => {
  const drawn = circuit(
    `${SUPPLY}, ${CYLINDER}, V1 directional-valve:valve-4/3-shut, V2 roller-valve:roller-3/2{actuator=C1;trips=out}, G1 single-acting-cylinder | P1.P R1.P V1.P V2.P | R1.T V1.T V2.T T1.T | V1.A C1.A | V1.B C1.B | V2.A G1.A`,
  );

  test('between the stops it is not tripped; at the outer stop it is', () => {
    const between = new Asked(drawn);
    expect(stands(between, 'V2', 'V1=0')).toBe('0');
    expect(between.explain('V1=0').dependents[0]?.steps[0]?.text).toBe(
      'V2 stays at rest (0): C1 is between its stops and does not trip it.',
    );
    const out = new Asked(drawn, { pumps: 'running', places: { C1: 'out' } });
    expect(stands(out, 'V2', 'V1=0')).toBe('a');
    expect(out.actuator('G1', 'V1=0')).toBe('extends');
    expect(out.table.data.dependentRests[0]).toBeUndefined();
  });

  test('what it gates is not called dead', () => {
    expect(
      new Asked(drawn).findings().filter(({ rule, title }) => rule === 'actuator-reach' && title.startsWith('Nothing')),
    ).toEqual([]);
  });

  test('a roller that nobody names an actuator for is found', () => {
    const nobody = {
      ...drawn,
      parts: drawn.parts.map((part) => (part.id === 'V2' ? { ...part, settings: {} } : part)),
    };
    expect(new Asked(nobody).findings().map(({ rule }) => rule)).toContain('roller-not-tripped');
  });
});

test('each verdict says by itself whether it holds for any values', () => {
  // C1 rests on the pilot pressure of V1; C2 is fed by a valve of its own and has nothing to do with it.
  const asked = new Asked(
    circuit(
      `${SUPPLY}, V1 two-stage-valve:two-stage-4/3-shut-coils, ${CYLINDER}, P2 fixed-pump, R2 relief-valve, V2 directional-valve:valve-4/3-shut, C2 double-rod-cylinder | P1.P R1.P V1.P | P2.P R2.P V2.P | R1.T R2.T V1.T V2.T T1.T | V1.A C1.A | V1.B C1.B | V2.A C2.A | V2.B C2.B`,
    ),
  );
  const row = asked.row('V1=a,V2=a');
  const { table } = asked;
  expect([table.actuatorOnValues(0, row), table.actuatorOnValues(1, row)]).toEqual([true, false]);
  const idle = asked.row('V1=0,V2=a');
  expect(table.actuatorOnValues(0, idle)).toBe(false);
});
