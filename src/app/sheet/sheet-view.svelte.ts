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
  readonly sheet?: string;
}
let timer: ReturnType<typeof setTimeout> | undefined;

const nameNow = (): string => `${editor.fileName ?? ''} ${editor.circuit.name}`;

/** Which sheet of the circuit of this name was looked at when it was last left, and where. */
export function lastViewport(): { readonly viewport: Viewport; readonly sheet: string | undefined } | undefined {
  const kept = recall<Partial<Kept> | undefined>(KEY, undefined);
  const { of, x, y, scale, sheet } = kept ?? {};
  if (of !== nameNow() || ![x, y, scale].every(Number.isFinite)) return undefined;
  return { viewport: { x: Number(x), y: Number(y), scale: Number(scale) }, sheet };
}

export function keepViewport(viewport: Viewport, sheet: string): void {
  clearTimeout(timer);
  timer = setTimeout(() => remember(KEY, { ...viewport, sheet, of: nameNow() }), DELAY_MS);
}
