import type { Part } from '../circuit/model.ts';
import type { PartKind, PathElement } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { quantitySetting, readSi, readSwitch, switchSetting } from './settings.ts';
import { boxOf, checkSeat, dot, leftOpen, port, shape, stroke } from './shapes.ts';

const BYPASS = switchSetting(
  {
    id: 'bypass',
    title: 'Bypass check',
    help: 'On: a check beside the element opens from A to B when the element is clogged.',
  },
  false,
);
const CRACKING = quantitySetting(
  {
    id: 'cracking',
    title: 'Bypass opens at',
    help: 'Pressure across the element at which the bypass check begins to open.',
  },
  'pressure',
  // Common practice.
  '3 bar',
  { min: '0 bar', max: '100 bar' },
);
const CLOGGED = quantitySetting(
  {
    id: 'clogged',
    title: 'Clogged',
    help: 'Share of the element that dirt has closed: half closed, it takes four times the drop for the same flow. 100 %: nothing passes the element.',
  },
  'ratio',
  '0 %',
  { min: '0 %', max: '100 %' },
);
const LOSS = lossSettings('60 L/min', '1 bar');
const OPEN = leftOpen(
  'note',
  'One port of the filter has no line; it counts as plugged, so nothing passes.',
  'Connect both ports.',
);

/** Half the area passes half the flow at the same drop; */
function element(part: Part): PathElement[] {
  const left = 1 - readSi(part, CLOGGED);
  const { flow, drop } = readLoss(part, LOSS);
  return left <= 0
    ? []
    : [{ type: 'path', from: 'A', to: 'B', way: 'both', throttled: false, rated: { flow: flow * left, drop } }];
}

export const filter: PartKind = {
  kind: 'filter',
  title: 'Filter',
  group: 'Supply',
  help: 'Open both ways with a small loss that grows as it clogs; a bypass check lets oil past a clogged element.',
  words: ['strainer', 'return filter', 'pressure filter', 'element'],
  prefix: 'FIL',
  settings: [BYPASS, CRACKING, CLOGGED, ...LOSS.all],
  readyMade: [
    { id: 'filter', title: 'Filter', make: () => ({}) },
    { id: 'filter-bypass', title: 'Filter with bypass check', make: () => ({ settings: { bypass: true } }) },
  ],
  ports: () => [port('A', [0, 4], 'down', 'working', OPEN), port('B', [0, -4], 'up', 'working', OPEN)],
  elements: (part) => [
    ...element(part),
    ...(readSwitch(part, BYPASS)
      ? [
          {
            type: 'path',
            from: 'A',
            to: 'B',
            way: 'one-way',
            throttled: false,
            cracking: readSi(part, CRACKING),
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
