import type { Box, Point } from '../base/points.ts';
import { vector } from '../base/points.ts';
import type { Connection } from '../circuit/model.ts';
import { boxOfPoints, inflate, overlaps } from './geometry.ts';
import { endOf, straighten } from './routing.ts';
import type { RoutingEnd, RoutingSheet } from './routing.ts';

/** Modules that a way round stands off from the ends. */
const ROUND = 3;
/** In modules of length: a turn, a part in the way, a stretch back into the part it came from. */
const COST = { bend: 6, part: 60, back: 400 } as const;

/**
 * A route for a line whose part is on its way, without a search: the best of a dozen simple shapes, judged by length,
 * turns and the parts they cross. Other lines are not looked at; they are when the part is put down.
 */
export function quickRoute(sheet: RoutingSheet, connection: Connection): Point[] {
  const from = endOf(sheet, connection.from.part, connection.from.port);
  const to = endOf(sheet, connection.to.part, connection.to.port);
  if (!from || !to) return [];
  const bends = connection.bends ?? [];
  const [p, q] = [from.port.at, to.port.at];
  if (bends.length > 0) return straighten([p, ...legs([from.stub, ...bends, to.stub]), q]);
  const shapes = shapesBetween(from, to);
  const reachBox = inflate(boxOfPoints([p, q, ...shapes.flat()]) as Box, 1);
  const near: Box[] = [];
  for (const box of sheet.boxes.values()) if (overlaps(box, reachBox)) near.push(inflate(box, 0.5));
  let best: Point[] = [];
  let least = Infinity;
  for (const inner of shapes) {
    const points = straighten([from.stub, ...inner, to.stub]);
    const cost = costOf(points, near) + leaving(from, points[0], points[1]) + leaving(to, points.at(-1), points.at(-2));
    if (cost < least) [least, best] = [cost, points];
  }
  return straighten([p, ...best, q]);
}

/** From bend to bend, with one corner where two are not in line. */
function legs(via: readonly Point[]): Point[] {
  return via.flatMap((p, i) => {
    const before = via[i - 1];
    return before && before.x !== p.x && before.y !== p.y ? [{ x: before.x, y: p.y }, p] : [p];
  });
}

function shapesBetween(from: RoutingEnd, to: RoutingEnd): Point[][] {
  const [a, b] = [from.stub, to.stub];
  const across = (y: number): Point[] => [
    { x: a.x, y },
    { x: b.x, y },
  ];
  const down = (x: number): Point[] => [
    { x, y: a.y },
    { x, y: b.y },
  ];
  const [left, right] = [Math.min(a.x, b.x) - ROUND, Math.max(a.x, b.x) + ROUND];
  const [top, bottom] = [Math.min(a.y, b.y) - ROUND, Math.max(a.y, b.y) + ROUND];
  const middle = { x: Math.round((a.x + b.x) / 2), y: Math.round((a.y + b.y) / 2) };
  const sides = [left - ROUND * 2, left, right, right + ROUND * 2];
  return [
    [{ x: a.x, y: b.y }],
    [{ x: b.x, y: a.y }],
    ...[middle.y, a.y, b.y, top, bottom].map(across),
    ...[middle.x, left, right].map(down),
    // Out to a side, along it, and back in: between ports that look away from each other.
    ...sides.flatMap((x) => [
      [
        { x: a.x, y: top },
        { x, y: top },
        { x, y: bottom },
        { x: b.x, y: bottom },
      ],
      [
        { x: a.x, y: bottom },
        { x, y: bottom },
        { x, y: top },
        { x: b.x, y: top },
      ],
    ]),
  ];
}

function costOf(points: readonly Point[], near: readonly Box[]): number {
  let cost = (points.length - 2) * COST.bend;
  for (let i = 1; i < points.length; i++) {
    const [a, b] = [points[i - 1] as Point, points[i] as Point];
    cost += Math.abs(a.x - b.x) + Math.abs(a.y - b.y);
    const [x0, x1] = a.x < b.x ? [a.x, b.x] : [b.x, a.x];
    const [y0, y1] = a.y < b.y ? [a.y, b.y] : [b.y, a.y];
    for (const box of near) {
      if (x0 < box.x + box.width && box.x < x1 && y0 < box.y + box.height && box.y < y1) cost += COST.part;
      else if (x0 === x1 && x0 > box.x && x0 < box.x + box.width && y0 < box.y + box.height && box.y < y1)
        cost += COST.part;
      else if (y0 === y1 && y0 > box.y && y0 < box.y + box.height && x0 < box.x + box.width && box.x < x1)
        cost += COST.part;
    }
  }
  return cost;
}

/** A line never runs back into the part that it has just left. */
function leaving(end: RoutingEnd, first: Point | undefined, next: Point | undefined): number {
  if (end.out === undefined || !first || !next) return 0;
  const out = vector(end.port.side);
  return (next.x - first.x) * out.x + (next.y - first.y) * out.y < 0 ? COST.back : 0;
}
