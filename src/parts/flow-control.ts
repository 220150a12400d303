import type { PartKind } from './contract.ts';
import { checkLossSettings, readLoss } from './losses.ts';
import { quantitySetting, readSi, readSwitch, switchSetting } from './settings.ts';
import { arrow, boxOf, checkSeat, dot, leftOpen, port, rectangle, stroke, throttleArcs } from './shapes.ts';

const FLOW = quantitySetting(
  { id: 'flow', title: 'Flow', help: 'What it passes from A to B at any pressure, as long as it has its least drop.' },
  'flow',
  '10 L/min',
  { min: '0.01 L/min', max: '10000 L/min' },
);
const LEAST_DROP = quantitySetting(
  {
    id: 'leastDrop',
    title: 'Least drop',
    help: 'Pressure that it needs to keep its flow; with less it works as a plain throttle, and so it does from B to A.',
  },
  'pressure',
  '6 bar',
  { min: '0.001 bar', max: '500 bar' },
);
const REVERSE = switchSetting(
  { id: 'reverseCheck', title: 'Reverse check', help: 'On: a check lets oil freely back from B to A.' },
  false,
);
const FREE = checkLossSettings('40 L/min', '2 bar');
const OPEN = leftOpen(
  'note',
  'One port of the flow control has no line; it counts as plugged, so nothing passes.',
  'Connect both ports.',
);

export const flowControl: PartKind = {
  kind: 'flow-control',
  title: 'Flow control',
  group: 'Flow and check',
  help: 'Pressure compensated: keeps the flow from A to B whatever the load. What the pump gives beyond it must go elsewhere.',
  words: [
    'pressure compensated',
    'flow regulator',
    'speed control',
    'constant flow',
    'meter-in',
    'meter-out',
    'bleed-off',
  ],
  prefix: 'FC',
  settings: [FLOW, LEAST_DROP, REVERSE, ...FREE.all],
  readyMade: [
    { id: 'flow-control', title: 'Flow control, pressure compensated', make: () => ({}) },
    {
      id: 'flow-control-check',
      title: 'Flow control with reverse check',
      words: ['reverse free flow'],
      make: () => ({ settings: { reverseCheck: true } }),
    },
  ],
  ports: () => [port('A', [0, 5], 'down', 'working', OPEN), port('B', [0, -5], 'up', 'working', OPEN)],
  elements: (part) => {
    const flow = readSi(part, FLOW);
    return [
      {
        type: 'path',
        from: 'A',
        to: 'B',
        way: 'both',
        throttled: true,
        limit: flow,
        rated: { flow, drop: readSi(part, LEAST_DROP) },
      },
      ...(readSwitch(part, REVERSE)
        ? [
            {
              type: 'path',
              from: 'B',
              to: 'A',
              way: 'one-way',
              throttled: false,
              rated: readLoss(part, FREE),
            } as const,
          ]
        : []),
    ];
  },
  draw: (part) => [
    ...(readSwitch(part, REVERSE)
      ? [
          rectangle('enclosure', boxOf(-4, -4, 11, 8)),
          stroke('symbol', [0, -3], [5, -3], [5, -1.2]),
          stroke('symbol', [5, 0.85], [5, 3], [0, 3]),
          ...checkSeat('symbol', [5, 0], [0, 1]),
          dot('symbol', [0, -3]),
          dot('symbol', [0, 3]),
        ]
      : []),
    stroke('symbol', [0, 5], [0, 2]),
    stroke('symbol', [0, -2], [0, -5]),
    rectangle('symbol', boxOf(-2, -2, 4, 4), 'paper'),
    stroke('symbol', [-0.4, 2], [-0.4, -2]),
    ...throttleArcs('symbol', [-0.4, 0], [0, -1], 0.8),
    // The upright arrow says that the flow does not change with the pressure.
    ...arrow('fine', [1.3, 1.7], [1.3, -1.7], 0.8, 0.6),
    ...arrow('fine', [-3, 2.7], [2.4, -2.9], 0.9, 0.65),
  ],
  bounds: (part) => (readSwitch(part, REVERSE) ? boxOf(-4, -5, 11, 10) : boxOf(-3, -5, 6, 10)),
};
