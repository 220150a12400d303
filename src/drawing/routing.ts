import type { Box, Point, Side } from '../base/points.ts';
import { vector } from '../base/points.ts';
import type { Circuit, Connection, Part } from '../circuit/model.ts';
import type { Routes } from './geometry.ts';
import { boxOfPoints, inflate, overlaps, portOf, routeTouches } from './geometry.ts';
import { partLetters } from './letters.ts';
import type { LineNumbers } from './lines.ts';
import { lineNumbers } from './lines.ts';
import { Near } from './near.ts';
import type { LaidSegment } from './route-field.ts';
import { buildField, MARGIN } from './route-field.ts';
import type { Direction, Found } from './route-search.ts';
import { opposite, searchLeg, THROUGH_PART } from './route-search.ts';
import type { PlacedPort } from './shapes.ts';
import { partReach } from './shapes.ts';

/** What a route has to reckon with. `laid` grows as routes are added; see `lay`. */
export interface RoutingSheet {
  readonly circuit: Circuit;
  readonly parts: ReadonlyMap<string, Part>;
  readonly boxes: ReadonlyMap<string, Box>;
  /** Letters beside ports. */
  readonly letters: Near<Box>;
  readonly lines: LineNumbers;
  readonly laid: Near<LaidSegment>;
  readonly bodies: Near<readonly [part: string, box: Box]>;
}

/** One end of a route. */
export interface RoutingEnd {
  readonly port: PlacedPort;
  /** Where the line has left the part; the port itself at a joint. */
  readonly stub: Point;
  /** Outward; undefined at a joint. */
  readonly out?: Direction;
}

const DIRECTIONS: Record<Side, Direction> = { right: 0, down: 1, left: 2, up: 3 };
const ANY: readonly Direction[] = [0, 1, 2, 3];
/** How far a first search looks beyond the ends, in modules. */
const REACH = 12;
/** How far beyond the window of a search things may still matter; at least the margins of parts and letters. */
const SEEN = 2 * MARGIN;

export function routingSheet(circuit: Circuit, routes?: Routes): RoutingSheet {
  const sheet: RoutingSheet = {
    circuit,
    parts: new Map(circuit.parts.map((p) => [p.id, p])),
    boxes: new Map(circuit.parts.map((p) => [p.id, partReach(p)])),
    letters: new Near(),
    lines: lineNumbers(circuit),
    laid: new Near(),
    bodies: new Near(),
  };
  for (const body of sheet.boxes) sheet.bodies.add(body[1], body);
  for (const letter of circuit.parts.flatMap(partLetters)) sheet.letters.add(letter, letter);
  for (const [id, points] of routes ?? []) lay(sheet, id, points);
  return sheet;
}

/** Makes later routes reckon with this one. */
export function lay(sheet: RoutingSheet, connectionId: string, points: readonly Point[]): void {
  const line = sheet.lines.get(connectionId) ?? -1;
  for (let i = 1; i < points.length; i++) {
    const [a, b] = [points[i - 1] as Point, points[i] as Point];
    sheet.laid.add(boxOfPoints([a, b]) as Box, { line, a, b });
  }
}

/** A right-angled route from port to port. Never fails: at worst it is a plain Z through whatever is there. */
export const routeConnection = (sheet: RoutingSheet, connection: Connection): Point[] =>
  routeWith(sheet, connection).points;

export interface Routed {
  readonly points: Point[];
  /** All that could change the route lies in here; undefined = anything could. */
  readonly looked: Box | undefined;
}

/** A route, and how far one had to look for it. */
export function routeWith(sheet: RoutingSheet, connection: Connection): Routed {
  const from = endOf(sheet, connection.from.part, connection.from.port);
  const to = endOf(sheet, connection.to.part, connection.to.port);
  if (!from || !to) return { points: [], looked: undefined };
  const bends = connection.bends ?? [];
  if (bends.length === 0 && facing(sheet, from, to))
    return {
      points: [from.port.at, to.port.at],
      looked: inflate(boxOfPoints([from.port.at, to.port.at]) as Box, MARGIN),
    };
  const via = [outOf(from, bends[0]), ...bends, outOf(to, bends.at(-1))];
  const near = inflate(boxOfPoints([from.port.at, ...via, to.port.at]) as Box, REACH);
  const window = whole(near);
  let found = searchAll(sheet, connection, from, to, via, window);
  let looked: Box | undefined = inflate(window, SEEN);
  if (!found || found.cost >= THROUGH_PART) {
    looked = undefined;
    const all = boxOfPoints(
      [...sheet.boxes.values()].flatMap((b) => [b, { x: b.x + b.width, y: b.y + b.height }]),
    ) as Box;
    const wide = searchAll(sheet, connection, from, to, via, whole(inflate(cover(all, near), 4)));
    if (wide && (!found || wide.cost < found.cost)) found = wide;
  }
  const inner = found ? found.points : plainRoute(via);
  return { points: straighten([from.port.at, ...inner, to.port.at]), looked };
}

