import type { PartKind, PortSpec } from './contract.ts';
import { LOCK_SETTINGS, lockPaths } from './lock-settings.ts';
import { boxOf, checkSeat, dot, leftOpen, port, rectangle, stroke } from './shapes.ts';

const valveSide = leftOpen(
  'caution',
  'A valve side has no line; it counts as plugged and cannot open the other check.',
  'Connect V1 and V2 to the directional valve.',
);
const cylinderSide = leftOpen(
  'caution',
  'A cylinder side has no line, so its check holds nothing.',
  'Connect C1 and C2 to the actuator.',
);
const PORTS: readonly PortSpec[] = [
  port('V1', [-5, 6], 'down', 'working', valveSide),
  port('C1', [-5, -6], 'up', 'working', cylinderSide),
  port('V2', [5, 6], 'down', 'working', valveSide),
  port('C2', [5, -6], 'up', 'working', cylinderSide),
];

export const doubleLockCheck: PartKind = {
  kind: 'double-lock-check',
  title: 'Double lock check',
  group: 'Flow and check',
  help: 'Locks both sides of an actuator; pressure on one valve side opens the check of the other.',
  words: ['double pilot operated check', 'twin lock', 'load holding', 'lock valve'],
  prefix: 'DLC',
  settings: LOCK_SETTINGS,
  readyMade: [{ id: 'double-lock-check', title: 'Double lock check', make: () => ({}) }],
  ports: () => PORTS,
  elements: (part) => [...lockPaths(part, 'V1', 'C1', 'V2'), ...lockPaths(part, 'V2', 'C2', 'V1')],
  draw: () => [
    rectangle('enclosure', boxOf(-8, -5, 16, 10)),
    ...[-5, 5].flatMap((x) => [
      stroke('symbol', [x, 6], [x, -0.8]),
      stroke('symbol', [x, -2.85], [x, -6]),
      ...checkSeat('symbol', [x, -2], [0, -1]),
    ]),
    // Each pilot taps its own valve side and reaches under the other seat; they cross without joining.
    stroke('pilot', [-5, 1.5], [1, 1.5], [1, -1.1], [4.2, -1.1]),
    stroke('pilot', [5, 3.5], [-1, 3.5], [-1, -1.1], [-4.2, -1.1]),
    dot('symbol', [-5, 1.5]),
    dot('symbol', [5, 3.5]),
  ],
  bounds: () => boxOf(-8, -6, 16, 12),
};
