import { expect, test } from 'vitest';
import type { Explanation } from '../../src/analysis/results.ts';
import { makeReport } from '../../src/report/rows.ts';
import { CLAMP, FINDING, sampleSource } from './sample.ts';

const report = makeReport(sampleSource(CLAMP, { findings: [FINDING] }));

test('rows carry shown names and count from 1', () => {
  expect([...report.rows()].map((row) => row.row)).toEqual([1, 2, 3]);
  expect(report.rowAt(1)).toEqual({
    row: 2,
    state: { V1: '0' },
    coils: { Y1: 'off', Y2: 'off' },
    actuators: { CLAMP: 'held' },
    pumps: { P1: 'over relief' },
    lines: { L1: 'fed', L2: 'cut off', L3: 'cut off' },
    blocked: { underPressure: ['L1'], cutOff: ['L2', 'L3'] },
    trapped: [
      { line: 'L2', reasons: ['left behind', 'heat'] },
      { line: 'L3', reasons: ['heat'] },
    ],
    rests: {},
    notes: ['CLAMP: void forms'],
    valued: false,
    fromValues: [],
  });
  expect(report.rowAt(0).coils).toEqual({ Y1: 'on', Y2: 'off' });
});

test('each row names the verdicts that rest on values', () => {
  const valued = makeReport(sampleSource({ ...CLAMP, valued: { CLAMP: [1], P1: [1, 2] } }));
  expect([0, 1, 2].map((row) => valued.rowAt(row).fromValues)).toEqual([[], ['CLAMP', 'P1'], ['P1']]);
});

test('a verdict that rests on pressure says why', () => {
  expect(report.rowAt(2).rests).toEqual({ CLAMP: { reasons: ['load', 'rivals'] } });
});

test('an explanation adds the sentence and the candidates, and is asked for open rows only', () => {
  const asked: number[] = [];
  const explain = (row: number): Explanation => {
    asked.push(row);
    const rests = { why: 'It depends on the load.', candidates: ['extends', 'stalled'] as const };
    const reason = {
      part: 'id-CLAMP',
      label: 'CLAMP',
      verdict: 'rests on pressure',
      onValues: true,
      notes: [],
      rests,
      steps: [],
    } as const;
    const none = {
      row,
      status: 'not converged',
      lines: [],
      actuators: [],
      pumps: [],
      reliefs: [],
      paths: [],
      flows: [],
      shares: [],
      power: { pumps: 0, loads: 0, stores: 0, useful: 0, lost: 0 },
    } as const;
    return {
      row,
      numbers: none,
      positions: [2],
      dependents: [],
      actuators: [reason],
      pumps: [],
      trapped: [],
      notes: ['Said so.'],
    };
  };
  const rows = [...makeReport(sampleSource(CLAMP, { explain })).rows()];
  expect(asked).toEqual([2]);
  expect(rows[2]?.rests).toEqual({
    CLAMP: { reasons: ['load', 'rivals'], why: 'It depends on the load.', candidates: ['extends', 'stalled'] },
  });
  expect(rows[2]?.notes).toEqual(['Said so.']);
});

test('inputs name their rest and what their coils do', () => {
  expect(report.inputs).toEqual([
    {
      label: 'V1',
      positions: ['a', '0', 'b'],
      rest: '0',
      coils: [
        { name: 'Y1', position: 'a' },
        { name: 'Y2', position: 'b' },
      ],
    },
  ]);
  expect(report.restRow).toBe(2);
});

test('findings name parts, lines and rows as people see them; a part that is gone keeps its id', () => {
  expect(report.findings).toEqual([{ ...FINDING, parts: ['P1', 'RV9'], lines: ['L1'], rows: [2] }]);
});

test('coils of the same name are told apart by their valve', () => {
  const coils = [{ name: 'a', position: 0 }];
  const inputs = ['V1', 'V2'].map((label) => ({ label, positions: ['a', '0'], rest: 1, coils }));
  expect(makeReport(sampleSource({ inputs })).coils).toEqual(['V1.a', 'V2.a']);
});

test('a label that JavaScript gives a meaning is a name like any other', () => {
  const row = makeReport(
    sampleSource({
      inputs: [{ label: '__proto__', positions: ['a', 'b'], coils: [] }],
      actuators: { constructor: ['held', 'floats'] },
    }),
  ).rowAt(1);
  expect(Object.entries(row.state)).toEqual([['__proto__', 'b']]);
  expect(row.actuators['constructor']).toBe('floats');
});
