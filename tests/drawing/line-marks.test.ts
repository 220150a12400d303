import { expect, test } from 'vitest';
import type { Point } from '../../src/base/points.ts';
import { lineMarks, pathPen } from '../../src/drawing/line-marks.ts';
import { pathData } from '../../src/drawing/strokes.ts';
import type { LineLook, Stroke } from '../../src/drawing/strokes.ts';

const path = (...pairs: [number, number][]): Point[] => pairs.map(([x, y]) => ({ x, y }));
const BENT = path([0, 0], [0, 12], [12, 12]);
const roles = (strokes: readonly Stroke[]): string[] => strokes.map((s) => s.role);
const of = (look: LineLook, role: Stroke['role']): Stroke | undefined =>
  lineMarks(BENT, look).find((s) => s.role === role);

// Weights in px at 8 px a module: the design's table of line classes.
test.each([
  ['fed', 3.5, 'fed'],
  ['flows to tank', 2, 'flows-to-tank'],
  ['vented', 1, 'vented'],
  ['cut off', 1.75, 'cut-off'],
] as const)('%s is drawn %f px in its colour', (name, weight, colour) => {
  expect(of({ class: name }, 'core')).toMatchObject({ weight, colour });
});

test('every class differs from every other in weight or mark, not only in colour', () => {
  const looks: LineLook[] = [
    { class: 'idle' },
    { class: 'fed' },
    { class: 'fed', blocked: true },
    { class: 'flows to tank', flow: 'forward' },
    { class: 'vented' },
    { class: 'cut off' },
    { class: 'carries displaced oil' },
    { class: 'cut off', trapped: 'known' },
    { class: 'cut off', trapped: 'possible' },
  ];
  const shapes = looks.map((look) =>
    JSON.stringify(lineMarks(BENT, look).map(({ role, weight, dash, lines }) => [role, weight, dash, lines.length])),
  );
  expect(new Set(shapes).size).toBe(looks.length);
});

test('chevrons stand about every 3 M and point the way the oil runs', () => {
  const forward = of({ class: 'flows to tank', flow: 'forward' }, 'chevron');
  expect(forward?.lines).toHaveLength(8);
  const [left, tip, right] = forward?.lines[0] as [Point, Point, Point];
  expect(tip.y).toBeGreaterThan(left.y);
  expect(left.y).toBe(right.y);
  const backward = of({ class: 'flows to tank', flow: 'backward' }, 'chevron');
  const last = backward?.lines.at(-1) as [Point, Point, Point];
  expect(last[1].y).toBeLessThan(last[0].y);
});

test.each(['unknown', undefined] as const)('flow %s draws no chevrons', (flow) => {
  expect(of({ class: 'flows to tank', ...(flow && { flow }) }, 'chevron')).toBeUndefined();
});

test('a cut off line has a bar 1 M from each port, across the line', () => {
  expect(of({ class: 'cut off' }, 'end-bar')?.lines).toEqual([path([-0.7, 1], [0.7, 1]), path([11, 11.3], [11, 12.7])]);
});

test('a branch has no bar where it leaves the trunk', () => {
  const strokes = lineMarks(BENT, { class: 'cut off' }, 'working', { end: 1 });
  expect(strokes.find((s) => s.role === 'end-bar')?.lines).toHaveLength(1);
});

test('a line blocked under pressure has a pair of bars at each port', () => {
  expect(of({ class: 'fed', blocked: true }, 'block-bar')?.lines).toHaveLength(4);
  expect(of({ class: 'fed' }, 'block-bar')).toBeUndefined();
});

test('bars of a line shorter than their distance stay on it', () => {
  const strokes = lineMarks(path([0, 0], [2, 0]), { class: 'cut off' });
  for (const [p] of strokes.find((s) => s.role === 'end-bar')?.lines ?? []) {
    expect(p?.x).toBeGreaterThan(0);
    expect(p?.x).toBeLessThan(2);
  }
});

test('the hatch keeps to a band of 9 px at 45°, and possible pressure is sparser and thinner', () => {
  const known = of({ class: 'cut off', trapped: 'known' }, 'hatch');
  const possible = of({ class: 'cut off', trapped: 'possible' }, 'hatch');
  for (const line of known?.lines ?? []) {
    const [a, b] = line as [Point, Point];
    expect(Math.abs(a.x - b.x)).toBeCloseTo(Math.abs(a.y - b.y), 9);
    for (const p of [a, b]) {
      const near = Math.min(Math.abs(p.x), Math.abs(p.y - 12));
      expect(near).toBeLessThanOrEqual(9 / 8 / 2 + 1e-9);
    }
  }
  expect(known?.lines.length).toBeGreaterThan(20);
  expect(possible?.lines.length).toBeLessThan((known?.lines.length ?? 0) / 2);
});

test('hatches of neighbouring pieces lie on one lattice', () => {
  const sums = (points: Point[]): number[] =>
    (lineMarks(points, { class: 'cut off', trapped: 'known' }).find((s) => s.role === 'hatch')?.lines ?? []).map(
      (l) => ((l[0] as Point).x + (l[0] as Point).y) / 0.75,
    );
  for (const k of [...sums(path([0, 0], [7, 0])), ...sums(path([7, 0], [7, 5]))])
    expect(k).toBeCloseTo(Math.round(k), 6);
});

test('displaced oil is a double line: paper inside a wider stroke', () => {
  const strokes = lineMarks(BENT, { class: 'carries displaced oil' });
  expect(roles(strokes)).toEqual(['core', 'gap']);
  expect(strokes[1]?.weight).toBeLessThan(strokes[0]?.weight ?? 0);
  expect(strokes[1]?.colour).toBe('paper');
});

test.each([
  ['pilot', [4, 2.5]],
  ['drain', [1.75, 1.75]],
] as const)('a %s line is dashed %j in the colour of its class', (use, dash) => {
  const [core] = lineMarks(BENT, { class: 'fed' }, use);
  expect(core).toMatchObject({ dash, colour: 'fed' });
});

test('no points, or twice the same one, draw nothing', () => {
  expect(lineMarks([], { class: 'fed' })).toEqual([]);
  expect(lineMarks(path([1, 1], [1, 1]), { class: 'fed' })).toEqual([]);
});

test('a path inside a symbol is drawn as its line, an idle one stays as it is', () => {
  expect(pathPen({ class: 'fed' })).toBe('fed');
  expect(pathPen({ class: 'cut off', trapped: 'possible' })).toBe('trapped');
  expect(pathPen({ class: 'idle' })).toBeUndefined();
});

test('path data in modules, rounded', () => {
  expect(pathData([path([0, 1], [2.00049, 3])])).toBe('M0 1L2 3');
  expect(pathData([path([0, 0], [1, 0]), path([5, 5], [6, 5])])).toBe('M0 0L1 0M5 5L6 5');
  expect(pathData([path([0, 0], [1, 0], [1, 1])], true)).toBe('M0 0L1 0L1 1Z');
});
