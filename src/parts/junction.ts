import type { PartKind } from './contract.ts';
import { boxOf, dot, leftOpen, port } from './shapes.ts';

export const junction: PartKind = {
  kind: 'junction',
  title: 'Junction',
  group: 'Measure and joints',
  help: 'Joins any number of lines. Lines that cross without one do not join.',
  words: ['joint', 'tee', 'node', 'branch'],
  prefix: 'J',
  settings: [],
  readyMade: [{ id: 'junction', title: 'Junction', make: () => ({}) }],
  ports: () => [
    port(
      'J',
      [0, 0],
      'up',
      'joint',
      leftOpen('note', 'The junction joins nothing.', 'Connect lines to it, or delete it.'),
    ),
  ],
  elements: () => [],
  draw: () => [dot('symbol', [0, 0])],
  bounds: () => boxOf(-1, -1, 2, 2),
};
