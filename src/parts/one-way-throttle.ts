import type { PartKind } from './contract.ts';
import { checkLossSettings, readLoss } from './losses.ts';
import { quantitySetting, readSi } from './settings.ts';
import { boxOf, checkSeat, dot, leftOpen, port, rectangle, stroke } from './shapes.ts';
import { adjustableThrottle, THROTTLE_SETTINGS, throttledPaths } from './throttle-settings.ts';

const CRACKING = quantitySetting(
  {
    id: 'cracking',
    title: 'Cracking pressure of the check',
    help: 'Pressure from A over B at which the check begins to open.',
  },
  'pressure',
  '0.5 bar',
  { min: '0 bar', max: '100 bar' },
);
const FREE = checkLossSettings('40 L/min', '2 bar');
const OPEN = leftOpen(
  'note',
  'One port of the one-way throttle has no line; it counts as plugged, so nothing passes.',
  'Connect both ports.',
);

export const oneWayThrottle: PartKind = {
  kind: 'one-way-throttle',
  title: 'One-way throttle',
  group: 'Flow and check',
  help: 'Free from A to B through its check, throttled from B to A.',
  words: ['throttle check', 'speed control', 'meter-in', 'meter-out', 'flow control with bypass check'],
  prefix: 'OT',
  settings: [...THROTTLE_SETTINGS, CRACKING, ...FREE.all],
  readyMade: [{ id: 'one-way-throttle', title: 'One-way throttle, adjustable', make: () => ({}) }],
  ports: () => [port('A', [0, 5], 'down', 'working', OPEN), port('B', [0, -5], 'up', 'working', OPEN)],
  elements: (part) => [
    ...throttledPaths(part),
    {
      type: 'path',
      from: 'A',
      to: 'B',
      way: 'one-way',
      throttled: false,
      cracking: readSi(part, CRACKING),
      rated: readLoss(part, FREE),
    },
  ],
  draw: () => [
    rectangle('enclosure', boxOf(-3, -4, 9, 8)),
    stroke('symbol', [0, 5], [0, -5]),
    stroke('symbol', [0, 3], [4, 3], [4, 1.2]),
    stroke('symbol', [4, -0.85], [4, -3], [0, -3]),
    ...checkSeat('symbol', [4, 0], [0, -1]),
    dot('symbol', [0, 3]),
    dot('symbol', [0, -3]),
    ...adjustableThrottle(),
  ],
  bounds: () => boxOf(-3, -5, 9, 10),
};
