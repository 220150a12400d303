import type { Box } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import { advance, CAP_HEIGHT } from '../base/text-advance.ts';
import type { Part } from '../circuit/model.ts';
import { kindOf } from '../parts/catalogue.ts';
import { isStripValve } from '../parts/valve-kinds.ts';
import { placementOf } from './shapes.ts';
import { placePrimitives } from './turned.ts';

const known = new WeakMap<Part, readonly Box[]>();
const NONE: readonly Box[] = [];

/** The letters that a symbol writes beside its ports, on the sheet; they stand still whatever slides. */
export function partLetters(part: Part): readonly Box[] {
  if (!isStripValve(part.kind)) return NONE;
  let letters = known.get(part);
  if (!letters) {
    const drawn = kindOf(part.kind)?.draw(part, {}) ?? [];
    const texts = drawn.filter((p) => p.type === 'text');
    letters = placePrimitives(texts, placementOf(part)).flatMap((p) => (p.type === 'text' ? [textBox(p)] : []));
    known.set(part, letters);
  }
  return letters;
}

/** Capitals and figures of a text that is drawn. */
function textBox({ at, text, size, align, weight }: Extract<Primitive, { type: 'text' }>): Box {
  const width = advance(text, size, weight);
  const height = CAP_HEIGHT * size;
  const x = align === 'start' ? at.x : align === 'end' ? at.x - width : at.x - width / 2;
  return { x, y: at.y - height, width, height };
}
