import type { Part } from '../circuit/model.ts';
import type { PartKind } from './contract.ts';
import { besideCheck, freeWay, pressureSetting, readLaw, VALVE_SETTINGS, valveBox } from './pressure-valve.ts';
import { choiceSetting, numberSetting, readChoice, readSi } from './settings.ts';
import { arrow, boxOf, leftOpen, port, rectangle, spring, stroke } from './shapes.ts';

const SETTING = pressureSetting(
  'Pressure at the cylinder side C at which it opens without any pilot; usually 1.3 times the highest load pressure.',
  '150 bar',
);
const RATIO = numberSetting(
  { id: 'ratio', title: 'Pilot ratio', help: 'How many times pressure at X counts against pressure at C.' },
  3,
  { min: 0, max: 100 },
);
const CHAMBER = choiceSetting(
  {
    id: 'springChamber',
    title: 'Spring chamber',
    help: 'On the valve side: back pressure at V, times ratio + 1, adds to the setting. Vented: back pressure does not count.',
  },
  ['on the valve side', 'vented'],
  'on the valve side',
);
const vented = (part: Part): boolean => readChoice(part, CHAMBER) === 'vented';

export const counterbalanceValve: PartKind = {
  kind: 'counterbalance-valve',
  title: 'Counterbalance valve',
  group: 'Pressure',
  help: 'Free from V to the cylinder side C. Holds C, and lets it back to V only as far as C + ratio × X passes the setting.',
  words: ['load holding', 'overcentre', 'over centre', 'motion control', 'brake valve', 'lowering', 'vertical load'],
  prefix: 'CB',
  settings: [SETTING, RATIO, CHAMBER, ...VALVE_SETTINGS],
  readyMade: [{ id: 'counterbalance-valve', title: 'Counterbalance valve', make: () => ({}) }],
  ports: () => [
    port(
      'V',
      [0, 6],
      'down',
      'working',
      leftOpen('caution', 'The valve side V has no line; it counts as plugged.', 'Connect V to the directional valve.'),
    ),
    port(
      'C',
      [0, -6],
      'up',
      'working',
      leftOpen(
        'caution',
        'The cylinder side C has no line, so the valve holds nothing.',
        'Connect C to the side of the actuator that carries the load.',
      ),
    ),
    port(
      'X',
      [5, 1],
      'right',
      'pilot',
      leftOpen(
        'caution',
        'The pilot X has no line; it counts as plugged, so only the pressure at C opens the valve.',
        'Connect X to the opposite side of the actuator.',
      ),
    ),
  ],
  elements: (part) => {
    const ratio = readSi(part, RATIO);
    return [
      {
        type: 'pressure-valve',
        duty: 'counterbalance',
        from: 'C',
        to: 'V',
        // Balance of forces on the poppet: C on the seat, X on ratio times it, V on the spring side of both.
        signals: [
          { port: 'C', factor: 1 },
          { port: 'X', factor: ratio },
          ...(vented(part) ? [] : [{ port: 'V', factor: -(1 + ratio) }]),
        ],
        setting: readSi(part, SETTING),
        ...readLaw(part),
      },
      freeWay(part, 'V', 'C'),
    ];
  },
  draw: (part) => [
    rectangle('enclosure', boxOf(-9, -5, 13, 10)),
    ...besideCheck(-7, 4),
    ...valveBox(6, true),
    stroke('pilot', [0, -3], [3, -3], [3, -1], [2, -1]),
    stroke('pilot', [5, 1], [2, 1]),
    spring('fine', -4.7, -2, 0),
    ...arrow('fine', [-2.2, 2], [-4.6, -2.2], 0.9, 0.65),
    ...(vented(part)
      ? [stroke('pilot', [-3, 1], [-3, 2.9]), stroke('fine', [-3.7, 2.6], [-3.7, 3.2], [-2.3, 3.2], [-2.3, 2.6])]
      : []),
  ],
  bounds: () => boxOf(-9, -6, 14, 12),
};
