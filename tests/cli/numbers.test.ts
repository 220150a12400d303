import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { passingFolder, spooltable, writeRig } from './spooltable.ts';

const example = (name: string): string => fileURLToPath(new URL(`../../examples/${name}.spool.json`, import.meta.url));
const LOG_DECK = example('log-deck');

let folder: ReturnType<typeof passingFolder>;
beforeEach(() => (folder = passingFolder()));
afterEach(() => folder.remove());

// Continuity (law): speed = flow / area. Bores, rods and pump flows as entered in the example.
const area = (bore: number, rod = 0): number => (Math.PI / 4) * (bore ** 2 - rod ** 2); // mm²
const LITRE_PER_MIN = 1e6 / 60; // mm³/s
const CLAMP_OUT = (6 * LITRE_PER_MIN) / area(50);
const CLAMP_IN = (6 * LITRE_PER_MIN) / area(50, 28);
const LIFT_OUT = (20 * LITRE_PER_MIN) / area(63);
// Exact by definition (NIST SP 811, appendix B): 1 in = 25.4 mm, 1 gal = 231 in³, 1 lbf = 4.4482216152605 N.
const INCH = 25.4;
const GPM = (231 * 25.4 ** 3) / 60; // mm³/s
const PSI = 4.4482216152605 / 0.0254 ** 2; // Pa

interface JsonRow {
  readonly row: number;
  readonly notes: readonly string[];
  readonly numbers: {
    readonly status: string;
    readonly words?: string;
    readonly lines: Record<string, number | null>;
    readonly actuators: Record<string, { speed: number | null; flow: number | null; force: number | null }>;
    readonly pumps: Record<string, { pressure: number | null; flow: number; power: number }>;
    readonly reliefs: Record<string, number>;
    readonly power: { pumps: number; loads: number; stores: number; useful: number; lost: number };
  };
}
interface JsonTable {
  readonly units: Record<string, string>;
  readonly loadCase?: string;
  readonly rows: readonly JsonRow[];
}

