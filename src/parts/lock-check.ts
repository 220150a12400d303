import type { PartKind } from './contract.ts';
import { LOCK_SETTINGS, lockPaths } from './lock-settings.ts';
import { boxOf, checkSeat, leftOpen, port, rectangle, stroke } from './shapes.ts';

export const lockCheck: PartKind = {
  kind: 'lock-check',
  title: 'Lock check',
  group: 'Flow and check',
  help: 'Holds the cylinder side C; opens back to V while the pilot X is under pressure.',
  words: ['pilot operated check', 'pilot to open check', 'load holding', 'lock valve', 'POCV'],
  prefix: 'LC',
  settings: LOCK_SETTINGS,
  readyMade: [{ id: 'lock-check', title: 'Lock check', make: () => ({}) }],
  ports: () => [
    port(
      'V',
      [0, 5],
      'down',
      'working',
      leftOpen('caution', 'The valve side V has no line; it counts as plugged.', 'Connect V to the directional valve.'),
    ),
    port(
      'C',
      [0, -5],
      'up',
      'working',
      leftOpen('caution', 'The cylinder side C has no line, so the check holds nothing.', 'Connect C to the actuator.'),
    ),
    port(
      'X',
      [-5, 3],
      'left',
      'pilot',
      leftOpen(
        'caution',
        'The pilot X has no line; it counts as plugged, so the check never opens back.',
        'Connect X to the line that is to open it.',
      ),
    ),
  ],
  elements: (part) => lockPaths(part, 'V', 'C', 'X'),
  draw: () => [
    rectangle('enclosure', boxOf(-4, -4, 8, 8)),
    stroke('symbol', [0, 5], [0, 1.2]),
    stroke('symbol', [0, -0.85], [0, -5]),
    stroke('pilot', [-5, 3], [-2, 3], [-2, 1.6], [-0.8, 0.9]),
    ...checkSeat('symbol', [0, 0], [0, -1]),
  ],
  bounds: () => boxOf(-5, -5, 9, 10),
};
