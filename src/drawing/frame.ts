import type { Box, Point } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import type { Paper } from '../circuit/paper.ts';
import { paperExtent } from '../circuit/paper.ts';

/** Millimetres on paper of one module, as ISO 1219-1 has it. */
export const MODULE_MM = 2.5;
export const mm = (length: number): number => length / MODULE_MM;

/** A sheet of paper with its frame, in modules from its upper left corner. */
export interface Frame {
  readonly paper: Paper;
  readonly width: number;
  readonly height: number;
  /** Inside the frame line. */
  readonly inside: Box;
  /** Names of the fields, left to right and from the top down. */
  readonly columns: readonly string[];
  readonly rows: readonly string[];
  readonly primitives: readonly Primitive[];
}

/** ISO 5457, from memory: 20 mm at the filing edge, 10 mm elsewhere, a border of 5 mm with fields of 50 mm. */
const FILING = 20;
const EDGE = 10;
const BORDER = 5;
const FIELD = 50;
const CENTRING = 5;
const LETTER = 3.5;
/** I and O are left out. */
const ROWS = 'ABCDEFGHJKLMNPQRSTUVWXYZ';

export function frameOf(paper: Paper): Frame {
  const extent = paperExtent(paper);
  const [width, height] = [mm(extent.width), mm(extent.height)];
  const inside: Box = {
    x: mm(FILING),
    y: mm(EDGE),
    width: width - mm(FILING + EDGE),
    height: height - mm(2 * EDGE),
  };
  const across = fieldsOf(extent.width);
  const down = fieldsOf(extent.height);
  const columns = Array.from({ length: across }, (_, i) => String(i + 1));
  const rows = Array.from({ length: down }, (_, i) => ROWS[i] ?? '');
  const bare = { paper, width, height, inside, columns, rows };
  return { ...bare, primitives: [...border(bare), ...fields(bare)] };
}

/** An even number of fields of 50 mm counted from the middle; those at the corners take what is left. */
const fieldsOf = (length: number): number => 2 * Math.round(length / 2 / FIELD);

/** The field that a point of the sheet lies in: `B3`. */
export function fieldAt(frame: Omit<Frame, 'primitives'>, at: Point): string {
  const index = (value: number, length: number, count: number): number =>
    Math.min(count - 1, Math.max(0, Math.floor((value - length / 2) / mm(FIELD)) + count / 2));
  const row = frame.rows[index(at.y, frame.height, frame.rows.length)] ?? '';
  return row + (frame.columns[index(at.x, frame.width, frame.columns.length)] ?? '');
}

const line = (a: Point, b: Point, pen: 'trace' | 'fine'): Primitive => ({ type: 'polyline', points: [a, b], pen });

function border({ width, height, inside }: Omit<Frame, 'primitives'>): Primitive[] {
  const { x, y } = inside;
  const [right, bottom] = [x + inside.width, y + inside.height];
  const [out, into] = [mm(BORDER), mm(CENTRING)];
  const [cx, cy] = [width / 2, height / 2];
  return [
    {
      type: 'box',
      x: x - out,
      y: y - out,
      width: inside.width + 2 * out,
      height: inside.height + 2 * out,
      pen: 'fine',
    },
    { type: 'box', ...inside, pen: 'trace' },
    line({ x: cx, y: y - out }, { x: cx, y: y + into }, 'trace'),
    line({ x: cx, y: bottom + out }, { x: cx, y: bottom - into }, 'trace'),
    line({ x: x - out, y: cy }, { x: x + into, y: cy }, 'trace'),
    line({ x: right + out, y: cy }, { x: right - into, y: cy }, 'trace'),
  ];
}

function fields({ width, height, inside, columns, rows }: Omit<Frame, 'primitives'>): Primitive[] {
  const { x, y } = inside;
  const [right, bottom] = [x + inside.width, y + inside.height];
  const out = mm(BORDER);
  const drawn: Primitive[] = [];
  const name = (at: Point, text: string): void => {
    drawn.push({ type: 'text', at: { x: at.x, y: at.y + mm(LETTER) * 0.36 }, text, size: mm(LETTER), align: 'middle' });
  };
  for (const { from, to, text } of spans(width, x, right, columns)) {
    const middle = (from + to) / 2;
    name({ x: middle, y: y - out / 2 }, text);
    name({ x: middle, y: bottom + out / 2 }, text);
    if (from <= x || from === width / 2) continue;
    drawn.push(line({ x: from, y: y - out }, { x: from, y }, 'fine'));
    drawn.push(line({ x: from, y: bottom }, { x: from, y: bottom + out }, 'fine'));
  }
  for (const { from, to, text } of spans(height, y, bottom, rows)) {
    const middle = (from + to) / 2;
    name({ x: x - out / 2, y: middle }, text);
    name({ x: right + out / 2, y: middle }, text);
    if (from <= y || from === height / 2) continue;
    drawn.push(line({ x: x - out, y: from }, { x, y: from }, 'fine'));
    drawn.push(line({ x: right, y: from }, { x: right + out, y: from }, 'fine'));
  }
  return drawn;
}

/** Where each field begins and ends inside the frame. */
function spans(
  length: number,
  start: number,
  end: number,
  names: readonly string[],
): { readonly from: number; readonly to: number; readonly text: string }[] {
  const half = names.length / 2;
  const edge = (i: number): number => length / 2 + (i - half) * mm(FIELD);
  return names.map((text, i) => ({
    from: i === 0 ? start : edge(i),
    to: i === names.length - 1 ? end : edge(i + 1),
    text,
  }));
}
