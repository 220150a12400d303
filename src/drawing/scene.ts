import type { Box, Placement, Point } from '../base/points.ts';
import { place, union } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import { isStripValve } from '../parts/valve-kinds.ts';
import type { Circuit, Part, PortRef } from '../circuit/model.ts';
import { labelOf } from '../circuit/model.ts';
import type { Look } from '../parts/contract.ts';
import type { PortPen } from './active-box.ts';
import { showActiveBox } from './active-box.ts';
import type { Routes } from './geometry.ts';
import { boxOfPoints } from './geometry.ts';
import type { SceneBlock } from './blocks.ts';
import { withHops } from './hops.ts';
import type { Dot } from './joints.ts';
import type { PartWords, SceneLabel } from './labels.ts';
import { labelBox, sceneLabels } from './labels.ts';
import { BAR_AT, lineMarks, pathPen } from './line-marks.ts';
import type { PortEnds } from './line-marks.ts';
import type { Piece } from './pieces.ts';
import type { PlacedPort } from './shapes.ts';
import { drawnKind, ownBox, partBox, partReach, placedPorts, placementOf, portSpecs } from './shapes.ts';
import { stageOf } from './stage.ts';
import type { Stage } from './stage.ts';
import type { LineLook, Stroke } from './strokes.ts';
import { placePrimitives } from './turned.ts';

/** Everything that is drawn, in sheet modules and in drawing order: blocks, enclosures, lines, dots, parts, labels. */
export interface Scene {
  readonly title: string;
  readonly bounds: Box;
  readonly blocks: readonly SceneBlock[];
  readonly enclosures: readonly { readonly part: string; readonly primitives: readonly Primitive[] }[];
  readonly lines: readonly SceneLine[];
  readonly dots: readonly Dot[];
  readonly parts: readonly ScenePart[];
  readonly labels: readonly SceneLabel[];
  /** Room of the names with all that a state may say beside them; the same list until the circuit changes. */
  readonly labelRooms: readonly Box[];
}

export interface SceneLine {
  readonly connection: string;
  /** Number of the line within the circuit, see `lineNumbers`. */
  readonly line: number;
  /** The whole route, for hits and reading; `strokes` leave out what another connection of the line draws. */
  readonly points: readonly Point[];
  readonly strokes: readonly Stroke[];
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
  readonly parts?: ReadonlyMap<string, Look & PartWords>;
  /** Flat lines hop over those they cross; else they cross plainly, as ISO 1219-1 has it. */
  readonly hops?: boolean;
}

const IDLE: LineLook = { class: 'idle' };

export function buildScene(circuit: Circuit, routes: Routes, state: SceneState = {}): Scene {
  return sceneOn(circuit, routes, state, stageOf(circuit, routes, state.parts !== undefined));
}

/** With a stage made by hand, which may be one for a part of the circuit. */
export function sceneOn(circuit: Circuit, routes: Routes, state: SceneState, stage: Stage): Scene {
  const looks = (id: string): LineLook => state.lines?.get(id) ?? IDLE;
  const parts = circuit.parts.map((part) =>
    scenePart(part, state.parts?.get(part.id) ?? {}, state.lines && portPens(stage, part, looks)),
  );
  const stubs = takeStubs(circuit, parts, looks);
  const plain = sceneLines(circuit, routes, stage, looks, stubs);
  const hops = state.hops ? stage.hops() : undefined;
  const lines = hops ? plain.map((line) => ({ ...line, strokes: withHops(line.strokes, hops) })) : plain;
  const shown = parts.map((part, i) => shownPart(circuit.parts[i] as Part, part, stubs));
  const labels = [...sceneLabels(circuit, stage.spots, (part) => state.parts?.get(part.id) ?? {}), ...stage.lineLabels];
  const blocks = stage.blocks;
  return {
    title: circuit.name,
    // A strip that is shown in a position may have slid out of its outline at rest.
    bounds: sceneBounds(circuit.parts.map(state.parts ? partReach : partBox), lines, labels, blocks),
    blocks,
    enclosures: shown.flatMap(({ id, enclosure }) =>
      enclosure.length > 0 ? [{ part: id, primitives: enclosure }] : [],
    ),
    lines,
    dots: stage.dots,
    parts: shown,
    labels,
    labelRooms: stage.rooms,
  };
}

