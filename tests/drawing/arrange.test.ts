import { expect, test } from 'vitest';
import { shiftEach } from '../../src/circuit/arrange.ts';
import { applyEdit, invertEdit } from '../../src/circuit/edit.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { alignShifts, distributeShifts } from '../../src/drawing/arrange.ts';
import type { Edge } from '../../src/drawing/arrange.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { partBox } from '../../src/drawing/shapes.ts';
import { circuit, joins, part, valve } from './samples.ts';

const SHEET = circuit([
  part('F1', 'filter', { x: 0, y: 0 }),
  part('F2', 'filter', { x: 13, y: 20 }),
  part('F3', 'filter', { x: 40, y: 7 }),
  part('F4', 'filter', { x: 31, y: 31 }),
]);
const IDS = ['F1', 'F2', 'F3', 'F4'];
const after = (sheet: Circuit, shifts: ReadonlyMap<string, { x: number; y: number }>): Circuit =>
  applyEdit(sheet, shiftEach(sheet, shifts));
const sides: Record<Edge, (box: ReturnType<typeof partBox>) => number> = {
  left: (b) => b.x,
  centre: (b) => b.x + b.width / 2,
  right: (b) => b.x + b.width,
  top: (b) => b.y,
  middle: (b) => b.y + b.height / 2,
  bottom: (b) => b.y + b.height,
};

test.each(Object.keys(sides) as Edge[])('%s: all stand on one edge, and one undo brings them back', (edge) => {
  const edit = shiftEach(SHEET, alignShifts(SHEET, IDS, edge));
  const moved = applyEdit(SHEET, edit);
  const at = moved.parts.map((each) => sides[edge](partBox(each)));
  expect(new Set(at).size).toBe(1);
  // Nothing moves along the edge itself.
  const upright = edge === 'left' || edge === 'centre' || edge === 'right';
  moved.parts.forEach((each, i) =>
    expect(upright ? each.at?.y : each.at?.x).toBe(upright ? SHEET.parts[i]?.at?.y : SHEET.parts[i]?.at?.x),
  );
  expect(applyEdit(moved, invertEdit(SHEET, edit))).toEqual(SHEET);
});

test('a cylinder over its valve comes to stand so that the line from port to port is straight', () => {
  const sheet = circuit([valve('V1', { x: 0, y: 30 }), part('F1', 'filter', { x: 7, y: 10 })], joins('V1.A F1.A'));
  const moved = after(sheet, alignShifts(sheet, ['V1', 'F1'], 'centre'));
  expect(moved.parts[0]).toBe(sheet.parts[0]);
  expect(routeAll(moved).get('c1')).toHaveLength(2);
});

test('distributing leaves the outermost where they are and makes the gaps equal', () => {
  for (const way of ['across', 'down'] as const) {
    const moved = after(SHEET, distributeShifts(SHEET, IDS, way));
    const boxes = moved.parts.map(partBox).sort((a, b) => (way === 'across' ? a.x - b.x : a.y - b.y));
    const gaps = boxes.slice(1).map((b, i) => {
      const a = boxes[i] as typeof b;
      return way === 'across' ? b.x - a.x - a.width : b.y - a.y - a.height;
    });
    // Whole modules: two roundings of half a module each.
    expect(Math.max(...gaps) - Math.min(...gaps)).toBeLessThanOrEqual(1);
    const low = (each: Circuit): number =>
      Math.min(...each.parts.map((p) => (way === 'across' ? partBox(p).x : partBox(p).y)));
    expect(low(moved)).toBe(low(SHEET));
  }
  expect(distributeShifts(SHEET, ['F1', 'F2'], 'across').size).toBe(0);
});

test('what stands in line already is refused rather than done for nothing', () => {
  const moved = after(SHEET, alignShifts(SHEET, IDS, 'left'));
  expect(() => after(moved, alignShifts(moved, IDS, 'left'))).toThrow('stand like that already');
});
