import type { PartKind } from './contract.ts';
import { boxOf, leftOpen, port, stroke } from './shapes.ts';

export const plug: PartKind = {
  kind: 'plug',
  title: 'Plug',
  group: 'Measure and joints',
  help: 'Shuts a port on purpose, so that it is not reported as left open.',
  words: ['blanking plug', 'closed end', 'cap'],
  prefix: 'PLUG',
  settings: [],
  readyMade: [{ id: 'plug', title: 'Plug', make: () => ({}) }],
  ports: () => [
    port(
      'A',
      [0, 1],
      'down',
      'working',
      leftOpen('note', 'The plug shuts nothing.', 'Connect it to the port that it is to shut, or delete it.'),
    ),
  ],
  elements: () => [],
  draw: () => [
    stroke('symbol', [0, 1], [0, 0]),
    stroke('symbol', [-0.6, -0.6], [0.6, 0.6]),
    stroke('symbol', [0.6, -0.6], [-0.6, 0.6]),
  ],
  bounds: () => boxOf(-1, -1, 2, 2),
};
