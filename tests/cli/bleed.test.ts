import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { passingFolder, spooltable, writeRig } from './spooltable.ts';

const example = (name: string): string => fileURLToPath(new URL(`../../examples/${name}.spool.json`, import.meta.url));

/** Closed centre, 20 kN on a 63 mm cap, a gauge on the cap side. */
const LIFT =
  'P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder{bore=63 mm;rod=45 mm;load=20 kN;loadSense=pushes in}, T1 tank, PG1 gauge' +
  ' | P: P1.P R1.P V1.P | A: V1.A C1.A PG1.M | B: V1.B C1.B | T: V1.T R1.T T1.T P1.S';

let folder: ReturnType<typeof passingFolder>;
beforeEach(() => {
  folder = passingFolder();
});
afterEach(() => folder.remove());

const oneLine = (text: string): void => expect(text).toMatch(/^spooltable: [^\n]+\n$/);

describe('bleed', () => {
  test('is a sheet to take along: pressure, cautions before moves, boxes, where to measure', async () => {
    const { code, out, err } = await spooltable(['bleed', writeRig(folder.path, LIFT), '--state', 'V1=0']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    // 20 000 N / (π/4 · 0.063² m²) = 64.2 bar (law: F/A).
    expect(out).toMatch(/^ {2}A \(measure at PG1\)\n {4}Pressed on by the load of C1: 64\.2 bar \(F\/A\)\.$/m);
    expect(out).toMatch(/^ {2}B \(no gauge or test point is drawn on it\)$/m);
    const lines = out.split('\n');
    const move = lines.indexOf(
      '[ ] 1. Move V1 from 0 to b. Keep it there to the end of the list: let go, it returns to 0.',
    );
    const caution = lines.findIndex((line) => line.includes('C1 comes down: the load (20 kN) moves it in'));
    expect(caution).toBeGreaterThan(0);
    expect(caution).toBeLessThan(move);
    expect(lines.filter((line) => line.startsWith('[ ]'))).toHaveLength(1);
    expect(lines[move + 2]).toBe('    Still under pressure: none');
  });

  test('begins and ends with the cautions (29 CFR 1910.147(d); published safety alerts)', async () => {
    const { out } = await spooltable(['bleed', writeRig(folder.path, LIFT)]);
    const first = out.indexOf('[ ] 1.');
    const order = ['know the energy', 'shut down', 'isolate', 'lock', 'relieve or restrain', 'verify'].map((word) =>
      out.indexOf(word),
    );
    expect(order).toEqual([...order].sort((a, b) => a - b));
    expect(Math.min(...order)).toBeGreaterThan(0);
    expect(Math.max(...order)).toBeLessThan(first);
    expect(out.indexOf('centre is not an isolating device')).toBeLessThan(first);
    expect(out.indexOf('Cracking a fitting is not an accepted way')).toBeGreaterThan(first);
    expect(out.indexOf('local codes and qualified people decide')).toBeGreaterThan(first);
    expect(out).toContain('Not given, taken at rest: V1 0');
  });

  test('exit code 1 where no lever lets it down, with what is usually added', async () => {
    const { code, out, err } = await spooltable(['bleed', example('panel-clamp'), '--state', 'V1=clamp']);
    expect({ code, err }).toEqual({ code: 1, err: '' });
    expect(out).toContain(
      'No lever position opens these to tank; they stay under pressure:\n  clamp side (measure at M1)\n',
    );
    expect(out).toContain('Usually added: a bleed valve by hand to tank between the lock check and the actuator');
    expect(out).toContain('With a bleed valve to tank on clamp side, L1.C2, opened first and left open:');
    expect(out).not.toContain('[ ]');
  });

  test('nothing under pressure is said too', async () => {
    const { code, out } = await spooltable(['bleed', example('grain-tipper'), '--state', 'LOWER=lower']);
    expect(code).toBe(0);
    expect(out).toContain('Caution when the pumps stop: BODY comes down');
    expect(out).toContain('No drawn line holds pressure once the pumps have stopped in this state. Verify it.');
  });

  test('writes JSON with the same steps', async () => {
    const rig = writeRig(folder.path, LIFT);
    const { code, out } = await spooltable(['bleed', rig, '--state', 'V1=0', '--format', 'json']);
    expect(code).toBe(0);
    expect(JSON.parse(out)).toMatchObject({
      row: 2,
      state: { V1: '0' },
      assumed: {},
      underPressure: [
        { line: 'A', measure: ['PG1'] },
        { line: 'B', measure: [] },
      ],
      steps: [
        {
          step: 1,
          valve: 'V1',
          from: '0',
          to: 'b',
          row: 3,
          springsTo: '0',
          cautions: [{ kind: 'drop' }, { kind: 'leak' }],
          vents: ['A', 'B'],
          underPressure: [],
        },
      ],
      left: [],
      proven: true,
    });
  });

  test('an example of every kind can be planned from every row', async () => {
    const { out } = await spooltable(['table', example('infeed-series'), '--format', 'json']);
    for (const { row, state } of JSON.parse(out).rows as { row: number; state: Record<string, string> }[]) {
      const given = Object.entries(state).map(([valve, position]) => `${valve}=${position}`);
      const answer = await spooltable([
        'bleed',
        example('infeed-series'),
        '--format',
        'json',
        '--state',
        given.join(','),
      ]);
      expect(JSON.parse(answer.out)).toMatchObject({ row, state, left: [] });
    }
  });

  test('writes into a file', async () => {
    const file = join(folder.path, 'list.txt');
    const rig = writeRig(folder.path, LIFT);
    expect(await spooltable(['bleed', rig, '--out', file])).toEqual({ code: 0, out: '', err: '' });
    expect(readFileSync(file, 'utf8')).toBe((await spooltable(['bleed', rig])).out);
  });
});

describe('trapped', () => {
  test('each line once, its reasons with the rows and the moves', async () => {
    const rig = writeRig(folder.path, LIFT);
    const { code, out, err } = await spooltable(['trapped', rig]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    // Closed centre: A is left behind from a, B from b (check case G1, practice).
    expect(out).toMatch(/^A \(measure at PG1\)$/m);
    expect(out).toContain('load: 1 of 3 rows\n    row 2: Pressed on at rest by the load of C1: 64 bar (F/A).');
    expect(out).toContain('row 2: Under pressure before this move of one lever: V1 from a to 0 (row 1), at up to');
    expect(out).toContain('row 2: Under pressure before this move of one lever: V1 from b to 0 (row 3), at up to');
    expect(out.match(/^A \(/gm)).toHaveLength(1);
    expect(out).toContain('qualified people');
  });

  test('counts the rows as the table does', async () => {
    const file = example('stacker-bank');
    const table = JSON.parse((await spooltable(['table', file, '--format', 'json', '--pumps', 'stopped'])).out);
    const { out } = await spooltable(['trapped', file, '--format', 'json', '--pumps', 'stopped']);
    const folded = JSON.parse(out);
    const expected = new Map<string, number>();
    for (const row of table.rows as { trapped: { line: string; reasons: string[] }[] }[]) {
      for (const { line, reasons } of row.trapped) {
        for (const kind of reasons) expected.set(`${line}: ${kind}`, (expected.get(`${line}: ${kind}`) ?? 0) + 1);
      }
    }
    const found = new Map<string, number>();
    for (const { line, reasons } of folded.lines as { line: string; reasons: { kind: string; rowCount: number }[] }[]) {
      for (const { kind, rowCount } of reasons) found.set(`${line}: ${kind}`, rowCount);
    }
    expect(expected.size).toBeGreaterThan(5);
    expect(found).toEqual(expected);
    for (const { reasons } of folded.lines as { reasons: { examples: { text: string }[] }[] }[]) {
      for (const { examples } of reasons) for (const { text } of examples) expect(text).not.toBe('');
    }
  });
});

describe('wrong input is told in one line, with exit code 2', () => {
  test.each([
    [['bleed'], /No circuit file/],
    [['bleed', 'a', '--pumps', 'stopped'], /--pumps.*See spooltable bleed --help/],
    [['bleed', 'a', '--format', 'csv'], /text or json/],
    [['trapped', 'a', '--state', 'V1=a'], /--state/],
    [['trapped', 'a', '--pumps', 'off'], /running or stopped/],
    [['trapped', 'none.spool.json'], /no such file/],
  ])('%j', async (args, said) => {
    const { code, out, err } = await spooltable(args, { cwd: folder.path });
    expect({ code, out }).toEqual({ code: 2, out: '' });
    oneLine(err);
    expect(err).toMatch(said);
  });

  test('an unknown position, and no circuit', async () => {
    const rig = writeRig(folder.path, LIFT);
    const unknown = await spooltable(['bleed', rig, '--state', 'V1=z']);
    expect(unknown.code).toBe(2);
    expect(unknown.err).toMatch(/V1 has no position "z".*a, 0, b/);
    writeFileSync(rig, '{}');
    for (const command of ['bleed', 'trapped']) {
      const { code, out, err } = await spooltable([command, rig]);
      expect({ code, out }).toEqual({ code: 2, out: '' });
      oneLine(err);
    }
  });

  test('help', async () => {
    for (const command of ['bleed', 'trapped']) {
      const { code, out } = await spooltable([command, '--help']);
      expect(code).toBe(0);
      expect(out).toMatch(new RegExp(`^Usage: spooltable ${command} `));
    }
    expect((await spooltable(['--help'])).out).toMatch(/ {2}trapped FILE.*\n {2}bleed FILE/);
  });
});
