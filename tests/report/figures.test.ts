import { expect, test } from 'vitest';
import type { RowNumbers } from '../../src/analysis/results.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import { writeCsv } from '../../src/report/csv.ts';
import { rowFigures } from '../../src/report/figures.ts';
import type { NumberSource, RowFigures, SolvedFigures } from '../../src/report/figures.ts';
import { makeReport } from '../../src/report/rows.ts';
import { writeText } from '../../src/report/text.ts';
import { CLAMP, joined, sampleSource, sampleTable } from './sample.ts';
import type { Sample } from './sample.ts';

/** The figures are invented: 1 bar a line, 100 mm/s inwards, 6 L/min. */
const numbersOf = (row: number, more: Partial<RowNumbers> = {}): RowNumbers => ({
  row,
  status: 'solved',
  lines: [1e5, 2e5, 3e5],
  actuators: [{ speed: -0.1, flow: 1e-4, force: 2500 }],
  pumps: [{ pressure: 1e5, delivered: 1e-4, power: 10 }],
  reliefs: [{ label: 'R1', flow: 5e-5 }],
  paths: [],
  flows: [{ part: 'R1', label: 'R1', from: 'P', to: 'T', flow: 5e-5, drop: 1e5 }],
  shares: [{ part: 'P1', label: 'P1', given: 10, useful: 0, lost: 0 }],
  power: { pumps: 10, loads: 0, stores: 0, useful: 0, lost: 10 },
  ...more,
});
const source = (more: Partial<NumberSource> = {}): NumberSource => ({
  units: 'metric',
  reliefs: ['R1'],
  of: (rows) => rows.map((row) => numbersOf(row)),
  ...more,
});

function solved(figures: RowFigures): SolvedFigures {
  if (figures.status !== 'solved') throw new Error(figures.words);
  return figures;
}
const figures = (more: Partial<RowNumbers>, sample: Sample = CLAMP, row = 0): SolvedFigures =>
  solved(rowFigures(numbersOf(row, more), sampleTable(sample), source()));

test('a cylinder in mm/s and kN, inwards negative', () => {
  expect(figures({}).actuators).toEqual({ CLAMP: { speed: -100, flow: 6, force: 2.5 } });
  expect(figures({}).reliefs).toEqual({ R1: 3 });
});

test('a motor in rpm and N·m: 2π rad/s are 60 rpm', () => {
  const { data } = sampleTable(CLAMP);
  const actuators = data.actuators.map((a) => ({ ...a, motion: 'rotary' as const }));
  const numbers = numbersOf(0, { actuators: [{ speed: 2 * Math.PI, flow: 1e-4, force: 30 }] });
  const motor = new StateTable({ ...data, actuators });
  expect(solved(rowFigures(numbers, motor, source())).actuators['CLAMP']).toEqual({ speed: 60, flow: 6, force: 30 });
});

test('what the calculation cannot tell from nought is nought, without a sign', () => {
  const still = figures({
    lines: [-300, 0, 0],
    actuators: [{ speed: -1e-7, flow: 1e-7, force: -0.01 }],
    power: { pumps: 0.01, loads: 0, stores: 0, useful: 0, lost: 0.01 },
  });
  expect(Object.is(still.actuators['CLAMP']?.speed, 0)).toBe(true);
  expect(still.actuators['CLAMP']?.flow).toBe(0);
  expect(Object.is(still.lines['L1'], 0)).toBe(true);
  expect(still.power).toEqual({ pumps: 0, loads: 0, stores: 0, useful: 0, lost: 0 });
});

test('a sealed line has a pressure only from a load', () => {
  // Row 1 of the sample: L2 and L3 are cut off; with a load on L2 its pressure is known.
  expect(figures({}, CLAMP, 1).lines).toEqual({ L1: 1, L2: null, L3: null });
  const loaded = { ...CLAMP, trapped: { L2: [[], ['load', 'heat'], []] } };
  expect(figures({}, loaded, 1).lines).toEqual({ L1: 1, L2: 2, L3: null });
});

test('springs and accumulators give what the balance lacks (first law)', () => {
  expect(figures({ power: { pumps: 1000, loads: 0, stores: 200, useful: 900, lost: 300 } }).power.stores).toBe(0.2);
  expect(figures({ power: { pumps: 1000, loads: 0, stores: -200, useful: 700, lost: 100 } }).power.stores).toBe(-0.2);
  expect(figures({ power: { pumps: 100_000, loads: 0, stores: 0.05, useful: 0, lost: 100_000 } }).power.stores).toBe(0);
});

test('every row is worked out once, in parts', () => {
  const positions = Array.from({ length: 1201 }, (_, i) => `p${i}`);
  const sample = {
    inputs: [{ label: 'V1', positions, coils: [] }],
    actuators: { C1: positions.map(() => 'extends') },
    pumps: { P1: positions.map(() => 'working') },
  };
  const asked: number[][] = [];
  const of = (rows: readonly number[]): RowNumbers[] => {
    asked.push([...rows]);
    return rows.map((row) => numbersOf(row, { lines: [] }));
  };
  for (const write of [writeText, writeCsv]) {
    asked.length = 0;
    const pieces = write(makeReport(sampleSource(sample, { numbers: source({ of }) })))[Symbol.iterator]();
    while (asked.length === 0 && pieces.next().done !== true);
    expect(asked).toHaveLength(1);
    while (pieces.next().done !== true);
    expect(asked.flat()).toEqual(positions.map((_, i) => i));
    expect(asked.length).toBeGreaterThan(1);
  }
});

test('a text table keeps its columns, and the reason for blanks whole where there is room', () => {
  const words = 'P1 pumps into line L1, which has no way out.';
  const of: NumberSource['of'] = (rows) =>
    rows.map((row) =>
      row === 1
        ? { ...numbersOf(row), status: 'unbounded', words, lines: [], actuators: [], pumps: [], reliefs: [] }
        : numbersOf(row),
    );
  const report = makeReport(sampleSource(CLAMP, { numbers: source({ of }) }));
  const [, first, second, third] = joined(writeText(report))
    .split('\n')
    .filter((line) => /^(Row| +\d)/.test(line));
  expect(first).toContain('   -100        1         3  –');
  expect(third?.indexOf('-100')).toBe(first?.indexOf('-100'));
  expect(second).toContain(words);
  expect(second).not.toContain('-100');
  const narrow = joined(writeText(report, { width: 170 }))
    .split('\n')
    .filter((line) => /^ +\d/.test(line));
  expect(narrow[1]?.length).toBeLessThanOrEqual(170);
  expect(narrow[1]).toMatch(/…$/);
});
