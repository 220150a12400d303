import { all, applyEdit, changePart } from '../../circuit/edit.ts';
import type { Edit } from '../../circuit/edit.ts';
import type { Circuit } from '../../circuit/model.ts';
import { placeMissing } from '../../drawing/place.ts';

/**
 * The edit, and with it a place for every part that has none: where it stood on the sheet before. Otherwise each
 * change would lay the sheet out anew and parts that nobody touched would jump.
 */
export function withPlaces(circuit: Circuit, edit: Edit): Edit {
  const after = applyEdit(circuit, edit);
  const open = new Set(after.parts.flatMap(({ id, at }) => (at ? [] : [id])));
  if (open.size === 0) return edit;
  const stood = new Map(placeMissing(circuit).parts.map(({ id, at }) => [id, at]));
  const kept = after.parts.map((part) => {
    const at = part.at ?? stood.get(part.id);
    return at ? { ...part, at } : part;
  });
  const places = placeMissing({ ...after, parts: kept }).parts.flatMap(({ id, at }) => (open.has(id) && at ? [changePart(id, { at })] : []));
  return all([edit, ...places]);
}
