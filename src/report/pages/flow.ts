import type { Box } from '../../base/points.ts';
import type { Primitive } from '../../base/primitives.ts';
import type { Stroke } from '../../drawing/strokes.ts';
import { advance, brokenAt } from '../../base/text-advance.ts';
import type { Block, TextBlock } from './blocks.ts';
import { LEADING, TEXT } from './blocks.ts';
import type { Drawn, Piece } from './piece.ts';
import { tablePieces } from './table.ts';

export interface Flowed extends Drawn {
  /** Where the text ends, for each column that was begun. */
  readonly ends: readonly number[];
}

/** Blocks set into columns, one after another and sheet after sheet. Something is drawn even where a piece has no room. */
export function flow(blocks: readonly Block[], columns: (sheet: number) => readonly Box[]): Flowed[] {
  const sheets: { primitives: Primitive[]; strokes: Stroke[]; ends: number[] }[] = [];
  let free: Box[] = [];
  let column: Box | undefined;
  let y = 0;
  const next = (): Box => {
    if (free.length === 0) {
      free = [...columns(sheets.length)];
      sheets.push({ primitives: [], strokes: [], ends: [] });
    }
    column = free.shift() as Box;
    y = column.y;
    sheets.at(-1)?.ends.push(y);
    return column;
  };
  const put = (piece: Piece, into: Box): void => {
    const { primitives, strokes } = piece.draw({ x: into.x, y });
    const sheet = sheets.at(-1);
    sheet?.primitives.push(...primitives);
    sheet?.strokes.push(...strokes);
    y += piece.height;
    if (sheet) sheet.ends[sheet.ends.length - 1] = y;
  };
  for (const block of blocks) {
    const first = column ?? next();
    const pieces = piecesOf(block, first.width);
    for (const [i, piece] of pieces.entries()) {
      let into: Box = column ?? first;
      const wanted = piece.height + following(pieces, i, block, blocks, into.width);
      const isFresh = y === into.y;
      if (!isFresh && y + wanted > into.y + into.height + 1e-6) into = next();
      if (piece.head && y === into.y) put(piece.head, into);
      if (block.type === 'gap' && y === into.y) continue;
      put(piece, into);
    }
  }
  return sheets;
}

/** Room that a piece needs behind it, so that no heading stands alone at the end of a sheet. */
function following(pieces: readonly Piece[], i: number, block: Block, blocks: readonly Block[], width: number): number {
  if (!pieces[i]?.keep) return 0;
  const own = pieces[i + 1];
  if (own) return own.height;
  const then = blocks[blocks.indexOf(block) + 1];
  const [first, second] = then ? piecesOf(then, width) : [];
  return (first?.height ?? 0) + (first?.keep ? (second?.height ?? 0) : 0);
}

export function piecesOf(block: Block, width: number): readonly Piece[] {
  switch (block.type) {
    case 'heading': {
      const size = block.level === 1 ? TEXT.h1 : TEXT.h2;
      const above = block.level === 1 ? 0.6 : 0.5;
      return [{ ...textPiece(brokenAt(block.text, size, width, 600), size, 600, 0, above), keep: true }];
    }
    case 'text':
      return textBlock(block, width);
    case 'table':
      return tablePieces(block, width);
    case 'fields':
      return [fieldsPiece(block.fields, width)];
    case 'gap':
      return [{ height: block.height, draw: () => ({ primitives: [], strokes: [] }) }];
    case 'drawn':
      return [
        {
          height: block.height,
          draw: ({ x, y }) => ({
            primitives: [{ type: 'group', role: 'box', shift: { x, y }, children: block.primitives }],
            strokes: block.strokes.map((stroke) => ({
              ...stroke,
              lines: stroke.lines.map((points) => points.map((p) => ({ x: p.x + x, y: p.y + y }))),
            })),
          }),
        },
      ];
    case 'together':
      return [stacked(block.blocks.flatMap((each) => piecesOf(each, width)))];
  }
}

/** Several pieces as one. */
export function stacked(pieces: readonly Piece[]): Piece {
  return {
    height: pieces.reduce((sum, piece) => sum + piece.height, 0),
    draw: ({ x, y }) => {
      let at = y;
      const drawn = pieces.map((piece) => {
        const each = piece.draw({ x, y: at });
        at += piece.height;
        return each;
      });
      return { primitives: drawn.flatMap((d) => d.primitives), strokes: drawn.flatMap((d) => d.strokes) };
    },
  };
}

function textPiece(lines: readonly string[], size: number, weight: 400 | 600, indent: number, above: number): Piece {
  return {
    height: above + lines.length * size * LEADING,
    draw: ({ x, y }) => ({
      primitives: lines.map((text, i): Primitive => ({
        type: 'text',
        at: { x: x + indent, y: y + above + (i + 0.75) * size * LEADING },
        text,
        size,
        align: 'start',
        weight,
      })),
      strokes: [],
    }),
  };
}

const TICK = 1.1;
const PAD = 0.6;

/** Long text may be parted between its lines; one with a mark or a frame is not. */
function textBlock({ text, weight = 400, indent = 0, mark, framed }: TextBlock, width: number): Piece[] {
  const size = TEXT.body;
  const hang =
    mark === undefined ? 0 : mark === 'tick' ? TICK + 0.7 : Math.max(1.8, advance(mark.text, size, 600) + 0.7);
  const inset = framed ? PAD : 0;
  const left = indent + hang + inset;
  const lines = text.split('\n').flatMap((line) => brokenAt(line, size, width - left - inset, weight));
  const above = framed ? PAD : 0.15;
  if (mark === undefined && !framed)
    return lines.map((line, i) => textPiece([line], size, weight, left, i === 0 ? above : 0));
  const body = textPiece(lines, size, weight, left, above);
  const height = body.height + (framed ? PAD + 0.4 : 0);
  return [
    {
      height,
      draw: (at) => {
        const { primitives } = body.draw(at);
        const first = at.y + above;
        const marks: Primitive[] =
          mark === undefined
            ? []
            : mark === 'tick'
              ? [{ type: 'box', x: at.x + indent, y: first + 0.2, width: TICK, height: TICK, pen: 'symbol' }]
              : [
                  {
                    type: 'text',
                    at: { x: at.x + indent + inset, y: first + 0.75 * size * LEADING },
                    text: mark.text,
                    size,
                    align: 'start',
                    weight: 600,
                  },
                ];
        const box: Primitive[] = framed
          ? [
              {
                type: 'box',
                x: at.x + indent,
                y: at.y + 0.1,
                width: width - indent,
                height: height - 0.5,
                pen: 'symbol',
              },
            ]
          : [];
        return { primitives: [...box, ...marks, ...primitives], strokes: [] };
      },
    },
  ];
}

const FIELD_HEIGHT = 3.4;

function fieldsPiece(fields: readonly { readonly label: string; readonly share: number }[], width: number): Piece {
  const whole = fields.reduce((sum, { share }) => sum + share, 0);
  return {
    height: FIELD_HEIGHT,
    draw: ({ x, y }) => {
      let left = x;
      const primitives = fields.flatMap(({ label, share }): Primitive[] => {
        const room = (width * share) / whole;
        const start = left;
        left += room;
        return [
          { type: 'text', at: { x: start, y: y + 1 }, text: label, size: TEXT.small, align: 'start' },
          {
            type: 'polyline',
            points: [
              { x: start, y: y + FIELD_HEIGHT - 0.5 },
              { x: start + room - 1, y: y + FIELD_HEIGHT - 0.5 },
            ],
            pen: 'fine',
          },
        ];
      });
      return { primitives, strokes: [] };
    },
  };
}
