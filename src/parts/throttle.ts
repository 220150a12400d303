import type { PartKind } from './contract.ts';
import { boxOf, leftOpen, port, stroke } from './shapes.ts';
import { adjustableThrottle, THROTTLE_SETTINGS, throttledPaths } from './throttle-settings.ts';

const OPEN = leftOpen(
  'note',
  'One port of the throttle has no line; it counts as plugged, so nothing passes.',
  'Connect both ports.',
);

export const throttle: PartKind = {
  kind: 'throttle',
  title: 'Throttle',
  group: 'Flow and check',
  help: 'Adjustable restriction, the same both ways.',
  words: ['needle valve', 'orifice', 'restrictor', 'speed control', 'bleed-off'],
  prefix: 'TV',
  settings: THROTTLE_SETTINGS,
  readyMade: [{ id: 'throttle', title: 'Throttle, adjustable', make: () => ({}) }],
  ports: () => [port('A', [0, 3], 'down', 'working', OPEN), port('B', [0, -3], 'up', 'working', OPEN)],
  elements: throttledPaths,
  draw: () => [stroke('symbol', [0, 3], [0, -3]), ...adjustableThrottle()],
  bounds: () => boxOf(-2, -3, 4, 6),
};
