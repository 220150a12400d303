import type { Point } from '../base/points.ts';
import type { Circuit, Connection } from '../circuit/model.ts';
import { portOf } from './geometry.ts';
import { straighten } from './routing.ts';

/** Modules that a line keeps straight at a port when its first stretch is moved aside. */
const STUB = 2;

export interface Bent {
  /** Where the connection bends from now on. */
  readonly bends: readonly Point[];
  /** Index of the moved stretch in the new route. */
  readonly segment: number;
}

/**
 * Moves stretch `segment` of a right-angled route across itself, `wanted` modules right or down. Stretches beside it grow
 * or shrink; one that ends at a port keeps a stub there.
 */
export function moveSegment(route: readonly Point[], segment: number, wanted: number): Bent {
  const [a, b] = [route[segment], route[segment + 1]];
  if (!a || !b) return { bends: route.slice(1, -1), segment };
  const flat = a.y === b.y;
  const by = clamped(route, segment, flat, wanted);
  const moved = (p: Point): Point => (flat ? { x: p.x, y: Math.round(p.y + by) } : { x: Math.round(p.x + by), y: p.y });
  const length = Math.abs(a.x - b.x) + Math.abs(a.y - b.y);
  const both = segment === 0 && segment === route.length - 2;
  const stub = Math.max(1, Math.min(STUB, Math.floor((both ? length / 2 : length) - 1)));
  const towards = (from: Point, to: Point): Point => ({
    x: from.x + Math.sign(to.x - from.x) * stub,
    y: from.y + Math.sign(to.y - from.y) * stub,
  });
  const start = segment === 0 ? [a, towards(a, b), moved(towards(a, b))] : [...route.slice(0, segment), moved(a)];
  const end =
    segment === route.length - 2 ? [moved(towards(b, a)), towards(b, a), b] : [moved(b), ...route.slice(segment + 2)];
  const next = by === 0 ? route : straighten([...start, ...end]);
  return { bends: next.slice(1, -1), segment: segmentOn(next, middle(moved(a), moved(b)), flat) };
}

/** The stub at a port stays at least 1 M long, and never turns round. */
function clamped(route: readonly Point[], segment: number, flat: boolean, by: number): number {
  const on = (p: Point): number => (flat ? p.y : p.x);
  let out = by;
  const keep = (port: Point | undefined, corner: Point | undefined): void => {
    if (!port || !corner) return;
    const way = Math.sign(on(corner) - on(port));
    const least = on(port) + way - on(corner);
    if (way > 0) out = Math.max(out, Math.ceil(least));
    if (way < 0) out = Math.min(out, Math.floor(least));
  };
  if (segment === 1) keep(route[0], route[1]);
  if (segment === route.length - 3) keep(route.at(-1), route.at(-2));
  return out;
}

const middle = (a: Point, b: Point): Point => ({ x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 });

/** The stretch of that direction that passes the point, or the nearest to it. */
export function segmentOn(route: readonly Point[], at: Point, flat: boolean): number {
  let best = 0;
  let least = Infinity;
  for (let i = 0; i + 1 < route.length; i++) {
    const [a, b] = [route[i] as Point, route[i + 1] as Point];
    const x = Math.min(Math.max(at.x, Math.min(a.x, b.x)), Math.max(a.x, b.x));
    const y = Math.min(Math.max(at.y, Math.min(a.y, b.y)), Math.max(a.y, b.y));
    const away = Math.hypot(at.x - x, at.y - y) + ((a.y === b.y) === flat ? 0 : 1000);
    if (away < least) [best, least] = [i, away];
  }
  return best;
}

/** The bends without those at the ends of a stretch: the sheet lays that piece again. */
export function withoutBendsAt(connection: Connection, route: readonly Point[], segment: number): readonly Point[] {
  const ends = [route[segment], route[segment + 1]];
  return (connection.bends ?? []).filter((bend) => !ends.some((end) => end?.x === bend.x && end.y === bend.y));
}

/** A bend that stood straight before a port goes along when the port's part moves, so that the line stays straight there. */
export function slideBends(
  circuit: Circuit,
  moved: ReadonlySet<string>,
  dx: number,
  dy: number,
): ReadonlyMap<string, readonly Point[]> {
  const parts = new Map(circuit.parts.map((part) => [part.id, part]));
  const out = new Map<string, readonly Point[]>();
  for (const { id, from, to, bends } of circuit.connections) {
    if (!bends?.length || moved.has(from.part) === moved.has(to.part)) continue;
    const ref = moved.has(from.part) ? from : to;
    const part = parts.get(ref.part);
    if (!part) continue;
    const order = ref === from ? [...bends] : bends.toReversed();
    const { at } = portOf(part, ref);
    const [first, second] = order as [Point, Point | undefined];
    const upright = first.x === at.x && (second === undefined || second.y === first.y);
    const flat = first.y === at.y && (second === undefined || second.x === first.x);
    if (!upright && !flat) continue;
    order[0] = { x: first.x + (upright ? dx : 0), y: first.y + (flat ? dy : 0) };
    out.set(id, ref === from ? order : order.reverse());
  }
  return out;
}
