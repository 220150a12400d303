import { expect, test } from 'vitest';
import { PAPERS, paperExtent } from '../../src/circuit/paper.ts';
import { fieldAt, frameOf, mm, MODULE_MM } from '../../src/drawing/frame.ts';
import { advance, brokenAt, cutTo, isMeasured } from '../../src/base/text-advance.ts';
import { BLOCK_WIDTH, titleBlock } from '../../src/drawing/title-block.ts';
import type { TitleBlock } from '../../src/drawing/title-block.ts';

const texts = (primitives: readonly { readonly type: string }[]): string[] =>
  primitives.flatMap((p) => ('text' in p ? [String(p.text)] : []));

/** ISO 216: A3 is 297 × 420 mm. ANSI B (tabloid) is 11 × 17 in. */
test('papers have their size both ways round', () => {
  expect(paperExtent('A3 landscape')).toEqual({ width: 420, height: 297 });
  expect(paperExtent('A3 portrait')).toEqual({ width: 297, height: 420 });
  expect(paperExtent('Tabloid landscape').width / 25.4).toBeCloseTo(17, 6);
  expect(PAPERS).toHaveLength(12);
});

/** ISO 5457, from memory: numbers of fields of 50 mm along the long and the short side. */
test.each([
  ['A4 portrait', 4, 6],
  ['A4 landscape', 6, 4],
  ['A3 landscape', 8, 6],
  ['A2 landscape', 12, 8],
  ['A1 landscape', 16, 12],
] as const)('%s has %i by %i fields', (paper, columns, rows) => {
  const frame = frameOf(paper);
  expect([frame.columns.length, frame.rows.length]).toEqual([columns, rows]);
  expect(frame.rows.join('')).not.toMatch(/[IO]/);
});

/** ISO 5457, from memory: the frame leaves 20 mm at the filing edge and 10 mm elsewhere. */
test.each(PAPERS)('the frame of %s leaves its margins, and everything lies on the paper', (paper) => {
  const frame = frameOf(paper);
  const { width, height } = paperExtent(paper);
  const { inside } = frame;
  expect(inside.x * MODULE_MM).toBeCloseTo(20, 6);
  expect((inside.x + inside.width) * MODULE_MM).toBeCloseTo(width - 10, 6);
  expect((inside.y + inside.height) * MODULE_MM).toBeCloseTo(height - 10, 6);
  for (const p of frame.primitives) {
    const points = p.type === 'polyline' ? p.points : 'at' in p ? [p.at] : [];
    for (const at of points) {
      expect(at.x >= 0 && at.x <= frame.width && at.y >= 0 && at.y <= frame.height).toBe(true);
    }
  }
});

test('a point is told by its field, from the upper left, also out in the corners', () => {
  const frame = frameOf('A3 landscape');
  // Fields are counted from the middle: the first one of a 420 mm side ends at 60 mm, the second at 110 mm.
  expect(fieldAt(frame, { x: mm(59), y: mm(40) })).toBe('A1');
  expect(fieldAt(frame, { x: mm(61), y: mm(40) })).toBe('A2');
  expect(fieldAt(frame, { x: mm(211), y: mm(149) })).toBe('D5');
  expect(fieldAt(frame, { x: mm(-50), y: mm(500) })).toBe('F1');
});

const BLOCK: TitleBlock = {
  name: 'Gate rig',
  fields: { machine: 'Gate', number: 'HY-7', revision: 'B', drawn: '2026-03-02', author: 'N. N.', units: 'bar' },
  document: 'Hydraulic circuit diagram',
  shows: 'Row 4',
  fit: '100 %, M 2.5 mm',
  sheet: 2,
  sheets: 5,
};

test('the title block says all fields, the fit and the sheet, in the lower right corner', () => {
  const frame = frameOf('A3 landscape');
  const drawn = titleBlock(frame, BLOCK, false);
  expect(texts(drawn)).toEqual(
    expect.arrayContaining([
      'Gate rig',
      'Gate',
      'HY-7',
      'B',
      '2026-03-02',
      'N. N.',
      'bar',
      '2 of 5',
      '100 %, M 2.5 mm',
    ]),
  );
  const [outline] = drawn;
  if (outline?.type !== 'box') throw new Error('no outline');
  // ISO 7200, from memory: 180 mm wide.
  expect(outline.width * MODULE_MM).toBeCloseTo(180, 6);
  expect(outline.x + outline.width).toBeCloseTo(frame.inside.x + frame.inside.width, 6);
  expect(outline.y + outline.height).toBeCloseTo(frame.inside.y + frame.inside.height, 6);
});

test.each(PAPERS)('on %s every cell lies inside the block, whole and following', (paper) => {
  const frame = frameOf(paper);
  for (const following of [false, true]) {
    const [outline, ...cells] = titleBlock(frame, { ...BLOCK, name: 'A very long name '.repeat(20) }, following);
    if (outline?.type !== 'box') throw new Error('no outline');
    const right = outline.x + outline.width + 1e-9;
    for (const p of cells) {
      if (p.type === 'box') expect(p.x >= outline.x - 1e-9 && p.x + p.width <= right).toBe(true);
      if (p.type === 'text') expect(p.at.x + advance(p.text, p.size, p.weight)).toBeLessThan(right);
    }
  }
  expect(BLOCK_WIDTH).toBe(72);
});

test('text is broken at blanks, inside a word only if it is longer than a line, and cut with a mark', () => {
  expect(brokenAt('one two three', 1, advance('one two', 1) + 0.01)).toEqual(['one two', 'three']);
  const pieces = brokenAt('MMMMMMMM', 1, advance('MMM', 1));
  expect(pieces).toEqual(['MMM', 'MMM', 'MM']);
  expect(brokenAt('', 1, 5)).toEqual(['']);
  const cut = cutTo('a long text', 1, 3);
  expect(cut.endsWith('…')).toBe(true);
  expect(advance(cut, 1)).toBeLessThanOrEqual(3);
  expect(cutTo('short', 1, 30)).toBe('short');
  expect([isMeasured('Pump 30 L/min'), isMeasured('泵')]).toEqual([true, false]);
});
