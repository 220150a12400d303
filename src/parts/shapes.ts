import type { Box, Point } from '../base/points.ts';
import type { Fill, Pen, Primitive } from '../base/primitives.ts';
import { CAP_HEIGHT } from '../base/text-advance.ts';
import type { PortSpec } from './contract.ts';

/** Strokes that several symbols share. Everything in modules, y down. */
export type Pair = readonly [number, number];

export const at = ([x, y]: Pair): Point => ({ x, y });

export const stroke = (pen: Pen, ...points: readonly Pair[]): Primitive => ({
  type: 'polyline',
  points: points.map(at),
  pen,
});

export const shape = (pen: Pen, fill: Fill, ...points: readonly Pair[]): Primitive => ({
  type: 'polyline',
  points: points.map(at),
  pen,
  closed: true,
  fill,
});

export const circle = (pen: Pen, centre: Pair, radius: number, fill: Fill = 'none'): Primitive => ({
  type: 'circle',
  centre: at(centre),
  radius,
  pen,
  fill,
});

export const rectangle = (pen: Pen, box: Box, fill: Fill = 'none'): Primitive => ({ type: 'box', ...box, pen, fill });

export const boxOf = (x: number, y: number, width: number, height: number): Box => ({ x, y, width, height });

const fillOf = (pen: Pen): Fill => (pen === 'idle' || pen === 'active' ? pen : 'ink');

/** Filled head with its tip at `tip`, seen coming from `from`. */
export function arrowHead(pen: Pen, from: Pair, tip: Pair, length = 1, width = 0.7): Primitive {
  const dx = tip[0] - from[0];
  const dy = tip[1] - from[1];
  const size = Math.hypot(dx, dy);
  const ux = dx / size;
  const uy = dy / size;
  const bx = tip[0] - ux * length;
  const by = tip[1] - uy * length;
  const half = width / 2;
  return shape(pen, fillOf(pen), tip, [bx - uy * half, by + ux * half], [bx + uy * half, by - ux * half]);
}

/** A line with a head at its end; the line stops inside the head, so that the tip stays sharp. */
export function arrow(pen: Pen, from: Pair, tip: Pair, length = 1, width = 0.7): Primitive[] {
  const size = Math.hypot(tip[0] - from[0], tip[1] - from[1]);
  const share = (size - length * 0.6) / size;
  const stop: Pair = [from[0] + (tip[0] - from[0]) * share, from[1] + (tip[1] - from[1]) * share];
  return [stroke(pen, from, stop), arrowHead(pen, from, tip, length, width)];
}

/** Spring from x0 to x1 about the height y. */
export function spring(pen: Pen, x0: number, x1: number, y: number, reach = 1, turns = 3): Primitive {
  const step = (x1 - x0) / (turns * 2);
  const points: Pair[] = [[x0, y]];
  for (let i = 0; i < turns * 2; i++) points.push([x0 + step * (i + 0.5), y + (i % 2 === 0 ? -reach : reach)]);
  points.push([x1, y]);
  return stroke(pen, ...points);
}

/** Ball and seat in a line that flows along `direction`; `centre` is the middle of the ball. */
export function checkSeat(pen: Pen, centre: Pair, direction: Pair, radius = 0.85): Primitive[] {
  const [cx, cy] = centre;
  const [dx, dy] = direction;
  // The arms touch the ball at 45°, from a point √2·r upstream.
  const apex: Pair = [cx - dx * radius * Math.SQRT2, cy - dy * radius * Math.SQRT2];
  const arm = radius * 1.35;
  return [
    circle(pen, centre, radius, 'paper'),
    stroke(pen, [apex[0] + (dx - dy) * arm, apex[1] + (dy + dx) * arm], apex, [
      apex[0] + (dx + dy) * arm,
      apex[1] + (dy - dx) * arm,
    ]),
  ];
}

/** The two arcs of a throttle about a point of a line that runs along `direction`. */
export function throttleArcs(pen: Pen, centre: Pair, direction: Pair, size = 1): Primitive[] {
  const [cx, cy] = centre;
  const [ux, uy] = direction;
  const half = 1.3 * size;
  const off = 0.95 * size;
  const side = (sign: 1 | -1): Primitive => {
    const nx = -uy * sign;
    const ny = ux * sign;
    return {
      type: 'arc',
      from: { x: cx + nx * off - ux * half, y: cy + ny * off - uy * half },
      to: { x: cx + nx * off + ux * half, y: cy + ny * off + uy * half },
      radius: 1.6 * size,
      // Bulges towards the line.
      clockwise: sign === 1,
      pen,
    };
  };
  return [side(1), side(-1)];
}

export const dot = (pen: Pen, centre: Pair, radius = 0.36): Primitive => circle(pen, centre, radius, fillOf(pen));

export const text = (
  value: string,
  [x, y]: Pair,
  size = 1.2,
  align: 'start' | 'middle' | 'end' = 'middle',
): Extract<Primitive, { type: 'text' }> => ({
  type: 'text',
  at: { x, y },
  text: value,
  size,
  align,
  tone: 'second',
});

/** The same by its upper edge, as a letter below a port stands. */
export const hungText = (value: string, [x, y]: Pair, size: number, align: 'start' | 'middle' | 'end'): Primitive => ({
  ...text(value, [x, y + CAP_HEIGHT * size], size, align),
  held: 'top',
});

export type LeftOpen = NonNullable<PortSpec['leftOpen']>;

export const leftOpen = (level: LeftOpen['level'], what: string, remedy: string): LeftOpen => ({ level, what, remedy });

/** A port; without `open` it has nothing to say when left open. */
export const port = (
  id: string,
  place: Pair,
  side: PortSpec['side'],
  role: PortSpec['role'],
  open?: LeftOpen,
): PortSpec => ({
  id,
  at: at(place),
  side,
  role,
  ...(open ? { leftOpen: open } : {}),
});
