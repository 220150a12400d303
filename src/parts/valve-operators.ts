import type { Primitive } from '../base/primitives.ts';
import { advance, cutTo } from '../base/text-advance.ts';
import type { Operator } from '../circuit/model.ts';
import { arrowHead, boxOf, circle, rectangle, shape, spring, stroke, text, type Pair } from './shapes.ts';

/** One end of a valve. `u` runs outwards from the edge of the last box, y down, 0 at mid height. */
export interface EndLook {
  readonly side: 'left' | 'right';
  /** Names of the coils on this end, from the box outwards. */
  readonly coils: readonly string[];
  /** For the notches of a detent: how many, and which one is engaged, counted left to right. */
  readonly positions: number;
  readonly active: number;
  /** A pilot is a stage of the valve itself, drawn in a box of its own. */
  readonly staged?: boolean;
}

/** How far each operator reaches out, in modules. */
const REACH: Readonly<Record<Operator, number>> = {
  coil: 3,
  spring: 2.7,
  detent: 3.2,
  lever: 4,
  pedal: 3,
  button: 2.8,
  hand: 2.2,
  roller: 2.9,
  pilot: 2.8,
};

/** Width of the box of a pilot stage. */
const STAGE = 2;

const reachOf = (operator: Operator, staged: boolean): number =>
  operator === 'pilot' && staged ? STAGE : REACH[operator];

const STEMS: readonly Operator[] = ['lever', 'pedal', 'button', 'hand', 'roller'];
const UNDER_A_STEM: readonly Operator[] = ['spring', 'detent'];

interface Placed {
  readonly operator: Operator;
  readonly u: number;
  readonly y: number;
}

/**
 * Operators in their places: a stem takes the upper lane when a spring or detent shares the end with
 * it and goes below; all else stacks outwards.
 */
export function placeOperators(
  operators: readonly Operator[],
  staged = false,
): {
  readonly placed: readonly Placed[];
  readonly length: number;
} {
  // A pilot by itself shares its end as a stem does; with a coil or lever behind it, it is one of a stack.
  const alone = operators.every((each) => each === 'pilot' || UNDER_A_STEM.includes(each));
  const above = (each: Operator): boolean => (alone ? each === 'pilot' : STEMS.includes(each));
  const twoLanes = operators.some(above) && operators.some((each) => UNDER_A_STEM.includes(each));
  const placed: Placed[] = [];
  let middle = 0;
  const stacked = operators.filter((each) => !twoLanes || !(above(each) || UNDER_A_STEM.includes(each)));
  for (const operator of stacked) {
    placed.push({ operator, u: middle, y: 0 });
    middle += reachOf(operator, staged);
  }
  let upper = middle;
  let lower = middle;
  for (const operator of operators.filter((each) => !stacked.includes(each))) {
    if (above(operator)) {
      placed.push({ operator, u: upper, y: -0.9 });
      upper += reachOf(operator, staged);
    } else {
      placed.push({ operator, u: lower, y: 1 });
      lower += reachOf(operator, staged);
    }
  }
  return { placed, length: Math.max(middle, upper, lower) };
}

/** Height over mid line that the operators of an end need, 2 at least. */
export const operatorTop = (operators: readonly Operator[]): number => (operators.includes('lever') ? 3 : 2);

/** Name of a coil over its box, about or from `u` outwards. */
interface CoilName {
  readonly text: string;
  readonly u: number;
  readonly centred: boolean;
}

const NAME = 1.1;
/** Baseline of the names over the mid line. */
const NAME_Y = -1.35;
/** A name stands out no further than this. */
const LONGEST = 8;

/**
 * Names over their coils. One that is too wide runs on outwards, over a spring or past the end, and is cut where the next
 * coil or a stem stands in its way.
 */
function coilNamesOf(operators: readonly Operator[], names: readonly string[], staged: boolean): CoilName[] {
  const { placed } = placeOperators(operators, staged);
  const coils = placed.filter(({ operator }) => operator === 'coil');
  return coils.flatMap(({ u }, i): CoilName[] => {
    const name = names[i] ?? '';
    if (name === '') return [];
    const width = advance(name, NAME);
    if (width <= REACH.coil - 0.3) return [{ text: name, u: u + REACH.coil / 2, centred: true }];
    const inTheWay = placed.filter(
      (each) => each.u > u && (each.operator === 'coil' || each.operator === 'lever' || each.y < 0),
    );
    const room = Math.min(LONGEST, ...inTheWay.map((each) => each.u - u));
    return [{ text: cutTo(name, NAME, room - 0.3), u: u + 0.15, centred: false }];
  });
}

