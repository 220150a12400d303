import type { Primitive } from '../base/primitives.ts';
import type { Part } from '../circuit/model.ts';
import type { PartKind } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { choiceSetting, quantitySetting, readChoice, readSi } from './settings.ts';
import { arrow, boxOf, circle, dot, leftOpen, port, rectangle, shape, stroke, throttleArcs } from './shapes.ts';

const FORM = choiceSetting(
  {
    id: 'form',
    title: 'Build',
    help: 'Spool: throttles the outlet with the lighter load, so that all oil costs the higher pressure; a blocked outlet nearly stops the other. Gear: two motors on one shaft; the oil of the lighter outlet helps the other along, whose pressure can rise far above the inlet, and a blocked outlet blocks the other.',
  },
  ['spool', 'gear'],
  'spool',
);
const SHARE = quantitySetting(
  { id: 'share', title: 'Share of A', help: 'Part of the inlet flow that goes to A; the rest goes to B.' },
  'ratio',
  '50 %',
  { min: '5 %', max: '95 %' },
);
const REST = quantitySetting(
  {
    id: 'synchronising',
    title: 'Passes when the other is blocked',
    help: 'Share of its rated flow that an outlet still passes while the other is blocked or at its stop, by which cylinders catch up there (gear: what slips past a section at 100 bar between its ports). Well below its rated flow a spool divides less truly.',
  },
  'ratio',
  '5 %',
  { min: '0.5 %', max: '50 %' },
);
const RETURN = choiceSetting(
  {
    id: 'back',
    title: 'Back from A and B',
    help: 'Combines: brings the two together in the same shares. Free: over checks, each as it likes. Shut: nothing. A gear divider always combines.',
  },
  ['combines', 'free', 'shut'],
  'combines',
);
const LOSS = lossSettings('40 L/min', '6 bar');
const OPEN = leftOpen(
  'caution',
  'An outlet of the flow divider has no line; it counts as plugged, so the other passes next to nothing.',
  'Connect both outlets.',
);
const isGear = (part: Part): boolean => readChoice(part, FORM) === 'gear';

/** Two motor circles on one shaft. */
const gears = (): Primitive[] =>
  [-3, 3].flatMap((x): Primitive[] => [
    stroke('symbol', [x, 0], [x, -4]),
    circle('symbol', [x, 0], 1.7, 'paper'),
    shape('fine', 'ink', [x, 0.45], [x - 0.7, 1.45], [x + 0.7, 1.45]),
  ]);

const spool = (): Primitive[] => [
  rectangle('symbol', boxOf(-4.5, -2, 9, 4), 'paper'),
  stroke('symbol', [0, 2], [0, 1.3]),
  dot('symbol', [0, 1.3]),
  ...[-3, 3].flatMap((x): Primitive[] => [
    stroke('symbol', [0, 1.3], [x, 1.3], [x, -0.4]),
    ...arrow('symbol', [x, 0], [x, -2]),
    ...throttleArcs('symbol', [x, 0.2], [0, -1], 0.7),
    stroke('symbol', [x, -2], [x, -4]),
  ]),
];

export const flowDivider: PartKind = {
  kind: 'flow-divider',
  title: 'Flow divider',
  group: 'Flow and check',
  help: 'Divides the flow into P between A and B in a fixed ratio, whatever the loads; backwards it can combine the two.',
  words: ['flow combiner', 'synchronise', 'synchronised cylinders', 'gear divider', 'rotary divider', 'equal speed'],
  prefix: 'FD',
  settings: [FORM, SHARE, REST, RETURN, ...LOSS.all],
  readyMade: [
    { id: 'flow-divider', title: 'Flow divider, spool', make: () => ({}) },
    { id: 'flow-divider-gear', title: 'Flow divider, gear', make: () => ({ settings: { form: 'gear' } }) },
  ],
  ports: () => [
    port(
      'P',
      [0, 4],
      'down',
      'supply',
      leftOpen('note', 'The flow divider has no inlet line, so it divides nothing.', 'Connect P to the supply.'),
    ),
    port('A', [-3, -4], 'up', 'working', OPEN),
    port('B', [3, -4], 'up', 'working', OPEN),
  ],
  elements: (part) => {
    const rated = readLoss(part, LOSS);
    const back = isGear(part) ? 'combines' : readChoice(part, RETURN);
    return [
      {
        type: 'divider',
        inlet: 'P',
        outlets: ['A', 'B'],
        share: readSi(part, SHARE),
        rest: readSi(part, REST),
        form: isGear(part) ? 'gear' : 'spool',
        combines: back === 'combines',
        rated,
      },
      ...(back === 'free'
        ? (['A', 'B'] as const).map(
            (from) => ({ type: 'path', from, to: 'P', way: 'one-way', throttled: false, rated }) as const,
          )
        : []),
    ];
  },
  draw: (part) => [
    stroke('symbol', [0, 4], [0, isGear(part) ? 2.5 : 2]),
    ...(isGear(part)
      ? [
          stroke('symbol', [-3, 1.7], [-3, 2.5], [3, 2.5], [3, 1.7]),
          // The common shaft.
          stroke('fine', [-3, -0.3], [3, -0.3]),
          stroke('fine', [-3, 0.3], [3, 0.3]),
          dot('symbol', [0, 2.5]),
          ...gears(),
        ]
      : spool()),
  ],
  bounds: () => boxOf(-5, -4, 10, 8),
};