function portPens(stage: Stage, part: Part, looks: (id: string) => LineLook): PortPen[] {
  return portSpecs(part).flatMap((port) => {
    const [first] = stage.atPort.get(`${part.id}.${port.id}`) ?? [];
    const pen = first === undefined ? undefined : pathPen(looks(first));
    return pen ? [{ at: port.at, pen }] : [];
  });
}

const isEnclosure = (p: Primitive): boolean => p.type !== 'text' && p.type !== 'group' && p.pen === 'enclosure';

function scenePart(part: Part, look: Look, pens: readonly PortPen[] | undefined): ScenePart {
  return {
    id: part.id,
    kind: part.kind,
    label: labelOf(part),
    placement: placementOf(part),
    box: partBox(part),
    ports: placedPorts(part),
    primitives: placedSymbol(part, look, pens),
  };
}

const symbols = new WeakMap<Part, { readonly look: string; readonly primitives: readonly Primitive[] }>();

/** A symbol is placed anew only when the part, its position or the lines at it change. */
function placedSymbol(part: Part, look: Look, pens: readonly PortPen[] | undefined): readonly Primitive[] {
  const key = `${look.position} ${look.stroke} ${pens?.map((p) => `${p.at.x} ${p.at.y} ${p.pen}`).join(' ')}`;
  const known = symbols.get(part);
  if (known?.look === key) return known.primitives;
  const own = drawn(part, look);
  const primitives = placePrimitives(pens ? showActiveBox(own, pens) : own, placementOf(part));
  symbols.set(part, { look: key, primitives });
  return primitives;
}

function drawn(part: Part, look: Look): readonly Primitive[] {
  const kind = drawnKind(part);
  if (kind) return kind.draw(part, look);
  const box = ownBox(part);
  return [
    { type: 'box', ...box, pen: 'symbol', fill: 'paper' },
    {
      type: 'text',
      at: { x: box.x + box.width / 2, y: box.y + box.height / 2 + 0.5 },
      text: '?',
      size: 1.6,
      align: 'middle',
      tone: 'second',
    },
  ];
}

/** A line is marked anew only when its pieces or its look change: while one part is dragged, hundreds do not. */
const drawnLines = new WeakMap<readonly Piece[], { readonly said: string; readonly line: SceneLine }>();

function sceneLines(
  circuit: Circuit,
  routes: Routes,
  stage: Stage,
  looks: (id: string) => LineLook,
  stubs: Stubs,
): SceneLine[] {
  const kinds = new Map(circuit.parts.map((p) => [p.id, p.kind]));
  // A valve's port letter stands where a bar would.
  const barAt = (ref: PortRef): number => (isStripValve(kinds.get(ref.part)) ? BAR_AT + 1 : BAR_AT);
  return circuit.connections.map((connection) => {
    const { id, from, to } = connection;
    const pieces = stage.pieces.get(id) ?? [];
    const points = routes.get(id) ?? [];
    const line = stage.numbers.get(id) ?? -1;
    const look = looks(id);
    const marks = [look, connection.use, stubs.get(key(from)), stubs.get(key(to)), barAt(from), barAt(to), id, line];
    const said = JSON.stringify(marks);
    const before = drawnLines.get(pieces);
    if (before?.said === said && before.line.points === points) return before.line;
    const strokes = pieces.flatMap((piece) => {
      const start = piece.fromPort ? stubs.get(key(from)) : undefined;
      const end = piece.toPort ? stubs.get(key(to)) : undefined;
      const reached = [...(start?.toReversed() ?? []), ...piece.points, ...(end ?? [])];
      const ends: PortEnds = {
        ...(piece.fromPort && { start: barAt(from) + lengthTo(start, piece.points[0]) }),
        ...(piece.toPort && { end: barAt(to) + lengthTo(end, piece.points.at(-1)) }),
      };
      return lineMarks(reached, look, connection.use ?? 'working', ends);
    });
    const drawn: SceneLine = { connection: id, line, points, strokes };
    drawnLines.set(pieces, { said, line: drawn });
    return drawn;
  });
}

