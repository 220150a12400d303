import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Box, Point, Turn } from '../../src/base/points.ts';
import { vector } from '../../src/base/points.ts';
import type { Circuit, Part, PortRef } from '../../src/circuit/model.ts';
import { inflate, overlaps, portPlace } from '../../src/drawing/geometry.ts';
import { lay, reroute, routeAll, routeConnection, routingSheet } from '../../src/drawing/routing.ts';
import { partReach } from '../../src/drawing/shapes.ts';
import { circuit, joins, part, unplacedRig } from './samples.ts';
import { placeMissing } from '../../src/drawing/place.ts';

const at = (x: number, y: number): Point => ({ x, y });
const orthogonal = (points: readonly Point[]): boolean =>
  points.every((p, i) => i === 0 || p.x === (points[i - 1] as Point).x || p.y === (points[i - 1] as Point).y);

function crosses(points: readonly Point[], box: Box): boolean {
  return points.some((b, i) => {
    const a = points[i - 1];
    if (!a) return false;
    const segment = {
      x: Math.min(a.x, b.x),
      y: Math.min(a.y, b.y),
      width: Math.abs(a.x - b.x),
      height: Math.abs(a.y - b.y),
    };
    return overlaps(inflate(segment, 1e-6), inflate(box, -1e-3));
  });
}

function bendsOf(points: readonly Point[]): number {
  return Math.max(0, points.length - 2);
}

/** Parts on a loose lattice, so that there is always a way between them. */
const scattered: fc.Arbitrary<Circuit> = fc
  .array(
    fc.record({
      kind: fc.constantFrom(
        'check-valve',
        'throttle',
        'relief-valve',
        'cylinder',
        'double-lock-check',
        'motor',
        'directional-valve',
        'filter',
      ),
      turn: fc.constantFrom<Turn>(0, 90, 180, 270),
      flip: fc.boolean(),
      dx: fc.integer({ min: 0, max: 3 }),
      dy: fc.integer({ min: 0, max: 3 }),
    }),
    { minLength: 2, maxLength: 7 },
  )
  .chain((specs) => {
    const parts: Part[] = specs.map((s, i) =>
      part(`p${i}`, s.kind, at((i % 3) * 46 + s.dx, Math.floor(i / 3) * 46 + s.dy), s.turn, s.flip),
    );
    const ports = parts.flatMap((p) => portNames(p.kind).map((name) => `${p.id}.${name}`));
    return fc
      .array(fc.tuple(fc.constantFrom(...ports), fc.constantFrom(...ports)), { minLength: 1, maxLength: 6 })
      .map((pairs) => circuit(parts, joins(...pairs.filter(([a, b]) => a !== b).map(([a, b]) => `${a} ${b}`))));
  });

function portNames(kind: string): string[] {
  switch (kind) {
    case 'relief-valve':
      return ['P', 'T'];
    case 'double-lock-check':
      return ['V1', 'C1', 'V2', 'C2'];
    case 'directional-valve':
      return ['P', 'T', 'A', 'B'];
    default:
      return ['A', 'B'];
  }
}

test('routes run at right angles from port to port and leave each port outward by 1 M or more', () => {
  fc.assert(
    fc.property(scattered, (sheet) => {
      const routes = routeAll(sheet);
      for (const connection of sheet.connections) {
        const points = routes.get(connection.id) as Point[];
        const from = portPlace(sheet, connection.from);
        const to = portPlace(sheet, connection.to);
        expect(orthogonal(points)).toBe(true);
        expect(points[0]).toEqual(from?.at);
        expect(points.at(-1)).toEqual(to?.at);
        for (const [port, next] of [
          [from, points[1]],
          [to, points.at(-2)],
        ] as const) {
          if (!port || !next) throw new Error('no such port');
          const out = vector(port.side);
          expect((next.x - port.at.x) * out.x + (next.y - port.at.y) * out.y).toBeGreaterThanOrEqual(1);
        }
      }
    }),
    { numRuns: 150 },
  );
});

