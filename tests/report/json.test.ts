import { expect, test } from 'vitest';
import { writeJson } from '../../src/report/json.ts';
import { makeReport } from '../../src/report/rows.ts';
import { CLAMP, FINDING, joined, sampleSource } from './sample.ts';

const report = makeReport(sampleSource(CLAMP, { findings: [FINDING] }));
const text = joined(writeJson(report));

test('the shape that other programs read', () => {
  const out: unknown = JSON.parse(text);
  expect(out).toEqual({
    spooltable: { version: '9.8.7', report: 1 },
    circuit: 'Clamp rig',
    conditions: { pumps: 'running' },
    inputs: [
      {
        label: 'V1',
        positions: ['a', '0', 'b'],
        rest: '0',
        coils: [
          { name: 'Y1', position: 'a' },
          { name: 'Y2', position: 'b' },
        ],
      },
    ],
    restRow: 2,
    rows: [...report.rows()],
    notPermitted: 1,
    commandCombinations: 4,
    findings: [{ ...FINDING, parts: ['P1', 'RV9'], lines: ['L1'], rows: [2] }],
  });
});

test('a row to a line', () => {
  expect(text.split('\n').filter((line) => line.startsWith('    {"row":'))).toHaveLength(3);
  expect(text.endsWith('}\n')).toBe(true);
});

test('an input that stays where it was left has rest null', () => {
  const detent = sampleSource({ inputs: [{ label: 'V1', positions: ['a', 'b'], coils: [] }] });
  expect(JSON.parse(joined(writeJson(makeReport(detent))))).toMatchObject({ inputs: [{ label: 'V1', rest: null }] });
});