/** Routes of every connection, in the circuit's order. Short ones are laid first, as they have least choice. */
export function routeAll(circuit: Circuit): Map<string, Point[]> {
  return routeSome(circuit, new Map());
}

/**
 * Routes after some parts were moved, added or changed: only connections at those parts, connections
 * that those parts now cover, and new ones are laid anew; all others keep their route.
 */
export function reroute(previous: Routes, circuit: Circuit, changedPartIds: Iterable<string>): Map<string, Point[]> {
  const changed = new Set(changedPartIds);
  const covering = circuit.parts
    .filter((p) => changed.has(p.id))
    .flatMap((p) => [inflate(partReach(p), MARGIN - 0.01), ...partLetters(p).map((box) => inflate(box, 0.1))]);
  const parts = new Map(circuit.parts.map((p) => [p.id, p]));
  const kept = new Map<string, readonly Point[]>();
  for (const connection of circuit.connections) {
    const points = previous.get(connection.id);
    if (!points || changed.has(connection.from.part) || changed.has(connection.to.part)) continue;
    if (covering.some((box) => routeTouches(points, box))) continue;
    if (!stillFits(parts, connection, points)) continue;
    kept.set(connection.id, points);
  }
  return routeSome(circuit, kept);
}

function routeSome(circuit: Circuit, kept: Routes): Map<string, Point[]> {
  const sheet = routingSheet(circuit, kept);
  const fresh = new Map<string, Point[]>();
  const waiting = circuit.connections.filter((c) => !kept.has(c.id));
  for (const connection of layingOrder(sheet, waiting)) {
    const points = routeConnection(sheet, connection);
    lay(sheet, connection.id, points);
    fresh.set(connection.id, points);
  }
  return new Map(circuit.connections.map((c) => [c.id, fresh.get(c.id) ?? [...(kept.get(c.id) ?? [])]]));
}

/** Connections in the order in which they are laid: those with least choice first. */
export function layingOrder(sheet: RoutingSheet, connections: readonly Connection[]): Connection[] {
  return connections
    .map((connection, order) => ({ connection, order, span: spanOf(sheet, connection) }))
    .sort((a, b) => a.span - b.span || a.order - b.order)
    .map(({ connection }) => connection);
}

/** Bent by the user: before all others, since it cannot give way. */
function spanOf(sheet: RoutingSheet, connection: Connection): number {
  if (connection.bends && connection.bends.length > 0) return -1;
  const from = endOf(sheet, connection.from.part, connection.from.port)?.port.at;
  const to = endOf(sheet, connection.to.part, connection.to.port)?.port.at;
  return from && to ? Math.abs(from.x - to.x) + Math.abs(from.y - to.y) : Infinity;
}

function stillFits(parts: ReadonlyMap<string, Part>, connection: Connection, points: readonly Point[]): boolean {
  const from = parts.get(connection.from.part);
  const to = parts.get(connection.to.part);
  const first = points[0];
  const last = points.at(-1);
  if (!from || !to || !first || !last) return false;
  if (!same(portOf(from, connection.from).at, first) || !same(portOf(to, connection.to).at, last)) return false;
  return (connection.bends ?? []).every((bend) => routeTouches(points, { ...bend, width: 0, height: 0 }));
}

const same = (a: Point, b: Point): boolean => a.x === b.x && a.y === b.y;

export function endOf(sheet: RoutingSheet, partId: string, port: string): RoutingEnd | undefined {
  const part = sheet.parts.get(partId);
  if (!part) return undefined;
  const placed = portOf(part, { part: partId, port });
  if (placed.role === 'joint') return { port: placed, stub: placed.at };
  const box = sheet.boxes.get(partId) as Box;
  return { port: placed, stub: stubOf(placed, box), out: DIRECTIONS[placed.side] };
}

/** At least 1 M out, clear of the part's own margin, on the module grid. */
function stubOf(port: PlacedPort, box: Box): Point {
  const { x, y } = port.at;
  switch (port.side) {
    case 'left':
      return { x: Math.floor(Math.min(x, box.x) - MARGIN), y };
    case 'right':
      return { x: Math.ceil(Math.max(x, box.x + box.width) + MARGIN), y };
    case 'up':
      return { x, y: Math.floor(Math.min(y, box.y) - MARGIN) };
    case 'down':
      return { x, y: Math.ceil(Math.max(y, box.y + box.height) + MARGIN) };
  }
}

/** Where a bent line leaves the part: no further out than a bend that the user set straight before the port. */
function outOf(end: RoutingEnd, bend: Point | undefined): Point {
  const { at, side } = end.port;
  if (!bend || end.out === undefined) return end.stub;
  const out = vector(side);
  const ahead = (bend.x - at.x) * out.x + (bend.y - at.y) * out.y;
  const aside = (bend.x - at.x) * out.y + (bend.y - at.y) * out.x;
  const stub = (end.stub.x - at.x) * out.x + (end.stub.y - at.y) * out.y;
  return aside === 0 && ahead >= 0.5 && ahead < stub ? bend : end.stub;
}

