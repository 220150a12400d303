import type { PartKind } from './contract.ts';
import {
  adjustableSpring,
  besideCheck,
  BYPASS,
  freeWay,
  pressureSetting,
  readLaw,
  VALVE_SETTINGS,
  valveBox,
} from './pressure-valve.ts';
import { readSi, readSwitch, switchSetting } from './settings.ts';
import { boxOf, dot, leftOpen, port, rectangle, stroke } from './shapes.ts';

const SETTING = pressureSetting(
  'Outlet pressure, over the drain, at which the way from P to A is fully shut.',
  '50 bar',
);
const RELIEVING = switchSetting(
  { id: 'relieving', title: 'Relieving', help: 'On: oil pushed back into A over the setting is let out through Y.' },
  false,
);

export const reducingValve: PartKind = {
  kind: 'reducing-valve',
  title: 'Pressure reducing valve',
  group: 'Pressure',
  help: 'Open from P to A until A reaches the setting, then lets through only what keeps it there. Back only through a bypass check.',
  words: ['pressure reducer', 'pressure regulator', 'second pressure', 'clamp pressure'],
  prefix: 'PR',
  settings: [SETTING, RELIEVING, BYPASS, ...VALVE_SETTINGS],
  readyMade: [
    { id: 'reducing-valve', title: 'Pressure reducing valve', make: () => ({}) },
    {
      id: 'reducing-valve-relieving',
      title: 'Pressure reducing and relieving valve',
      words: ['three way', '3-way'],
      make: () => ({ settings: { relieving: true } }),
    },
  ],
  ports: () => [
    port(
      'P',
      [0, -5],
      'up',
      'supply',
      leftOpen('caution', 'The reducing valve has no inlet line, so nothing gets to A.', 'Connect P to the supply.'),
    ),
    port(
      'A',
      [0, 5],
      'down',
      'working',
      leftOpen(
        'note',
        'The reducing valve has no outlet line; A counts as plugged.',
        'Connect A to what needs the lower pressure.',
      ),
    ),
    port(
      'Y',
      [3, 5],
      'down',
      'drain',
      leftOpen(
        'caution',
        'The drain Y of the reducing valve has no line. It is computed as if it led to tank; on the machine a plugged drain fills and the outlet pressure climbs to that of the inlet.',
        'Lead Y to a tank without back pressure.',
      ),
    ),
  ],
  elements: (part) => {
    const setting = readSi(part, SETTING);
    const signals = [
      { port: 'A', factor: 1 },
      { port: 'Y', factor: -1 },
    ];
    const law = readLaw(part);
    return [
      { type: 'pressure-valve', duty: 'closes', from: 'P', to: 'A', signals, setting, ...law },
      // Lets out what is pushed back in: shut until A passes the setting, as a sequence valve is.
      ...(readSwitch(part, RELIEVING)
        ? [{ type: 'pressure-valve', duty: 'sequence', from: 'A', to: 'Y', signals, setting, ...law } as const]
        : []),
      ...(readSwitch(part, BYPASS) ? [freeWay(part, 'A', 'P')] : []),
    ];
  },
  draw: (part) => {
    const bypass = readSwitch(part, BYPASS);
    return [
      ...(bypass ? [rectangle('enclosure', boxOf(-8, -4, 14, 8)), ...besideCheck(-6, 3)] : []),
      ...valveBox(5, false),
      stroke('pilot', ...(bypass ? [] : ([[0, 3]] as const)), [-3, 3], [-3, 0], [-2, 0]),
      ...(bypass ? [dot('symbol', [-3, 3])] : []),
      // The third way, from the outlet to the drain, stands shut at rest.
      ...(readSwitch(part, RELIEVING)
        ? [stroke('fine', [1.1, 0.9], [1.1, 1.7]), stroke('fine', [1.1, 1.3], [3, 1.3])]
        : []),
      stroke('pilot', [3, 1], [3, 5]),
      ...adjustableSpring(),
    ];
  },
  bounds: (part) => (readSwitch(part, BYPASS) ? boxOf(-8, -5, 14, 10) : boxOf(-3, -5, 8, 10)),
};