test('no route runs through a part while there is a way round', () => {
  fc.assert(
    fc.property(scattered, (sheet) => {
      const routes = routeAll(sheet);
      for (const connection of sheet.connections) {
        const points = routes.get(connection.id) as Point[];
        for (const each of sheet.parts) {
          // A port may stand a little inside the outline (beside a lever): its own first run leads out of it.
          const own = (ref: PortRef): number => (ref.part === each.id ? 1 : 0);
          const inner = points.slice(own(connection.from), points.length - own(connection.to));
          expect(crosses(inner, partReach(each))).toBe(false);
        }
      }
    }),
    { numRuns: 150 },
  );
});

test('equal circuits have equal routes', () => {
  fc.assert(
    fc.property(scattered, (sheet) => {
      expect(routeAll(structuredClone(sheet))).toEqual(routeAll(sheet));
    }),
    { numRuns: 60 },
  );
});

test('facing ports are joined by one straight piece', () => {
  const sheet = circuit([part('a', 'check-valve', at(0, 0)), part('b', 'check-valve', at(0, -12))], joins('a.B b.A'));
  const points = routeAll(sheet).get('c1') as Point[];
  expect(points).toHaveLength(2);
  expect(points[0]?.x).toBe(points[1]?.x);
});

test('a part in the way is passed with 1 M to spare and four bends at most', () => {
  const parts = [
    part('a', 'check-valve', at(0, 20)),
    part('b', 'check-valve', at(0, -20)),
    part('wall', 'double-lock-check', at(0, 0)),
  ];
  const points = routeAll(circuit(parts, joins('a.B b.A'))).get('c1') as Point[];
  expect(bendsOf(points)).toBe(4);
  expect(crosses(points, inflate(partReach(parts[2] as Part), 0.99))).toBe(false);
});

test('a route passes the bends that the user set', () => {
  const [connection] = joins('a.B b.A');
  if (!connection) throw new Error('no connection');
  const bends = [at(9, -7), at(9, -30)];
  const sheet = circuit(
    [part('a', 'check-valve', at(0, 0)), part('b', 'check-valve', at(20, -40))],
    [{ ...connection, bends }],
  );
  const points = routeAll(sheet).get('c1') as Point[];
  const touches = (p: Point): boolean =>
    points.some((b, i) => {
      const a = points[i - 1];
      return (
        a !== undefined &&
        Math.min(a.x, b.x) <= p.x &&
        p.x <= Math.max(a.x, b.x) &&
        Math.min(a.y, b.y) <= p.y &&
        p.y <= Math.max(a.y, b.y)
      );
    });
  expect(bends.map(touches)).toEqual([true, true]);
  expect(orthogonal(points)).toBe(true);
});

test('lines that are not joined never run on top of each other', () => {
  const parts = [
    part('a', 'check-valve', at(0, 0)),
    part('b', 'check-valve', at(30, 0)),
    part('c', 'check-valve', at(8, -24)),
    part('d', 'check-valve', at(22, -24)),
  ];
  const routes = routeAll(circuit(parts, joins('a.B d.A', 'b.B c.A')));
  const pieces = [...routes.values()].map((points) => points.slice(1).map((b, i) => [points[i] as Point, b] as const));
  const [one, two] = pieces as [(typeof pieces)[0], (typeof pieces)[0]];
  for (const [a, b] of one) {
    for (const [c, d] of two) {
      const flat =
        a.y === b.y &&
        c.y === d.y &&
        a.y === c.y &&
        Math.min(Math.max(a.x, b.x), Math.max(c.x, d.x)) > Math.max(Math.min(a.x, b.x), Math.min(c.x, d.x));
      const upright =
        a.x === b.x &&
        c.x === d.x &&
        a.x === c.x &&
        Math.min(Math.max(a.y, b.y), Math.max(c.y, d.y)) > Math.max(Math.min(a.y, b.y), Math.min(c.y, d.y));
      expect(flat || upright).toBe(false);
    }
  }
});

