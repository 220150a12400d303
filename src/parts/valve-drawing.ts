import type { Box } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import type { ValveData } from '../circuit/model.ts';
import { boxOf, rectangle, text } from './shapes.ts';
import { drawPaths } from './valve-box.ts';
import { frameOf, HALF_HEIGHT } from './valve-frame.ts';
import { drawEnd, operatorTop, placeOperators } from './valve-operators.ts';

/** The position drawn at the ports: the one asked for, else the rest position, else the first. */
export function activeOf(data: ValveData, position: number | undefined): number {
  const last = data.positions.length - 1;
  return Math.max(0, Math.min(last, position ?? data.rest ?? 0));
}

/** Coil names by end, from the box outwards. Coils are bound in drawn order, left to right. */
export function coilNames(data: ValveData): { left: string[]; right: string[] } {
  const names = (data.coils ?? []).map((coil) => coil.name);
  const onLeft = data.left.filter((operator) => operator === 'coil').length;
  return { left: names.slice(0, onLeft).reverse(), right: names.slice(onLeft) };
}

/**
 * The whole valve. The box that is at the ports stands about (0, 0); the strip of boxes with its
 * operators slides, the ports and their letters stay.
 */
export function drawValve(data: ValveData, position?: number, staged = false): Primitive[] {
  const frame = frameOf(data);
  const { width } = frame;
  const active = activeOf(data, position);
  const count = data.positions.length;
  const names = coilNames(data);
  const end = { positions: count, active, staged };
  const boxes = data.positions.map((_, index): Primitive => ({
    type: 'group',
    role: 'box',
    index,
    shift: { x: index * width, y: 0 },
    children: [
      rectangle('symbol', boxOf(-width / 2, -HALF_HEIGHT, width, 2 * HALF_HEIGHT), 'paper'),
      ...drawPaths(data, frame, index, index === active ? 'active' : 'idle'),
    ],
  }));
  const ends: Primitive[] = [
    {
      type: 'group',
      role: 'operator',
      index: 0,
      shift: { x: -width / 2, y: 0 },
      children: drawEnd(data.left, { side: 'left', coils: names.left, ...end }),
    },
    {
      type: 'group',
      role: 'operator',
      index: 1,
      shift: { x: (count - 0.5) * width, y: 0 },
      children: drawEnd(data.right, { side: 'right', coils: names.right, ...end }),
    },
  ];
  return [
    { type: 'group', role: 'strip', shift: { x: -active * width, y: 0 }, children: [...ends, ...boxes] },
    ...portLetters(data),
  ];
}

/** Letters beside the lines, on the outer side of each port. */
function portLetters(data: ValveData): Primitive[] {
  const { places } = frameOf(data);
  return data.ports.map(({ id, side }) => {
    const [x] = places.get(id) as readonly [number, number];
    return text(id, [x + (x < 0 ? -0.4 : 0.4), side === 'top' ? -2.45 : 3.25], 1.2, x < 0 ? 'end' : 'start');
  });
}

function boundsAt(data: ValveData, position: number, staged: boolean): Box {
  const { width } = frameOf(data);
  const left = -(position + 0.5) * width - placeOperators(data.left, staged).length;
  const right = (data.positions.length - position - 0.5) * width + placeOperators(data.right, staged).length;
  const top = Math.max(operatorTop(data.left), operatorTop(data.right));
  const x = Math.floor(left);
  return boxOf(x, -top, Math.ceil(right) - x, top + HALF_HEIGHT);
}

/** Outline with the rest position at the ports. */
export const valveBounds = (data: ValveData, staged = false): Box => boundsAt(data, activeOf(data, undefined), staged);

/** Outline over all positions, for keeping room free. */
export function valveReach(data: ValveData, staged = false): Box {
  const first = boundsAt(data, 0, staged);
  const last = boundsAt(data, Math.max(0, data.positions.length - 1), staged);
  return boxOf(last.x, first.y, first.x + first.width - last.x, first.height);
}
