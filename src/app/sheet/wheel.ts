import type { Point } from '../../base/points.ts';
import { panBy, zoomAt } from './viewport.ts';
import type { Viewport } from './viewport.ts';

/** What of a wheel event counts. */
export interface Turned {
  readonly deltaX: number;
  readonly deltaY: number;
  /** 0 pixels, 1 lines, 2 pages. */
  readonly deltaMode: number;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly shiftKey: boolean;
}

/** Pixels that a notch of a mouse wheel turns at the least; two fingers on a trackpad give less at a time. */
const NOTCH = 40;
const LINE = 16;

/** A mouse wheel and a pinch zoom at the pointer; two fingers on a trackpad, and Shift, pan. */
export function wheeled(view: Viewport, turned: Turned, offset: Point): Viewport {
  const unit = turned.deltaMode === 0 ? 1 : LINE * (turned.deltaMode === 2 ? 20 : 1);
  const dx = turned.deltaX * unit;
  const dy = turned.deltaY * unit;
  const pinches = turned.ctrlKey || turned.metaKey;
  if (turned.shiftKey && !pinches) return panBy(view, -(dx === 0 ? dy : dx), 0);
  const isWheel = turned.deltaMode !== 0 || (dx === 0 && Math.abs(dy) >= NOTCH && Number.isInteger(dy));
  if (!pinches && !isWheel) return panBy(view, -dx, -dy);
  const speed = pinches && !isWheel ? 0.01 : 0.0016;
  return zoomAt(view, offset, Math.exp(-Math.max(-240, Math.min(240, dy)) * speed));
}
