import type { PartKind } from './contract.ts';
import { boxOf, leftOpen, port, stroke } from './shapes.ts';

export const tank: PartKind = {
  kind: 'tank',
  title: 'Tank',
  group: 'Supply',
  help: 'Oil at no pressure. All tank symbols are one tank.',
  words: ['reservoir', 'return', 'sump', 'T'],
  prefix: 'TANK',
  settings: [],
  readyMade: [{ id: 'tank', title: 'Tank', make: () => ({}) }],
  ports: () => [
    port(
      'T',
      [0, -1],
      'up',
      'return',
      leftOpen('note', 'Nothing leads to this tank symbol.', 'Connect a return or suction line, or delete it.'),
    ),
  ],
  elements: () => [{ type: 'tank', port: 'T' }],
  draw: () => [stroke('symbol', [0, -1], [0, 1.5]), stroke('symbol', [-1.5, 0.5], [-1.5, 2], [1.5, 2], [1.5, 0.5])],
  bounds: () => boxOf(-2, -1, 4, 3),
};