async function json(args: readonly string[]): Promise<JsonTable> {
  const { code, out, err } = await spooltable(['table', ...args, '--format', 'json']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  return JSON.parse(out) as JsonTable;
}

/** Cells of the text table by column head. */
function cells(out: string, row: number): Record<string, string> {
  const lines = out.split('\n');
  const rule = lines.findIndex((line) => line.startsWith('─'));
  const spans = [...(lines[rule] ?? '').matchAll(/─+/g)].map(({ index, 0: dashes }) => [index, index + dashes.length]);
  const cut = (line: string): string[] => spans.map(([from, to]) => line.slice(from, to).trim());
  const line = lines.slice(rule + 1).find((text) => Number.parseInt(text, 10) === row) ?? '';
  const values = cut(line);
  return Object.fromEntries(cut(lines[rule - 1] ?? '').map((head, i) => [head, values[i] ?? '']));
}

describe('table --numbers', () => {
  test('text has speeds, pressures and relief flows with the unit in the head', async () => {
    const { out } = await spooltable(['table', LOG_DECK, '--numbers']);
    expect(cells(out, 4)).toMatchObject({
      'CLAMP mm/s': CLAMP_OUT.toPrecision(3),
      'LIFT mm/s': '0',
      'FEED rpm': '0',
      'RV1 L/min': '0',
    });
    expect(cells(out, 2)['LIFT mm/s']).toBe(LIFT_OUT.toPrecision(3));
    expect(cells(out, 13)['CLAMP mm/s']).toBe(`-${CLAMP_IN.toPrecision(3)}`);
    // Row 10, at rest: V1 shuts the supply, so all 6 L/min go over RV1 at no less than its 120 bar.
    expect(cells(out, 10)['RV1 L/min']).toBe('6');
    expect(Number(cells(out, 10)['PUMP1 bar'])).toBeGreaterThanOrEqual(120);
    expect(out).toContain('from entered and assumed values; speeds inwards and B→A are negative');
  });

  test('without it there is none, whatever the units', async () => {
    const { out } = await spooltable(['table', LOG_DECK, '--units', 'us']);
    expect(out).toBe((await spooltable(['table', LOG_DECK])).out);
    expect(out).not.toContain('mm/s');
  });

  test('JSON carries everything, and its power balances', async () => {
    const { units, rows } = await json([LOG_DECK, '--numbers']);
    expect(units).toEqual({
      pressure: 'bar',
      flow: 'L/min',
      speed: 'mm/s',
      rotarySpeed: 'rpm',
      force: 'kN',
      torque: 'N·m',
      power: 'kW',
    });
    const { numbers } = rows[3] as JsonRow;
    expect(numbers.status).toBe('solved');
    expect(numbers.actuators['CLAMP']?.speed).toBeCloseTo(CLAMP_OUT, 2);
    expect(numbers.actuators['CLAMP']?.flow).toBeCloseTo(6, 3);
    expect(numbers.pumps['PUMP2']?.flow).toBeCloseTo(20, 3);
    expect(numbers.lines['clamp supply']).toBe(numbers.pumps['PUMP1']?.pressure);
    // Sealed in at rest of V3, with no load on the motor that works backwards: nobody knows.
    expect(numbers.lines['V3.A']).toBeNull();
    for (const { numbers: at } of rows) {
      const { pumps, loads, stores, useful, lost } = at.power;
      expect(pumps + loads + stores).toBeCloseTo(useful + lost, 3); // first law
      expect(stores).toBe(0); // no spring and no accumulator is drawn
      // P = Δp · Q (law): bar · L/min / 600 = kW; the pumps draw from tank.
      const drawn = Object.values(at.pumps).reduce(
        (sum, { pressure, flow }) => sum + ((pressure ?? 0) * flow) / 600,
        0,
      );
      expect(pumps).toBeCloseTo(drawn, 3);
    }
  });

  test('a lowering load gives power', async () => {
    const { rows } = await json([LOG_DECK, '--numbers']);
    const { numbers } = rows[5] as JsonRow; // V2 lower, V3 stop
    const speed = numbers.actuators['LIFT']?.speed ?? 0;
    expect(speed).toBeLessThan(0);
    expect(numbers.power.loads).toBeCloseTo((20 * -speed) / 1000, 2); // P = F · v: 20 kN · mm/s / 1000 = kW
  });

  test('CSV has the columns last, and negative numbers stay numbers', async () => {
    const { out } = await spooltable(['table', LOG_DECK, '--numbers', '--format', 'csv']);
    const [head = '', ...rows] = out.split('\r\n');
    expect(head).toMatch(
      /,notes,speed CLAMP mm\/s,speed LIFT mm\/s,speed FEED rpm,pressure PUMP1 bar,pressure PUMP2 bar,flow RV1 L\/min,flow RV2 L\/min,verdicts from values$/,
    );
    expect(rows[12]).toContain(`,-${CLAMP_IN.toPrecision(3)},`);
  });

  test('Markdown has the columns, to the right', async () => {
    const { out } = await spooltable(['table', LOG_DECK, '--numbers', '--format', 'markdown']);
    const table = out.split('\n').filter((line) => line.startsWith('|'));
    expect(table[0]).toContain('| CLAMP mm/s | LIFT mm/s | FEED rpm | PUMP1 bar | PUMP2 bar | RV1 L/min | RV2 L/min |');
    expect(table[1]?.match(/ ---: /g)).toHaveLength(1 + 7);
    expect(table[2 + 12]).toContain(`| -${CLAMP_IN.toPrecision(3)} | ${LIFT_OUT.toPrecision(3)} |`);
  });

  test('a row without a steady state has blanks, and says why', async () => {
    // A fixed pump with no way out and no relief valve: its pressure has no bound (law).
    const dead =
      'P1 fixed-pump, T1 tank, V1 directional-valve:valve-4/3-shut, C1 cylinder | P1.P V1.P | T1.T P1.S V1.T | V1.A C1.A | V1.B C1.B';
    const rig = writeRig(folder.path, dead);
    const text = await spooltable(['table', rig, '--numbers']);
    expect(cells(text.out, 2)).toMatchObject({ P1: 'dead-headed', 'C1 mm/s': '', 'P1 bar': '' });
    expect(cells(text.out, 1)['C1 mm/s']).not.toBe('');
    expect(text.out).toMatch(/^ *2 .*no steady numbers: P1 pumps into line P1\.P, which has no way out.*burst/m);
    const csv = await spooltable(['table', rig, '--numbers', '--format', 'csv']);
    expect(csv.out.split('\r\n')[2]).toMatch(/no steady numbers: P1 .*",,,$/);
    const { rows } = await json([rig, '--numbers']);
    expect(rows[1]?.numbers).toEqual({ status: 'unbounded', words: expect.stringContaining('P1') as string });
    const said = await spooltable(['explain', rig, '--state', 'V1=0']);
    expect(said.out).toContain('No steady pressures: P1 pumps into line P1.P');
  });

  test('equal rivals get no speed', async () => {
    // Check case F15: the split between two equal cylinders is not decided by the circuit (law).
    const { rows } = await json([writeRig(folder.path), '--numbers']);
    expect(rows[0]?.numbers.actuators).toMatchObject({
      C1: { speed: null, flow: null },
      C2: { speed: null, flow: null },
    });
    expect(rows[0]?.notes).toContain('C1, C2: undetermined, so no speed is given');
  });

  test('stopped pumps with nothing at their outlet have no pressure', async () => {
    const { rows } = await json([LOG_DECK, '--numbers', '--pumps', 'stopped']);
    expect(rows[3]?.numbers.pumps['PUMP1']).toEqual({ pressure: null, flow: 0, power: 0 });
  });
});

describe('--units us', () => {
  test('converts by the exact factors', async () => {
    const metric = await json([LOG_DECK, '--numbers']);
    const us = await json([LOG_DECK, '--numbers', '--units', 'us']);
    expect(us.units).toEqual({
      pressure: 'psi',
      flow: 'gpm',
      speed: 'in/s',
      rotarySpeed: 'rpm',
      force: 'lbf',
      torque: 'lbf·ft',
      power: 'hp',
    });
    const [si, at] = [metric.rows[9]?.numbers, us.rows[9]?.numbers];
    expect(at?.reliefs['RV1']).toBeCloseTo((6 * LITRE_PER_MIN) / GPM, 4); // 1.585 gpm
    const psi = ((si?.pumps['PUMP1']?.pressure ?? NaN) * 1e5) / PSI;
    expect(at?.pumps['PUMP1']?.pressure).toBeCloseTo(psi, 1);
    expect(psi).toBeGreaterThanOrEqual(120 * 14.5037); // 1 bar = 14.5037 psi
    expect(us.rows[3]?.numbers.actuators['CLAMP']?.speed).toBeCloseTo(CLAMP_OUT / INCH, 4);
    expect(us.rows[0]?.numbers.actuators['FEED']?.speed).toBe(metric.rows[0]?.numbers.actuators['FEED']?.speed);
  });

  test('in the heads of the text, and in explain', async () => {
    const { out } = await spooltable(['table', LOG_DECK, '--numbers', '--units', 'us']);
    expect(cells(out, 4)['CLAMP in/s']).toBe((CLAMP_OUT / INCH).toPrecision(3));
    expect(Object.keys(cells(out, 4))).toEqual(expect.arrayContaining(['FEED rpm', 'PUMP1 psi', 'RV1 gpm']));
    const said = await spooltable(['explain', LOG_DECK, '--units', 'us']);
    expect(said.out).toContain('  RV1: 1.59 gpm');
  });

  test('another system is refused', async () => {
    const { code, err } = await spooltable(['table', LOG_DECK, '--units', 'imperial']);
    expect(code).toBe(2);
    expect(err).toContain('--units takes metric or us, not "imperial"');
  });
});

describe('explain', () => {
  test('ends with pressures, relief flows, power, and what they rest on', async () => {
    const { out } = await spooltable(['explain', LOG_DECK]); // row 10, at rest
    const lines = out.split('\n');
    const from = lines.indexOf('Pressures');
    expect(from).toBeGreaterThan(lines.findIndex((line) => line.startsWith('PUMP2: ')));
    expect(lines.slice(from)).toEqual(
      expect.arrayContaining([
        expect.stringMatching(/^ {2}clamp supply: 12\d bar$/) as string,
        '  V3.A: sealed; what stands in it is not known',
        '  RV1: 6 L/min',
        '  RV2: 0 L/min',
        expect.stringMatching(/^ {2}in: pumps give [\d.]+ kW$/) as string,
        '  useful: 0 kW',
        expect.stringMatching(/^ {2}lost: [\d.]+ kW$/) as string,
        'These figures rest on entered values and, where nothing was entered, on assumed ones.',
      ]),
    );
    // Held by its load alone: 20 kN on 31.17 cm² are 64.2 bar (p = F/A), and friction takes part of it at most.
    const held = /V2\.A: ([\d.]+) bar from its load/.exec(out);
    expect(Number(held?.[1])).toBeGreaterThan(0.9 * 64.2);
    expect(Number(held?.[1])).toBeLessThan(1.1 * 64.2);
  });

  test('JSON likewise', async () => {
    const { out } = await spooltable(['explain', LOG_DECK, '--format', 'json']);
    const answer = JSON.parse(out) as JsonRow & { units: object; figuresRestOn: string };
    expect(answer.units).toMatchObject({ pressure: 'bar', power: 'kW' });
    expect(answer.numbers.reliefs['RV1']).toBeCloseTo(6, 3);
    expect(answer.numbers.reliefs['RV2']).toBe(0);
    expect(answer.figuresRestOn).toContain('assumed');
  });
});

describe('notes of motors', () => {
  test('say A→B, not outward', async () => {
    for (const format of ['text', 'markdown']) {
      const { out } = await spooltable(['table', example('net-winch'), '--format', format]);
      expect(out).toContain('DRUM: A→B by suction only');
      expect(out).not.toContain('outward');
    }
    const { out } = await spooltable(['explain', example('net-winch'), '--state', 'V1=haul,BRAKE=shut']);
    expect(out).toContain('DRUM: held; A→B by suction only');
    expect(out).not.toContain('outward');
  });

  test('cylinders keep outward and inward', async () => {
    expect((await spooltable(['table', example('hop-press')])).out).toContain('PLATE: inward by suction only');
  });
});

describe('--load', () => {
  const withCases = (cases: readonly object[]): string => {
    const file = join(folder.path, 'deck.spool.json');
    const circuit = JSON.parse(readFileSync(LOG_DECK, 'utf8')) as object;
    writeFileSync(file, JSON.stringify({ ...circuit, loadCases: cases }));
    return file;
  };
  const CASES = [
    { id: 'lc1', name: 'Wet logs', loads: { LIFT: { load: '40 kN' } } },
    { id: 'lc2', name: 'Too much', loads: { LIFT: { load: '60 kN' } } },
  ];

  test('by name or id, with other pressures', async () => {
    const file = withCases(CASES);
    const plain = await json([file, '--numbers']);
    const wet = await json([file, '--numbers', '--load', 'Wet logs']);
    expect(plain.loadCase).toBeUndefined();
    expect(wet.loadCase).toBe('Wet logs');
    expect(await json([file, '--numbers', '--load', 'lc1'])).toEqual(wet);
    // Raise with V3 at stop: 20 kN more on 31.17 cm² are 64.2 bar more (p = F/A), losses being the same.
    const more = (wet.rows[1]?.numbers.lines['V2.A'] ?? 0) - (plain.rows[1]?.numbers.lines['V2.A'] ?? 0);
    expect(more).toBeGreaterThan((20e3 / area(63)) * 10 * 0.98);
    expect(more).toBeLessThan((20e3 / area(63)) * 10 * 1.1);
  });

  test('another verdict where the relief valve opens first', async () => {
    // 60 kN on 31.17 cm² need 192 bar; RV2 opens at 180.
    const { out } = await spooltable(['explain', withCases(CASES), '--load', 'Too much', '--state', 'V2=raise']);
    expect(out).toMatch(/^Row \d+ of 18, pumps running, load case Too much: /m);
    expect(out).not.toMatch(/^LIFT: extends/m);
    expect((await spooltable(['explain', LOG_DECK, '--state', 'V2=raise'])).out).toMatch(/^LIFT: extends/m);
  });

  test('stands in the head of every report', async () => {
    const file = withCases(CASES);
    for (const [args, head] of [
      [['table'], 'State table, pumps running, load case Wet logs'],
      [['table', '--format', 'markdown'], 'State table, pumps running, load case Wet logs'],
      [['explain'], 'pumps running, load case Wet logs:'],
      [['trapped', '--pumps', 'stopped'], 'pumps stopped, load case Wet logs'],
    ] as const) {
      const [command, ...rest] = args;
      const { out } = await spooltable([command, file, ...rest, '--load', 'Wet logs']);
      expect(out).toContain(head);
      expect((await spooltable([command, file, ...rest])).out).toContain('loads as the parts say');
    }
    for (const command of ['explain', 'trapped']) {
      const { out } = await spooltable([command, file, '--load', 'Wet logs', '--format', 'json']);
      expect(JSON.parse(out)).toMatchObject({
        loadCase: 'Wet logs',
        conditions: { pumps: 'running', loadCase: 'lc1' },
      });
    }
    expect((await spooltable(['bleed', file])).out).toContain('pumps stopped, loads as the parts say');
    const rule = await spooltable(['check', file, '--rule', 'never CLAMP moves while CLAMP is held']);
    expect(rule.out).toContain('pumps running, loads as the parts say');
    expect((await spooltable(['table', LOG_DECK])).out).not.toContain('loads');
  });

  test.each(['table', 'explain', 'trapped'])('%s refuses an unknown one and names those there are', async (command) => {
    const { code, out, err } = await spooltable([command, withCases(CASES), '--load', 'Dry logs']);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toMatch(
      /^spooltable: [^\n]*no load case "Dry logs"\. Use one of Wet logs \(lc1\), Too much \(lc2\)\.\n$/,
    );
  });

  test('none there, an empty one, and two of one name', async () => {
    const none = await spooltable(['table', LOG_DECK, '--load', 'x']);
    expect(none.code).toBe(2);
    expect(none.err).toContain('This circuit has none; leave --load out.');
    expect((await spooltable(['table', LOG_DECK, '--load', ''])).err).toContain('--load needs the name of a load case');
    const twice = withCases(CASES.map((entry) => ({ ...entry, name: 'Same' })));
    const both = await spooltable(['table', twice, '--load', 'Same']);
    expect(both.code).toBe(2);
    expect(both.err).toContain('2 load cases are called "Same". Use an id: lc1, lc2.');
    expect((await spooltable(['table', twice, '--load', 'lc2'])).code).toBe(0);
  });
});
