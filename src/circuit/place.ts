import type { Point, Turn } from '../base/points.ts';
import { all, changeConnection, changeLabel, changePart, type Edit } from './edit.ts';
import type { Circuit, Part } from './model.ts';
import { RefusedEdit } from './refused.ts';

/** Where the sheet shows parts that have no place of their own yet. */
export type Places = ReadonlyMap<string, Point>;
const NOWHERE: Places = new Map();

export const movePart = (circuit: Circuit, id: string, at: Point): Edit => {
  partOf(circuit, id);
  return changePart(id, { at });
};

/**
 * Move parts by dx, dy modules. Bends of connections between two moved parts go along.
 * A part without a place takes it from `places`, else the move is refused.
 */
export const moveParts = (
  circuit: Circuit,
  ids: Iterable<string>,
  dx: number,
  dy: number,
  places: Places = NOWHERE,
): Edit =>
  transform(
    circuit,
    ids,
    places,
    (p) => ({ x: p.x + dx, y: p.y + dy }),
    () => ({}),
  );

/** Quarter turns clockwise about the first of the parts, in document order. */
export function turnParts(circuit: Circuit, ids: Iterable<string>, by: Turn = 90, places: Places = NOWHERE): Edit {
  const pivot = pivotOf(circuit, ids, places);
  const turned = (p: Point): Point => {
    const x = p.x - pivot.x;
    const y = p.y - pivot.y;
    if (by === 90) return { x: pivot.x - y, y: pivot.y + x };
    if (by === 180) return { x: pivot.x - x, y: pivot.y - y };
    if (by === 270) return { x: pivot.x + y, y: pivot.y - x };
    return p;
  };
  return transform(circuit, ids, places, turned, (part) => ({ turn: turnOf((part.turn ?? 0) + by) }));
}

/** Mirror left to right as seen on the sheet, about the first of the parts in document order. */
export function flipParts(circuit: Circuit, ids: Iterable<string>, places: Places = NOWHERE): Edit {
  const pivot = pivotOf(circuit, ids, places);
  const mirrored = (p: Point): Point => ({ x: 2 * pivot.x - p.x, y: p.y });
  // A part is mirrored before it is turned, so mirroring the turned part reverses its turn.
  return transform(circuit, ids, places, mirrored, (part) => ({
    turn: turnOf(360 - (part.turn ?? 0)),
    flip: part.flip ? undefined : true,
  }));
}

export const moveLabel = (id: string, at: Point): Edit => changeLabel(id, { at });

function turnOf(degrees: number): Turn | undefined {
  const turn = (degrees % 360) as Turn;
  return turn === 0 ? undefined : turn;
}

function transform(
  circuit: Circuit,
  ids: Iterable<string>,
  places: Places,
  where: (p: Point) => Point,
  turned: (part: Part) => { turn?: Turn | undefined; flip?: true | undefined },
): Edit {
  const chosen = new Set(ids);
  const tidy = (p: Point): Point => ({ x: p.x + 0, y: p.y + 0 });
  const edits: Edit[] = [];
  for (const part of partsOf(circuit, chosen)) {
    // A part that only turns in place need not be given one.
    const at = part.at ?? places.get(part.id);
    if (at === undefined && chosen.size > 1) throw placeless(part.id);
    const moved = at && tidy(where(at));
    if (at === undefined && Object.keys(turned(part)).length === 0) throw placeless(part.id);
    edits.push(changePart(part.id, { ...(moved && { at: moved }), ...turned(part) }));
  }
  for (const { id, from, to, bends } of circuit.connections) {
    if (!bends?.length || !chosen.has(from.part) || !chosen.has(to.part)) continue;
    edits.push(changeConnection(id, { bends: bends.map((bend) => tidy(where(bend))) }));
  }
  return edits.length === 1 ? (edits[0] as Edit) : all(edits);
}

function pivotOf(circuit: Circuit, ids: Iterable<string>, places: Places): Point {
  const [first] = partsOf(circuit, new Set(ids));
  return (first && (first.at ?? places.get(first.id))) ?? { x: 0, y: 0 };
}

const placeless = (id: string): RefusedEdit =>
  new RefusedEdit(id, 'This part has no place on the sheet yet.', 'Place it first.');

export function partOf(circuit: Circuit, id: string): Part {
  const part = circuit.parts.find((p) => p.id === id);
  if (part === undefined) throw new RefusedEdit(id, `There is no part "${id}".`, 'It may have been removed before.');
  return part;
}

/** In document order. */
export function partsOf(circuit: Circuit, ids: ReadonlySet<string>): readonly Part[] {
  const found = circuit.parts.filter((part) => ids.has(part.id));
  if (found.length < ids.size) for (const id of ids) partOf(circuit, id);
  return found;
}
