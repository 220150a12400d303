import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { passingFolder, spooltable, writeRig } from './spooltable.ts';

const example = (name: string): string => fileURLToPath(new URL(`../../examples/${name}.spool.json`, import.meta.url));

/** Tandem centre by coils, 20 kN on a 63 mm cap. */
const LIFT =
  'P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-shut-coils, C1 cylinder{bore=63 mm;rod=45 mm;load=20 kN;loadSense=pushes in}, T1 tank' +
  ' | P: P1.P R1.P V1.P | A: V1.A C1.A | B: V1.B C1.B | T: V1.T R1.T T1.T P1.S';

let folder: ReturnType<typeof passingFolder>;
beforeEach(() => {
  folder = passingFolder();
});
afterEach(() => folder.remove());

describe('moves', () => {
  test('each move with what it changes, and both bounds where the crossover is not drawn', async () => {
    const { code, out, err } = await spooltable(['moves', writeRig(folder.path, LIFT)]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toContain('Moves of one lever from row 2: V1 0; pumps running');
    expect(out).toContain('Not given, taken at rest: V1 0');
    expect(out).toMatch(/^V1: 0 → a \(row 1\)\. Let go, it returns to 0\.\n {4}C1 extends \(held before\)\.$/m);
    // All joined: the load side is open to tank for a moment (practice).
    expect(out).toMatch(
      /^ {4}On the way, between 0 and a, if all ways are joined \(the crossover is not drawn\): C1 dips:/m,
    );
    expect(out).toContain('It belongs to the move, not to a state.');
  });

  test('writes JSON', async () => {
    const { code, out } = await spooltable([
      'moves',
      writeRig(folder.path, LIFT),
      '--state',
      'V1=b',
      '--format',
      'json',
    ]);
    expect(code).toBe(0);
    const { row, moves } = JSON.parse(out) as { row: number; moves: { to: string; onTheWay: { kind: string }[] }[] };
    expect(row).toBe(3);
    expect(moves.map(({ to }) => to)).toEqual(['a', '0']);
    expect(moves[0]?.onTheWay.map(({ kind }) => kind)).toContain('crossing');
  });

  test('the pressures are in the units asked for', async () => {
    const { out } = await spooltable(['moves', writeRig(folder.path, LIFT), '--state', 'V1=a', '--units', 'us']);
    expect(out).toMatch(/A is shut in with pressure, up to [\d,.]+ psi/);
  });
});

describe('trapped --line', () => {
  test('the fewest moves that open it to tank', async () => {
    const args = ['trapped', writeRig(folder.path, LIFT), '--line', 'A', '--pumps', 'stopped'];
    const { code, out, err } = await spooltable(args);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toContain('One move opens A to tank; no shorter list does.');
    expect(out).toMatch(/^1\. V1: 0 → b \(row 3\)/m);
    expect(out).toContain('Caution: C1 is moved in by load (held before).');
    expect(out).toContain('qualified people');
  });

  test('exit code 1 when no combination does, 2 for a line that is not there', async () => {
    const rig = writeRig(folder.path, LIFT);
    expect(await spooltable(['trapped', rig, '--line', 'P'])).toMatchObject({ code: 1 });
    const wrong = await spooltable(['trapped', rig, '--line', 'Q']);
    expect(wrong).toMatchObject({ code: 2, out: '' });
    expect(wrong.err).toContain('There is no line "Q". Use one of P, T, A, B.');
    expect(await spooltable(['trapped', rig, '--state', 'V1=a'])).toMatchObject({ code: 2 });
  });

  test('writes JSON', async () => {
    const { out } = await spooltable(['trapped', writeRig(folder.path, LIFT), '--line', 'A', '--format', 'json']);
    expect(JSON.parse(out)).toMatchObject({ line: 'A', outcome: 'moves', steps: [{ valve: 'V1', to: 'b', row: 3 }] });
  });
});

describe('powerloss', () => {
  test('a closed centre holds the load whatever goes; the moving load stops (practice)', async () => {
    const { code, out, err } = await spooltable(['powerloss', writeRig(folder.path, LIFT), '--state', 'V1=a']);
    expect({ code, err }).toEqual({ code: 1, err: '' });
    expect(out).toContain('Springs take back: V1 from a to 0.');
    expect(out).toContain('Coils off, pumps running on (row 2):\n  C1: holds (extends before)\n');
    expect(out).toContain('Coils off, pumps stopped (row 2):\n  C1: holds (extends before)\n');
    // The open valve lets the load down through the leakage of the stopped pump.
    expect(out).toContain('Pumps stopped, coils on:\n  C1: the load moves it: moved in by load (extends before)\n');
    expect(out).toContain('Caution: C1 comes down');
    expect(out).toContain('qualified people');
  });

  test('nothing moves, nothing to do: exit code 0; and JSON', async () => {
    const rig = writeRig(folder.path, LIFT);
    const { code, out } = await spooltable(['powerloss', rig, '--format', 'json']);
    expect(code).toBe(0);
    expect(JSON.parse(out)).toMatchObject({
      row: 2,
      returned: [],
      coilsOff: { row: 2, actuators: [{ actuator: 'C1', verdict: 'held', comes: 'holds' }] },
      pumpsStopped: { row: 2, underPressure: expect.arrayContaining(['A']) },
    });
  });

  test('every example from rest', async () => {
    for (const name of ['grain-tipper', 'panel-clamp', 'stage-lift'])
      expect((await spooltable(['powerloss', example(name)])).out).toContain('Pumps stopped, coils on:');
  });
});

describe('trapped on a panel too large to list', () => {
  /** One pump, sections side by side, a load on the first cylinder. */
  const panel = (sections: number): string => {
    const ids = Array.from({ length: sections }, (_, i) => i + 1);
    const parts = ids.map(
      (i) =>
        `V${i} directional-valve:valve-4/3-shut, C${i} cylinder${i === 1 ? '{load=20 kN;loadSense=pushes in}' : ''}`,
    );
    const lines = ids.map((i) => `A${i}: V${i}.A C${i}.A | B${i}: V${i}.B C${i}.B`);
    const all = (port: string): string => ids.map((i) => `V${i}.${port}`).join(' ');
    return `P1 fixed-pump, R1 relief-valve, T1 tank, ${parts.join(', ')} | P: P1.P R1.P ${all('P')} | T: R1.T P1.S T1.T ${all('T')} | ${lines.join(' | ')}`;
  };

  test('exact counts over 3⁴⁰ combinations', async () => {
    const { code, out, err } = await spooltable(['trapped', writeRig(folder.path, panel(40)), '--format', 'json']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    const found = JSON.parse(out) as {
      combinations: string;
      lines: { line: string; reasons: { kind: string; combinations: string }[] }[];
    };
    expect(found.combinations).toBe(String(3n ** 40n));
    // A1 is cut off in the centre of V1 only, whatever the 39 others do.
    const first = found.lines.find(({ line }) => line === 'A1');
    expect(first?.reasons.map(({ kind, combinations }) => [kind, combinations])).toEqual([
      ['load', String(3n ** 39n)],
      ['left behind', String(3n ** 39n)],
      ['heat', String(3n ** 39n)],
    ]);
  });

  test('in words, with a combination for each reason', async () => {
    const { out } = await spooltable(['trapped', writeRig(folder.path, panel(15))]);
    expect(out).toContain('Trapped pressure over 14,348,907 combinations, pumps running; open paths alone');
    expect(out).toMatch(
      /^ {2}left behind: 4,782,969 of 14,348,907\n {4}with V1 0: Under pressure before .* V1 from a to 0/m,
    );
    expect(out).toMatch(/^ {2}load: 4,782,969 of 14,348,907\n {4}with V1 0: Pressed on at rest by the load of C1/m);
    expect(out).toContain('qualified people');
  });
});