/** Ports that look straight at each other with nothing between them need no search. */
function facing(sheet: RoutingSheet, from: RoutingEnd, to: RoutingEnd): boolean {
  const a = from.port;
  const b = to.port;
  if (from.out === undefined || to.out === undefined || from.out !== opposite(to.out)) return false;
  const out = vector(a.side);
  const along = (b.at.x - a.at.x) * out.x + (b.at.y - a.at.y) * out.y;
  const off = (b.at.x - a.at.x) * out.y + (b.at.y - a.at.y) * out.x;
  if (off !== 0 || along < 0) return false;
  const path = inflate(boxOfPoints([a.at, b.at]) as Box, 0.01);
  for (const [id, box] of sheet.bodies.touching(path)) {
    if (id !== a.ref.part && id !== b.ref.part && overlaps(box, path)) return false;
  }
  if (sheet.letters.touching(path).some((box) => overlaps(box, path))) return false;
  const clear = sheet.laid.touching(path).length === 0;
  return clear || along < 2 * MARGIN;
}

function searchAll(
  sheet: RoutingSheet,
  connection: Connection,
  from: RoutingEnd,
  to: RoutingEnd,
  via: readonly Point[],
  window: Box,
): Found | undefined {
  const seen = inflate(window, SEEN);
  const field = buildField({
    window,
    boxes: sheet.bodies
      .touching(seen)
      .flatMap(([id, box]) => (isJointEnd(from, id) || isJointEnd(to, id) ? [] : [box])),
    letters: sheet.letters.touching(seen),
    segments: sheet.laid.touching(seen),
    line: sheet.lines.get(connection.id) ?? -1,
    points: via,
  });
  const points: Point[] = [];
  let headings: readonly Direction[] = from.out === undefined ? ANY : [from.out];
  let cost = 0;
  for (let i = 1; i < via.length; i++) {
    const last = i === via.length - 1;
    // Between two bends that the user set, the line runs as the user drew it.
    const drawn = via.length > 2 ? straightOn(via[i - 1] as Point, via[i] as Point, headings) : undefined;
    if (drawn !== undefined && !(last && to.out !== undefined && drawn !== opposite(to.out))) {
      points.push(via[i - 1] as Point, via[i] as Point);
      headings = [drawn];
      continue;
    }
    const arrive = last && to.out !== undefined ? { arrive: opposite(to.out) } : {};
    const leg = searchLeg(field, { from: via[i - 1] as Point, headings, to: via[i] as Point, ...arrive });
    if (!leg) return undefined;
    points.push(...leg.points);
    headings = [leg.heading];
    cost += leg.cost;
  }
  return { points, heading: headings[0] as Direction, cost };
}

/** The direction of a stretch that needs no search: along the grid, and not back the way the line came. */
function straightOn(a: Point, b: Point, headings: readonly Direction[]): Direction | undefined {
  if ((a.x === b.x) === (a.y === b.y)) return undefined;
  const way: Direction = a.x === b.x ? (b.y > a.y ? 1 : 3) : b.x > a.x ? 0 : 2;
  return headings.every((heading) => heading === opposite(way)) ? undefined : way;
}

const isJointEnd = (end: RoutingEnd, partId: string): boolean => end.out === undefined && end.port.ref.part === partId;

/** The last resort: straight out, across in the middle, straight in. */
function plainRoute(via: readonly Point[]): Point[] {
  const points: Point[] = [];
  via.forEach((p, i) => {
    const before = via[i - 1];
    if (before && before.x !== p.x && before.y !== p.y) {
      const y = Math.round((before.y + p.y) / 2);
      points.push({ x: before.x, y }, { x: p.x, y });
    }
    points.push(p);
  });
  return points;
}

/** Drops doubled points and points in the middle of a straight run; a way back along a run is cut off too. */
export function straighten(points: readonly Point[]): Point[] {
  const out: Point[] = [];
  for (const p of points) {
    if (out.length > 0 && same(out.at(-1) as Point, p)) continue;
    while (out.length >= 2) {
      const a = out.at(-2) as Point;
      const b = out.at(-1) as Point;
      if (!((a.x === b.x && b.x === p.x) || (a.y === b.y && b.y === p.y))) break;
      out.pop();
    }
    if (out.length > 0 && same(out.at(-1) as Point, p)) continue;
    out.push(p);
  }
  const [only] = out;
  return out.length === 1 && only ? [only, only] : out;
}

const whole = (box: Box): Box => {
  const x = Math.floor(box.x);
  const y = Math.floor(box.y);
  return { x, y, width: Math.ceil(box.x + box.width) - x, height: Math.ceil(box.y + box.height) - y };
};

function cover(a: Box, b: Box): Box {
  const x = Math.min(a.x, b.x);
  const y = Math.min(a.y, b.y);
  return {
    x,
    y,
    width: Math.max(a.x + a.width, b.x + b.width) - x,
    height: Math.max(a.y + a.height, b.y + b.height) - y,
  };
}
