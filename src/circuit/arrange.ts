import type { Point } from '../base/points.ts';
import { all, changeConnection, changePart, type Edit } from './edit.ts';
import type { Circuit } from './model.ts';
import { partsOf, type Places } from './place.ts';
import { RefusedEdit } from './refused.ts';

const NOWHERE: Places = new Map();

/**
 * Moves each part its own way, in modules. Bends of a connection go along when both its ends go the same way.
 * Refused when nothing would move, and for a part that has no place and none in `places`.
 */
export function shiftEach(circuit: Circuit, shifts: ReadonlyMap<string, Point>, places: Places = NOWHERE): Edit {
  const moving = new Map([...shifts].filter(([, by]) => by.x !== 0 || by.y !== 0));
  if (moving.size === 0) throw new RefusedEdit('arrange', 'They stand like that already.', 'Nothing had to be moved.');
  const add = (p: Point, by: Point): Point => ({ x: p.x + by.x, y: p.y + by.y });
  const edits: Edit[] = [];
  for (const part of partsOf(circuit, new Set(moving.keys()))) {
    const at = part.at ?? places.get(part.id);
    if (!at) throw new RefusedEdit(part.id, 'This part has no place on the sheet yet.', 'Place it first.');
    edits.push(changePart(part.id, { at: add(at, moving.get(part.id) as Point) }));
  }
  for (const { id, from, to, bends } of circuit.connections) {
    const [a, b] = [moving.get(from.part), moving.get(to.part)];
    if (!bends?.length || !a || !b || a.x !== b.x || a.y !== b.y) continue;
    edits.push(changeConnection(id, { bends: bends.map((bend) => add(bend, a)) }));
  }
  return all(edits);
}
