import type { Box } from '../../base/points.ts';
import type { Size, Viewport } from './viewport.ts';

/** Between these the drawing is scaled as a picture while the wheel turns; beyond, it is set anew. */
const LEAST = 1 / 8;
const MOST = 8;

/** The scale that the drawing is set at, px per module: that of the view, or while it is zoomed, one not far from it. */
export function settledScale(last: number, scale: number, flows: boolean): number {
  const share = scale / last;
  return flows && share >= LEAST && share <= MOST ? last : scale;
}

/** Share of the view's size that is drawn beyond each of its edges, so that most pans need nothing new. */
const BEYOND = 0.5;

/** The part of the sheet that is drawn, in modules: all that is in view and some way round it. */
export function drawnRegion(last: Box | undefined, view: Viewport, size: Size): Box {
  const seen = { x: view.x, y: view.y, width: size.width / view.scale, height: size.height / view.scale };
  const holds =
    last !== undefined &&
    seen.x >= last.x &&
    seen.y >= last.y &&
    seen.x + seen.width <= last.x + last.width &&
    seen.y + seen.height <= last.y + last.height;
  // A region much too large for the view holds what nobody sees.
  const spare = (1 + 2 * BEYOND) * 2;
  if (holds && last.width <= seen.width * spare && last.height <= seen.height * spare) return last;
  return {
    x: seen.x - seen.width * BEYOND,
    y: seen.y - seen.height * BEYOND,
    width: seen.width * (1 + 2 * BEYOND),
    height: seen.height * (1 + 2 * BEYOND),
  };
}
