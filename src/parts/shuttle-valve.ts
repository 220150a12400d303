import type { PartKind, PathElement } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { boxOf, checkSeat, leftOpen, port, rectangle, stroke } from './shapes.ts';

const LOSS = lossSettings('20 L/min', '3 bar');
const INLET = leftOpen(
  'note',
  'One inlet of the shuttle valve has no line; it counts as plugged, so only the other one reaches A.',
  'Connect X and Y to the two lines to choose from.',
);

export const shuttleValve: PartKind = {
  kind: 'shuttle-valve',
  title: 'Shuttle valve',
  group: 'Flow and check',
  help: 'A gets the higher of the pressures at X and Y. It drains back through an inlet while the other one is let down; which of them the ball stands at with both shut in is not known, and then A counts as shut in.',
  words: ['or valve', 'double check', 'higher of two', 'selector', 'load sensing', 'brake release'],
  prefix: 'SH',
  settings: [...LOSS.all],
  readyMade: [{ id: 'shuttle-valve', title: 'Shuttle valve', make: () => ({}) }],
  ports: () => [
    port('X', [-4, 0], 'left', 'working', INLET),
    port('Y', [4, 0], 'right', 'working', INLET),
    port(
      'A',
      [0, -3],
      'up',
      'working',
      leftOpen(
        'note',
        'The outlet of the shuttle valve has no line; it counts as plugged.',
        'Connect A to what is to get the higher pressure.',
      ),
    ),
  ],
  elements: (part) =>
    [
      ['X', 'Y'],
      ['Y', 'X'],
    ].flatMap(([inlet = '', other = '']): PathElement[] => {
      const common = { type: 'path', way: 'one-way', throttled: false, rated: readLoss(part, LOSS) } as const;
      return [
        { ...common, from: inlet, to: 'A' },
        { ...common, from: 'A', to: inlet, vent: other },
      ];
    }),
  draw: () => [
    rectangle('symbol', boxOf(-3, -2, 6, 4), 'paper'),
    stroke('symbol', [-4, 0], [-1.6, 0]),
    stroke('symbol', [4, 0], [1.6, 0]),
    stroke('symbol', [0, -3], [0, -1.1]),
    ...checkSeat('symbol', [-0.61, 0], [1, 0], 0.7),
    // The other seat, which the ball would close coming over.
    stroke('symbol', [0.655, -0.945], [1.6, 0], [0.655, 0.945]),
  ],
  bounds: () => boxOf(-4, -3, 8, 5),
};
