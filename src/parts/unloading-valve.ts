import type { PartKind } from './contract.ts';
import { adjustableSpring, pressureSetting, readLaw, VALVE_SETTINGS, valveBox } from './pressure-valve.ts';
import { readSi } from './settings.ts';
import { boxOf, leftOpen, port, stroke } from './shapes.ts';

const SETTING = pressureSetting('Pressure at the pilot X, over T, at which the way from P to T opens.', '100 bar');

export const unloadingValve: PartKind = {
  kind: 'unloading-valve',
  title: 'Unloading valve',
  group: 'Pressure',
  help: 'Lets P out to T at low pressure while the pilot X, taken from elsewhere, is above the setting. Opens and shuts at the same pressure: no switching range.',
  words: ['unloader', 'pump unloading', 'accumulator charging', 'high-low pump', 'remote pilot'],
  prefix: 'UV',
  settings: [SETTING, ...VALVE_SETTINGS],
  readyMade: [{ id: 'unloading-valve', title: 'Unloading valve', make: () => ({}) }],
  ports: () => [
    port(
      'P',
      [0, -4],
      'up',
      'supply',
      leftOpen(
        'caution',
        'The unloading valve has no inlet line, so it unloads nothing.',
        'Connect P to the outlet line of the pump.',
      ),
    ),
    port(
      'T',
      [0, 4],
      'down',
      'return',
      leftOpen(
        'danger',
        'The unloading valve has no outlet line; T counts as plugged, so the valve cannot let anything out.',
        'Lead T to a tank.',
      ),
    ),
    port(
      'X',
      [-4, 0],
      'left',
      'pilot',
      leftOpen(
        'caution',
        'The pilot X has no line; it counts as plugged, so the valve never opens.',
        'Connect X to the line whose pressure is to unload the pump.',
      ),
    ),
  ],
  elements: (part) => [
    {
      type: 'pressure-valve',
      duty: 'unloading',
      from: 'P',
      to: 'T',
      signals: [
        { port: 'X', factor: 1 },
        { port: 'T', factor: -1 },
      ],
      setting: readSi(part, SETTING),
      ...readLaw(part),
    },
  ],
  draw: () => [...valveBox(4, true), stroke('pilot', [-4, 0], [-2, 0]), ...adjustableSpring()],
  bounds: () => boxOf(-4, -4, 9, 8),
};
