import { union } from '../../base/points.ts';
import type { Box } from '../../base/points.ts';
import { boxOfPoints, overlaps } from '../../drawing/geometry.ts';
import { labelBox } from '../../drawing/labels.ts';
import type { Scene } from '../../drawing/scene.ts';
import { fitTo, toScreen } from './viewport.ts';
import type { Size, Viewport } from './viewport.ts';

/** Pixels of the frame round the sheet. */
export const EDGE = 18;
/** Modules between the circuit and the frame or what covers the sheet. */
const MARGIN = 1;
/** Width that a circuit with room to spare leaves free at its left, px. */
const ASIDE = 90;

/**
 * Show all of `items` as large as can be, none of them under a cover. `covers`: boxes of open panels and other
 * furniture on the sheet, in its pixels. Where some must be covered, the larger picture wins.
 */
export function fitClear(items: readonly Box[], size: Size, covers: readonly Box[]): Viewport {
  const box = union(items) ?? { x: 0, y: 0, width: 80, height: 50 };
  const whole = { x: EDGE, y: EDGE, width: size.width - 2 * EDGE, height: size.height - 2 * EDGE };
  const tries = roomsOf(whole, covers).map((room) => within(box, items, room, covers));
  tries.sort((p, q) => p.covered - q.covered || q.view.scale - p.view.scale);
  const clear = tries[0]?.view;
  const large = within(box, items, whole, []).view;
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
  /** Parts, names and runs of lines that lie under a cover. */
  readonly covered: number;
}

/** In a corner, or the middle, of the room: where the fewest covers are. */
function within(box: Box, items: readonly Box[], room: Box, covers: readonly Box[]): Try {
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
    const shown = items.map((item) => ({ ...toScreen(view, item), width: item.width * scale, height: item.height * scale }));
    const covered = covers.reduce((sum, cover) => sum + shown.filter((item) => overlaps(cover, item)).length, 0);
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

/** Boxes of everything that is drawn, with room for what a state may say beside a name; runs of lines have no width. */
export const itemsOf = (scene: Scene): Box[] => [
  ...scene.parts.map(({ box }) => box),
  ...scene.blocks.map(({ box }) => box),
  ...scene.labelRooms,
  ...scene.labels.filter(({ role }) => role === 'free').map(labelBox),
  ...scene.lines.flatMap(({ points }) => points.slice(1).flatMap((b, i) => boxOfPoints([points[i] ?? b, b]) ?? [])),
];
