import type { PartKind } from './contract.ts';
import { checkLoad, MOTOR_LOAD, readLoad } from './load.ts';
import { ratingSetting, readRating } from './ratings.ts';
import { quantitySetting, readSi, type QuantitySpec } from './settings.ts';
import { boxOf, circle, leftOpen, port, shape, stroke } from './shapes.ts';

const DISPLACEMENT = quantitySetting(
  { id: 'displacement', title: 'Displacement', help: 'Oil for one turn of the shaft.' },
  'displacement',
  '82 cm³/rev',
  { min: '0.01 cm³/rev', max: '1000000 cm³/rev' },
);
const leakage = (id: string, title: string, help: string): QuantitySpec =>
  quantitySetting({ id, title, help }, 'flow', '0 L/min', { min: '0 L/min', max: '1000 L/min' });
const LEAKAGE = leakage(
  'leakage',
  'Leakage at 100 bar',
  'Oil that slips past its working parts at 100 bar between A and B, in proportion at other drops. It lowers the speed, and lets a load turn a motor whose lines are blocked.',
);
const CASE_LEAKAGE = leakage(
  'caseLeakage',
  'Case leakage at 100 bar',
  'Oil that leaks from each of A and B into the case at 100 bar over L, in proportion at other pressures.',
);
/** Pa at which the two are given. */
const LEAKAGE_AT = 100e5;
const OPEN = leftOpen(
  'caution',
  'One port of the motor has no line; it counts as plugged, so the motor cannot turn.',
  'Connect A and B.',
);
const RATING = ratingSetting('350 bar');

export const motor: PartKind = {
  kind: 'motor',
  title: 'Motor',
  group: 'Motion',
  help: 'Oil through it from A to B turns the shaft one way, from B to A the other way.',
  words: ['hydraulic motor', 'rotary actuator', 'winch', 'hydromotor'],
  prefix: 'MOT',
  settings: [DISPLACEMENT, ...MOTOR_LOAD.all, LEAKAGE, CASE_LEAKAGE, RATING],
  readyMade: [{ id: 'motor', title: 'Motor, both ways', make: () => ({}) }],
  ports: () => [
    port('A', [-4, 0], 'left', 'working', OPEN),
    port('B', [4, 0], 'right', 'working', OPEN),
    port(
      'L',
      [2, 4],
      'down',
      'drain',
      leftOpen(
        'caution',
        'The case drain has no line; it counts as plugged, so leakage presses on the shaft seal.',
        'Lead L to the tank by a line of its own, unless the maker says that it is drained inside.',
      ),
    ),
  ],
  ratings: (part) => [readRating(part, RATING, ['A', 'B'])],
  elements: (part) => {
    const area = readSi(part, DISPLACEMENT);
    return [
      {
        type: 'actuator',
        a: 'A',
        b: 'B',
        motion: 'rotary',
        areaA: area,
        areaB: area,
        ...readLoad(part, MOTOR_LOAD),
        leakage: readSi(part, LEAKAGE) / LEAKAGE_AT,
        drain: { port: 'L', leakage: readSi(part, CASE_LEAKAGE) / LEAKAGE_AT },
      },
    ];
  },
  draw: () => [
    stroke('symbol', [-4, 0], [-3, 0]),
    stroke('symbol', [3, 0], [4, 0]),
    stroke('pilot', [2, 4], [2, 2.24]),
    stroke('fine', [-0.35, -4.6], [-0.35, -2.98]),
    stroke('fine', [0.35, -4.6], [0.35, -2.98]),
    circle('symbol', [0, 0], 3, 'paper'),
    shape('symbol', 'ink', [-0.9, 0], [-2.79, -1.1], [-2.79, 1.1]),
    shape('symbol', 'ink', [0.9, 0], [2.79, -1.1], [2.79, 1.1]),
  ],
  bounds: () => boxOf(-4, -5, 8, 9),
  check: (part) => checkLoad(part, MOTOR_LOAD),
};
