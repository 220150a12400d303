import type { Primitive } from '../base/primitives.ts';
import type { Part } from '../circuit/model.ts';
import type { PathElement, PressureValveElement } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { quantitySetting, readSi, switchSetting, type QuantitySpec } from './settings.ts';
import { arrow, boxOf, checkSeat, dot, rectangle, spring, stroke } from './shapes.ts';

/** What the valves that pressures open or close share: settings, law and strokes. */
export const pressureSetting = (help: string, preset: string): QuantitySpec =>
  quantitySetting({ id: 'setting', title: 'Setting', help }, 'pressure', preset, { min: '0.1 bar', max: '1000 bar' });

const RISE = quantitySetting(
  {
    id: 'fullFlowRise',
    title: 'Change to rated flow',
    help: 'How far past the setting the sensed pressure must go before the valve passes its rated flow.',
  },
  'pressure',
  '5 bar',
  { min: '0.001 bar', max: '500 bar' },
);
const LOSS = lossSettings('40 L/min', '3 bar');

export const VALVE_SETTINGS = [RISE, ...LOSS.all];

export const BYPASS = switchSetting(
  { id: 'bypass', title: 'Bypass check', help: 'On: a check beside the valve lets oil back from A to P.' },
  false,
);

/** Override, and loss when fully open. */
export const readLaw = (part: Part): Required<Pick<PressureValveElement, 'override' | 'rated'>> => {
  const rated = readLoss(part, LOSS);
  return { override: { rise: readSi(part, RISE), flow: rated.flow }, rated };
};

/** The free way of a built-in check, as wide as the valve itself; its spring is too light to count. */
export const freeWay = (part: Part, from: string, to: string): PathElement => ({
  type: 'path',
  from,
  to,
  way: 'one-way',
  throttled: false,
  rated: readLoss(part, LOSS),
});

/** Upright line with the valve's box on it; the arrow points down, off the axis where the valve is shut at rest. */
export const valveBox = (reach: number, shut: boolean): Primitive[] => [
  stroke('symbol', [0, -reach], [0, -2]),
  stroke('symbol', [0, 2], [0, reach]),
  rectangle('symbol', boxOf(-2, -2, 4, 4), 'paper'),
  ...arrow('symbol', [shut ? -0.9 : 0, -2], [shut ? -0.9 : 0, 2]),
];

/** Spring on the right of the box, with the arrow that says adjustable; `from`: where it begins. */
export const adjustableSpring = (from = 2): Primitive[] => [
  spring('fine', from, from + 2.7, 0),
  ...arrow('fine', [from + 0.2, 2], [from + 2.6, -2.2], 0.9, 0.65),
];

/** Check beside the box that lets oil up, at x; joins the upright line at ±y. */
export const besideCheck = (x: number, y: number): Primitive[] => [
  stroke('symbol', [0, y], [x, y], [x, 1.2]),
  stroke('symbol', [x, -0.85], [x, -y], [0, -y]),
  ...checkSeat('symbol', [x, 0], [0, -1]),
  dot('symbol', [0, y]),
  dot('symbol', [0, -y]),
];
