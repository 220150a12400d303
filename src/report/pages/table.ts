import type { Point } from '../../base/points.ts';
import type { Primitive } from '../../base/primitives.ts';
import { advance, brokenAt } from '../../base/text-advance.ts';
import type { TableBlock, TableColumn } from './blocks.ts';
import { LEADING, TEXT } from './blocks.ts';
import type { Piece } from './piece.ts';

const SIZE = TEXT.table;
const PAD = 0.6;
const ABOVE = 0.35;
/** Besides the text: its pads, and a hair for rounding. */
const SLACK = 2 * PAD + 0.01;
/** Widths are found from so many rows; the rest is broken to fit. */
const LOOKED_AT = 3000;

/** A piece for each row; each brings the head along, which is drawn wherever a sheet begins with it. */
export function tablePieces({ columns, rows }: TableBlock, room: number): Piece[] {
  const widths = columnWidths(columns, rows, room);
  const head = rowPiece(
    columns.map((column) => column.head),
    columns.map((column) => ({ ...column, weight: 600 })),
    widths,
    'head',
  );
  return [{ ...head, keep: true }, ...rows.map((row): Piece => ({ ...rowPiece(row, columns, widths, 'row'), head }))];
}

/** What each column wants; where that is too much, the wide ones share what the others leave. */
function columnWidths(columns: readonly TableColumn[], rows: TableBlock['rows'], room: number): number[] {
  const wanted = columns.map(({ head, weight = 400, least = 0 }, i) => {
    const texts = rows.slice(0, LOOKED_AT).map((row) => row[i] ?? '');
    const widest = [...new Set(texts)].reduce((most, text) => Math.max(most, advance(text, SIZE, weight)), 0);
    return Math.max(least, advance(head, SIZE, 600) + SLACK, widest + SLACK);
  });
  /** How much of a column is written on, on the average. */
  const filled = (i: number): number => {
    const looked = rows.slice(0, LOOKED_AT);
    return 1 + looked.reduce((sum, row) => sum + advance(row[i] ?? '', SIZE), 0) / Math.max(1, looked.length);
  };
  const total = wanted.reduce((sum, width) => sum + width, 0);
  if (total <= room) return wanted;
  const given: (number | undefined)[] = wanted.map(() => undefined);
  for (;;) {
    const left = room - given.reduce((sum: number, width) => sum + (width ?? 0), 0);
    const open = given.flatMap((width, i) => (width === undefined ? [i] : []));
    const share = left / open.length;
    const modest = open.filter((i) => (wanted[i] ?? 0) <= share);
    if (modest.length === 0) {
      return shareOut(left, given, filled, (i) => wordRoom(columns[i]?.head ?? ''));
    }
    for (const i of modest) given[i] = wanted[i];
  }
}

/** Least width of a column that has to be broken: no word of its head is parted. */
const LEAST = 5;
const wordRoom = (head: string): number =>
  Math.max(LEAST, ...head.split(' ').map((word) => advance(word, SIZE, 600) + SLACK));

/** What is left goes to the open columns by how full they are, so that a long remark in one row does not starve the others. */
function shareOut(
  left: number,
  given: readonly (number | undefined)[],
  weight: (i: number) => number,
  wanted: (i: number) => number,
): number[] {
  const open = given.flatMap((width, i) => (width === undefined ? [i] : []));
  const most = open.reduce((sum, i) => sum + wanted(i), 0);
  const all = open.reduce((sum, i) => sum + weight(i), 0);
  const squeeze = Math.min(1, left / most);
  const spare = Math.max(0, left - most);
  return given.map((width, i) => width ?? wanted(i) * squeeze + (spare * weight(i)) / all);
}

function rowPiece(
  cells: readonly string[],
  columns: readonly TableColumn[],
  widths: readonly number[],
  kind: 'head' | 'row',
): Piece {
  const broken = columns.map(({ weight = 400 }, i) =>
    brokenAt(cells[i] ?? '', SIZE, Math.max((widths[i] ?? 0) - 2 * PAD, SIZE), weight),
  );
  const lines = Math.max(1, ...broken.map((each) => each.length));
  const height = lines * SIZE * LEADING + 2 * ABOVE;
  const total = widths.reduce((sum, width) => sum + width, 0);
  return {
    height,
    draw: ({ x, y }) => {
      const drawn: Primitive[] = [];
      let left = x;
      columns.forEach(({ align = 'start', weight = 400, apart = false }, i) => {
        const width = widths[i] ?? 0;
        if (apart) drawn.push(rule({ x: left, y }, { x: left, y: y + height }, 'hair'));
        broken[i]?.forEach((text, k) => {
          if (text === '') return;
          drawn.push({
            type: 'text',
            at: {
              x: align === 'end' ? left + width - PAD : left + PAD,
              y: y + ABOVE + (k + 0.8) * SIZE * LEADING - SIZE * 0.1,
            },
            text,
            size: SIZE,
            align,
            weight,
          });
        });
        left += width;
      });
      const under = y + height;
      drawn.push(rule({ x, y: under }, { x: x + total, y: under }, kind === 'head' ? 'symbol' : 'hair'));
      return { primitives: drawn, strokes: [] };
    },
  };
}

const rule = (from: Point, to: Point, pen: 'symbol' | 'hair'): Primitive => ({
  type: 'polyline',
  points: [from, to],
  pen,
});
