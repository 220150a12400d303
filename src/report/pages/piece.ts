import type { Point } from '../../base/points.ts';
import type { Primitive } from '../../base/primitives.ts';
import type { Stroke } from '../../drawing/strokes.ts';

export interface Drawn {
  readonly primitives: readonly Primitive[];
  readonly strokes: readonly Stroke[];
}

/** What is not parted by the end of a sheet. */
export interface Piece {
  readonly height: number;
  readonly draw: (at: Point) => Drawn;
  /** Stays on one sheet with what follows. */
  readonly keep?: boolean;
  /** Drawn before it wherever it comes first in a column. */
  readonly head?: Piece;
}
