import type { Box } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import { advance } from '../base/text-advance.ts';
import type { Part, ValveData } from '../circuit/model.ts';
import { boxOf, hungText, rectangle, text, type Pair } from './shapes.ts';
import { drawPaths } from './valve-box.ts';
import { frameOf, HALF_HEIGHT } from './valve-frame.ts';
import { drawEnd, endExtent } from './valve-operators.ts';

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

const LETTER = 1.2;
/** Two letters between two lines. */
const SMALL = 1;
/** From the edge of the box to the letter. */
const OFF = 0.45;

/** Letters beside the lines, on the outer side of each port; where the next line is near, halfway between the two. */
function portLetters(data: ValveData): Primitive[] {
  const { places } = frameOf(data);
  return data.ports.map(({ id, side }) => {
    const [x] = places.get(id) as Pair;
    const out = x < 0 ? -1 : 1;
    const next = data.ports.some((other) => other.side === side && (places.get(other.id) as Pair)[0] === x + 2 * out);
    const size = next && id.length > 1 ? SMALL : LETTER;
    const gap = next ? Math.min(0.7, Math.max(0.2, (2 - advance(id, size)) / 2)) : 0.7;
    const align = out < 0 ? 'end' : 'start';
    return side === 'top'
      ? text(id, [x + gap * out, -HALF_HEIGHT - OFF], size, align)
      : hungText(id, [x + gap * out, HALF_HEIGHT + OFF], size, align);
  });
}

function boundsAt(data: ValveData, position: number, staged: boolean, turned: boolean): Box {
  const { width } = frameOf(data);
  const names = coilNames(data);
  const [leftEnd, rightEnd] = [
    endExtent(data.left, names.left, staged, turned),
    endExtent(data.right, names.right, staged, turned),
  ];
  const left = -(position + 0.5) * width - leftEnd.length;
  const right = (data.positions.length - position - 0.5) * width + rightEnd.length;
  const top = Math.max(leftEnd.top, rightEnd.top);
  const x = Math.floor(left);
  return boxOf(x, -top, Math.ceil(right) - x, top + HALF_HEIGHT);
}

/** A quarter turn: names of coils, which stay upright, then stand out to the side. */
export const isTurned = ({ turn }: Pick<Part, 'turn'>): boolean => turn === 90 || turn === 270;

/** Outline with the rest position at the ports. */
export const valveBounds = (data: ValveData, staged = false, turned = false): Box =>
  boundsAt(data, activeOf(data, undefined), staged, turned);

/** Outline over all positions, for keeping room free. */
export function valveReach(data: ValveData, staged = false, turned = false): Box {
  const first = boundsAt(data, 0, staged, turned);
  const last = boundsAt(data, Math.max(0, data.positions.length - 1), staged, turned);
  return boxOf(last.x, first.y, first.x + first.width - last.x, first.height);
}
