import type { Point, Side, Turn } from '../../base/points.ts';
import type { PortRef } from '../../circuit/model.ts';
import type { Hit } from './hit.ts';
import type { Cursor } from './reading-order.ts';
import type { Size, Viewport } from './viewport.ts';

/** One end of a line that is being drawn. */
export type End =
  | { readonly type: 'port'; readonly ref: PortRef; readonly at: Point; readonly side: Side }
  | { readonly type: 'line'; readonly connection: string; readonly at: Point };

/** What the hand is doing. */
export type Gesture =
  | { readonly type: 'none' }
  | { readonly type: 'pan' }
  | { readonly type: 'band'; readonly from: Point; readonly to: Point; readonly adds: boolean }
  | { readonly type: 'drag'; readonly ids: readonly string[] }
  /** `held`: the button is down; otherwise the line waits for its second click. */
  | { readonly type: 'connect'; readonly from: End; readonly to: Point; readonly over: End | undefined; readonly held: boolean }
  | { readonly type: 'place'; readonly form: Form; readonly at: Point | undefined; readonly turn: Turn; readonly flip: boolean };

/** A ready-made form in the hand: the part kind and the form's id. */
export interface Form {
  readonly kind: string;
  readonly ready: string;
  readonly title: string;
}

export interface Naming {
  readonly of: 'part' | 'connection';
  readonly id: string;
}

export const RESTING: Gesture = { type: 'none' };

/** What the sheet is showing and what the hand does on it; nothing of this is in the circuit. */
class Desk {
  viewport = $state.raw<Viewport>({ x: 0, y: 0, scale: 8 });
  size = $state.raw<Size>({ width: 0, height: 0 });
  gesture = $state.raw<Gesture>(RESTING);
  hover = $state.raw<Hit>({ type: 'paper' });
  /** Where the keyboard stands. */
  cursor = $state.raw<Cursor | undefined>();
  naming = $state.raw<Naming | undefined>();
  trayOpen = $state(false);
  /** Space is down: the next drag pans. */
  panning = $state(false);
  /** A part is being dragged here from the tray. */
  carrying = $state(false);
  /** The keyboard is on the sheet. */
  focused = $state(false);
  /** The element that has the keyboard while the sheet does. */
  host = $state.raw<HTMLElement | undefined>();

  #said = $state.raw<{ readonly text: string; readonly refused: boolean; readonly count: number }>({ text: '', refused: false, count: 0 });
  said = $derived(this.#said);

  /** Shown in the status line and read out. */
  say(text: string): void {
    this.#said = { text, refused: false, count: this.#said.count + 1 };
  }

  /** Why something was not done. */
  refuse(text: string): void {
    this.#said = { text, refused: true, count: this.#said.count + 1 };
  }

  rest(): void {
    this.gesture = RESTING;
  }
}

export const desk = new Desk();
