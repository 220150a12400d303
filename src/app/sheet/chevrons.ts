import type { Point } from '../../base/points.ts';
import type { Routes } from '../../drawing/geometry.ts';
import type { SceneLine } from '../../drawing/scene.ts';
import type { RealFlow } from './real-flows.ts';

/**
 * Flow marks as oil really runs. Connections of one line share stretches on the sheet: there a mark shows the sum of
 * their flows, turned if it runs the other way, left out where nothing runs.
 */
export function trueChevrons(lines: readonly SceneLine[], routes: Routes, flows: ReadonlyMap<string, RealFlow>): SceneLine[] {
  const together = new Map<number, string[]>();
  for (const { connection, line } of lines) together.set(line, [...(together.get(line) ?? []), connection]);
  return lines.map((line) => {
    const own = flows.get(line.connection);
    if (!own) return line;
    const others = (together.get(line.line) ?? []).flatMap((id) => {
      const flow = flows.get(id)?.flow ?? 0;
      return flow === 0 ? [] : [{ flow, points: routes.get(id) ?? [] }];
    });
    const strokes = line.strokes.flatMap((stroke) => {
      if (stroke.role !== 'chevron') return [stroke];
      const marks = stroke.lines.flatMap((mark) => {
        const [left, tip, right] = mark;
        if (!left || !tip || !right) return [mark];
        const back = { x: (left.x + right.x) / 2, y: (left.y + right.y) / 2 };
        const middle = { x: (tip.x + back.x) / 2, y: (tip.y + back.y) / 2 };
        const heading = { x: Math.sign(tip.x - back.x), y: Math.sign(tip.y - back.y) };
        const flow = others.reduce((sum, each) => sum + each.flow * passes(each.points, middle, heading), 0);
        if (Math.abs(flow) <= own.still) return [];
        return [flow > 0 ? mark : turned(left, tip, right, back)];
      });
      return marks.length > 0 ? [{ ...stroke, lines: marks }] : [];
    });
    return { ...line, strokes };
  });
}

const turned = (left: Point, tip: Point, right: Point, back: Point): Point[] => [
  { x: left.x + tip.x - back.x, y: left.y + tip.y - back.y },
  back,
  { x: right.x + tip.x - back.x, y: right.y + tip.y - back.y },
];

/** Modules that a line may run on into a symbol. */
const STUB = 2;

/** 1 or −1 if a route passes the spot along or against the heading; 0 if it does not. */
function passes(points: readonly Point[], at: Point, heading: Point): number {
  for (let i = 1; i < points.length; i++) {
    const [a, b] = [points[i - 1] as Point, points[i] as Point];
    const way = { x: Math.sign(b.x - a.x), y: Math.sign(b.y - a.y) };
    const before = i === 1 ? STUB : 0.01;
    const after = i === points.length - 1 ? STUB : 0.01;
    const along = way.x * (at.x - a.x) + way.y * (at.y - a.y);
    const aside = Math.abs(way.x * (at.y - a.y)) + Math.abs(way.y * (at.x - a.x));
    const length = Math.abs(b.x - a.x) + Math.abs(b.y - a.y);
    if (length === 0 || aside > 0.01 || along < -before || along > length + after) continue;
    const same = way.x * heading.x + way.y * heading.y;
    if (same !== 0) return same;
  }
  return 0;
}
