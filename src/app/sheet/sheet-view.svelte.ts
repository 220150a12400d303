import { recall, remember } from '../state/remembered.ts';
import { editor } from '../state/editor.svelte.ts';
import type { Viewport } from './viewport.ts';

/** How the sheet is looked at; kept between visits, no part of the circuit. */
class SheetView {
  /** Flat lines hop over those that they cross. */
  hops = $state(recall('hops', false));
  /** Modules along the edges instead of zones. */
  rulers = $state(recall('rulers', false));
  /** The whole sheet in small, with what is in view. */
  overview = $state(recall('overview', false));

  toggle(what: 'hops' | 'rulers' | 'overview'): boolean {
    this[what] = !this[what];
    remember(what, this[what]);
    return this[what];
  }
}

export const sheetView = new SheetView();

const KEY = 'viewport';
const DELAY_MS = 400;
interface Kept extends Viewport {
  readonly of: string;
}
let timer: ReturnType<typeof setTimeout> | undefined;

const nameNow = (): string => `${editor.fileName ?? ''} ${editor.circuit.name}`;

/** Where the sheet of this name was looked at when it was last left. */
export function lastViewport(): Viewport | undefined {
  const kept = recall<Partial<Kept> | undefined>(KEY, undefined);
  const { of, x, y, scale } = kept ?? {};
  if (of !== nameNow() || ![x, y, scale].every(Number.isFinite)) return undefined;
  return { x: Number(x), y: Number(y), scale: Number(scale) };
}

export function keepViewport(viewport: Viewport): void {
  clearTimeout(timer);
  timer = setTimeout(() => remember(KEY, { ...viewport, of: nameNow() }), DELAY_MS);
}