/** How far an end reaches out with its names, and up where they stand across it because the valve is turned. */
export function endExtent(
  operators: readonly Operator[],
  names: readonly string[],
  staged: boolean,
  turned: boolean,
): { readonly length: number; readonly top: number } {
  const { length } = placeOperators(operators, staged);
  const top = operatorTop(operators);
  const texts = coilNamesOf(operators, names, staged);
  if (turned) {
    const widest = Math.max(0, ...names.map((name) => advance(cutTo(name, NAME, LONGEST), NAME)));
    return { length, top: texts.length > 0 ? Math.max(top, Math.ceil(widest - NAME_Y)) : top };
  }
  const ends = texts.map(({ text: said, u, centred }) => (centred ? u : u + advance(said, NAME)));
  return { length: Math.max(length, ...ends), top };
}

export function drawEnd(operators: readonly Operator[], look: EndLook): Primitive[] {
  const sign = look.side === 'right' ? 1 : -1;
  const names = coilNamesOf(operators, look.coils, look.staged ?? false).map(({ text: said, u, centred }) =>
    text(said, [sign * u, NAME_Y], NAME, centred ? 'middle' : sign === 1 ? 'start' : 'end'),
  );
  return [...placeOperators(operators, look.staged).placed.flatMap((each) => drawOperator(each, look)), ...names];
}

function drawOperator({ operator, u, y }: Placed, look: EndLook): Primitive[] {
  const sign = look.side === 'right' ? 1 : -1;
  const p = (du: number, dy: number): Pair => [sign * (u + du), y + dy];
  const box = (du: number, dy: number, width: number, height: number): Primitive =>
    rectangle('symbol', boxOf(sign === 1 ? u + du : -(u + du + width), y + dy, width, height), 'paper');
  const stem = (to: number): Primitive[] => [
    stroke('fine', p(0, -0.35), p(to, -0.35)),
    stroke('fine', p(0, 0.35), p(to, 0.35)),
  ];
  switch (operator) {
    case 'coil':
      return [box(0, -1, 3, 2), stroke('fine', p(2, 1), p(1, -1))];
    case 'spring':
      return [spring('symbol', sign * u, sign * (u + 2.7), y, y === 0 ? 1 : 0.8)];
    case 'detent':
      return detent(p, look);
    case 'lever':
      return [...stem(2), stroke('symbol', p(2, 0.7), p(3.45, -1.6)), circle('symbol', p(3.45, -1.6), 0.45, 'ink')];
    case 'pedal':
      return [...stem(1.6), stroke('symbol', p(2.9, -1), p(1.6, 0.7), p(1.6, -0.7))];
    case 'button':
      return [
        ...stem(1.7),
        stroke('symbol', p(1.7, -1), p(1.7, 1)),
        { type: 'arc', from: xy(p(1.7, -1)), to: xy(p(1.7, 1)), radius: 1.05, clockwise: sign === 1, pen: 'symbol' },
      ];
    case 'hand':
      return [...stem(2), stroke('symbol', p(2, -1), p(2, 1))];
    case 'roller':
      return [...stem(1.6), circle('symbol', p(2.2, 0), 0.6, 'paper')];
    case 'pilot':
      if (look.staged) return [box(0, -1, STAGE, 2), shape('symbol', 'ink', p(0.35, 0), p(1.65, -0.65), p(1.65, 0.65))];
      return [shape('symbol', 'ink', p(0, 0), p(1.3, -0.7), p(1.3, 0.7)), stroke('pilot', p(1.3, 0), p(2.8, 0))];
  }
}

const xy = ([x, y]: Pair): { x: number; y: number } => ({ x, y });

/** A bar with one notch for each position, and the catch in the notch that is engaged. */
function detent(p: (du: number, dy: number) => Pair, look: EndLook): Primitive[] {
  const { positions, side } = look;
  const pitch = 2.8 / positions;
  const half = Math.min(0.35, pitch / 2.4);
  const middle = (notch: number): number => 0.2 + pitch * (notch + 0.5);
  const rim: Pair[] = [];
  for (let notch = 0; notch < positions; notch++) {
    rim.push(p(middle(notch) - half, -0.1), p(middle(notch), 0.45), p(middle(notch) + half, -0.1));
  }
  const engaged = middle(side === 'right' ? look.active : positions - 1 - look.active);
  return [
    stroke('symbol', p(0, -0.1), ...rim, p(3, -0.1), p(3, 0.8), p(0, 0.8)),
    stroke('fine', p(engaged, -1), p(engaged, 0)),
    arrowHead('fine', p(engaged, -1), p(engaged, 0.4), 0.7, 0.5),
  ];
}
