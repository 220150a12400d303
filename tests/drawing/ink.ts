import type { Box, Point } from '../../src/base/points.ts';
import type { Primitive } from '../../src/base/primitives.ts';
import { advance, CAP_HEIGHT } from '../../src/base/text-advance.ts';
import { GLYPH_ROOM } from '../../src/drawing/label-text.ts';
import type { SceneLabel } from '../../src/drawing/labels.ts';

/** What is drawn, as straight strokes and boxes of text, to see what lies on what. Modules. */
export interface Ink {
  readonly strokes: readonly Stroke[];
  readonly texts: readonly WrittenText[];
}

export interface Stroke {
  readonly a: Point;
  readonly b: Point;
}

export interface WrittenText {
  readonly text: string;
  readonly box: Box;
}

/** Letters that reach below the baseline, and how far (Inter, in its size). */
const DESCENDERS = /[gjpqyQ,;()/|_]/;
const DESCENT = 0.21;
const CHORDS = 24;
/** Pixels at 8 px a module. */
const PX = 8;
/** Between two runs of a line. */
const GAP = 0.8;

export const ZERO: Point = { x: 0, y: 0 };
const plus = (p: Point, q: Point): Point => ({ x: p.x + q.x, y: p.y + q.y });

export function inkOf(primitives: readonly Primitive[], shift: Point = ZERO): Ink {
  const strokes: Stroke[] = [];
  const texts: WrittenText[] = [];
  const chain = (points: readonly Point[], closed = false): void => {
    const all = closed ? [...points, ...points.slice(0, 1)] : points;
    all.slice(1).forEach((b, i) => strokes.push({ a: plus(all[i] as Point, shift), b: plus(b, shift) }));
  };
  for (const p of primitives) {
    switch (p.type) {
      case 'polyline':
        chain(p.points, p.closed);
        break;
      case 'circle':
        chain(round(p.centre, p.radius, 0, 2 * Math.PI));
        break;
      case 'arc':
        chain(arcPoints(p));
        break;
      case 'box': {
        const [x1, y1] = [p.x + p.width, p.y + p.height];
        chain([p, { x: x1, y: p.y }, { x: x1, y: y1 }, { x: p.x, y: y1 }], true);
        break;
      }
      case 'text': {
        const width = advance(p.text, p.size, p.weight);
        texts.push({ text: p.text, box: textBox(plus(p.at, shift), p.align, width, p.size, p.text) });
        break;
      }
      case 'group': {
        const inner = inkOf(p.children, plus(shift, p.shift));
        strokes.push(...inner.strokes);
        texts.push(...inner.texts);
      }
    }
  }
  return { strokes, texts };
}

/** A line of words beside a symbol, with the glyph of its verdict. */
export function writtenLabel(label: SceneLabel): WrittenText {
  const width = label.runs.reduce(
    (sum, run, i) =>
      sum + (i > 0 ? GAP : 0) + advance(run.text, run.size / PX, run.weight) + (run.glyph ? GLYPH_ROOM : 0),
    0,
  );
  const text = label.runs.map((run) => run.text).join(' ');
  const size = Math.max(...label.runs.map((run) => run.size)) / PX;
  return { text, box: textBox(label.at, label.align, width, size, text) };
}

function textBox(at: Point, align: 'start' | 'middle' | 'end', width: number, size: number, text: string): Box {
  const x = align === 'start' ? at.x : align === 'end' ? at.x - width : at.x - width / 2;
  const below = DESCENDERS.test(text) ? DESCENT * size : 0;
  return { x, y: at.y - CAP_HEIGHT * size, width, height: CAP_HEIGHT * size + below };
}

function round(centre: Point, radius: number, from: number, sweep: number): Point[] {
  return Array.from({ length: CHORDS + 1 }, (_, i) => {
    const angle = from + (sweep * i) / CHORDS;
    return { x: centre.x + radius * Math.cos(angle), y: centre.y + radius * Math.sin(angle) };
  });
}

/** As SVG has it: the flag `clockwise` is its sweep flag, y down. */
function arcPoints(arc: Extract<Primitive, { type: 'arc' }>): Point[] {
  const { from, to, radius, large = false, clockwise = true } = arc;
  const [dx, dy] = [to.x - from.x, to.y - from.y];
  const half = Math.hypot(dx, dy) / 2;
  const r = Math.max(radius, half);
  const off = Math.sqrt(Math.max(0, r * r - half * half)) * (large === clockwise ? -1 : 1);
  const centre = {
    x: (from.x + to.x) / 2 - (dy / (2 * half)) * off,
    y: (from.y + to.y) / 2 + (dx / (2 * half)) * off,
  };
  const start = Math.atan2(from.y - centre.y, from.x - centre.x);
  let sweep = Math.atan2(to.y - centre.y, to.x - centre.x) - start;
  if (clockwise && sweep < 0) sweep += 2 * Math.PI;
  if (!clockwise && sweep > 0) sweep -= 2 * Math.PI;
  return round(centre, r, start, sweep);
}

/** True if the straight stroke passes through the inside of the box, at any angle. */
export function strikes({ a, b }: Stroke, box: Box): boolean {
  let [low, high] = [0, 1];
  for (const [from, by, edge, size] of [
    [a.x, b.x - a.x, box.x, box.width],
    [a.y, b.y - a.y, box.y, box.height],
  ] as const) {
    if (by === 0) {
      if (from <= edge || from >= edge + size) return false;
      continue;
    }
    const [p, q] = [(edge - from) / by, (edge + size - from) / by];
    low = Math.max(low, Math.min(p, q));
    high = Math.min(high, Math.max(p, q));
  }
  return low < high;
}
