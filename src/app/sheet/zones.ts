import type { Size, Viewport } from './viewport.ts';

/** Zones of the sheet, in modules: numbered columns and lettered rows, as on any drawing. */
export const ZONE = { width: 20, height: 14 } as const;

export interface ZoneMark {
  readonly name: string;
  /** Pixels along the edge of the view: where the zone begins, and the middle of what is in sight of it. */
  readonly start: number;
  readonly middle: number;
}

const column = (index: number): string => (index < 0 ? `−${-index}` : String(index + 1));

/** A … Z, AA …; above the origin −A, −B. */
function row(index: number): string {
  if (index < 0) return `−${row(-index - 1)}`;
  const rest = Math.floor(index / 26);
  return (rest > 0 ? row(rest - 1) : '') + String.fromCharCode(65 + (index % 26));
}

/** Zones in sight along one edge; a zone of which little shows is left without its name. */
function along(from: number, length: number, scale: number, zone: number, name: (index: number) => string): ZoneMark[] {
  // Far out the names would run into one another: skip to every second, fourth … zone.
  let step = 1;
  while (zone * step * scale < 60) step *= 2;
  const marks: ZoneMark[] = [];
  const first = Math.floor(from / zone / step) * step;
  for (let i = first; i * zone < from + length / scale; i += step) {
    const start = (i * zone - from) * scale;
    const end = start + zone * step * scale;
    const seen = Math.min(end, length) - Math.max(start, 0);
    marks.push({ name: seen < 24 ? '' : name(i), start, middle: (Math.max(start, 0) + Math.min(end, length)) / 2 });
  }
  return marks;
}

export const columnsInSight = (view: Viewport, size: Size): ZoneMark[] =>
  along(view.x, size.width, view.scale, ZONE.width, column);
export const rowsInSight = (view: Viewport, size: Size): ZoneMark[] =>
  along(view.y, size.height, view.scale, ZONE.height, row);

/** Modules between two numbers of a ruler. */
const RULER = 10;
const modules = (index: number): string => (index < 0 ? `−${-index * RULER}` : String(index * RULER));
/** Where a ruler's numbers stand: at the start of each mark. */
export const rulerInSight = (from: number, length: number, scale: number): ZoneMark[] =>
  along(from, length, scale, RULER, modules);

/** `B3`: the zone that a point lies in. */
export const zoneAt = (p: { readonly x: number; readonly y: number }): string =>
  row(Math.floor(p.y / ZONE.height)) + column(Math.floor(p.x / ZONE.width));
