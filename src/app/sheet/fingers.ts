import type { Point } from '../../base/points.ts';
import { panBy, zoomAt } from './viewport.ts';
import type { Viewport } from './viewport.ts';

/** Milliseconds after which a finger that lies still has pressed long. */
const LONG = 550;

/** The fingers on the sheet, by pointer, in pixels of the view; and the one that may press long. */
export class Fingers {
  readonly #at = new Map<number, Point>();
  #timer: ReturnType<typeof setTimeout> | undefined;

  get count(): number {
    return this.#at.size;
  }

  down(pointer: number, at: Point): void {
    this.#at.set(pointer, at);
  }

  up(pointer: number): void {
    this.#at.delete(pointer);
  }

  clear(): void {
    this.#at.clear();
  }

  /** Runs unless it is stopped before: by a move, a lift or another finger. */
  pressLong(run: () => void): void {
    this.stop();
    this.#timer = setTimeout(run, LONG);
  }

  stop(): void {
    clearTimeout(this.#timer);
  }

  /** Two fingers: the sheet follows both. */
  pinched(view: Viewport, pointer: number, to: Point): Viewport {
    const before = this.#at.get(pointer);
    const other = [...this.#at].find(([id]) => id !== pointer)?.[1];
    if (!before || !other) return view;
    this.#at.set(pointer, to);
    const spread = (a: Point): number => Math.max(1, Math.hypot(a.x - other.x, a.y - other.y));
    const panned = panBy(view, (to.x - before.x) / 2, (to.y - before.y) / 2);
    return zoomAt(panned, { x: (to.x + other.x) / 2, y: (to.y + other.y) / 2 }, spread(to) / spread(before));
  }
}
