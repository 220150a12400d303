import type { Box, Point } from '../../base/points.ts';
import type { Primitive } from '../../base/primitives.ts';
import { formatNumber } from '../../base/units.ts';
import type { Circuit } from '../../circuit/model.ts';
import type { Paper } from '../../circuit/paper.ts';
import { DEFAULT_PAPER } from '../../circuit/paper.ts';
import type { Frame } from '../../drawing/frame.ts';
import { fieldAt, frameOf, MODULE_MM } from '../../drawing/frame.ts';
import type { ZoneOf } from '../../drawing/faces.ts';
import type { Scene } from '../../drawing/scene.ts';
import type { Stroke } from '../../drawing/strokes.ts';
import { BLOCK_HEIGHT, BLOCK_WIDTH, titleBlock } from '../../drawing/title-block.ts';
import type { Block } from './blocks.ts';
import { flow, piecesOf, stacked } from './flow.ts';
import { lineKey } from './line-key.ts';
import type { Drawn } from './piece.ts';

/** One sheet of paper, in modules from its upper left corner. */
export interface PrintedPage {
  readonly frame: Frame;
  readonly title: string;
  readonly description: string;
  readonly primitives: readonly Primitive[];
  readonly strokes: readonly Stroke[];
  readonly scene?: PlacedScene;
}

/** A drawing on a sheet: its origin, and how many modules of paper one of its own takes. */
export interface PlacedScene {
  readonly scene: Scene;
  readonly at: Point;
  readonly scale: number;
}

/** Blocks that begin on a sheet of their own. */
export interface Section {
  readonly document: string;
  readonly shows: string;
  /** Prose is set in two columns where the paper is wide. */
  readonly columns: 'one' | 'two';
  readonly blocks: readonly Block[];
}

export interface DrawingSheet {
  readonly scene: Scene;
  /** The state that it is drawn in, or that it is drawn at rest. */
  readonly shows: string;
  /** Beside the title block: what the marks on the lines mean. */
  readonly key?: boolean;
  /** Above the title block, such as a part list; left out where it would take more than half of the sheet's height. */
  readonly beside?: Block;
  /** One sheet of several that the circuit is drawn on. */
  readonly one?: {
    readonly id: string;
    readonly name: string;
    /** The scene with its references named by the fields of the paper. */
    readonly zoned: (zoneOf: ZoneOf) => Scene;
  };
}

export interface PrintSource {
  readonly circuit: Circuit;
  /** The circuit's own when absent. */
  readonly paper?: Paper;
  /** In the order of the circuit's sheets, so that the numbers of references are those of the paper. */
  readonly drawing?: DrawingSheet | readonly DrawingSheet[];
  readonly sections: readonly Section[];
}

interface Sheet extends Drawn {
  readonly document: string;
  readonly shows: string;
  readonly fit: string;
  readonly scene?: PlacedScene;
}

/** Modules between the frame and what stands in it. */
const PAD = 2;
const GUTTER = 4;
/** From this width on, prose stands in two columns. */
const WIDE = 110;

/** Sections that need no sheet of their own, one after another. */
export function joined(sections: readonly Section[]): Section[] {
  const [first, ...rest] = sections;
  if (!first) return [];
  return [
    rest.reduce(
      (all, { document, shows, blocks }) => ({
        document: `${all.document}, ${document.toLowerCase()}`,
        shows: [all.shows, shows].filter((text) => text !== '').join('; '),
        columns: all.columns,
        blocks: [...all.blocks, { type: 'gap', height: 1.5 }, ...blocks],
      }),
      first,
    ),
  ];
}

/** All sheets with frame, title block and "sheet 2 of 5". */
export function printedPages(source: PrintSource): PrintedPage[] {
  const { circuit, drawing, sections } = source;
  const frame = frameOf(source.paper ?? circuit.paper ?? DEFAULT_PAPER);
  const sheets: Sheet[] = drawnSheets(frame, drawing ? [drawing].flat() : []);
  for (const { document, shows, columns, blocks } of sections) {
    const before = sheets.length;
    const boxes = flow(blocks, (sheet) => columnsOf(frame, columns, before + sheet === 0));
    sheets.push(...boxes.map((drawn): Sheet => ({ ...drawn, document, shows, fit: '' })));
  }
  return sheets.map((sheet, i): PrintedPage => {
    const block = titleBlock(
      frame,
      {
        name: circuit.name,
        fields: circuit.title ?? {},
        document: sheet.document,
        shows: sheet.shows,
        fit: sheet.fit,
        sheet: i + 1,
        sheets: sheets.length,
      },
      i > 0 && sheet.scene === undefined,
    );
    return {
      frame,
      title: `${circuit.name}, sheet ${i + 1} of ${sheets.length}`,
      description: `${sheet.document}. ${sheet.shows}`,
      primitives: [...frame.primitives, ...sheet.primitives, ...block],
      strokes: sheet.strokes,
      ...(sheet.scene && { scene: sheet.scene }),
    };
  });
}

