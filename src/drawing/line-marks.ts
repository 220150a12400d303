import type { Point } from '../base/points.ts';
import type { PathPen } from '../base/primitives.ts';
import { straighten } from './routing.ts';
import { DRAIN_DASH, LINE_WEIGHTS, PILOT_DASH } from './palette.ts';
import type { ColourToken } from './palette.ts';
import type { LineLook, LineUse, Stroke } from './strokes.ts';
import { MODULE_PX } from './strokes.ts';

/** Which ends of the polyline stand at a port, and how far from it a bar is to stand, in modules; absent = no port. */
export interface PortEnds {
  readonly start?: number;
  readonly end?: number;
}

export const BAR_AT = 1;
const BOTH: PortEnds = { start: BAR_AT, end: BAR_AT };
const COLOUR: Readonly<Record<LineLook['class'], PathPen | 'ink'>> = {
  idle: 'ink',
  fed: 'fed',
  'flows to tank': 'flows-to-tank',
  vented: 'vented',
  'cut off': 'cut-off',
  'carries displaced oil': 'displaced',
};
/** Modules. */
const CHEVRON_STEP = 3;
const CHEVRON_ROOM = 2.6;
const CHEVRON_HALF = 0.65;
const CHEVRON_DEPTH = 0.75;
const BAR_HALF = 0.7;
const HATCH_STEP = { known: 0.75, possible: 1.9 } as const;

/** How a path inside a symbol shows that it takes part in this line; an idle line leaves it in ink. */
export function pathPen(look: LineLook): PathPen | undefined {
  if (look.trapped) return 'trapped';
  const colour = COLOUR[look.class];
  return colour === 'ink' ? undefined : colour;
}

export const lineColour = (look: LineLook): ColourToken => (look.trapped ? 'trapped' : COLOUR[look.class]);

/**
 * Everything that shows the state of one drawn piece of line: class by colour, weight, dash and mark,
 * so that no class is told by colour alone. Strokes are in drawing order.
 */
export function lineMarks(
  points: readonly Point[],
  look: LineLook,
  use: LineUse = 'working',
  ends: PortEnds = BOTH,
): Stroke[] {
  const path = straighten(points);
  const [first, second] = path;
  if (!first || !second || (path.length === 2 && first.x === second.x && first.y === second.y)) return [];
  const pilot = use !== 'working';
  const dash = pilot ? { dash: use === 'drain' ? DRAIN_DASH : PILOT_DASH } : {};
  const colour = lineColour(look);
  const strokes: Stroke[] = [];
  if (look.trapped && !pilot) strokes.push(hatch(path, look.trapped));
  if (look.class === 'carries displaced oil' && !look.trapped) {
    const weight = LINE_WEIGHTS['carries displaced oil'];
    strokes.push({ role: 'core', lines: [path], colour, weight, cap: 'square', ...dash });
    strokes.push({ role: 'gap', lines: [path], colour: 'paper', weight: LINE_WEIGHTS.displacedGap, cap: 'square' });
  } else {
    const weight = look.trapped ? LINE_WEIGHTS.trappedCore : LINE_WEIGHTS[look.class];
    const thin = pilot ? Math.min(Math.max(weight, LINE_WEIGHTS.vented), 2) : weight;
    strokes.push({ role: 'core', lines: [path], colour, weight: thin, cap: pilot ? 'butt' : 'square', ...dash });
  }
  if (look.class === 'flows to tank' && (look.flow === 'forward' || look.flow === 'backward')) {
    const lines = chevrons(look.flow === 'forward' ? path : [...path].reverse());
    if (lines.length > 0) strokes.push({ role: 'chevron', lines, colour, weight: 2, cap: 'butt' });
  }
  if (look.class === 'cut off' && !look.trapped) {
    const lines = bars(path, ends, [0]);
    if (lines.length > 0) strokes.push({ role: 'end-bar', lines, colour, weight: LINE_WEIGHTS.endBar, cap: 'butt' });
  }
  if (look.blocked && look.class === 'fed') {
    const lines = bars(path, ends, [-0.3, 0.3]);
    if (lines.length > 0)
      strokes.push({ role: 'block-bar', lines, colour: 'ink', weight: LINE_WEIGHTS.endBar, cap: 'butt' });
  }
  return strokes;
}

const lengthOf = (a: Point, b: Point): number => Math.abs(a.x - b.x) + Math.abs(a.y - b.y);

