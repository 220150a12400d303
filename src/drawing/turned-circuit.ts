import type { Point, Turn } from '../base/points.ts';
import { flipParts, moveParts, turnParts } from '../circuit/build.ts';
import { applyEdit } from '../circuit/edit.ts';
import type { Circuit } from '../circuit/model.ts';
import { placeMissing } from './place.ts';

/** A circuit turned by quarter turns clockwise about the origin, or mirrored left to right; texts stay level. */
export function turnedCircuit(circuit: Circuit, how: Exclude<Turn, 0> | 'flip'): Circuit {
  const placed = placeMissing(circuit);
  const ids = placed.parts.map(({ id }) => id);
  const where = (p: Point): Point => {
    if (how === 'flip') return { x: 0 - p.x, y: p.y };
    if (how === 90) return { x: 0 - p.y, y: p.x };
    return how === 180 ? { x: 0 - p.x, y: 0 - p.y } : { x: p.y, y: 0 - p.x };
  };
  const pivot = placed.parts[0]?.at ?? { x: 0, y: 0 };
  // Parts turn about the first of them, which then goes to where the origin would have taken it.
  const turned = applyEdit(placed, how === 'flip' ? flipParts(placed, ids) : turnParts(placed, ids, how));
  const to = where(pivot);
  const moved = applyEdit(turned, moveParts(turned, ids, to.x - pivot.x, to.y - pivot.y));
  return {
    ...moved,
    ...(circuit.labels && { labels: circuit.labels.map((label) => ({ ...label, at: where(label.at) })) }),
  };
}
