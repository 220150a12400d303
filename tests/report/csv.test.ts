import fc from 'fast-check';
import { expect, test } from 'vitest';
import { field, writeCsv } from '../../src/report/csv.ts';
import { makeReport } from '../../src/report/rows.ts';
import { CLAMP, joined, sampleSource } from './sample.ts';

/** A reader written from the grammar of RFC 4180 section 2. */
function parse(text: string): string[][] {
  const records: string[][] = [];
  let record: string[] = [];
  const pattern = /(?:"((?:[^"]|"")*)"|([^",\r\n]*))(,|\r\n)/gy;
  for (let m = pattern.exec(text); m; m = pattern.exec(text)) {
    record.push(m[1] === undefined ? (m[2] ?? '') : m[1].replaceAll('""', '"'));
    if (m[3] === '\r\n') {
      records.push(record);
      record = [];
    }
    if (pattern.lastIndex === text.length) return records;
  }
  throw new Error(`not RFC 4180 near ${pattern.lastIndex}`);
}

test('a record per row with a head', () => {
  const records = parse(joined(writeCsv(makeReport(sampleSource(CLAMP)))));
  expect(records).toEqual([
    [
      ...['row', 'V1', 'coil Y1', 'coil Y2', 'CLAMP', 'P1', 'line L1', 'line L2', 'line L3'],
      ...['blocked under pressure', 'cut off', 'trapped', 'rests on', 'from values', 'notes', 'verdicts from values'],
    ],
    ['1', 'a', 'on', 'off', 'extends', 'working', 'fed', 'fed', 'vented', '', '', '', '', 'no', '', ''],
    [
      ...['2', '0', 'off', 'off', 'held', 'over relief', 'fed', 'cut off', 'cut off'],
      ...['L1', 'L2; L3', 'L2 (left behind, heat); L3 (heat)', '', 'no', 'CLAMP: void forms', ''],
    ],
    [
      ...['3', 'b', 'off', 'on', 'rests on pressure', 'working, part over relief', 'fed', 'vented', 'fed'],
      ...['', '', '', 'CLAMP (load, rivals)', 'no', '', ''],
    ],
  ]);
});

test('verdicts that rest on values stand in the last column, behind those that there were before', () => {
  const records = parse(joined(writeCsv(makeReport(sampleSource({ ...CLAMP, valued: { CLAMP: [1], P1: [1] } })))));
  expect(records.map((record) => record.at(-1))).toEqual(['verdicts from values', '', 'CLAMP; P1', '']);
});

test.each([
  ['=1+1', `'=1+1`],
  ['+A', `'+A`],
  ['-A', `'-A`],
  ['@x', `'@x`],
  ['\tx', `'\tx`],
  ['\rx', `"'\rx"`],
  ['=a,b', `"'=a,b"`],
  ['a=b', 'a=b'],
  ['a "b"', '"a ""b"""'],
  ['a\nb', '"a\nb"'],
])('%j is written as %j', (text, written) => {
  expect(field(text)).toBe(written);
});

test('any label comes back, and none can start a formula', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary' }), fc.string(), (label, name) => {
      const inputs = [{ label, positions: [name, 'b'], coils: [] }];
      const [head, first] = parse(joined(writeCsv(makeReport(sampleSource({ inputs })))));
      const guarded = (text: string): string => (/^[=+\-@\t\r]/.test(text) ? `'${text}` : text);
      expect(head?.[1]).toBe(guarded(label));
      expect(first?.[1]).toBe(guarded(name));
    }),
  );
});
