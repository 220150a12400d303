import { isStripValve } from '../../parts/valve-kinds.ts';
import type { Box, Point } from '../../base/points.ts';
import type { Circuit } from '../../circuit/model.ts';
import { boxOfPoints, inflate, overlaps, segmentTouches } from '../../drawing/geometry.ts';
import type { Routes } from '../../drawing/geometry.ts';
import { Near } from '../../drawing/near.ts';
import { partReach, placedPorts } from '../../drawing/shapes.ts';

/** Where a line's pressure is written; `at` is on the baseline. */
export interface PressureSpot {
  readonly at: Point;
  readonly align: 'start' | 'middle' | 'end';
}

/** Modules kept for `1740 psi`, and the size of its letters. */
const WIDTH = 6.6;
const HEIGHT = 1.5;
const GAP = 0.55;
/** A crowded spot is worse than none. */
const WORST = 6;
/** Runs of a line that are looked at. */
const RUNS = 5;

interface Run {
  readonly a: Point;
  readonly b: Point;
  readonly length: number;
}

interface Candidate extends PressureSpot {
  readonly box: Box;
}

/** One spot for each line that has a free one: on its longest run, else on the next. */
export function pressureSpots(
  circuit: Circuit,
  routes: Routes,
  labels: readonly Box[],
  lines: readonly { readonly connections: readonly string[] }[],
): Map<number, PressureSpot> {
  const ground: Ground = { bodies: new Near(), taken: new Near(), runs: new Near() };
  const take = (box: Box): void => ground.taken.add(box, box);
  labels.forEach(take);
  for (const part of circuit.parts) if (part.kind !== 'junction') ground.bodies.add(partReach(part), partReach(part));
  // A valve writes a letter at each port.
  for (const part of circuit.parts) {
    if (!isStripValve(part.kind)) continue;
    for (const { at } of placedPorts(part)) take({ x: at.x - 1.8, y: at.y - 1.8, width: 3.6, height: 3.6 });
  }
  for (const run of [...routes.values()].flatMap(runsOf)) ground.runs.add(boxOfPoints([run.a, run.b]) as Box, run);
  const out = new Map<number, PressureSpot>();
  lines.forEach(({ connections }, line) => {
    const runs = connections.flatMap((id) => runsOf(routes.get(id) ?? [])).sort((p, q) => q.length - p.length);
    let best: Candidate | undefined;
    let least = WORST;
    for (const [rank, run] of runs.slice(0, RUNS).entries()) {
      for (const candidate of candidates(run)) {
        const cost = rank * 0.4 + crowd(candidate.box, ground);
        if (cost < least) [best, least] = [candidate, cost];
      }
      if (least <= rank * 0.4) break;
    }
    if (!best) return;
    take(best.box);
    out.set(line, best);
  });
  return out;
}

const runsOf = (points: readonly Point[]): Run[] =>
  points.slice(1).flatMap((b, i) => {
    const a = points[i] as Point;
    const length = Math.abs(a.x - b.x) + Math.abs(a.y - b.y);
    return length >= 1.5 ? [{ a, b, length }] : [];
  });

function candidates({ a, b }: Run): Candidate[] {
  const flat = a.y === b.y;
  return [0.5, 0.3, 0.7].flatMap((share): Candidate[] => {
    const p = { x: a.x + (b.x - a.x) * share, y: a.y + (b.y - a.y) * share };
    const box = (x: number, y: number): Box => ({ x, y, width: WIDTH, height: HEIGHT });
    const base = HEIGHT * 0.8;
    if (flat) {
      return [p.y - GAP - HEIGHT, p.y + GAP].map((top) => ({
        at: { x: p.x, y: top + base },
        align: 'middle',
        box: box(p.x - WIDTH / 2, top),
      }));
    }
    const top = p.y - HEIGHT / 2;
    return [
      { at: { x: p.x + GAP + 0.2, y: top + base }, align: 'start', box: box(p.x + GAP + 0.2, top) },
      { at: { x: p.x - GAP - 0.2, y: top + base }, align: 'end', box: box(p.x - GAP - 0.2 - WIDTH, top) },
    ];
  });
}

/** What stands on the sheet already. */
interface Ground {
  readonly bodies: Near<Box>;
  readonly taken: Near<Box>;
  readonly runs: Near<Run>;
}

function crowd(box: Box, { bodies, taken, runs }: Ground): number {
  let cost = 0;
  const room = inflate(box, 0.2);
  for (const body of bodies.touching(room)) if (overlaps(body, room)) cost += WORST;
  for (const other of taken.touching(box)) if (overlaps(other, box)) cost += WORST;
  for (const { a, b } of runs.touching(room)) if (segmentTouches(a, b, room)) cost += 2;
  return cost;
}