function columnsOf({ inside }: Frame, columns: Section['columns'], first: boolean): Box[] {
  const strip = first ? BLOCK_HEIGHT.whole : BLOCK_HEIGHT.following;
  const box: Box = {
    x: inside.x + PAD,
    y: inside.y + PAD,
    width: inside.width - 2 * PAD,
    height: inside.height - strip - 2 * PAD,
  };
  if (columns === 'one' || inside.width < WIDE) return [box];
  const width = (box.width - GUTTER) / 2;
  return [
    { ...box, width },
    { ...box, x: box.x + width + GUTTER, width },
  ];
}

/** Least free width beside the title block in which the key of the marks is set; else it stands above it. */
const KEY_ROOM = 34;

function drawnSheets(frame: Frame, drawings: readonly DrawingSheet[]): Sheet[] {
  const sheets = drawings.map((drawing) => drawnSheet(frame, drawing));
  const places = new Map(drawings.flatMap(({ one }, i) => (one ? [[one.id, sheets[i]?.scene] as const] : [])));
  const zoneOf: ZoneOf = (sheet, { x, y }) => {
    const placed = places.get(sheet);
    return placed ? fieldAt(frame, { x: placed.at.x + x * placed.scale, y: placed.at.y + y * placed.scale }) : '';
  };
  return drawings.flatMap(({ one }, i) => {
    const sheet = sheets[i];
    if (!sheet?.scene || !one) return sheet ?? [];
    const shows = [one.name, sheet.shows].filter((text) => text !== '').join('. ');
    return { ...sheet, shows, scene: { ...sheet.scene, scene: one.zoned(zoneOf) } };
  });
}

function drawnSheet(frame: Frame, { scene, shows, key, beside }: DrawingSheet): Sheet {
  const { inside } = frame;
  const free = inside.width - BLOCK_WIDTH;
  const keyBeside = free >= KEY_ROOM;
  const marks = key ? stacked(piecesOf(lineKey((keyBeside ? free : inside.width) - 2 * PAD), inside.width)) : undefined;
  const strip = BLOCK_HEIGHT.whole + (marks && !keyBeside ? marks.height + 0.6 : 0);
  const bottom = inside.y + inside.height;
  const drawn: Drawn[] = [];
  if (marks) drawn.push(marks.draw({ x: inside.x + PAD, y: bottom - strip + 0.6 }));
  let room: Box = { ...inside, height: inside.height - strip };
  if (beside) {
    const piece = stacked(piecesOf(beside, BLOCK_WIDTH - 2 * PAD));
    const high = piece.height + PAD;
    if (listFits(frame, high)) {
      const x = inside.x + inside.width - BLOCK_WIDTH;
      const y = bottom - strip - high;
      drawn.push({ primitives: [{ type: 'box', x, y, width: BLOCK_WIDTH, height: high, pen: 'fine' }], strokes: [] });
      drawn.push(piece.draw({ x: x + PAD, y: y + PAD / 2 }));
      room = roomier(scene, { ...room, width: room.width - BLOCK_WIDTH }, { ...room, height: room.height - high });
    }
  }
  const placed = fitted(scene, room);
  const percent = Math.round(placed.scale * 100);
  const fit = `${percent} %, M ${formatNumber(MODULE_MM * placed.scale, 3)} mm`;
  return {
    document: 'Hydraulic circuit diagram',
    shows,
    fit,
    scene: placed,
    primitives: drawn.flatMap((d) => d.primitives),
    strokes: drawn.flatMap((d) => d.strokes),
  };
}

/** Whether a list of this height has its place above the title block. */
const listFits = ({ inside }: Frame, height: number): boolean =>
  height <= (inside.height - BLOCK_HEIGHT.whole) * (inside.width >= 2 * BLOCK_WIDTH ? 0.9 : 0.5);

/** Whether `beside` will stand on the drawing; else it needs a sheet of its own. */
export function hasRoomBeside(paper: Paper, beside: Block): boolean {
  const height = stacked(piecesOf(beside, BLOCK_WIDTH - 2 * PAD)).height + PAD;
  return listFits(frameOf(paper), height);
}

const scaleIn = ({ bounds }: Scene, room: Box): number =>
  Math.min(1, (room.width - 2 * PAD) / bounds.width, (room.height - 2 * PAD) / bounds.height);

const roomier = (scene: Scene, a: Box, b: Box): Box => (scaleIn(scene, a) > scaleIn(scene, b) ? a : b);

/** In the middle of the room, never enlarged, made smaller by whole hundredths. */
function fitted(scene: Scene, room: Box): PlacedScene {
  const { bounds } = scene;
  const scale = Math.max(0.01, Math.floor(scaleIn(scene, room) * 100) / 100);
  return {
    scene,
    scale,
    at: {
      x: room.x + (room.width - bounds.width * scale) / 2 - bounds.x * scale,
      y: room.y + (room.height - bounds.height * scale) / 2 - bounds.y * scale,
    },
  };
}

/** Height in mm of the smallest letters of a drawing at this scale: port letters, 11 px at 8 px a module. */
export const lettersMm = (scale: number): number => (11 / 8) * MODULE_MM * scale;
