import type { Box, Point } from '../../base/points.ts';
import { desk } from './desk.svelte.ts';
import { drawnRegion, settledScale } from './plane-region.ts';
import type { Viewport } from './viewport.ts';

/** A wheel or a pinch has come to rest when it was still for so long, ms. */
const REST_MS = 160;
/**
 * What stands on the paper is laid out once for a scale; panning and zooming only move and scale it as one picture,
 * which costs the same however much is drawn. It is set anew, sharp, as soon as the hand rests.
 */
class Plane {
  /** A wheel turns or two fingers move: more of it is likely to come. */
  flows = $state(false);
  #timer: ReturnType<typeof setTimeout> | undefined;
  #scale = desk.viewport.scale;
  #region: Box | undefined;

  /** Pixels per module that the drawing is set at. */
  scale: number = $derived.by(() => (this.#scale = settledScale(this.#scale, desk.viewport.scale, this.flows)));

  region: Box = $derived.by(() => (this.#region = drawnRegion(this.#region, desk.viewport, desk.size)));

  /** Pixels from the sheet's origin to the corner of the view: whole ones of the screen, or letters would be blurred. */
  corner: Point = $derived.by(() => {
    const { x, y, scale } = desk.viewport;
    const dots = window.devicePixelRatio;
    return { x: Math.round(x * scale * dots) / dots, y: Math.round(y * scale * dots) / dots };
  });

  /** The view as it is shown, from that corner. */
  view: Viewport = $derived({
    x: this.corner.x / desk.viewport.scale,
    y: this.corner.y / desk.viewport.scale,
    scale: desk.viewport.scale,
  });

  /** Lays what is set at `scale`, from the sheet's origin, where it is to be seen. */
  transform: string = $derived(
    `translate(${-this.corner.x}px, ${-this.corner.y}px) scale(${desk.viewport.scale / this.scale})`,
  );

  flow(): void {
    this.flows = true;
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => (this.flows = false), REST_MS);
  }
}

export const plane = new Plane();