const lengthTo = (stub: readonly Point[] | undefined, port: Point | undefined): number =>
  stub && port
    ? stub.reduce((sum, p, i) => {
        const before = stub[i - 1] ?? port;
        return sum + Math.abs(p.x - before.x) + Math.abs(p.y - before.y);
      }, 0)
    : 0;

const key = (ref: PortRef): string => `${ref.part}.${ref.port}`;

/** Port → the points, from the port inwards, through which its line goes on in the symbol, on the sheet. */
type Stubs = ReadonlyMap<string, readonly Point[]>;

/**
 * The short line between a port and the body of a symbol belongs to the line at the port: in a shown
 * state, and wherever it is dashed, the line takes it over, so that dashes go on. One that runs through from port to port
 * is shared half and half.
 */
function takeStubs(circuit: Circuit, parts: readonly ScenePart[], looks: (id: string) => LineLook): Stubs {
  const shown = new Set<string>();
  for (const { id, from, to, use } of circuit.connections) {
    if (looks(id).class !== 'idle' || (use !== undefined && use !== 'working')) shown.add(key(from)).add(key(to));
  }
  const out = new Map<string, readonly Point[]>();
  if (shown.size === 0) return out;
  for (const part of parts) {
    for (const port of part.ports) {
      const stub = shown.has(key(port.ref)) ? part.primitives.find((p) => stubFrom(p, port.at)) : undefined;
      const points = stub && stubFrom(stub, port.at);
      const end = points?.at(-1);
      if (!points || !end) continue;
      const other = part.ports.find((p) => samePoint(p.at, end));
      if (!other) out.set(key(port.ref), points);
      else if (shown.has(key(other.ref)))
        out.set(key(port.ref), [{ x: (port.at.x + end.x) / 2, y: (port.at.y + end.y) / 2 }]);
    }
  }
  return out;
}

const samePoint = (a: Point, b: Point): boolean => a.x === b.x && a.y === b.y;

/** From the port inwards, without the port: one straight stroke, or a pilot line that turns at right angles. */
function stubFrom(p: Primitive, port: Point): readonly Point[] | undefined {
  if (p.type !== 'polyline' || p.closed === true || p.pen === 'enclosure') return undefined;
  const { points } = p;
  if (points.length !== 2 && (p.pen !== 'pilot' || !points.every((b, i) => isSquare(points[i - 1] ?? b, b))))
    return undefined;
  if (samePoint(points[0] as Point, port)) return points.slice(1);
  return samePoint(points.at(-1) as Point, port) ? points.slice(0, -1).toReversed() : undefined;
}

const isSquare = (a: Point, b: Point): boolean => a.x === b.x || a.y === b.y;

interface ShownPart extends ScenePart {
  readonly enclosure: readonly Primitive[];
}

const shownParts = new WeakMap<
  Part,
  { readonly from: readonly Primitive[]; readonly taken: string; readonly part: ShownPart }
>();

/** Without its enclosure and what its lines draw; the same object as before if nothing about it changed. */
function shownPart(own: Part, part: ScenePart, stubs: Stubs): ShownPart {
  const hidden = part.ports.filter((p) => stubs.has(key(p.ref)));
  const taken = hidden.map(({ ref }) => ref.port).join(' ');
  const known = shownParts.get(own);
  if (known && known.from === part.primitives && known.taken === taken) return known.part;
  const left = part.primitives.filter((p) => !hidden.some((port) => stubFrom(p, port.at) !== undefined));
  const shown = { ...part, primitives: left.filter((p) => !isEnclosure(p)), enclosure: left.filter(isEnclosure) };
  shownParts.set(own, { from: part.primitives, taken, part: shown });
  return shown;
}

function sceneBounds(
  parts: readonly Box[],
  lines: readonly SceneLine[],
  labels: readonly SceneLabel[],
  blocks: readonly SceneBlock[],
): Box {
  const boxes = [...parts, ...labels.map(labelBox), ...blocks.map(({ box }) => box)];
  for (const { points } of lines) {
    const box = boxOfPoints(points);
    if (box) boxes.push(box);
  }
  return union(boxes) ?? { x: 0, y: 0, width: 80, height: 50 };
}

/** Where a part's own frame point lies on the sheet, for balloons and marks. */
export const onSheet = (part: ScenePart, p: Point): Point => place(p, part.placement);
