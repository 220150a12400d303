import type { Box, Point, Side } from '../../base/points.ts';

/** What stands where on the sheet, in modules. */
export interface HitMap {
  readonly parts: readonly { readonly id: string; readonly box: Box }[];
  /** Where lines go on on other sheets. */
  readonly references?: readonly { readonly id: string; readonly box: Box }[];
  readonly ports: readonly HitPort[];
  readonly routes: readonly { readonly id: string; readonly points: readonly Point[] }[];
  /** Free texts. */
  readonly labels?: readonly { readonly id: string; readonly box: Box }[];
}

export interface HitPort {
  readonly part: string;
  readonly port: string;
  readonly at: Point;
  readonly side: Side;
  /** A junction is nothing but its port. */
  readonly joint: boolean;
}

export type Hit =
  | { readonly type: 'port'; readonly port: HitPort }
  | { readonly type: 'part'; readonly id: string }
  | { readonly type: 'reference'; readonly id: string }
  | { readonly type: 'connection'; readonly id: string; readonly at: Point; readonly segment: number }
  | { readonly type: 'paper' };

export const distance = (a: Point, b: Point): number => Math.hypot(a.x - b.x, a.y - b.y);

/** The nearest port within `reach`. */
export function portAt(map: HitMap, p: Point, reach: number): HitPort | undefined {
  let best: HitPort | undefined;
  let least = reach;
  for (const port of map.ports) {
    const d = distance(port.at, p);
    if (d <= least) {
      least = d;
      best = port;
    }
  }
  return best;
}

/** The last drawn part whose box, grown by `reach`, holds the point; of two, the one whose middle is nearer. */
export function partAt(map: HitMap, p: Point, reach: number): string | undefined {
  let best: string | undefined;
  let least = Infinity;
  for (const { id, box } of map.parts) {
    if (!inBox(box, p, reach)) continue;
    const d = distance({ x: box.x + box.width / 2, y: box.y + box.height / 2 }, p);
    if (d <= least) {
      least = d;
      best = id;
    }
  }
  return best;
}

/** The nearest route within `reach`, with the foot of the perpendicular. */
export function routeAt(map: HitMap, p: Point, reach: number): Extract<Hit, { type: 'connection' }> | undefined {
  let best: Extract<Hit, { type: 'connection' }> | undefined;
  let least = reach;
  for (const { id, points } of map.routes) {
    for (let i = 0; i + 1 < points.length; i++) {
      const foot = footOn(points[i] as Point, points[i + 1] as Point, p);
      const d = distance(foot, p);
      if (d <= least) {
        least = d;
        best = { type: 'connection', id, at: foot, segment: i };
      }
    }
  }
  return best;
}

/** Ports first, then references and parts, then lines. */
export function hitAt(map: HitMap, p: Point, reach: number): Hit {
  const port = portAt(map, p, reach);
  if (port) return { type: 'port', port };
  const reference = map.references?.find(({ box }) => inBox(box, p));
  if (reference) return { type: 'reference', id: reference.id };
  const part = partAt(map, p, 0);
  if (part !== undefined) return { type: 'part', id: part };
  const route = routeAt(map, p, reach);
  if (route) return route;
  const near = partAt(map, p, reach / 2);
  return near !== undefined ? { type: 'part', id: near } : { type: 'paper' };
}

export const inBox = (box: Box, p: Point, reach = 0): boolean =>
  p.x >= box.x - reach && p.x <= box.x + box.width + reach && p.y >= box.y - reach && p.y <= box.y + box.height + reach;

export const boxOf = (a: Point, b: Point): Box => ({
  x: Math.min(a.x, b.x),
  y: Math.min(a.y, b.y),
  width: Math.abs(a.x - b.x),
  height: Math.abs(a.y - b.y),
});

const within = (outer: Box, inner: Box): boolean =>
  inner.x >= outer.x &&
  inner.y >= outer.y &&
  inner.x + inner.width <= outer.x + outer.width &&
  inner.y + inner.height <= outer.y + outer.height;

/** Parts, connections and texts that lie wholly in the rubber band. */
export function inBand(map: HitMap, band: Box): { parts: string[]; connections: string[]; labels: string[] } {
  return {
    parts: map.parts.filter(({ box }) => within(band, box)).map(({ id }) => id),
    connections: map.routes.filter(({ points }) => points.every((p) => inBox(band, p))).map(({ id }) => id),
    labels: (map.labels ?? []).filter(({ box }) => within(band, box)).map(({ id }) => id),
  };
}

function footOn(a: Point, b: Point, p: Point): Point {
  const dx = b.x - a.x;
  const dy = b.y - a.y;
  const square = dx * dx + dy * dy;
  const t = square === 0 ? 0 : Math.min(1, Math.max(0, ((p.x - a.x) * dx + (p.y - a.y) * dy) / square));
  return { x: a.x + t * dx, y: a.y + t * dy };
}
