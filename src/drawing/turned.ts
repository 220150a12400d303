import type { Placement, Point } from '../base/points.ts';
import { place, placeBox } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import { CAP_HEIGHT } from '../base/text-advance.ts';

type Text = Extract<Primitive, { type: 'text' }>;

/**
 * Primitives of a symbol, on the sheet: flipped, turned and moved, with text kept upright. Group shifts
 * become sheet directions, so a view only moves a group by its shift.
 */
export function placePrimitives(primitives: readonly Primitive[], placement: Placement): Primitive[] {
  const to = (p: Point): Point => place(p, placement);
  const still: Placement = { ...placement, at: { x: 0, y: 0 } };
  return primitives.map((p): Primitive => {
    switch (p.type) {
      case 'polyline':
        return { ...p, points: p.points.map(to) };
      case 'circle':
        return { ...p, centre: to(p.centre) };
      case 'arc':
        // A mirrored arc bulges the other way.
        return { ...p, from: to(p.from), to: to(p.to), clockwise: (p.clockwise ?? true) !== placement.flip };
      case 'box':
        return { ...p, ...placeBox(p, placement) };
      case 'text':
        return { ...p, ...placeText(p, placement) };
      case 'group': {
        const { clip, ...rest } = p;
        return {
          ...rest,
          shift: place(p.shift, still),
          ...(clip ? { clip: placeBox(clip, placement) } : {}),
          children: placePrimitives(p.children, placement),
        };
      }
    }
  });
}

const SIGN = { start: 1, middle: 0, end: -1 } as const;

/**
 * Where text that is kept upright begins: its box stays in the same quadrant about its anchor as the symbol has it, so
 * that a letter above and to the right of a port is below and to the right of it after a quarter turn.
 */
function placeText({ at, align, size, held }: Text, placement: Placement): Pick<Text, 'at' | 'align'> {
  const still: Placement = { ...placement, at: { x: 0, y: 0 } };
  const tall = CAP_HEIGHT * size;
  const anchor = place(held === 'top' ? { x: at.x, y: at.y - tall } : at, placement);
  // From the anchor, text runs along its line, and up from its baseline or down from its top.
  const along = place({ x: SIGN[align], y: 0 }, still);
  const over = place({ x: 0, y: held === 'top' ? 1 : -1 }, still);
  const way = { x: along.x + over.x, y: along.y + over.y };
  return {
    at: { x: anchor.x, y: anchor.y + ((way.y + 1) / 2) * tall },
    align: way.x > 0 ? 'start' : way.x < 0 ? 'end' : 'middle',
  };
}
