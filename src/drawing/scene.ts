import type { Box, Placement, Point } from '../base/points.ts';
import { place, union } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import type { Circuit, Connection, Part, PortRef } from '../circuit/model.ts';
import { labelOf } from '../circuit/model.ts';
import { kindOf } from '../parts/catalogue.ts';
import type { Look } from '../parts/contract.ts';
import type { Routes } from './geometry.ts';
import { boxOfPoints } from './geometry.ts';
import type { Dot } from './joints.ts';
import { junctionDots } from './joints.ts';
import type { SceneLabel } from './labels.ts';
import { labelBox, sceneLabels } from './labels.ts';
import { lineColour, lineMarks } from './line-marks.ts';
import type { PortEnds } from './line-marks.ts';
import { lineNumbers } from './lines.ts';
import type { ColourToken } from './palette.ts';
import { freshPieces } from './pieces.ts';
import type { PlacedPort } from './shapes.ts';
import { ownBox, partBox, placedPorts, placementOf } from './shapes.ts';
import type { LineLook, Stroke } from './strokes.ts';
import { placePrimitives } from './turned.ts';

/** Everything that is drawn, in sheet modules and in drawing order: enclosures, lines, dots, parts, labels. */
export interface Scene {
  readonly title: string;
  readonly bounds: Box;
  readonly enclosures: readonly { readonly part: string; readonly primitives: readonly Primitive[] }[];
  readonly lines: readonly SceneLine[];
  readonly dots: readonly SceneDot[];
  readonly parts: readonly ScenePart[];
  readonly labels: readonly SceneLabel[];
}

export interface SceneLine {
  readonly connection: string;
  /** Number of the line within the circuit, see `lineNumbers`. */
  readonly line: number;
  /** The whole route, for hits and reading; `strokes` leave out what another connection of the line draws. */
  readonly points: readonly Point[];
  readonly strokes: readonly Stroke[];
}

export interface SceneDot extends Dot {
  readonly colour: ColourToken;
}

export interface ScenePart {
  readonly id: string;
  readonly kind: string;
  readonly label: string;
  readonly placement: Placement;
  readonly box: Box;
  readonly ports: readonly PlacedPort[];
  /** On the sheet, text upright; groups still carry their shift. */
  readonly primitives: readonly Primitive[];
}

/** What the sheet is to show; absent = a circuit that is only drawn. */
export interface SceneState {
  /** Connection id → look. */
  readonly lines?: ReadonlyMap<string, LineLook>;
  /** Part id → active position and stroke, and words beside its name (position, verdict). */
  readonly parts?: ReadonlyMap<string, Look & { readonly note?: string }>;
}

const IDLE: LineLook = { class: 'idle' };
const DOT_LAST = 'ink';

export function buildScene(circuit: Circuit, routes: Routes, state: SceneState = {}): Scene {
  const looks = (id: string): LineLook => state.lines?.get(id) ?? IDLE;
  const parts = circuit.parts.map((part) => scenePart(part, state.parts?.get(part.id) ?? {}));
  const stubs = state.lines ? takeStubs(circuit, parts, looks) : new Map<string, Point>();
  const lines = sceneLines(circuit, routes, looks, stubs);
  const shown = parts.map((part) => hideStubs(part, stubs));
  const labels = sceneLabels(circuit, routes, (part) => state.parts?.get(part.id)?.note);
  const dots = junctionDots(circuit, routes).map((dot): SceneDot => {
    const member = lines.find((l) => l.line === dot.line);
    return { ...dot, colour: member && state.lines ? lineColour(looks(member.connection)) : DOT_LAST };
  });
  return {
    title: circuit.name,
    bounds: sceneBounds(shown, lines, labels),
    enclosures: shown.flatMap(({ id, primitives }) => {
      const own = primitives.filter(isEnclosure);
      return own.length > 0 ? [{ part: id, primitives: own }] : [];
    }),
    lines,
    dots,
    parts: shown.map((p) => ({ ...p, primitives: p.primitives.filter((x) => !isEnclosure(x)) })),
    labels,
  };
}

const isEnclosure = (p: Primitive): boolean => p.type !== 'text' && p.type !== 'group' && p.pen === 'enclosure';

