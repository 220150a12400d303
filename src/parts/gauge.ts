import type { PartKind } from './contract.ts';
import { arrow, boxOf, circle, leftOpen, port, stroke } from './shapes.ts';

export const gauge: PartKind = {
  kind: 'gauge',
  title: 'Pressure gauge',
  group: 'Measure and joints',
  help: 'Shows the pressure of its line; nothing flows through it.',
  words: ['manometer', 'pressure indicator', 'test point', 'meter'],
  prefix: 'PG',
  settings: [],
  readyMade: [{ id: 'gauge', title: 'Pressure gauge', make: () => ({}) }],
  ports: () => [
    port(
      'M',
      [0, 3],
      'down',
      'measure',
      leftOpen('note', 'The gauge measures nothing.', 'Connect M to a line, or delete it.'),
    ),
  ],
  elements: () => [],
  draw: () => [
    stroke('symbol', [0, 3], [0, 2]),
    circle('symbol', [0, 0], 2, 'paper'),
    ...arrow('fine', [-0.75, 1.1], [0.8, -1.15], 0.9, 0.65),
  ],
  bounds: () => boxOf(-2, -2, 4, 5),
};
