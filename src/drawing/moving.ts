import type { Point } from '../base/points.ts';
import type { Circuit, Connection, Part } from '../circuit/model.ts';
import { sceneBlocks } from './blocks.ts';
import type { Routes } from './geometry.ts';
import { junctionDots } from './joints.ts';
import { lineLabels } from './line-labels.ts';
import { lineNumbers } from './lines.ts';
import { freshPieces } from './pieces.ts';
import { quickRoute } from './quick-route.ts';
import { routingSheet } from './routing.ts';
import type { RoutingSheet } from './routing.ts';
import { sceneOn } from './scene.ts';
import type { Scene, SceneState } from './scene.ts';
import { connectionsAt } from './stage.ts';

/** What is on its way while something is dragged. All else stands as it stood, and need not be drawn again. */
export interface Moves {
  /** How far everything in hand has moved. */
  readonly by: Point;
  readonly parts: ReadonlySet<string>;
  /** Free labels. */
  readonly labels: ReadonlySet<string>;
  /** Blocks with a moved part. */
  readonly blocks: ReadonlySet<string>;
  /** Lines, by number, that lie between moved parts only: they go along as they are. */
  readonly carried: ReadonlySet<number>;
  /** Lines that are drawn anew: some part at them moved, or a stretch of theirs. */
  readonly laid: ReadonlySet<number>;
}

/** Undefined if more changed than that some things moved, all of them alike. */
export function movesOf(rest: Circuit, now: Circuit): Moves | undefined {
  if (rest.parts.length !== now.parts.length || rest.connections.length !== now.connections.length) return undefined;
  const shifts: (Point | undefined)[] = [];
  const parts = new Set<string>();
  for (const [i, part] of now.parts.entries()) {
    const was = rest.parts[i] as Part;
    if (was === part) continue;
    shifts.push(was.id === part.id && sameShape(was, part) ? between(was.at, part.at) : undefined);
    parts.add(part.id);
  }
  const labels = new Set<string>();
  const stood = new Map(rest.labels?.map((label) => [label.id, label]));
  for (const label of now.labels ?? []) {
    const was = stood.get(label.id);
    if (was === label) continue;
    shifts.push(was && was.text === label.text ? between(was.at, label.at) : undefined);
    labels.add(label.id);
  }
  const by = shifts.length === 0 ? { x: 0, y: 0 } : shifts[0];
  if (!by || shifts.some((shift) => shift?.x !== by.x || shift.y !== by.y)) return undefined;
  const lines = touched(rest, now, parts);
  const blocks = new Set((now.groups ?? []).flatMap((g) => (g.parts.some((id) => parts.has(id)) ? [g.id] : [])));
  return lines && { by, parts, labels, blocks, ...lines };
}

function touched(rest: Circuit, now: Circuit, moved: ReadonlySet<string>): Pick<Moves, 'carried' | 'laid'> | undefined {
  const numbers = lineNumbers(rest);
  const moving = new Set<number>();
  // Lines with a connection that stands still, or that one end of moves.
  const held = new Set<number>();
  for (const [i, connection] of now.connections.entries()) {
    const was = rest.connections[i] as Connection;
    if (was !== connection && (was.id !== connection.id || was.from !== connection.from || was.to !== connection.to))
      return undefined;
    const line = numbers.get(was.id) ?? -1;
    const ends = Number(moved.has(was.from.part)) + Number(moved.has(was.to.part));
    if (ends > 0 || was !== connection) moving.add(line);
    if (ends < 2) held.add(line);
  }
  const of = (kept: boolean): Set<number> => new Set([...moving].filter((line) => held.has(line) === kept));
  return { carried: of(false), laid: of(true) };
}

const sameShape = (a: Part, b: Part): boolean =>
  a.kind === b.kind && a.valve === b.valve && a.turn === b.turn && a.flip === b.flip;

const between = (a: Point | undefined, b: Point | undefined): Point | undefined =>
  a && b && { x: b.x - a.x, y: b.y - a.y };

/**
 * Routes while something is on its way, without a search: the hand must be followed on a sheet of hundreds of parts.
 * What moves as a whole keeps its lines as they were; lines give way to one another when the parts are put down.
 */
export function sketchRoutes(rest: Circuit, settled: Routes, now: Circuit, moves: Moves): Routes {
  const numbers = lineNumbers(rest);
  const out = new Map(settled);
  let sheet: RoutingSheet | undefined;
  for (const [i, connection] of now.connections.entries()) {
    const { id, from, to } = connection;
    const line = numbers.get(id) ?? -1;
    if (!moves.laid.has(line) && !moves.carried.has(line)) continue;
    const ends = Number(moves.parts.has(from.part)) + Number(moves.parts.has(to.part));
    if (ends === 0 && connection === rest.connections[i]) continue;
    const route = settled.get(id);
    const along = ends === 2 && route ? shifted(route, moves.by) : undefined;
    out.set(id, along ?? quickRoute((sheet ??= routingSheet(now)), connection));
  }
  return out;
}

const shifted = (points: readonly Point[], by: Point): Point[] => points.map((p) => ({ x: p.x + by.x, y: p.y + by.y }));

/** What a drag draws anew. */
export type Laid = Pick<Scene, 'blocks' | 'lines' | 'dots' | 'labels' | 'parts'>;

/**
 * Lines that are laid anew, with their dots and names, and blocks whose parts moved; the moved parts and what goes
 * along are those of the scene at rest. Names of lines keep clear of nothing, and lines hop over none, until the parts
 * are put down.
 */
export function laidScene(rest: Circuit, now: Circuit, routes: Routes, moves: Moves, state: SceneState): Laid {
  const numbers = lineNumbers(rest);
  const connections = now.connections.filter(({ id }) => moves.laid.has(numbers.get(id) ?? -1));
  const ends = new Set(connections.flatMap(({ from, to }) => [from.part, to.part]));
  const circuit: Circuit = { name: now.name, parts: now.parts.filter(({ id }) => ends.has(id)), connections };
  const own = new Map(connections.map(({ id }) => [id, routes.get(id) ?? []]));
  const { lines, dots, labels } = sceneOn(
    circuit,
    own,
    { ...state, hops: false },
    {
      numbers,
      pieces: freshPieces(circuit, own, numbers),
      dots: junctionDots(circuit, own),
      spots: new Map(),
      rooms: [],
      lineLabels: lineLabels(circuit, own, []),
      blocks: [],
      hops: () => new Map(),
      atPort: connectionsAt(circuit),
    },
  );
  const blocks = moves.blocks.size > 0 ? sceneBlocks(now).filter(({ id }) => moves.blocks.has(id)) : [];
  return { blocks, lines, dots, labels: labels.filter(({ role }) => role === 'line'), parts: [] };
}
