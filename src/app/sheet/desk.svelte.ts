import type { Point, Side, Turn } from '../../base/points.ts';
import type { Circuit, PortRef } from '../../circuit/model.ts';
import type { Insertion } from '../../drawing/through.ts';
import type { MenuItem } from '../ui/menu-item.ts';
import type { Hit } from './hit.ts';
import type { Cursor } from './reading-order.ts';
import type { Size, Viewport } from './viewport.ts';

/** One end of a line that is being drawn; `sheet`: where it stands, set when the line begins or ends there. */
export type End =
  | { readonly type: 'port'; readonly ref: PortRef; readonly at: Point; readonly side: Side; readonly sheet?: string }
  | { readonly type: 'line'; readonly connection: string; readonly at: Point; readonly sheet?: string };

/** What the hand is doing. */
export type Gesture =
  | { readonly type: 'none' }
  | { readonly type: 'pan' }
  | { readonly type: 'band'; readonly from: Point; readonly to: Point; readonly adds: boolean }
  /** `into`: the line that the part would go into if it were let go. */
  | { readonly type: 'drag'; readonly ids: readonly string[]; readonly into?: Insertion | undefined }
  /** A stretch of a line is moved: `held` by the pointer, else by the keys. */
  | {
      readonly type: 'bend';
      readonly connection: string;
      readonly segment: number;
      readonly route: readonly Point[];
      readonly held: boolean;
    }
  /** A text on its way to its place. */
  | { readonly type: 'text'; readonly at: Point | undefined }
  /** Several parts with their lines, as one. */
  | {
      readonly type: 'place-several';
      readonly title: string;
      readonly fragment: Circuit;
      readonly at: Point | undefined;
    }
  /** `held`: the button is down; otherwise the line waits for its second click. */
  | {
      readonly type: 'connect';
      readonly from: End;
      readonly to: Point;
      readonly over: End | undefined;
      readonly held: boolean;
    }
  | {
      readonly type: 'place';
      readonly form: Form;
      readonly at: Point | undefined;
      readonly turn: Turn;
      readonly flip: boolean;
    };

/** A ready-made form in the hand: the part kind and the form's id. */
export interface Form {
  readonly kind: string;
  readonly ready: string;
  readonly title: string;
}

/**
 * What gets a name or a text: `size` is that of the connection, `text` a label that is not there yet, `spot` the place
 * of what is in hand or selected.
 */
export interface Naming {
  readonly of: 'part' | 'connection' | 'size' | 'label' | 'text' | 'group' | 'spot';
  readonly id: string;
  readonly at?: Point;
  /** Typed already. */
  readonly begun?: string;
}

/** A menu at its place in the window. */
export interface SheetMenu {
  readonly at: Point;
  readonly title: string;
  readonly items: readonly MenuItem[];
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
  /** Sheet that is getting a name, in its tab. */
  namingSheet = $state<string | undefined>();
  trayOpen = $state(false);
  /** Part that what is picked in the tray takes the place of. */
  swapping = $state<string | undefined>();
  /** Where the keyboard puts the next part that is taken from the tray. */
  target = $state.raw<Point | undefined>();
  menu = $state.raw<SheetMenu | undefined>();
  finding = $state(false);
  /** Space is down: the next drag pans. */
  panning = $state(false);
  /** A part is being dragged here from the tray. */
  carrying = $state(false);
  /** The keyboard is on the sheet. */
  focused = $state(false);
  /** The element that has the keyboard while the sheet does. */
  host = $state.raw<HTMLElement | undefined>();

  #said = $state.raw<{ readonly text: string; readonly refused: boolean; readonly count: number }>({
    text: '',
    refused: false,
    count: 0,
  });
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
