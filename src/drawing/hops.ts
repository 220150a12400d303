import type { Point } from '../base/points.ts';
import type { Stroke } from './strokes.ts';

/** Modules. */
const RADIUS = 0.55;
/** Chords that stand for the half circle. */
const STEPS = 6;

/** Points at which flat stretches hop, by their y. */
export type Hops = ReadonlyMap<number, readonly number[]>;

export function hopsOf(crossings: readonly Point[]): Hops {
  const out = new Map<number, number[]>();
  for (const { x, y } of crossings) {
    const list = out.get(y);
    if (list) list.push(x);
    else out.set(y, [x]);
  }
  for (const list of out.values()) list.sort((a, b) => a - b);
  return out;
}

/** The strokes with a half circle upwards wherever a flat stretch crosses another line. Marks and hatches stay. */
export function withHops(strokes: readonly Stroke[], hops: Hops): readonly Stroke[] {
  if (hops.size === 0) return strokes;
  return strokes.map((stroke) => {
    if (stroke.role !== 'core' && stroke.role !== 'gap' && stroke.role !== 'band') return stroke;
    const lines = stroke.lines.map((points) => hopped(points, hops));
    return lines.every((points, i) => points === stroke.lines[i]) ? stroke : { ...stroke, lines };
  });
}

function hopped(points: readonly Point[], hops: Hops): readonly Point[] {
  let out: Point[] | undefined;
  points.forEach((b, i) => {
    const a = points[i - 1];
    const over = a && a.y === b.y ? within(hops.get(a.y) ?? [], Math.min(a.x, b.x), Math.max(a.x, b.x)) : [];
    if (a && over.length > 0) {
      out ??= points.slice(0, i);
      const way = Math.sign(b.x - a.x);
      for (const x of way > 0 ? over : over.toReversed()) out.push(...halfCircle(x, a.y, way));
    }
    out?.push(b);
  });
  return out ?? points;
}

/** Clear of corners and ports: a hop needs room on both sides. */
const within = (xs: readonly number[], low: number, high: number): readonly number[] =>
  xs.filter((x) => x - RADIUS > low && x + RADIUS < high);

function halfCircle(x: number, y: number, way: number): Point[] {
  return Array.from({ length: STEPS + 1 }, (_, i) => {
    const angle = (i / STEPS) * Math.PI;
    return { x: x - way * RADIUS * Math.cos(angle), y: y - RADIUS * Math.sin(angle) };
  });
}
