import type { Box, Point } from '../base/points.ts';
import { union } from '../base/points.ts';
import type { Circuit, Connection, Part, PortRef } from '../circuit/model.ts';
import type { PlacedPort } from './shapes.ts';
import { partBox, placedPorts, placementOf } from './shapes.ts';

export type Routes = ReadonlyMap<string, readonly Point[]>;

export const partById = (circuit: Circuit, id: string): Part | undefined => circuit.parts.find((p) => p.id === id);

/**
 * Where a port stands and which way a line leaves it; undefined if there is no such part. A port that
 * its part does not have is taken to be a joint at the part's origin, so that a wrong file still shows.
 */
export function portPlace(circuit: Circuit, ref: PortRef): PlacedPort | undefined {
  const part = partById(circuit, ref.part);
  return part && portOf(part, ref);
}

export function portOf(part: Part, ref: PortRef): PlacedPort {
  const found = placedPorts(part).find((p) => p.ref.port === ref.port);
  return found ?? { ref, at: placementOf(part).at, side: 'up', role: 'joint' };
}

export const partBoxes = (circuit: Circuit): Map<string, Box> => new Map(circuit.parts.map((p) => [p.id, partBox(p)]));

export const inflate = (box: Box, by: number): Box => ({
  x: box.x - by,
  y: box.y - by,
  width: box.width + 2 * by,
  height: box.height + 2 * by,
});

/** True if the insides share a point; touching edges do not count. */
export const overlaps = (a: Box, b: Box): boolean =>
  a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height;

export const contains = (box: Box, p: Point): boolean =>
  p.x >= box.x && p.x <= box.x + box.width && p.y >= box.y && p.y <= box.y + box.height;

export const boxOfPoints = (points: readonly Point[]): Box | undefined =>
  union(points.map((p) => ({ x: p.x, y: p.y, width: 0, height: 0 })));

/** Parts, lines and free labels together; an empty circuit has an empty sheet of 80 × 50 M. */
export function circuitBounds(circuit: Circuit, routes?: Routes): Box {
  const boxes: Box[] = circuit.parts.map(partBox);
  for (const points of routes?.values() ?? []) {
    const box = boxOfPoints(points);
    if (box) boxes.push(box);
  }
  for (const label of circuit.labels ?? [])
    boxes.push({ x: label.at.x, y: label.at.y - 2, width: label.text.length, height: 2 });
  return union(boxes) ?? { x: 0, y: 0, width: 80, height: 50 };
}

/** The nearest port within `reach` modules; the earlier part wins a tie. */
export function nearestPort(circuit: Circuit, to: Point, reach: number, except?: PortRef): PlacedPort | undefined {
  let best: PlacedPort | undefined;
  let least = reach;
  for (const part of circuit.parts) {
    for (const port of placedPorts(part)) {
      if (except && except.part === port.ref.part && except.port === port.ref.port) continue;
      const distance = Math.hypot(port.at.x - to.x, port.at.y - to.y);
      if (distance < least || (distance === least && !best)) {
        least = distance;
        best = port;
      }
    }
  }
  return best;
}

/** The part drawn last whose outline holds the point; small parts are given a reach of `margin`. */
export function partAt(circuit: Circuit, at: Point, margin = 0.5): Part | undefined {
  return circuit.parts.findLast((part) => contains(inflate(partBox(part), margin), at));
}

export const partsTouching = (circuit: Circuit, box: Box): Part[] =>
  circuit.parts.filter((part) => overlaps(inflate(partBox(part), 0.01), box));

export function segmentTouches(a: Point, b: Point, box: Box): boolean {
  const x = Math.min(a.x, b.x);
  const y = Math.min(a.y, b.y);
  return (
    x <= box.x + box.width && box.x <= Math.max(a.x, b.x) && y <= box.y + box.height && box.y <= Math.max(a.y, b.y)
  );
}

export const routeTouches = (points: readonly Point[], box: Box): boolean =>
  points.some((p, i) => i > 0 && segmentTouches(points[i - 1] as Point, p, box));

export const connectionsTouching = (circuit: Circuit, routes: Routes, box: Box): Connection[] =>
  circuit.connections.filter((c) => routeTouches(routes.get(c.id) ?? [], box));

/** The connection whose route passes within `reach` of the point, the nearest first. */
export function connectionAt(circuit: Circuit, routes: Routes, at: Point, reach = 0.75): Connection | undefined {
  let best: Connection | undefined;
  let least = reach;
  for (const connection of circuit.connections) {
    const distance = distanceToRoute(routes.get(connection.id) ?? [], at);
    if (distance <= least) {
      least = distance;
      best = connection;
    }
  }
  return best;
}

export function distanceToRoute(points: readonly Point[], at: Point): number {
  let least = Infinity;
  for (let i = 1; i < points.length; i++) {
    const a = points[i - 1] as Point;
    const b = points[i] as Point;
    const x = Math.min(Math.max(at.x, Math.min(a.x, b.x)), Math.max(a.x, b.x));
    const y = Math.min(Math.max(at.y, Math.min(a.y, b.y)), Math.max(a.y, b.y));
    least = Math.min(least, Math.hypot(at.x - x, at.y - y));
  }
  return least;
}
