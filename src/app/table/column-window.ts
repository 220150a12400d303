import type { Column } from './columns.ts';

/** Columns from `first` to before `end`, by number. */
export interface Seen {
  readonly first: number;
  readonly end: number;
}

/** px drawn on either side of the window, so that a small move shows no gap. */
const SPARE = 240;
/** So few rows are drawn whole: nothing is gained by leaving cells out. */
const FEW_ROWS = 200;

/**
 * The columns within the window. A table wider than the window has its tracks at their least widths, so their sums
 * are where the columns stand; `left` and `width` of the window in px.
 */
export function seenColumns(columns: readonly Column[], rows: number, left: number, width: number): Seen {
  const all = { first: 0, end: columns.length };
  const total = columns.reduce((sum, column) => sum + column.width, 0);
  if (rows <= FEW_ROWS || width <= 0 || total <= width) return all;
  let x = 0;
  let first = columns.length;
  let end = 0;
  columns.forEach((column, c) => {
    if (x + column.width > left - SPARE && x < left + width + SPARE) {
      first = Math.min(first, c);
      end = c + 1;
    }
    x += column.width;
  });
  return end === 0 ? all : { first, end };
}

/** With their numbers; the first one, which stays at the edge, always among them. */
export function drawnColumns(columns: readonly Column[], { first, end }: Seen): { column: Column; c: number }[] {
  return columns.flatMap((column, c) => (c === 0 || (c >= first && c < end) ? [{ column, c }] : []));
}
