import type { Primitive } from '../base/primitives.ts';
import type { ValveData } from '../circuit/model.ts';
import { arrow, checkSeat, dot, stroke, throttleArcs, type Pair } from './shapes.ts';
import type { Frame } from './valve-frame.ts';
import { pathsOf, type ValvePath } from './valve-paths.ts';

type PathPen = 'idle' | 'active';

/** What stands in one box, about its middle: its paths, and a T for every port that is shut. */
export function drawPaths(data: ValveData, frame: Frame, position: number, pen: PathPen): Primitive[] {
  const paths = pathsOf(data, position);
  const used = new Set(paths.flatMap((path) => path.ports));
  const place = (id: string): Pair => frame.places.get(id) as Pair;
  const out: Primitive[] = [];
  for (const { id } of data.ports) {
    if (used.has(id)) continue;
    const [x, y] = place(id);
    const bar = y - Math.sign(y);
    out.push(stroke(pen, [x, y], [x, bar]), stroke(pen, [x - 0.6, bar], [x + 0.6, bar]));
  }
  const buses = paths.filter((path) => path.ports.length > 2);
  const loops = paths.filter((path) => path.ports.length === 2 && sameEdge(path, place));
  const uprights = paths.length - buses.length - loops.length;
  const shut = data.ports.filter(({ id }) => !used.has(id)).map(({ id }) => place(id));
  for (const path of paths) {
    const [from, to] = path.ports.map(place) as [Pair, Pair];
    if (path.ports.length > 2) {
      out.push(...bus(path.ports.map(place), (buses.indexOf(path) - (buses.length - 1) / 2) * 0.8, pen));
    } else if (sameEdge(path, place)) {
      const others = loops.filter((other) => other !== path).map((other) => other.ports.map(place) as [Pair, Pair]);
      out.push(...loop(path, from, to, loopDepth([from, to], others, shut), pen));
    } else {
      const shared = paths.some((other) => other !== path && other.ports.some((id) => path.ports.includes(id)));
      out.push(...straight(path, from, to, shared, uprights > 1, pen));
    }
  }
  return out;
}

const sameEdge = (path: ValvePath, place: (id: string) => Pair): boolean =>
  place(path.ports[0] as string)[1] === place(path.ports[1] as string)[1];

type Ends = readonly [Pair, Pair];

const covers = (outer: Ends, [x]: Pair): boolean =>
  x > Math.min(outer[0][0], outer[1][0]) && x < Math.max(outer[0][0], outer[1][0]);

/** How far a loop reaches in from its edge: narrow loops lie within wide ones, and loops of both edges keep apart. */
function loopDepth(ends: Ends, others: readonly Ends[], shut: readonly Pair[]): number {
  const edge = ends[0][1];
  const inner = others.filter((other) => other[0][1] === edge && other.some((end) => covers(ends, end))).length;
  const alone = others.every(
    (other) =>
      other[0][1] === edge && !other.some((end) => covers(ends, end)) && !ends.some((end) => covers(other, end)),
  );
  const overShut = shut.some((place) => place[1] === edge && covers(ends, place));
  return alone || overShut ? 1.5 : Math.min(1.7, 0.9 + 0.6 * inner);
}

/** Joined ports: a stub from each to a common bar; a dot only where four ways meet, which would read as a crossing. */
function bus(places: readonly Pair[], y: number, pen: PathPen): Primitive[] {
  const xs = places.map(([x]) => x);
  const low = Math.min(...xs);
  const high = Math.max(...xs);
  const fourWays = [...new Set(xs)].filter(
    (x) => x > low && x < high && xs.filter((other) => other === x).length === 2,
  );
  return [
    ...places.map(([x, edge]) => stroke(pen, [x, edge], [x, y])),
    ...(low < high ? [stroke(pen, [low, y], [high, y])] : []),
    ...fourWays.map((x) => dot(pen, [x, y], 0.26)),
  ];
}

/** Two ports of one edge. */
function loop(path: ValvePath, from: Pair, to: Pair, depth: number, pen: PathPen): Primitive[] {
  const y = from[1] - Math.sign(from[1]) * depth;
  const middle: Pair = [(from[0] + to[0]) / 2, y];
  const along: Pair = [Math.sign(to[0] - from[0]), 0];
  return [stroke(pen, from, [from[0], y], [to[0], y], to), ...marks(path, middle, along, pen)];
}

/** Ports on opposite edges. Marked paths and paths that share an end carry no head: it would hide the mark or the joint. */
function straight(path: ValvePath, from: Pair, to: Pair, shared: boolean, crowded: boolean, pen: PathPen): Primitive[] {
  const marked = path.throttled || path.way === 'one-way';
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const along: Pair = [(to[0] - from[0]) / length, (to[1] - from[1]) / length];
  if (!marked) return shared ? [stroke(pen, from, to)] : arrow(pen, from, to, 1.1, 0.8);
  // Off the middle where other paths may cross or share an end, so that the marks keep clear of them.
  const share = !crowded ? 0.5 : path.throttled && path.way === 'one-way' ? 0.34 : 0.22;
  const middle: Pair = [from[0] + (to[0] - from[0]) * share, from[1] + (to[1] - from[1]) * share];
  return [stroke(pen, from, to), ...marks(path, middle, along, pen)];
}

function marks(path: ValvePath, middle: Pair, along: Pair, pen: PathPen): Primitive[] {
  const both = path.throttled && path.way === 'one-way';
  const shift = (by: number): Pair => [middle[0] + along[0] * by, middle[1] + along[1] * by];
  return [
    ...(path.throttled ? throttleArcs(pen, both ? shift(-0.65) : middle, along, 0.45) : []),
    ...(path.way === 'one-way' ? checkSeat(pen, both ? shift(0.55) : middle, along, 0.42) : []),
  ];
}
