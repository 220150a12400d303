import type { Box } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import type { ValveData } from '../circuit/model.ts';
import { boxesOf, pathsIn, type BoxRef } from '../circuit/valve-box.ts';
import { boxOf, rectangle, stroke, text, type Pair } from './shapes.ts';
import { drawPaths } from './valve-box.ts';
import { coilNames } from './valve-drawing.ts';
import { frameOf, HALF_HEIGHT } from './valve-frame.ts';
import { drawEnd, operatorTop, placeOperators } from './valve-operators.ts';

/** A valve laid out to be worked on: crossovers stand between the positions as dashed boxes, ports are named at every box. */
export interface Spread {
  readonly primitives: readonly Primitive[];
  readonly bounds: Box;
  /** Width of each box. */
  readonly width: number;
  /** In drawn order; `x` is the middle. */
  readonly boxes: readonly { readonly box: BoxRef; readonly x: number }[];
  /** Ports from the middle of their box. */
  readonly places: ReadonlyMap<string, Pair>;
}

const STUB = 1;
const LETTER = 1.1;
/** Outside the box: stub of a line, and the letter. */
const MARGIN = 3;

/** The boxes side by side from x = 0, those of crossovers as far as they are known; by the code that draws the symbol. */
export function spreadValve(data: ValveData, staged = false): Spread {
  const frame = frameOf(data);
  const { width, places } = frame;
  const boxes = boxesOf(data).map((box, i) => ({ box, x: i * width }));
  const names = coilNames(data);
  const end = { positions: data.positions.length, active: data.rest ?? 0, staged };
  const right = (boxes.length - 0.5) * width;
  const isRest = (box: BoxRef): boolean => box.of === 'position' && box.index === data.rest;
  const primitives: Primitive[] = [
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
      shift: { x: right, y: 0 },
      children: drawEnd(data.right, { side: 'right', coils: names.right, ...end }),
    },
    ...boxes.map(({ box, x }, index): Primitive => ({
      type: 'group',
      role: 'box',
      index,
      shift: { x, y: 0 },
      children: [
        rectangle(
          box.of === 'position' ? 'symbol' : 'pilot',
          boxOf(-width / 2, -HALF_HEIGHT, width, 2 * HALF_HEIGHT),
          'paper',
        ),
        // A box of its own, so that a crossover is drawn as a position is.
        ...drawPaths({ ...data, positions: [{ name: '', paths: pathsIn(data, box) }] }, frame, 0, 'active'),
        ...(isRest(box) ? [...places.values()].map(([px, py]) => stub(px, py)) : []),
        ...[...places].map(([id, [px, py]]) =>
          text(id, [px, py < 0 ? -HALF_HEIGHT - STUB - 0.35 : HALF_HEIGHT + STUB + 1.2], LETTER),
        ),
      ],
    })),
  ];
  const left = -width / 2 - placeOperators(data.left, staged).length - 0.5;
  const far = right + placeOperators(data.right, staged).length + 0.5;
  const top = Math.max(HALF_HEIGHT + MARGIN, operatorTop(data.left), operatorTop(data.right));
  return {
    primitives,
    bounds: boxOf(left, -top, far - left, top + HALF_HEIGHT + MARGIN),
    width,
    boxes,
    places,
  };
}

const stub = (x: number, y: number): Primitive => stroke('symbol', [x, y], [x, y + Math.sign(y) * STUB]);
