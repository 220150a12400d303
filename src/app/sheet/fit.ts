import type { Box } from '../../base/points.ts';
import { overlaps } from '../../drawing/geometry.ts';
import { fitTo, toScreen } from './viewport.ts';
import type { Size, Viewport } from './viewport.ts';

/** Pixels of the frame round the sheet. */
export const EDGE = 18;
/** Modules between the circuit and the frame or what covers the sheet. */
const MARGIN = 1;
/** Width that a circuit with room to spare leaves free at its left, px. */
const ASIDE = 90;

/**
 * Show all of `box` as large as can be, in the part of the sheet that nothing covers. `covers`: boxes of open panels
 * and other furniture on the sheet, in its pixels. Where some must be covered, the larger picture wins.
 */
export function fitClear(box: Box, size: Size, covers: readonly Box[]): Viewport {
  const whole = { x: EDGE, y: EDGE, width: size.width - 2 * EDGE, height: size.height - 2 * EDGE };
  const tries = roomsOf(whole, covers).map((room) => within(box, room, covers));
  tries.sort((p, q) => p.covered - q.covered || q.view.scale - p.view.scale);
  const clear = tries[0]?.view;
  const large = within(box, whole, []).view;
  // Half the size is too dear a price for a panel that can be moved.
  return clear && clear.scale >= 0.7 * large.scale ? clear : large;
}

/** The sheet, and what is left of it beside or above each cover. */
function roomsOf(whole: Box, covers: readonly Box[]): Box[] {
  const cut = covers.flatMap((cover): Box[] => [
    { ...whole, width: cover.x - whole.x },
    { ...whole, height: cover.y - whole.y },
    { ...whole, x: cover.x + cover.width, width: whole.x + whole.width - cover.x - cover.width },
    { ...whole, y: cover.y + cover.height, height: whole.y + whole.height - cover.y - cover.height },
  ]);
  return [whole, ...cut, ...cut.flatMap((room) => covers.flatMap((cover) => [
    { ...room, width: Math.min(room.width, cover.x - room.x) },
    { ...room, height: Math.min(room.height, cover.y - room.y) },
  ]))].filter(({ width, height }) => width > 80 && height > 80);
}

interface Try {
  readonly view: Viewport;
  /** Covers that the circuit lies under. */
  readonly covered: number;
}

/** In a corner, or the middle, of the room: where the fewest covers are. */
function within(box: Box, room: Box, covers: readonly Box[]): Try {
  const fitted = fitTo(box, room, MARGIN);
  const { scale } = fitted;
  const spare = { x: room.width - (box.width + 2 * MARGIN) * scale, y: room.height - (box.height + 2 * MARGIN) * scale };
  let best: Try | undefined;
  const left = Math.min(spare.x, ASIDE);
  for (const [dx, dy] of [[left, spare.y / 2], [left, 0], [spare.x / 2, spare.y / 2], [spare.x / 2, 0], [spare.x, 0], [0, 0]] as const) {
    const view: Viewport = {
      scale,
      x: box.x - MARGIN - (room.x + dx) / scale,
      y: box.y - MARGIN - (room.y + dy) / scale,
    };
    const from = toScreen(view, box);
    const shown = { ...from, width: box.width * scale, height: box.height * scale };
    const covered = covers.filter((cover) => overlaps(cover, shown)).length;
    if (!best || covered < best.covered) best = { view, covered };
  }
  return best as Try;
}

/** What stands on the sheet: the open legend, the zoom buttons, the title block. */
export function coversOf(host: HTMLElement | undefined): Box[] {
  const sheet = host?.getBoundingClientRect();
  if (!sheet) return [];
  return [...document.querySelectorAll('[data-covers-sheet]')].flatMap((element) => {
    const { left, top, width, height } = element.getBoundingClientRect();
    const box = { x: left - sheet.left, y: top - sheet.top, width, height };
    return width > 0 && overlaps(box, { x: 0, y: 0, width: sheet.width, height: sheet.height }) ? [box] : [];
  });
}