function towards(a: Point, b: Point, distance: number): Point {
  const length = lengthOf(a, b);
  const share = length === 0 ? 0 : distance / length;
  return { x: a.x + (b.x - a.x) * share, y: a.y + (b.y - a.y) * share };
}

/** Open arrow heads, spread evenly over each straight run, pointing along the path; a path of short runs has one on its longest. */
function chevrons(path: readonly Point[]): Point[][] {
  const longest = Math.max(...path.slice(1).map((b, i) => lengthOf(path[i] as Point, b)));
  const out: Point[][] = [];
  for (let i = 1; i < path.length; i++) {
    const a = path[i - 1] as Point;
    const b = path[i] as Point;
    const length = lengthOf(a, b);
    if (length < Math.min(longest, CHEVRON_ROOM) || length < 1) continue;
    const count = Math.max(1, Math.floor(length / CHEVRON_STEP));
    for (let k = 0; k < count; k++) {
      const tip = towards(a, b, ((k + 0.5) * length) / count + CHEVRON_DEPTH / 2);
      const back = towards(a, b, ((k + 0.5) * length) / count - CHEVRON_DEPTH / 2);
      const side = a.y === b.y ? { x: 0, y: CHEVRON_HALF } : { x: CHEVRON_HALF, y: 0 };
      out.push([{ x: back.x - side.x, y: back.y - side.y }, tip, { x: back.x + side.x, y: back.y + side.y }]);
    }
  }
  return out;
}

/** Short bars across the line at each port, `offsets` about the bar's place; nearer on runs too short for them. */
function bars(path: readonly Point[], ends: PortEnds, offsets: readonly number[]): Point[][] {
  const out: Point[][] = [];
  const both = path.length === 2 && ends.start !== undefined && ends.end !== undefined;
  const at = (a: Point, b: Point, place: number): void => {
    const room = (both ? lengthOf(a, b) / 2 : lengthOf(a, b)) - Math.max(...offsets) - 0.5;
    for (const offset of offsets) {
      const p = towards(a, b, Math.max(0.3, Math.min(place, room)) + offset);
      const side = a.y === b.y ? { x: 0, y: BAR_HALF } : { x: BAR_HALF, y: 0 };
      out.push([
        { x: p.x - side.x, y: p.y - side.y },
        { x: p.x + side.x, y: p.y + side.y },
      ]);
    }
  };
  if (ends.start !== undefined) at(path[0] as Point, path[1] as Point, ends.start);
  if (ends.end !== undefined) at(path.at(-1) as Point, path.at(-2) as Point, ends.end);
  return out;
}

/**
 * Strokes at 45° across a band along the path. They lie on one lattice over the whole sheet, so that
 * neighbouring pieces of a line match at corners and branches.
 */
function hatch(path: readonly Point[], kind: 'known' | 'possible'): Stroke {
  const half = (kind === 'known' ? LINE_WEIGHTS.trappedBand : LINE_WEIGHTS.possibleBand) / MODULE_PX / 2;
  const step = HATCH_STEP[kind];
  const lines: Point[][] = [];
  for (let i = 1; i < path.length; i++) {
    const a = path[i - 1] as Point;
    const b = path[i] as Point;
    const flat = a.y === b.y;
    // Bands run on round corners, but end flush at ports and branches.
    const before = i > 1 ? half : 0;
    const after = i < path.length - 1 ? half : 0;
    const [start, end] = (flat ? a.x <= b.x : a.y <= b.y) ? [before, after] : [after, before];
    const x0 = Math.min(a.x, b.x) - (flat ? start : half);
    const x1 = Math.max(a.x, b.x) + (flat ? end : half);
    const y0 = Math.min(a.y, b.y) - (flat ? half : start);
    const y1 = Math.max(a.y, b.y) + (flat ? half : end);
    for (let k = Math.ceil((x0 + y0) / step); k * step < x1 + y1; k++) {
      const sum = k * step;
      const left = Math.max(x0, sum - y1);
      const right = Math.min(x1, sum - y0);
      if (right - left < 0.05) continue;
      lines.push([
        { x: left, y: sum - left },
        { x: right, y: sum - right },
      ]);
    }
  }
  return { role: 'hatch', lines, colour: 'trapped', weight: LINE_WEIGHTS.hatch, cap: 'butt' };
}
