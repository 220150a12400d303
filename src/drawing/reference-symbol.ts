import type { Box, Point, Side } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import { advance, CAP_HEIGHT, cutTo } from '../base/text-advance.ts';
import type { Part } from '../circuit/model.ts';
import type { PartKind } from '../parts/contract.ts';

/**
 * Stands where a line leaves its sheet: a flag that points away from the line, with the line's name and the sheet and
 * zone where it goes on (common practice on drawings of several sheets). It is drawn and routed to like a part, but is
 * none: it is in no file, and has no name.
 */
export const REFERENCE = 'sheet-reference';

/** A colon is in no id that a file can hold. */
export const referenceId = (connection: string, end: 'from' | 'to'): string => `${connection}:${end}`;
export const isReference = ({ id }: Pick<Part, 'id'>): boolean => id.includes(':');
export const REFERENCE_PORT = 'R';

/** Which way it points. */
export type Way = Side;

/** Modules. */
const SIZE = 1.5;
const PAD = 0.8;
const GAP = 0.7;
const HALF = 1.25;
const TIP = 1.25;
const LONGEST = 12;
/** Kept for the sheet and its zone, so that no flag grows with what it points to. */
const TARGET = advance('88/W88', SIZE);

const BACK: Record<Way, Side> = { left: 'right', right: 'left', up: 'down', down: 'up' };
const cut = (name: string): string => cutTo(name, SIZE, LONGEST, 600);
const lengthOf = (name: string): number => Math.round(advance(cut(name), SIZE, 600) + GAP + TARGET + 2 * PAD);

export interface Flag {
  readonly way: Way;
  /** Of the line. */
  readonly name: string;
  /** Such as `2/B3`. */
  readonly target: string;
}

/** A flag whose line ends at `at`. */
export const referencePart = (id: string, at: Point, { way, name, target }: Flag): Part => ({
  id,
  kind: REFERENCE,
  at,
  settings: { way, name, target },
});

const flagOf = ({ settings = {} }: Part): Flag => {
  const { way } = settings;
  return {
    way: way === 'left' || way === 'up' || way === 'down' ? way : 'right',
    name: String(settings['name'] ?? ''),
    target: String(settings['target'] ?? ''),
  };
};

/** Outline of a flag at the origin. */
export function flagBox({ way, name }: Pick<Flag, 'way' | 'name'>): Box {
  const length = lengthOf(name);
  switch (way) {
    case 'right':
      return { x: 0, y: -HALF, width: length + TIP, height: 2 * HALF };
    case 'left':
      return { x: -length - TIP, y: -HALF, width: length + TIP, height: 2 * HALF };
    case 'up':
      return { x: -length / 2, y: -2 * HALF - TIP, width: length, height: 2 * HALF + TIP };
    case 'down':
      return { x: -length / 2, y: 0, width: length, height: 2 * HALF + TIP };
  }
}

function outline(way: Way, length: number): Point[] {
  const half = length / 2;
  switch (way) {
    case 'right':
      return points([0, -HALF], [length, -HALF], [length + TIP, 0], [length, HALF], [0, HALF]);
    case 'left':
      return points([0, -HALF], [-length, -HALF], [-length - TIP, 0], [-length, HALF], [0, HALF]);
    case 'up':
      return points([-half, 0], [-half, -2 * HALF], [0, -2 * HALF - TIP], [half, -2 * HALF], [half, 0]);
    case 'down':
      return points([-half, 0], [-half, 2 * HALF], [0, 2 * HALF + TIP], [half, 2 * HALF], [half, 0]);
  }
}

const points = (...pairs: readonly (readonly [number, number])[]): Point[] => pairs.map(([x, y]) => ({ x, y }));

/** Name and target side by side in the body of the flag. */
function draw(part: Part): Primitive[] {
  const { way, name, target } = flagOf(part);
  const length = lengthOf(name);
  const start = way === 'right' ? 0 : way === 'left' ? -length : -length / 2;
  const middle = way === 'up' ? -HALF : way === 'down' ? HALF : 0;
  const y = middle + (CAP_HEIGHT * SIZE) / 2;
  const word = (text: string, x: number, align: 'start' | 'end', weight: 400 | 600): Primitive => ({
    type: 'text',
    at: { x, y },
    text,
    size: SIZE,
    align,
    weight,
    tone: 'ink',
  });
  return [
    { type: 'polyline', points: outline(way, length), pen: 'symbol', closed: true, fill: 'paper' },
    word(cut(name), start + PAD, 'start', 600),
    word(target, start + length - PAD, 'end', 400),
  ];
}

/** What drawing and routing ask of a kind of part. */
export type DrawnKind = Pick<PartKind, 'ports' | 'bounds' | 'reach' | 'draw'>;

export const referenceKind: DrawnKind = {
  ports: (part) => [{ id: REFERENCE_PORT, at: { x: 0, y: 0 }, side: BACK[flagOf(part).way], role: 'working' }],
  bounds: (part) => flagBox(flagOf(part)),
  draw,
};
