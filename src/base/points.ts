/** Plane geometry in modules (1 M = 2.5 mm on paper, 8 px on screen at 100 %). x right, y down. */
export interface Point {
  readonly x: number;
  readonly y: number;
}

export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** The way a line leaves a port, seen on the unturned symbol. */
export type Side = 'up' | 'down' | 'left' | 'right';

/** Quarter turns clockwise. */
export type Turn = 0 | 90 | 180 | 270;

export const point = (x: number, y: number): Point => ({ x, y });

const VECTORS: Record<Side, Point> = {
  up: { x: 0, y: -1 },
  right: { x: 1, y: 0 },
  down: { x: 0, y: 1 },
  left: { x: -1, y: 0 },
};
const ORDER: readonly Side[] = ['up', 'right', 'down', 'left'];

export const vector = (side: Side): Point => VECTORS[side];

export interface Placement {
  readonly at: Point;
  readonly turn: Turn;
  /** Mirrored left to right before it is turned. */
  readonly flip: boolean;
}

/** A point of the unturned symbol, on the sheet. */
export function place(p: Point, placement: Placement): Point {
  const x = placement.flip ? -p.x : p.x;
  const y = p.y;
  const { at } = placement;
  switch (placement.turn) {
    case 0:
      return { x: at.x + x, y: at.y + y };
    case 90:
      return { x: at.x - y, y: at.y + x };
    case 180:
      return { x: at.x - x, y: at.y - y };
    case 270:
      return { x: at.x + y, y: at.y - x };
  }
}

/** The side a port faces once its part is flipped and turned. */
export function placeSide(side: Side, placement: Pick<Placement, 'turn' | 'flip'>): Side {
  let index = ORDER.indexOf(side);
  if (placement.flip && (side === 'left' || side === 'right')) index = (index + 2) % 4;
  return ORDER[(index + placement.turn / 90) % 4] as Side;
}

/** The smallest upright box round a placed box. */
export function placeBox(box: Box, placement: Placement): Box {
  const a = place({ x: box.x, y: box.y }, placement);
  const b = place({ x: box.x + box.width, y: box.y + box.height }, placement);
  return {
    x: Math.min(a.x, b.x),
    y: Math.min(a.y, b.y),
    width: Math.abs(a.x - b.x),
    height: Math.abs(a.y - b.y),
  };
}

export function union(boxes: readonly Box[]): Box | undefined {
  if (boxes.length === 0) return undefined;
  let x0 = Infinity;
  let y0 = Infinity;
  let x1 = -Infinity;
  let y1 = -Infinity;
  for (const box of boxes) {
    x0 = Math.min(x0, box.x);
    y0 = Math.min(y0, box.y);
    x1 = Math.max(x1, box.x + box.width);
    y1 = Math.max(y1, box.y + box.height);
  }
  return { x: x0, y: y0, width: x1 - x0, height: y1 - y0 };
}
