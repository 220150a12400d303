import { spawn } from 'node:child_process';
import {
  chmodSync,
  existsSync,
  mkdirSync,
  readFileSync,
  readdirSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import manifest from '../../package.json' with { type: 'json' };
import { passingFolder, spooltable, writeRig } from './spooltable.ts';

let folder: ReturnType<typeof passingFolder>;
let rig: string;
beforeEach(() => {
  folder = passingFolder();
  rig = writeRig(folder.path);
});
afterEach(() => folder.remove());

const oneLine = (text: string): void => expect(text).toMatch(/^spooltable: [^\n]+\n$/);

describe('table', () => {
  test('writes text, with a row for each of 3 × 3 positions', async () => {
    const { code, out, err } = await spooltable(['table', rig]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out.split('\n').filter((line) => /^ +\d+[ *] /.test(line))).toHaveLength(9);
    expect(out).toContain('Row  V1  V2');
  });

  test('writes JSON with the verdicts of the engine', async () => {
    const { code, out } = await spooltable(['table', rig, '--format', 'json']);
    expect(code).toBe(0);
    const report = JSON.parse(out);
    expect(report.rows.map((row: { row: number }) => row.row)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9]);
    // Both at rest: V1 shuts its cylinder in, V2 lets the pump free to tank (check case G2: tandem centre; practice).
    expect(report.rows[4]).toMatchObject({
      state: { V1: '0', V2: '0' },
      actuators: { C1: 'held', C2: 'held' },
      pumps: { P1: 'unloaded' },
    });
    // V2 to a with V1 shut: only C2 gets the flow.
    expect(report.rows[3]).toMatchObject({ state: { V1: '0', V2: 'a' }, actuators: { C1: 'held', C2: 'extends' } });
  });

  test('equal rivals for one flow stay open, and say why', async () => {
    // Check case F15: two equal cylinders with equal loads on one pump; the split is not decided by the circuit (law).
    const { out } = await spooltable(['table', rig, '--format', 'json']);
    const [first] = JSON.parse(out).rows;
    expect(first).toMatchObject({ state: { V1: 'a', V2: 'a' }, actuators: { C1: 'undetermined', C2: 'undetermined' } });
    expect(first.rests.C1.reasons).toContain('rivals');
    expect(first.valued).toBe(true);
  });

  test('pumps stopped is another table', async () => {
    const { out } = await spooltable(['table', rig, '--format', 'json', '--pumps', 'stopped']);
    const report = JSON.parse(out);
    expect(report.conditions).toEqual({ pumps: 'stopped' });
    expect(new Set(report.rows.map((row: { pumps: { P1: string } }) => row.pumps.P1))).toEqual(new Set(['stopped']));
  });

  test('writes CSV and Markdown', async () => {
    const csv = await spooltable(['table', rig, '--format', 'csv']);
    expect(csv.out.split('\r\n')).toHaveLength(11);
    const markdown = await spooltable(['table', rig, '--format', 'markdown']);
    expect(markdown.out.split('\n').filter((line) => line.startsWith('|'))).toHaveLength(9 + 2);
  });

  test('reads standard input', async () => {
    const { code, out } = await spooltable(['table', '-', '--format', 'csv'], { input: readFileSync(rig) });
    expect(code).toBe(0);
    expect(out).toBe((await spooltable(['table', rig, '--format', 'csv'])).out);
  });

  test('a reader that stops early is no fault', async () => {
    const notation = (n: number): string => {
      const ids = Array.from({ length: n }, (_, i) => i + 1);
      const parts = ids.map((i) => `V${i} directional-valve:valve-4/3-shut, C${i} cylinder`).join(', ');
      const lines = ids.map((i) => `V${i}.A C${i}.A | V${i}.B C${i}.B`).join(' | ');
      const all = (port: string): string => ids.map((i) => `V${i}.${port}`).join(' ');
      return `P1 fixed-pump, T1 tank, R1 relief-valve, ${parts} | P1.P R1.P ${all('P')} | R1.T T1.T P1.S ${all('T')} | ${lines}`;
    };
    const big = writeRig(folder.path, notation(8));
    const bin = fileURLToPath(new URL('../../src/cli/bin.mjs', import.meta.url));
    const child = spawn(process.execPath, [bin, 'table', big, '--format', 'csv'], {
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    let err = '';
    child.stderr.on('data', (chunk: Buffer) => (err += chunk.toString()));
    child.stdout.once('data', () => child.stdout.destroy());
    const code = await new Promise((resolve) => child.on('close', resolve));
    expect({ code, err }).toEqual({ code: 0, err: '' });
  });
});

describe('--out', () => {
  test('writes the same as the screen would get', async () => {
    const file = join(folder.path, 'table.csv');
    const { code, out } = await spooltable(['table', rig, '--format', 'csv', '--out', file]);
    expect({ code, out }).toEqual({ code: 0, out: '' });
    expect(readFileSync(file, 'utf8')).toBe((await spooltable(['table', rig, '--format', 'csv'])).out);
    expect(readdirSync(folder.path).sort()).toEqual(['rig.spool.json', 'table.csv']);
  });

  test('keeps the rights of a file that it replaces, and follows a link', async () => {
    const file = join(folder.path, 'real.txt');
    const link = join(folder.path, 'link.txt');
    writeFileSync(file, 'old');
    chmodSync(file, 0o640);
    symlinkSync(file, link);
    expect((await spooltable(['table', rig, '--out', link])).code).toBe(0);
    expect(readFileSync(file, 'utf8')).toContain('State table');
    expect(statSync(file).mode & 0o777).toBe(0o640);
  });

  test('leaves the old file when the circuit is wrong', async () => {
    const file = join(folder.path, 'table.txt');
    writeFileSync(file, 'old');
    writeFileSync(rig, '{}');
    expect((await spooltable(['table', rig, '--out', file])).code).toBe(2);
    expect(readFileSync(file, 'utf8')).toBe('old');
    expect(readdirSync(folder.path).sort()).toEqual(['rig.spool.json', 'table.txt']);
  });

  test('refuses a folder, a missing folder and the circuit itself', async () => {
    mkdirSync(join(folder.path, 'sub'));
    const before = readFileSync(rig, 'utf8');
    for (const [out, said] of [
      [join(folder.path, 'sub'), 'This is a folder'],
      [join(folder.path, 'none', 'x.txt'), 'folder does not exist'],
      [rig, 'circuit file itself'],
    ] as const) {
      const { code, err } = await spooltable(['table', rig, '--out', out]);
      expect(code).toBe(2);
      oneLine(err);
      expect(err).toContain(said);
    }
    expect(readFileSync(rig, 'utf8')).toBe(before);
    expect(existsSync(join(folder.path, 'none'))).toBe(false);
  });
});

describe('explain', () => {
  test('says one state, and what was taken at rest', async () => {
    const { code, out } = await spooltable(['explain', rig, '--state', 'V2=a']);
    expect(code).toBe(0);
    expect(out).toContain('Row 4 of 9, pumps running: V1 0, V2 a');
    expect(out).toContain('Not given, taken at rest: V1 0');
    expect(out).toMatch(/^C2: extends\n {2}1\. /m);
  });

  test('writes JSON', async () => {
    const { out } = await spooltable(['explain', rig, '--state', 'V1=0,V2=0', '--format', 'json']);
    const answer = JSON.parse(out);
    expect(answer).toMatchObject({
      row: 5,
      assumed: {},
      state: { V1: '0', V2: '0' },
      actuators: { C1: { verdict: 'held' } },
    });
    expect(answer.actuators.C1.steps.length).toBeGreaterThan(0);
  });

  test.each([
    ['V9=a', /no valve "V9".*V1, V2/],
    ['V1=z', /V1 has no position "z".*a, 0, b/],
    ['V1', /not written as VALVE=POSITION/],
    ['V1=a,V1=b', /given twice/],
    ['V9=a,V8=b', /and 1 more/],
  ])('refuses --state %s', async (state, said) => {
    const { code, out, err } = await spooltable(['explain', rig, '--state', state]);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    oneLine(err);
    expect(err).toMatch(said);
  });
});

describe('wrong input is told in one line, with exit code 2', () => {
  test.each<[string, string | Buffer, RegExp]>([
    ['no JSON', '{ "format": ', /rig\.spool\.json: /],
    ['another file', '{"hello": 1}', /rig\.spool\.json: /],
    ['not text', Buffer.from([0xff, 0xfe, 0x00, 0x41]), /not UTF-8/],
    [
      'an unknown kind',
      '{"format":"spooltable-circuit","version":1,"name":"x","parts":[{"id":"A","kind":"pmup"}],"connections":[]}',
      /parts\[0\]\.kind.*pmup/,
    ],
  ])('%s', async (_, text, said) => {
    writeFileSync(rig, text);
    const { code, out, err } = await spooltable(['table', rig]);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    oneLine(err);
    expect(err).toMatch(said);
  });

  test('no such file, and a folder', async () => {
    const missing = await spooltable(['table', 'none.spool.json'], { cwd: folder.path });
    expect(missing).toEqual({
      code: 2,
      out: '',
      err: 'spooltable: none.spool.json: There is no such file. Check its name and folder.\n',
    });
    const place = await spooltable(['table', folder.path]);
    expect(place.code).toBe(2);
    oneLine(place.err);
  });
});

describe('usage', () => {
  test('help and version', async () => {
    expect((await spooltable(['--version'])).out).toBe(`${manifest.version}\n`);
    for (const args of [['--help'], ['table', '--help'], ['explain', '--help']]) {
      const { code, out, err } = await spooltable(args);
      expect({ code, err }).toEqual({ code: 0, err: '' });
      expect(out).toMatch(/^Usage: spooltable /);
    }
  });

  test.each([
    [[], /No command/],
    [['tabel', 'x'], /Unknown command "tabel"/],
    [['--bogus'], /Unknown option --bogus/],
    [['table'], /No circuit file/],
    [['table', 'a', 'b'], /second one/],
    [['table', 'a', '--frmat', 'csv'], /--frmat.*See spooltable table --help/],
    [['table', 'a', '--format'], /--format/],
    [['table', 'a', '--format', 'xml'], /text or csv or json or markdown, not "xml"/],
    [['table', 'a', '--pumps', 'on'], /running or stopped/],
    [['table', 'a', '--state', 'V1=a'], /--state/],
    [['explain', 'a', '--format', 'csv'], /text or json/],
    [['table', 'a', '--out', ''], /--out/],
  ])('%j', async (args, said) => {
    const { code, out, err } = await spooltable(args);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    oneLine(err);
    expect(err).toMatch(said);
  });
});
