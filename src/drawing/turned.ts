import type { Placement, Point } from '../base/points.ts';
import { place, placeBox } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';

const ALIGN_BACK = { start: 'end', middle: 'middle', end: 'start' } as const;

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
        return { ...p, at: to(p.at), align: alignOf(p.align, placement) };
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

/** Text beside a point stays on the same side of it; upright turns centre it. */
function alignOf(align: 'start' | 'middle' | 'end', { turn, flip }: Placement): 'start' | 'middle' | 'end' {
  if (turn === 90 || turn === 270) return 'middle';
  return (turn === 180) !== flip ? ALIGN_BACK[align] : align;
}
