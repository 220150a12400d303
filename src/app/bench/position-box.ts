import type { Box } from '../../base/points.ts';
import type { Primitive } from '../../base/primitives.ts';
import type { Part } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';

export interface Thumb {
  readonly primitives: readonly Primitive[];
  readonly frame: Box;
}

type Group = Extract<Primitive, { type: 'group' }>;

function findBox(primitives: readonly Primitive[], index: number): Group | undefined {
  for (const primitive of primitives) {
    if (primitive.type !== 'group') continue;
    if (primitive.role === 'box' && primitive.index === index) return primitive;
    const inside = findBox(primitive.children, index);
    if (inside) return inside;
  }
  return undefined;
}

/** The box of one position as the symbol draws it, or the whole symbol where it has no boxes. */
export function positionThumb(part: Part, position: number): Thumb | undefined {
  const kind = kindOf(part.kind);
  if (!kind) return undefined;
  const drawn = kind.draw(part, { position });
  const box = findBox(drawn, position);
  if (!box) return { primitives: drawn, frame: kind.bounds(part) };
  const outline = box.children.find((child) => child.type === 'box');
  const frame: Box = outline ?? { x: 0, y: 0, width: 4, height: 4 };
  return { primitives: box.children, frame };
}
