import fc from 'fast-check';
import { expect, test } from 'vitest';
import { ACTUATOR_VERDICTS, PUMP_VERDICTS } from '../../src/engine/table/words.ts';
import { makeReport, TRAPPED_CAUTION } from '../../src/report/rows.ts';
import { writeText } from '../../src/report/text.ts';
import { cutTo, plain, widthOf } from '../../src/report/width.ts';
import { CLAMP, FINDING, joined, sampleSource } from './sample.ts';
import type { Sample } from './sample.ts';

const write = (sample: Sample, width?: number, findings = [FINDING]): string =>
  joined(writeText(makeReport(sampleSource(sample, { findings })), width === undefined ? {} : { width }));

test('columns are aligned and everything is said', () => {
  expect(write(CLAMP)).toBe(
    [
      'Clamp rig',
      'State table, pumps running',
      '3 rows. 1 of 4 lever and coil combinations is not permitted (opposed coils on at once); no row is given to what is not permitted.',
      'At rest: V1 0; see row 2.',
      '',
      'Row  V1  Coils on  CLAMP                             P1                         Blocked under pressure  Cut off  Trapped                            Notes',
      '───  ──  ────────  ────────────────────────────────  ─────────────────────────  ──────────────────────  ───────  ─────────────────────────────────  ─────────────────',
      '  1  a   Y1        extends                           working                    –                       –        –                                  –',
      '  2  0   –         held                              over relief                L1                      L2, L3   L2 (left behind, heat), L3 (heat)  CLAMP: void forms',
      '  3  b   Y2        rests on pressure (load, rivals)  working, part over relief  –                       –        –                                  –',
      '',
      TRAPPED_CAUTION,
      '',
      'Findings',
      'Caution: P1 runs over its relief at rest (row 2)',
      '  All its flow turns into heat.',
      '  Give it a free path to tank at rest.',
      '',
    ].join('\n'),
  );
});

test('a narrow terminal shortens lists, never verdicts, and never wraps a row', () => {
  const text = write(CLAMP, 100);
  expect(text.split('\n').filter((line) => /^ +\d/.test(line))).toHaveLength(3);
  for (const word of [
    'extends',
    'held',
    'rests on pressure (load, rivals)',
    'over relief',
    'working, part over relief',
  ]) {
    expect(text).toContain(word);
  }
  expect(text).toContain('…');
});

test('no verdict is lost at any width', () => {
  const verdicts = fc.tuple(fc.constantFrom(...ACTUATOR_VERDICTS), fc.constantFrom(...PUMP_VERDICTS));
  fc.assert(
    fc.property(fc.integer({ min: 0, max: 220 }), fc.array(verdicts, { minLength: 3, maxLength: 3 }), (width, said) => {
      const sample = { ...CLAMP, actuators: { CLAMP: said.map(([a]) => a) }, pumps: { P1: said.map(([, p]) => p) } };
      const rows = write(sample, width, [])
        .split('\n')
        .filter((line) => /^ +\d/.test(line));
      expect(rows).toHaveLength(3);
      said.forEach(([actuator, pump], i) => {
        expect(rows[i]).toContain(actuator);
        expect(rows[i]).toContain(pump);
      });
    }),
    { numRuns: 200 },
  );
});

test('verdicts that rest on values are marked one by one, and the mark is explained', () => {
  const text = write({ ...CLAMP, valued: { CLAMP: [1, 2], P1: [2] } });
  expect(text).toMatch(/^ +2 .* held\* +over relief /m);
  // What is open says so itself.
  expect(text).toMatch(/rests on pressure \(load, rivals\) +working, part over relief\*/);
  expect(text).toContain('* Rests on entered or assumed values');
  expect(write(CLAMP)).not.toContain('*');
});

test('the caution stands only where trapped pressure is listed', () => {
  expect(write({ ...CLAMP, trapped: {} })).not.toContain(TRAPPED_CAUTION);
});

test('a circuit without valves has one row', () => {
  const text = write({ inputs: [], pumps: { P1: ['over relief'] } }, undefined, []);
  expect(text).toContain('1 row.');
  expect(text).toContain('No part of this circuit is commanded');
});

test('a label cannot break the line or command the terminal', () => {
  const text = write({ inputs: [{ label: 'V\u001b[2J\n1', positions: ['a\r', 'b'], coils: [] }] }, undefined, []);
  expect(/[\u0000-\u0009\u000b-\u001f\u202e]/.test(text)).toBe(false);
  expect(text.split('\n').filter((line) => /^ +\d/.test(line))).toHaveLength(2);
});

test('widths count columns of the terminal', () => {
  expect(widthOf('A→B')).toBe(3);
  expect(widthOf('弁')).toBe(2); // East Asian Width W, Unicode Standard Annex 11
  expect(widthOf('e\u0301')).toBe(1);
  expect(cutTo('L1, L2, L3', 6)).toBe('L1, L…');
  expect(widthOf(cutTo('弁弁弁弁', 6))).toBeLessThanOrEqual(6);
  expect(plain('a\u202eb')).toBe('a b');
});
