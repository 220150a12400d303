import type { PartKind } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { quantitySetting, readSetting, readSi } from './settings.ts';
import { boxOf, checkSeat, leftOpen, port, stroke } from './shapes.ts';

const CRACKING = quantitySetting(
  { id: 'cracking', title: 'Cracking pressure', help: 'Pressure from A over B at which it begins to open.' },
  'pressure',
  '0.5 bar',
  { min: '0 bar', max: '100 bar' },
);
const LOSS = lossSettings('40 L/min', '2 bar');
const OPEN = leftOpen(
  'note',
  'One port of the check valve has no line; it counts as plugged, so nothing passes.',
  'Connect both ports.',
);

export const checkValve: PartKind = {
  kind: 'check-valve',
  title: 'Check valve',
  group: 'Flow and check',
  help: 'Lets oil through from A to B and shuts the other way.',
  words: ['non-return valve', 'one way valve', 'back pressure valve', 'anti-cavitation', 'make-up'],
  prefix: 'CV',
  settings: [CRACKING, ...LOSS.all],
  readyMade: [
    { id: 'check-valve', title: 'Check valve', make: () => ({}) },
    {
      id: 'check-valve-spring',
      title: 'Check valve with a strong spring',
      words: ['back pressure', 'pilot supply', 'preload'],
      make: () => ({ settings: { cracking: '5 bar' } }),
    },
  ],
  ports: () => [port('A', [0, 3], 'down', 'working', OPEN), port('B', [0, -3], 'up', 'working', OPEN)],
  elements: (part) => [
    {
      type: 'path',
      from: 'A',
      to: 'B',
      way: 'one-way',
      throttled: false,
      cracking: readSi(part, CRACKING),
      rated: readLoss(part, LOSS),
    },
  ],
  draw: (part) => {
    const cracking = readSetting(part, CRACKING);
    const sprung = !cracking.assumed && cracking.si > 0;
    return [
      stroke('symbol', [0, 3], [0, 1.2]),
      ...(sprung
        ? // The spring stands on end, from the ball to the outlet.
          [
            stroke('symbol', [0, -2.6], [0, -3]),
            stroke('fine', [0, -0.85], [0.7, -1], [-0.7, -1.4], [0.7, -1.8], [-0.7, -2.2], [0.7, -2.6], [-0.7, -2.6]),
          ]
        : [stroke('symbol', [0, -0.85], [0, -3])]),
      ...checkSeat('symbol', [0, 0], [0, -1]),
    ];
  },
  bounds: () => boxOf(-2, -3, 4, 6),
};
