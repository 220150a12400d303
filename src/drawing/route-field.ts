import type { Box, Point } from '../base/points.ts';
import { inflate, overlaps, segmentTouches } from './geometry.ts';

/** A straight piece of a route that is already laid. */
export interface LaidSegment {
  readonly line: number;
  readonly a: Point;
  readonly b: Point;
}

/** What lies on a grid edge or node. */
export const FLAG = {
  /** Inside a part's outline. */
  box: 1,
  /** Closer than 1 M to a part. */
  margin: 2,
  /** Along a segment of another line. */
  foreign: 4,
  /** Along a segment of the same line. */
  own: 8,
  /** Another line passes this node from left to right, up and down, or turns or ends on it. */
  foreignAcross: 16,
  foreignUpright: 32,
  foreignCorner: 64,
  /** Through a letter beside a port. */
  letter: 128,
} as const;

/**
 * The sparse grid on which routes are searched: only coordinates at which a sensible line could run
 * (beside parts, at ports, on and beside lines already laid), after the idea of orthogonal visibility
 * graphs. Node (i, j) has index j · width + i; its edges lead to the right and down.
 */
export interface Field {
  readonly xs: readonly number[];
  readonly ys: readonly number[];
  readonly across: Uint8Array;
  readonly upright: Uint8Array;
  readonly nodes: Uint8Array;
  /** Pieces of the same line are near, which cost less to follow. */
  readonly joins: boolean;
}

export interface FieldInput {
  readonly window: Box;
  readonly boxes: readonly Box[];
  readonly letters: readonly Box[];
  readonly segments: readonly LaidSegment[];
  readonly line: number;
  /** Ends, stubs and bends: their coordinates are always on the grid. */
  readonly points: readonly Point[];
}

/** Space that a line keeps from a part, in modules. */
export const MARGIN = 1;
/** And from a letter. */
export const LETTER_MARGIN = 0.3;

export function buildField(input: FieldInput): Field {
  const { window, line } = input;
  const seen = inflate(window, MARGIN + 0.01);
  const boxes = input.boxes.filter((box) => overlaps(box, seen));
  const letters = input.letters.map((box) => inflate(box, LETTER_MARGIN)).filter((box) => overlaps(box, seen));
  const segments = input.segments.filter((s) => segmentTouches(s.a, s.b, seen));
  const xs = new Set<number>();
  const ys = new Set<number>();
  for (const box of boxes) {
    xs.add(Math.floor(box.x - MARGIN)).add(Math.ceil(box.x + box.width + MARGIN));
    ys.add(Math.floor(box.y - MARGIN)).add(Math.ceil(box.y + box.height + MARGIN));
  }
  for (const box of letters) {
    xs.add(Math.floor(box.x)).add(Math.ceil(box.x + box.width));
    ys.add(Math.floor(box.y)).add(Math.ceil(box.y + box.height));
  }
  for (const s of segments) {
    // Room on both sides of another line; the same line is joined rather than followed.
    const steps = s.line === line ? [0] : [-1, 0, 1];
    for (const step of steps) {
      if (s.a.y === s.b.y) ys.add(s.a.y + step);
      if (s.a.x === s.b.x) xs.add(s.a.x + step);
    }
  }
  const middle = (a: number, b: number): number => Math.round((a + b) / 2);
  const [first, last] = [input.points[0], input.points.at(-1)];
  if (first && last) {
    xs.add(middle(first.x, last.x));
    ys.add(middle(first.y, last.y));
  }
  for (const x of [window.x, window.x + window.width]) xs.add(x);
  for (const y of [window.y, window.y + window.height]) ys.add(y);
  const inside = (low: number, size: number) => (v: number) => v >= low && v <= low + size;
  const xList = [...new Set([...[...xs].filter(inside(window.x, window.width)), ...input.points.map((p) => p.x)])];
  const yList = [...new Set([...[...ys].filter(inside(window.y, window.height)), ...input.points.map((p) => p.y)])];
  xList.sort((a, b) => a - b);
  yList.sort((a, b) => a - b);
  const size = xList.length * yList.length;
  const field: Field = {
    xs: xList,
    ys: yList,
    across: new Uint8Array(size),
    upright: new Uint8Array(size),
    nodes: new Uint8Array(size),
    joins: segments.some((s) => s.line === line),
  };
  for (const box of boxes) {
    markBox(field, box, FLAG.box);
    markBox(field, inflate(box, MARGIN), FLAG.margin);
  }
  for (const box of letters) markBox(field, box, FLAG.letter);
  for (const s of segments) markSegment(field, s, s.line === line);
  return field;
}

/** First index whose coordinate is not below `value`. */
export function lowerBound(list: readonly number[], value: number): number {
  let low = 0;
  let high = list.length;
  while (low < high) {
    const mid = (low + high) >>> 1;
    if ((list[mid] as number) < value) low = mid + 1;
    else high = mid;
  }
  return low;
}

function mark(flags: Uint8Array, index: number, flag: number): void {
  flags[index] = (flags[index] as number) | flag;
}

/** Marks every edge that runs through the inside of the box. */
function markBox(field: Field, box: Box, flag: number): void {
  const { xs, ys } = field;
  const x1 = box.x + box.width;
  const y1 = box.y + box.height;
  const i0 = Math.max(0, lowerBound(xs, box.x) - 1);
  const j0 = Math.max(0, lowerBound(ys, box.y) - 1);
  for (let j = j0; j < ys.length && (ys[j] as number) < y1; j++) {
    const y = ys[j] as number;
    for (let i = i0; i < xs.length && (xs[i] as number) < x1; i++) {
      const x = xs[i] as number;
      const index = j * xs.length + i;
      if (y > box.y && (xs[i + 1] ?? x) > box.x) mark(field.across, index, flag);
      if (x > box.x && (ys[j + 1] ?? y) > box.y) mark(field.upright, index, flag);
    }
  }
}

function markSegment(field: Field, s: LaidSegment, own: boolean): void {
  const { xs, ys } = field;
  const width = xs.length;
  const x0 = Math.min(s.a.x, s.b.x);
  const x1 = Math.max(s.a.x, s.b.x);
  const y0 = Math.min(s.a.y, s.b.y);
  const y1 = Math.max(s.a.y, s.b.y);
  const edge = own ? FLAG.own : FLAG.foreign;
  if (y0 === y1) {
    const j = lowerBound(ys, y0);
    if (ys[j] === y0) {
      for (let i = lowerBound(xs, x0); i < width && (xs[i] as number) <= x1; i++) {
        if ((xs[i + 1] ?? Infinity) <= x1) mark(field.across, j * width + i, edge);
        if (!own) mark(field.nodes, j * width + i, FLAG.foreignAcross);
      }
    }
  } else {
    const i = lowerBound(xs, x0);
    if (xs[i] === x0) {
      for (let j = lowerBound(ys, y0); j < ys.length && (ys[j] as number) <= y1; j++) {
        if ((ys[j + 1] ?? Infinity) <= y1) mark(field.upright, j * width + i, edge);
        if (!own) mark(field.nodes, j * width + i, FLAG.foreignUpright);
      }
    }
  }
  for (const end of [s.a, s.b]) {
    const i = lowerBound(xs, end.x);
    const j = lowerBound(ys, end.y);
    if (xs[i] === end.x && ys[j] === end.y) mark(field.nodes, j * width + i, own ? FLAG.own : FLAG.foreignCorner);
  }
}
