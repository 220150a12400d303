import type { PartKind } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { readSwitch, switchSetting } from './settings.ts';
import { boxOf, checkSeat, dot, leftOpen, port, shape, stroke } from './shapes.ts';

const BYPASS = switchSetting(
  {
    id: 'bypass',
    title: 'Bypass check',
    help: 'On: a check beside the element opens from A to B when the element is clogged.',
  },
  false,
);
const LOSS = lossSettings('60 L/min', '1 bar');
/** Common practice: a bypass opens at about 3 bar across the element. */
const BYPASS_CRACKING = 3e5;
const OPEN = leftOpen(
  'note',
  'One port of the filter has no line; it counts as plugged, so nothing passes.',
  'Connect both ports.',
);

export const filter: PartKind = {
  kind: 'filter',
  title: 'Filter',
  group: 'Supply',
  help: 'Open both ways with a small loss.',
  words: ['strainer', 'return filter', 'pressure filter', 'element'],
  prefix: 'FIL',
  settings: [BYPASS, ...LOSS.all],
  readyMade: [
    { id: 'filter', title: 'Filter', make: () => ({}) },
    { id: 'filter-bypass', title: 'Filter with bypass check', make: () => ({ settings: { bypass: true } }) },
  ],
  ports: () => [port('A', [0, 4], 'down', 'working', OPEN), port('B', [0, -4], 'up', 'working', OPEN)],
  elements: (part) => [
    { type: 'path', from: 'A', to: 'B', way: 'both', throttled: false, rated: readLoss(part, LOSS) },
    ...(readSwitch(part, BYPASS)
      ? [
          {
            type: 'path',
            from: 'A',
            to: 'B',
            way: 'one-way',
            throttled: false,
            cracking: BYPASS_CRACKING,
            rated: readLoss(part, LOSS),
          } as const,
        ]
      : []),
  ],
  draw: (part) => [
    stroke('symbol', [0, 4], [0, 2]),
    stroke('symbol', [0, -2], [0, -4]),
    shape('symbol', 'paper', [0, -2], [2, 0], [0, 2], [-2, 0]),
    stroke('pilot', [-2, 0], [2, 0]),
    ...(readSwitch(part, BYPASS)
      ? [
          stroke('symbol', [0, 3], [4, 3], [4, 1.2]),
          stroke('symbol', [4, -0.85], [4, -3], [0, -3]),
          ...checkSeat('symbol', [4, 0], [0, -1]),
          dot('symbol', [0, 3]),
          dot('symbol', [0, -3]),
        ]
      : []),
  ],
  bounds: (part) => boxOf(-2, -4, readSwitch(part, BYPASS) ? 8 : 4, 8),
};
