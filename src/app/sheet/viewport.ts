import type { Box, Point } from '../../base/points.ts';

/** The part of the sheet in sight: top left corner in modules, and screen pixels per module. */
export interface Viewport {
  readonly x: number;
  readonly y: number;
  readonly scale: number;
}

export interface Size {
  readonly width: number;
  readonly height: number;
}

/** Pixels per module at 100 %. */
export const MODULE = 8;
export const MIN_SCALE = MODULE / 8;
export const MAX_SCALE = MODULE * 6;
/** A small circuit is not blown up beyond this when it is fitted. */
const FIT_SCALE = MODULE * 1.25;

const clamp = (value: number, low: number, high: number): number => Math.min(high, Math.max(low, value));

/** `offset`: pixels from the top left corner of the view. */
export const toSheet = (view: Viewport, offset: Point): Point => ({
  x: view.x + offset.x / view.scale,
  y: view.y + offset.y / view.scale,
});

export const toScreen = (view: Viewport, at: Point): Point => ({
  x: (at.x - view.x) * view.scale,
  y: (at.y - view.y) * view.scale,
});

/** Move the paper by so many pixels: right and down are positive. */
export const panBy = (view: Viewport, dx: number, dy: number): Viewport => ({
  ...view,
  x: view.x - dx / view.scale,
  y: view.y - dy / view.scale,
});

/** The sheet point under `offset` stays where it is. */
export function zoomAt(view: Viewport, offset: Point, factor: number): Viewport {
  const scale = clamp(view.scale * factor, MIN_SCALE, MAX_SCALE);
  const under = toSheet(view, offset);
  return { scale, x: under.x - offset.x / scale, y: under.y - offset.y / scale };
}

/** Show all of `box`, in the middle, with `margin` modules round it. */
export function fitTo(box: Box, size: Size, margin = 3): Viewport {
  const width = box.width + 2 * margin;
  const height = box.height + 2 * margin;
  const scale = clamp(Math.min(size.width / width, size.height / height), MIN_SCALE, FIT_SCALE);
  return {
    scale,
    x: box.x + box.width / 2 - size.width / scale / 2,
    y: box.y + box.height / 2 - size.height / scale / 2,
  };
}

/** The smallest pan after which `box` is in sight; the same object if it is already. */
export function reveal(view: Viewport, size: Size, box: Box, margin = 2): Viewport {
  const width = size.width / view.scale;
  const height = size.height / view.scale;
  const x = slide(view.x, width, box.x - margin, box.width + 2 * margin);
  const y = slide(view.y, height, box.y - margin, box.height + 2 * margin);
  return x === view.x && y === view.y ? view : { ...view, x, y };
}

function slide(start: number, length: number, from: number, span: number): number {
  if (from < start || span > length) return from;
  return from + span > start + length ? from + span - length : start;
}

export const snap = (p: Point): Point => ({ x: Math.round(p.x), y: Math.round(p.y) });
