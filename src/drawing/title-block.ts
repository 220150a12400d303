import type { Point } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import type { TitleKey } from '../circuit/paper.ts';
import { advance, brokenAt, cutTo } from '../base/text-advance.ts';
import type { Frame } from './frame.ts';
import { mm } from './frame.ts';

/** What the title block of one sheet says. */
export interface TitleBlock {
  /** Of the circuit. */
  readonly name: string;
  readonly fields: Readonly<Partial<Record<TitleKey, string>>>;
  /** What the sheet is: hydraulic circuit diagram, operating chart, part list. */
  readonly document: string;
  /** Below the name: the state that is shown, the conditions. */
  readonly shows: string;
  /** Such as `100 %, M 2.5 mm`, M being the module; empty where nothing is drawn to one. */
  readonly fit: string;
  readonly sheet: number;
  readonly sheets: number;
}

/** ISO 7200, from memory: 180 mm wide, in the lower right corner. */
const WIDTH = 180;
const ROW = 7.5;
const HEAD = 1.9;
const BODY = 2.9;
const NAME = 4.2;

interface Cell {
  readonly x: number;
  readonly width: number;
  readonly row: number;
  readonly rows?: number;
  readonly head: string;
  readonly text: string;
}

/** Heights in modules of the whole block and of the one on following sheets. */
export const BLOCK_HEIGHT = { whole: mm(4 * ROW), following: mm(2 * ROW) } as const;
export const BLOCK_WIDTH = mm(WIDTH);

/** Lines and texts of the block. `following`: the short one of a sheet that follows. */
export function titleBlock(frame: Frame, block: TitleBlock, following: boolean): Primitive[] {
  const height = following ? BLOCK_HEIGHT.following : BLOCK_HEIGHT.whole;
  const width = Math.min(BLOCK_WIDTH, frame.inside.width);
  const corner: Point = {
    x: frame.inside.x + frame.inside.width - width,
    y: frame.inside.y + frame.inside.height - height,
  };
  const cells = following ? followingCells(block) : wholeCells(block);
  return [
    { type: 'box', ...corner, width, height, pen: 'symbol', fill: 'paper' },
    ...cells.flatMap((cell) => drawCell(cell, corner, width / BLOCK_WIDTH)),
  ];
}

const field = ({ fields }: TitleBlock, key: TitleKey): string => fields[key] ?? '';
const sheetOf = ({ sheet, sheets }: TitleBlock): string => `${sheet} of ${sheets}`;

function wholeCells(block: TitleBlock): Cell[] {
  return [
    { x: 0, width: 66, row: 0, head: 'Owner', text: field(block, 'owner') },
    { x: 66, width: 57, row: 0, head: 'Machine', text: field(block, 'machine') },
    { x: 123, width: 57, row: 0, head: 'Document', text: block.document },
    { x: 0, width: 33, row: 1, head: 'Author', text: field(block, 'author') },
    { x: 33, width: 33, row: 1, head: 'Checked', text: field(block, 'checked') },
    { x: 66, width: 114, row: 1, rows: 2, head: 'Title', text: block.name },
    { x: 0, width: 33, row: 2, head: 'Approved', text: field(block, 'approved') },
    { x: 33, width: 33, row: 2, head: 'Units', text: field(block, 'units') },
    { x: 0, width: 33, row: 3, head: 'Fit', text: block.fit },
    { x: 33, width: 33, row: 3, head: 'Date', text: field(block, 'drawn') },
    { x: 66, width: 65, row: 3, head: 'Drawing number', text: field(block, 'number') },
    { x: 131, width: 22, row: 3, head: 'Revision', text: field(block, 'revision') },
    { x: 153, width: 27, row: 3, head: 'Sheet', text: sheetOf(block) },
  ].map((cell) => (cell.head === 'Title' ? { ...cell, shows: block.shows } : cell));
}

const followingCells = (block: TitleBlock): Cell[] => [
  { x: 0, width: 57, row: 0, head: 'Machine', text: field(block, 'machine') },
  { x: 57, width: 74, row: 0, head: 'Title', text: block.name },
  { x: 131, width: 49, row: 0, head: 'Document', text: block.document },
  { x: 0, width: 57, row: 1, head: 'Drawing number', text: field(block, 'number') },
  { x: 57, width: 22, row: 1, head: 'Revision', text: field(block, 'revision') },
  { x: 79, width: 52, row: 1, head: 'Date', text: field(block, 'drawn') },
  { x: 131, width: 49, row: 1, head: 'Sheet', text: sheetOf(block) },
];

/** `squeeze`: share of the full width that the paper leaves. */
function drawCell(cell: Cell & { readonly shows?: string }, corner: Point, squeeze: number): Primitive[] {
  const x = corner.x + mm(cell.x) * squeeze;
  const y = corner.y + mm(cell.row * ROW);
  const width = mm(cell.width) * squeeze;
  const room = width - mm(3);
  const rows = cell.rows ?? 1;
  const text = (said: string, size: number, down: number, weight: 400 | 600): Primitive => ({
    type: 'text',
    at: { x: x + mm(1.5), y: y + mm(down) },
    text: cutTo(said, mm(size), room, weight),
    size: mm(size),
    align: 'start',
    weight,
  });
  const drawn: Primitive[] = [
    { type: 'box', x, y, width, height: mm(ROW) * rows, pen: 'hair' },
    { ...(text(cell.head, HEAD, 2.5, 400) as Extract<Primitive, { type: 'text' }>), tone: 'second' },
  ];
  if (rows === 1) {
    if (cell.text !== '') drawn.push(text(cell.text, fits(cell.text, BODY, room), 6.2, 600));
    return drawn;
  }
  drawn.push(text(cell.text, fits(cell.text, NAME, room), 7.4, 600));
  const shows = brokenAt(cell.shows ?? '', mm(2.3), room);
  shows.slice(0, 2).forEach((said, i) => {
    const cut = i === 1 && shows.length > 2 ? `${said} …` : said;
    if (said !== '') drawn.push(text(cut, 2.3, 10.8 + i * 3, 400));
  });
  return drawn;
}

/** The size in mm, made smaller down to three quarters where that keeps the text whole. */
const fits = (text: string, size: number, room: number): number =>
  Math.max(size * 0.75, Math.min(size, (size * room) / Math.max(advance(text, mm(size), 600), 1e-9)));
