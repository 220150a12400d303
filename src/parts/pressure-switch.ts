import type { PartKind } from './contract.ts';
import { adjustableSpring } from './pressure-valve.ts';
import { quantitySetting, readSi } from './settings.ts';
import { boxOf, circle, leftOpen, port, rectangle, stroke } from './shapes.ts';

const SETTING = quantitySetting(
  { id: 'setting', title: 'Switches on at', help: 'Pressure, rising, at which its contact changes over.' },
  'pressure',
  '100 bar',
  { min: '0.1 bar', max: '1000 bar' },
);
const DIFFERENCE = quantitySetting(
  {
    id: 'difference',
    title: 'Switch-back difference',
    help: 'How far the pressure must fall below the setting before the contact goes back; between the two it stays as it was.',
  },
  'pressure',
  '10 bar',
  { min: '0 bar', max: '1000 bar' },
);

export const pressureSwitch: PartKind = {
  kind: 'pressure-switch',
  title: 'Pressure switch',
  group: 'Measure and joints',
  help: 'Its contact changes over when the pressure at M reaches the setting; nothing flows through it. It can end a step of a plan.',
  words: ['pressostat', 'electrical contact', 'pressure sensor', 'signal', 'step end'],
  prefix: 'PS',
  settings: [SETTING, DIFFERENCE],
  readyMade: [{ id: 'pressure-switch', title: 'Pressure switch, adjustable', make: () => ({}) }],
  ports: () => [
    port(
      'M',
      [0, 4],
      'down',
      'measure',
      leftOpen('caution', 'The pressure switch has no line, so it never switches.', 'Connect M to a line.'),
    ),
  ],
  elements: (part) => {
    const on = readSi(part, SETTING);
    return [{ type: 'pressure-switch', port: 'M', on, off: Math.max(0, on - readSi(part, DIFFERENCE)) }];
  },
  draw: () => [
    stroke('symbol', [0, 4], [0, 2]),
    rectangle('symbol', boxOf(-2, -2, 4, 4), 'paper'),
    // The contact, open at rest: two terminals and the blade between them.
    circle('fine', [-1.1, 0.2], 0.28),
    circle('fine', [1.1, 0.2], 0.28),
    stroke('fine', [-0.85, 0.05], [1, -1.05]),
    stroke('fine', [-1.1, 0.48], [-1.1, 1.1]),
    stroke('fine', [1.1, 0.48], [1.1, 1.1]),
    ...adjustableSpring(),
  ],
  bounds: () => boxOf(-2, -3, 7, 7),
  check: (part) =>
    readSi(part, DIFFERENCE) < readSi(part, SETTING)
      ? []
      : [
          {
            level: 'warning',
            where: 'settings.difference',
            what: 'The switch-back difference is as large as the setting, so the contact goes back only without any pressure.',
            remedy: 'Give a difference smaller than the setting.',
          },
        ],
};