test('a second connection of the same line follows the first', () => {
  const parts = [
    part('pu', 'fixed-pump', at(0, 40)),
    part('a', 'check-valve', at(20, 0)),
    part('b', 'check-valve', at(40, 0)),
  ];
  const sheet = circuit(parts, joins('pu.P a.A', 'pu.P b.A'));
  const [first, second] = [...routeAll(sheet).values()] as [Point[], Point[]];
  // The trunk out of the pump is shared for at least the first run.
  expect(second[1]?.x).toBe(first[1]?.x);
  expect(orthogonal(second)).toBe(true);
});

test('ports shut in by other parts still get a right-angled route', () => {
  const parts = [
    part('a', 'check-valve', at(0, 0)),
    part('b', 'check-valve', at(0, -6)),
    part('c', 'filter', at(30, 0)),
  ];
  const points = routeAll(circuit(parts, joins('a.B c.A'))).get('c1') as Point[];
  expect(orthogonal(points)).toBe(true);
  expect(points[0]).toEqual(at(0, -3));
});

test('connections to parts or ports that do not exist are left out or go to the part itself', () => {
  const routes = routeAll(
    circuit([part('a', 'check-valve', at(0, 0)), part('b', 'gauge', at(9, 9))], joins('a.B gone.P', 'a.A b.none')),
  );
  expect(routes.get('c1')).toEqual([]);
  expect(routes.get('c2')?.at(-1)).toEqual(at(9, 9));
});

test('moving one part leaves every other route as it was', () => {
  const rig = placeMissing(unplacedRig());
  const before = routeAll(rig);
  const moved: Circuit = {
    ...rig,
    parts: rig.parts.map((p) => (p.id === 'PG' && p.at ? { ...p, at: at(p.at.x + 2, p.at.y - 1) } : p)),
  };
  const after = reroute(before, moved, ['PG']);
  const touched = rig.connections.filter((c) => c.from.part === 'PG' || c.to.part === 'PG').map((c) => c.id);
  for (const connection of rig.connections) {
    if (touched.includes(connection.id))
      expect(after.get(connection.id)?.at(-1)).toEqual(portPlace(moved, connection.to)?.at);
    else expect(after.get(connection.id)).toEqual(before.get(connection.id));
  }
  expect([...after.keys()]).toEqual([...before.keys()]);
});

test('rerouting after no change, or from nothing, equals routing all', () => {
  fc.assert(
    fc.property(scattered, (sheet) => {
      const all = routeAll(sheet);
      expect(reroute(all, sheet, [])).toEqual(all);
      expect(
        reroute(
          new Map(),
          sheet,
          sheet.parts.map((p) => p.id),
        ),
      ).toEqual(all);
    }),
    { numRuns: 60 },
  );
});

test('a part put on a line makes way for the line, and only for it', () => {
  const parts = [
    part('a', 'check-valve', at(0, 0)),
    part('b', 'check-valve', at(0, -40)),
    part('c', 'check-valve', at(60, 0)),
    part('d', 'check-valve', at(60, -40)),
  ];
  const sheet = circuit(parts, joins('a.B b.A', 'c.B d.A'));
  const before = routeAll(sheet);
  const wall = part('wall', 'relief-valve', at(0, -20));
  const after = reroute(before, { ...sheet, parts: [...parts, wall] }, ['wall']);
  expect(crosses(after.get('c1') as Point[], partReach(wall))).toBe(false);
  expect(after.get('c2')).toEqual(before.get('c2'));
});

test('a line laid anew on a full sheet takes the way it had', () => {
  const parts: Part[] = [];
  for (let i = 0; i < 60; i++) parts.push(part(`p${i}`, 'check-valve', at((i % 10) * 22, Math.floor(i / 10) * 18)));
  const pairs: string[] = [];
  for (let i = 0; i < 49; i++) pairs.push(`p${i}.A p${i + 11}.B`);
  const sheet = circuit(parts, joins(...pairs));
  const routes = routeAll(sheet);
  const last = sheet.connections.at(-1);
  if (!last) throw new Error('no connection');
  const field = routingSheet(sheet);
  for (const [id, points] of routes) if (id !== last.id) lay(field, id, points);
  expect(routeConnection(field, last)).toEqual(routes.get(last.id));
});
