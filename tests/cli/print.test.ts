import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { passingFolder, spooltable, writeRig } from './spooltable.ts';

let folder: ReturnType<typeof passingFolder>;
beforeEach(() => {
  folder = passingFolder();
});
afterEach(() => folder.remove());

test('print lays all sheets out, numbered, on the paper asked for, with a state only where one is asked for', async () => {
  const file = writeRig(folder.path);
  const all = await spooltable(['print', file, '--paper', 'A4 landscape', '--state', 'V1=a']);
  expect({ code: all.code, err: all.err }).toEqual({ code: 0, err: '' });
  expect(all.out).toContain('@page{size:297mm 210mm;margin:0}');
  const sheets = all.out.match(/<svg /g)?.length ?? 0;
  expect(sheets).toBeGreaterThan(2);
  expect(all.out).toContain(`>${sheets} of ${sheets}<`);
  for (const text of [
    'Row 2: V1 a, V2 0',
    'Operating chart: pumps running',
    'Findings',
    'Part list',
    'trapped by heat',
  ])
    expect(all.out).toContain(text);

  const plain = await spooltable(['print', file, '--only', 'drawing']);
  expect(plain.out.match(/<svg /g)).toHaveLength(1);
  expect(plain.out).toContain('Every valve at rest');
  expect(plain.out).not.toContain('trapped by heat');
});

test('print names what it cannot do', async () => {
  const file = writeRig(folder.path);
  const paper = await spooltable(['print', file, '--paper', 'A5 landscape']);
  expect(paper.code).toBe(2);
  expect(paper.err).toMatch(/^spooltable: --paper takes A4 landscape or A4 portrait or .*, not "A5 landscape"/);
  const only = await spooltable(['print', file, '--only', 'legend']);
  expect([only.code, only.err]).toEqual([2, expect.stringContaining('not "legend"')]);
});

test('parts lists parts as text and as CSV', async () => {
  const file = writeRig(folder.path);
  const text = await spooltable(['parts', file]);
  const [head = '', ...rows] = text.out.trimEnd().split('\n');
  expect(head).toMatch(/^Item +Code +Label +Part +Data +Count$/);
  // Pump, tank, relief valve, two different valves, and two cylinders alike.
  expect(rows).toHaveLength(6);
  expect(rows.find((row) => row.includes('C1, C2'))).toMatch(/ 2$/);
  expect(rows.filter((row) => row.includes('Directional valve')).map((row) => /at rest [^,]+/.exec(row)?.[0])).toEqual([
    'at rest all shut',
    'at rest P-T',
  ]);
  const csv = await spooltable(['parts', file, '--format', 'csv']);
  expect(csv.out).toContain('"C1, C2",Cylinder,,2\r\n');
});

test('bleed gives the sheet to print as HTML', async () => {
  const { code, out } = await spooltable(['bleed', writeRig(folder.path), '--state', 'V1=0', '--format', 'html']);
  expect(code).not.toBe(2);
  expect(out).toContain('@page{size:210mm 297mm;margin:0}');
  for (const text of ['Bleed-down sheet', 'Order of isolation (29 CFR 1910.147(d))', 'Signature'])
    expect(out).toContain(text);
});

test('print lays out every sheet of a circuit that has several, and parts names them', async () => {
  const file = fileURLToPath(new URL('../../examples/tile-press.spool.json', import.meta.url));
  const { code, out } = await spooltable(['print', file, '--only', 'drawing', '--state', 'V1=shut']);
  expect(code).toBe(0);
  expect(out.match(/<svg /g)).toHaveLength(2);
  for (const text of ['1 of 2', '2 of 2', 'Power unit. Row', 'Stations. Row']) expect(out).toContain(text);
  // Three lines lead from one sheet to the other: each names the other's field at both its ends.
  expect(out.match(/>[12]\/[A-H]\d+</g)).toHaveLength(6);
  const list = await spooltable(['parts', file]);
  expect(list.out.split('\n')[0]).toMatch(/Data +Sheet +Count$/);
});
