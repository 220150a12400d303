import type { PartKind } from './contract.ts';
import { adjustableSpring } from './pressure-valve.ts';
import { FULL_FLOW_RISE, RELIEF_FLOW, RELIEF_SETTING } from './relief-valve.ts';
import { quantitySetting, readSi } from './settings.ts';
import { arrow, boxOf, leftOpen, port, rectangle, shape, stroke } from './shapes.ts';

const VENT = quantitySetting(
  {
    id: 'vent',
    title: 'Opens at, when vented',
    help: 'Pressure at P over X that opens the main stage: what the pump stands at while X is open to tank. A valve on X that holds pressure adds to it.',
  },
  'pressure',
  '5 bar',
  { min: '0.1 bar', max: '100 bar' },
);
/** m³/s through the bore between inlet and pilot chamber while the main stage is open; about 1 L/min, common practice. */
const PILOT_FLOW = 1e-3 / 60;

export const pilotReliefValve: PartKind = {
  kind: 'pilot-relief-valve',
  title: 'Pilot-operated relief valve',
  group: 'Pressure',
  help: 'Lets P out to T at its setting; with X open to tank already at a few bar, which unloads the pump; with a small relief valve on X at the setting of that one.',
  words: ['vented relief', 'two stage relief', 'pump unloading', 'remote control', 'solenoid relief', 'vent port'],
  prefix: 'RV',
  settings: [RELIEF_SETTING, VENT, FULL_FLOW_RISE, RELIEF_FLOW],
  readyMade: [{ id: 'pilot-relief-valve', title: 'Relief valve, pilot operated, with vent port', make: () => ({}) }],
  ports: () => [
    port(
      'P',
      [0, -4],
      'up',
      'supply',
      leftOpen(
        'caution',
        'The relief valve has no inlet line, so it protects nothing.',
        'Connect P to the line that it is to protect.',
      ),
    ),
    port(
      'T',
      [0, 4],
      'down',
      'return',
      leftOpen(
        'danger',
        'The relief valve has no outlet line; T counts as plugged, so the valve cannot let anything out.',
        'Lead T to a tank.',
      ),
    ),
    port(
      'X',
      [4, -4],
      'up',
      'pilot',
      leftOpen(
        'note',
        'The vent port X has no line; it counts as plugged, so the valve keeps to its setting.',
        'Plug X on the sheet, or lead it over a valve to tank to unload the pump.',
      ),
    ),
  ],
  elements: (part) => {
    const vent = readSi(part, VENT);
    return [
      {
        type: 'path',
        from: 'P',
        to: 'X',
        way: 'both',
        throttled: true,
        rated: { flow: PILOT_FLOW, drop: vent },
      },
      {
        type: 'pressure-opened',
        from: 'P',
        to: 'T',
        duty: 'relief',
        setting: readSi(part, RELIEF_SETTING),
        override: { rise: readSi(part, FULL_FLOW_RISE), flow: readSi(part, RELIEF_FLOW) },
        vent: { port: 'X', pressure: vent },
      },
    ];
  },
  draw: () => [
    stroke('symbol', [0, -4], [0, -2]),
    stroke('symbol', [0, 2], [0, 4]),
    stroke('pilot', [0, -3], [-3, -3], [-3, 0], [-2, 0]),
    rectangle('symbol', boxOf(-2, -2, 4, 4), 'paper'),
    ...arrow('symbol', [-0.9, -2], [-0.9, 2]),
    // The pilot stage between box and spring, with the triangle of hydraulic pressure.
    rectangle('symbol', boxOf(2, -1, 2, 2), 'paper'),
    shape('fine', 'ink', [2.3, 0], [3.6, -0.7], [3.6, 0.7]),
    ...adjustableSpring(4),
    stroke('pilot', [4, -4], [4, -2], [3, -2], [3, -1]),
  ],
  bounds: () => boxOf(-3, -4, 10, 8),
  check: (part) =>
    readSi(part, VENT) < readSi(part, RELIEF_SETTING)
      ? []
      : [
          {
            where: 'settings.vent',
            what: 'The vented pressure is not below the setting.',
            remedy: 'Give a vented pressure below the setting; a few bar are usual.',
          },
        ],
};
