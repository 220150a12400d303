import type { Box, Point } from '../base/points.ts';
import type { Circuit, Connection } from '../circuit/model.ts';
import { inflate, overlaps, segmentTouches } from './geometry.ts';
import type { Routes } from './geometry.ts';
import type { LabelText, SceneLabel } from './labels.ts';
import { freeLabels, labelBox } from './labels.ts';
import { partLetters } from './letters.ts';
import { TEXT_SIZES } from './palette.ts';
import { partReach } from './shapes.ts';
import { MODULE_PX } from './strokes.ts';

/** Modules between a line and its name, and between the places tried along it. */
const GAP = 1;
const CLEAR = 0.3;
const STEP = 2;
/** Shares of a stretch at which a name is tried, the middle first. */
const SPOTS = [0.5, 0.35, 0.65, 0.2, 0.8, 0.1, 0.9] as const;
/** Stretches that are looked at; the rest only if these are crowded. */
const LONGEST = 3;
/** How far off its line a name may be moved to be clear. */
const OFF = [0, 1.2] as const;
const COST = { room: 5, line: 2, off: 1, near: 0.4 } as const;
/** Modules within which a name might be taken for that of something else. */
const NEAR = 0.8;

const worded = ({ name, size }: Connection): boolean => name !== undefined || (size ?? '') !== '';

/** Names and sizes of lines, each on the longest stretches of its connection, clear of what stands there if it can be. */
export function lineLabels(circuit: Circuit, routes: Routes, taken: readonly Box[]): SceneLabel[] {
  const named = circuit.connections.filter(worded);
  if (named.length === 0) return [];
  const rooms: Box[] = [
    ...taken,
    ...circuit.parts.map(partReach),
    ...circuit.parts.flatMap(partLetters),
    ...freeLabels(circuit).map(labelBox),
  ];
  const stretches = [...routes.values()].flatMap((points) =>
    points.slice(1).map((b, i) => [points[i] as Point, b] as const),
  );
  return named.flatMap((connection) => {
    const label = best(connection, routes.get(connection.id) ?? [], rooms, stretches);
    if (!label) return [];
    rooms.push(labelBox(label));
    return [label];
  });
}

function best(
  connection: Connection,
  points: readonly Point[],
  rooms: readonly Box[],
  stretches: readonly (readonly [Point, Point])[],
): SceneLabel | undefined {
  const runs: LabelText[] = [
    ...(connection.name === undefined
      ? []
      : [{ text: connection.name, size: TEXT_SIZES.code, weight: 500, tone: 'second' } as const]),
    ...(connection.size ? [{ text: connection.size, size: TEXT_SIZES.code, weight: 400, tone: 'mute' } as const] : []),
  ];
  let found: SceneLabel | undefined;
  let least = Infinity;
  const lengths = points
    .slice(1)
    .map((b, i) => ({ a: points[i] as Point, b, length: lengthOf(points[i] as Point, b) }));
  lengths.sort((p, q) => q.length - p.length);
  for (const [rank, { a, b, length }] of lengths.entries()) {
    if (found && (length < STEP || (rank >= LONGEST && least < COST.off))) break;
    for (const off of OFF) {
      if (least < COST.off * off) break;
      for (const share of SPOTS) {
        const at = { x: a.x + (b.x - a.x) * share, y: a.y + (b.y - a.y) * share };
        for (const label of spotsAt(connection.id, runs, at, a.y === b.y, GAP + off)) {
          const cost =
            crowd(labelBox(label), rooms, stretches) +
            ((lengths[0]?.length ?? 0) - length) / 100 +
            Math.abs(share - 0.5) / 10 +
            COST.off * off;
          if (cost < least) [least, found] = [cost, label];
        }
      }
    }
  }
  return found;
}

const lengthOf = (a: Point, b: Point): number => Math.abs(a.x - b.x) + Math.abs(a.y - b.y);

function spotsAt(owner: string, runs: readonly LabelText[], at: Point, flat: boolean, gap: number): SceneLabel[] {
  const label = (x: number, y: number, align: SceneLabel['align']): SceneLabel => ({
    role: 'line',
    owner,
    at: { x, y },
    align,
    runs,
  });
  // Capitals are 0.73 of their size tall; the box round them, which has room for tails too, starts 0.96 of it up.
  const size = TEXT_SIZES.code / MODULE_PX;
  return flat
    ? [label(at.x, at.y - gap, 'middle'), label(at.x, at.y + gap + size * 0.73, 'middle')]
    : [label(at.x + gap, at.y + size * 0.36, 'start'), label(at.x - gap, at.y + size * 0.36, 'end')];
}

function crowd(box: Box, rooms: readonly Box[], stretches: readonly (readonly [Point, Point])[]): number {
  const own = inflate(box, 0.1);
  let cost = 0;
  const nearby = inflate(box, NEAR);
  for (const room of rooms) {
    if (overlaps(room, own)) cost += COST.room;
    else if (overlaps(room, nearby)) cost += COST.near;
  }
  const clear = inflate(box, CLEAR);
  for (const [a, b] of stretches) if (segmentTouches(a, b, clear)) cost += COST.line;
  return cost;
}
