import type { Point, Turn } from '../base/points.ts';
import { vector } from '../base/points.ts';
import type { Part } from '../circuit/model.ts';
import type { PlacedPort } from './shapes.ts';
import { placedPorts, portSpecs } from './shapes.ts';

/** How a part goes into a line. */
export interface Insertion {
  readonly connection: string;
  readonly at: Point;
  readonly turn: Turn;
  /** Port that the near half of the line comes to, and the one from which the far half goes on. */
  readonly entry: string;
  readonly exit: string;
  /** Where these stand then, for the preview. */
  readonly ends: readonly [Point, Point];
}

/** A line ends at these, or starts; it never runs through one. */
const ENDS = new Set(['cylinder', 'double-rod-cylinder', 'motor', 'fixed-pump', 'compensated-pump', 'hand-pump']);
const TURNS: readonly Turn[] = [0, 90, 180, 270];

/** Pairs of ports that a line may run through, best first; none for a part at which lines end. */
export function throughPairs(part: Part): readonly (readonly [string, string])[] {
  if (ENDS.has(part.kind)) return [];
  const ports = portSpecs(part).filter(({ role }) => role !== 'pilot' && role !== 'drain' && role !== 'measure');
  const ids = ports.map(({ id }) => id);
  const [first, second] = ids;
  if (ids.length === 1 && first !== undefined && ports[0]?.role === 'joint') return [[first, first]];
  if (ids.length === 2 && first !== undefined && second !== undefined) return [[first, second]];
  const pairs = [
    ['V1', 'C1'],
    ['V2', 'C2'],
    ['P', 'T'],
    ['P', 'A'],
  ] as const;
  return pairs.filter(([a, b]) => ids.includes(a) && ids.includes(b));
}

/**
 * How `part` would go into the stretch a → b of a connection's route near `at`; undefined if no line runs through it.
 * `mayTurn`: the user has not turned it, so it may be turned to lie along the line.
 */
export function insertionAt(
  part: Part,
  stretch: { readonly connection: string; readonly a: Point; readonly b: Point },
  at: Point,
  mayTurn: boolean,
): Insertion | undefined {
  const { connection, a, b } = stretch;
  const flat = a.y === b.y;
  const along = { x: Math.sign(b.x - a.x), y: Math.sign(b.y - a.y) };
  const dot = (p: Point): number => p.x * along.x + p.y * along.y;
  const turns = mayTurn ? TURNS : [part.turn ?? 0];
  let best: { readonly cost: number; readonly insertion: Insertion } | undefined;
  for (const turn of turns) {
    const placed = placedPorts({ ...part, at, turn });
    const port = (id: string): PlacedPort | undefined => placed.find(({ ref }) => ref.port === id);
    for (const [one, other] of throughPairs(part)) {
      const [p, q] = [port(one), port(other)];
      if (!p || !q) continue;
      // Further back along the line is where it comes in; side by side, the one that looks back.
      const ahead = dot(q.at) - dot(p.at) || dot(vector(q.side)) - dot(vector(p.side));
      const [entry, exit] = ahead >= 0 ? [p, q] : [q, p];
      const aside = flat ? Math.abs(p.at.y - q.at.y) : Math.abs(p.at.x - q.at.x);
      const looks = dot(vector(exit.side)) - dot(vector(entry.side));
      const cost = aside * 10 - looks * 4 + (ahead < 0 ? 1 : 0) + turn / 360;
      if (best && cost >= best.cost) continue;
      // Both ports onto the line where they lie across from each other.
      const off = aside === 0 ? (flat ? a.y - p.at.y : a.x - p.at.x) : 0;
      const by = flat ? { x: 0, y: off } : { x: off, y: 0 };
      const moved = ({ x, y }: Point): Point => ({ x: x + by.x, y: y + by.y });
      best = {
        cost,
        insertion: {
          connection,
          at: moved(at),
          turn,
          entry: entry.ref.port,
          exit: exit.ref.port,
          ends: [moved(entry.at), moved(exit.at)],
        },
      };
    }
  }
  return best?.insertion;
}
