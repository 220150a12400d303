import type { Point } from '../base/points.ts';
import type { Circuit } from '../circuit/model.ts';
import type { Routes } from './geometry.ts';
import type { LineNumbers } from './lines.ts';

/** A part of a route that no earlier connection of the same line draws. */
export interface Piece {
  readonly points: readonly Point[];
  /** It begins at the route's first point, ends at its last. */
  readonly fromPort: boolean;
  readonly toPort: boolean;
}

interface Covered {
  readonly flat: boolean;
  readonly fixed: number;
  readonly low: number;
  readonly high: number;
}

/**
 * What each connection has to draw so that a shared trunk is drawn once: dashes, chevrons and hatches
 * laid twice would blur each other. `only`: of these lines.
 */
export function freshPieces(
  circuit: Circuit,
  routes: Routes,
  numbers: LineNumbers,
  only?: ReadonlySet<number>,
): Map<string, Piece[]> {
  const covered = new Map<number, Covered[]>();
  const out = new Map<string, Piece[]>();
  for (const connection of circuit.connections) {
    const points = routes.get(connection.id) ?? [];
    const line = numbers.get(connection.id) ?? -1;
    if (only && !only.has(line)) continue;
    const before = covered.get(line) ?? [];
    out.set(connection.id, piecesOf(points, before));
    const added = points.slice(1).map((b, i) => spanOf(points[i] as Point, b));
    covered.set(line, [...before, ...added]);
  }
  return out;
}

const spanOf = (a: Point, b: Point): Covered =>
  a.y === b.y
    ? { flat: true, fixed: a.y, low: Math.min(a.x, b.x), high: Math.max(a.x, b.x) }
    : { flat: false, fixed: a.x, low: Math.min(a.y, b.y), high: Math.max(a.y, b.y) };

function piecesOf(points: readonly Point[], covered: readonly Covered[]): Piece[] {
  const pieces: Piece[] = [];
  let run: Point[] = [];
  let runFromPort = false;
  const close = (toPort: boolean): void => {
    if (run.length > 1) pieces.push({ points: run, fromPort: runFromPort, toPort });
    run = [];
  };
  const last = points.length - 1;
  for (let i = 1; i <= last; i++) {
    const a = points[i - 1] as Point;
    const b = points[i] as Point;
    for (const [from, to] of gaps(a, b, covered)) {
      const joins = run.length > 0 && samePoint(run.at(-1) as Point, from);
      if (!joins) {
        close(false);
        run = [from];
        runFromPort = i === 1 && samePoint(from, a);
      }
      run.push(to);
    }
  }
  close(last > 0 && run.length > 0 && samePoint(run.at(-1) as Point, points[last] as Point));
  return pieces;
}

const samePoint = (a: Point, b: Point): boolean => a.x === b.x && a.y === b.y;

/** The uncovered stretches of a segment, in its own direction. */
function gaps(a: Point, b: Point, covered: readonly Covered[]): [Point, Point][] {
  const own = spanOf(a, b);
  if (own.low === own.high) return [];
  const on = covered
    .filter((c) => c.flat === own.flat && c.fixed === own.fixed && c.high > own.low && c.low < own.high)
    .sort((p, q) => p.low - q.low);
  const free: [number, number][] = [];
  let at = own.low;
  for (const c of on) {
    if (c.low > at) free.push([at, c.low]);
    at = Math.max(at, c.high);
  }
  if (at < own.high) free.push([at, own.high]);
  const forward = own.flat ? a.x < b.x : a.y < b.y;
  const toPoint = (v: number): Point => (own.flat ? { x: v, y: own.fixed } : { x: own.fixed, y: v });
  return (forward ? free : free.reverse().map(([l, h]): [number, number] => [h, l])).map(([l, h]) => [
    toPoint(l),
    toPoint(h),
  ]);
}