function scenePart(part: Part, look: Look): ScenePart {
  const placement = placementOf(part);
  return {
    id: part.id,
    kind: part.kind,
    label: labelOf(part),
    placement,
    box: partBox(part),
    ports: placedPorts(part),
    primitives: placePrimitives(drawn(part, look), placement),
  };
}

function drawn(part: Part, look: Look): readonly Primitive[] {
  const kind = kindOf(part.kind);
  if (kind) return kind.draw(part, look);
  const box = ownBox(part);
  return [
    { type: 'box', ...box, pen: 'symbol', fill: 'paper' },
    { type: 'text', at: { x: box.x + box.width / 2, y: box.y + box.height / 2 + 0.5 }, text: '?', size: 1.6, align: 'middle', tone: 'second' },
  ];
}

function sceneLines(circuit: Circuit, routes: Routes, looks: (id: string) => LineLook, stubs: ReadonlyMap<string, Point>): SceneLine[] {
  const numbers = lineNumbers(circuit);
  const pieces = freshPieces(circuit, routes, numbers);
  return circuit.connections.map((connection) => {
    const points = routes.get(connection.id) ?? [];
    const strokes = (pieces.get(connection.id) ?? []).flatMap((piece) => {
      const ends: PortEnds = { start: piece.fromPort, end: piece.toPort };
      const reached = throughStubs(piece.points, connection, piece, stubs);
      return lineMarks(reached, looks(connection.id), connection.use ?? 'working', ends);
    });
    return { connection: connection.id, line: numbers.get(connection.id) ?? -1, points, strokes };
  });
}

const key = (ref: PortRef): string => `${ref.part}.${ref.port}`;

function throughStubs(
  points: readonly Point[], connection: Connection, piece: { fromPort: boolean; toPort: boolean }, stubs: ReadonlyMap<string, Point>,
): Point[] {
  const start = piece.fromPort ? stubs.get(key(connection.from)) : undefined;
  const end = piece.toPort ? stubs.get(key(connection.to)) : undefined;
  return [...(start ? [start] : []), ...points, ...(end ? [end] : [])];
}

/**
 * The short line between a port and the body of a symbol belongs to the line at the port: in a shown
 * state the line takes it over. Port → far end of the stub, on the sheet.
 */
function takeStubs(circuit: Circuit, parts: readonly ScenePart[], looks: (id: string) => LineLook): Map<string, Point> {
  const byId = new Map(parts.map((p) => [p.id, p]));
  const out = new Map<string, Point>();
  for (const connection of circuit.connections) {
    if (looks(connection.id).class === 'idle') continue;
    for (const ref of [connection.from, connection.to]) {
      const part = byId.get(ref.part);
      const port = part?.ports.find((p) => p.ref.port === ref.port);
      if (!part || !port) continue;
      const stub = part.primitives.find((p) => stubEnd(p, port.at) !== undefined);
      const end = stub && stubEnd(stub, port.at);
      if (end) out.set(key(ref), end);
    }
  }
  return out;
}

function stubEnd(p: Primitive, port: Point): Point | undefined {
  if (p.type !== 'polyline' || p.points.length !== 2 || p.pen === 'enclosure') return undefined;
  const [a, b] = p.points as readonly [Point, Point];
  if (a.x === port.x && a.y === port.y) return b;
  return b.x === port.x && b.y === port.y ? a : undefined;
}

function hideStubs(part: ScenePart, stubs: ReadonlyMap<string, Point>): ScenePart {
  const taken = part.ports.filter((p) => stubs.has(key(p.ref)));
  if (taken.length === 0) return part;
  return { ...part, primitives: part.primitives.filter((p) => !taken.some((port) => stubEnd(p, port.at) !== undefined)) };
}

function sceneBounds(parts: readonly ScenePart[], lines: readonly SceneLine[], labels: readonly SceneLabel[]): Box {
  const boxes = [...parts.map((p) => p.box), ...labels.map(labelBox)];
  for (const { points } of lines) {
    const box = boxOfPoints(points);
    if (box) boxes.push(box);
  }
  return union(boxes) ?? { x: 0, y: 0, width: 80, height: 50 };
}

/** Where a part's own frame point lies on the sheet, for balloons and marks. */
export const onSheet = (part: ScenePart, p: Point): Point => place(p, part.placement);
