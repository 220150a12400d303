import { expect, test } from 'vitest';
import { escapeMarkdown, writeMarkdown } from '../../src/report/markdown.ts';
import { makeReport, TRAPPED_CAUTION } from '../../src/report/rows.ts';
import { CLAMP, FINDING, joined, sampleSource } from './sample.ts';

const lines = joined(writeMarkdown(makeReport(sampleSource(CLAMP, { findings: [FINDING] })))).split('\n');

test('a pipe table with as many cells in each row as in its head', () => {
  const table = lines.filter((line) => line.startsWith('|'));
  expect(table).toHaveLength(5);
  const cells = table.map((line) => line.split(/(?<!\\)\|/).length);
  expect(new Set(cells).size).toBe(1);
  expect(table[3]).toBe(
    '| 2 | 0 | – | held | over relief | L1 | L2, L3 | L2 (left behind, heat), L3 (heat) | CLAMP: void forms |',
  );
});

test('caution and findings follow', () => {
  expect(lines).toContain(`> ${TRAPPED_CAUTION}`);
  expect(lines).toContain(
    '- **Caution: P1 runs over its relief at rest** (row 2). All its flow turns into heat. Give it a free path to tank at rest.',
  );
});

test('labels cannot break out of a cell or start markup', () => {
  expect(escapeMarkdown('a|b')).toBe('a\\|b');
  expect(escapeMarkdown('a\nb')).toBe('a b');
  expect(escapeMarkdown('a\\|b')).toBe('a\\\\\\|b');
  expect(escapeMarkdown('<img src=x>')).toBe('\\<img src=x\\>');
  expect(escapeMarkdown('# x')).toBe('\\# x');
  expect(escapeMarkdown('1. x')).toBe('1\\. x');
});
