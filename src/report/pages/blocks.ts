import type { Primitive } from '../../base/primitives.ts';
import type { Stroke } from '../../drawing/strokes.ts';

/** What a printed sheet is made of below its frame, in reading order. Lengths in modules. */
export type Block =
  | { readonly type: 'heading'; readonly text: string; readonly level: 1 | 2 }
  | TextBlock
  | TableBlock
  /** Lines to be filled in by hand, side by side; `share` of the width. */
  | { readonly type: 'fields'; readonly fields: readonly { readonly label: string; readonly share: number }[] }
  | { readonly type: 'gap'; readonly height: number }
  | DrawnBlock
  /** Never parted by the end of a sheet, unless it is longer than one. */
  | { readonly type: 'together'; readonly blocks: readonly Block[] };

export interface TextBlock {
  readonly type: 'text';
  readonly text: string;
  readonly weight?: 400 | 600;
  readonly indent?: number;
  /** Before the first line: an empty box to tick, or a short text such as `1.` or `Caution`. */
  readonly mark?: 'tick' | { readonly text: string };
  /** Set in a frame, as a caution. */
  readonly framed?: true;
}

export interface TableBlock {
  readonly type: 'table';
  readonly columns: readonly TableColumn[];
  readonly rows: readonly (readonly string[])[];
}

export interface TableColumn {
  readonly head: string;
  readonly align?: 'start' | 'end';
  readonly weight?: 400 | 600;
  /** Room to be kept, for what is filled in by hand. */
  readonly least?: number;
  /** Set off from the column before it. */
  readonly apart?: boolean;
}

export interface DrawnBlock {
  readonly type: 'drawn';
  readonly height: number;
  readonly primitives: readonly Primitive[];
  readonly strokes: readonly Stroke[];
}

/** Sizes of text and the height of its lines, in modules. */
export const TEXT = { h1: 1.8, h2: 1.35, body: 1.15, table: 1, small: 0.9 } as const;
export const LEADING = 1.4;
