import type { Part } from '../circuit/model.ts';
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
import { choiceSetting, readChoice, readSi, readSwitch } from './settings.ts';
import { boxOf, dot, leftOpen, port, rectangle, stroke } from './shapes.ts';

const SETTING = pressureSetting('Inlet pressure over the spring chamber at which the way from P to A opens.', '60 bar');
const DRAIN = choiceSetting(
  {
    id: 'drain',
    title: 'Spring chamber drains',
    help: 'External: by its own port Y, so that the outlet pressure does not count. Internal: to A, and pressure there adds to the setting.',
  },
  ['external', 'internal'],
  'external',
);
const ownDrain = (part: Part): boolean => readChoice(part, DRAIN) === 'external';

export const sequenceValve: PartKind = {
  kind: 'sequence-valve',
  title: 'Sequence valve',
  group: 'Pressure',
  help: 'Shut until its inlet P reaches the setting, then lets oil on to A; P stays at the setting or above. Back only through a bypass check.',
  words: ['priority', 'pressure sequence', 'order of motion', 'kick down', 'one after the other'],
  prefix: 'SV',
  settings: [SETTING, DRAIN, BYPASS, ...VALVE_SETTINGS],
  readyMade: [
    { id: 'sequence-valve', title: 'Sequence valve', make: () => ({}) },
    {
      id: 'sequence-valve-check',
      title: 'Sequence valve with bypass check',
      words: ['reverse free flow'],
      make: () => ({ settings: { bypass: true } }),
    },
  ],
  ports: (part) => [
    port(
      'P',
      [0, -5],
      'up',
      'supply',
      leftOpen(
        'caution',
        'The sequence valve has no inlet line, so nothing gets to A.',
        'Connect P to the line that is served first.',
      ),
    ),
    port(
      'A',
      [0, 5],
      'down',
      'working',
      leftOpen(
        'caution',
        'The sequence valve has no outlet line; A counts as plugged, so nothing passes.',
        'Connect A to what moves second.',
      ),
    ),
    ...(ownDrain(part)
      ? [
          port(
            'Y',
            [3, 5],
            'down',
            'drain',
            leftOpen(
              'caution',
              'The drain Y of the sequence valve has no line. It is computed as if it led to tank; on the machine a plugged drain fills and the valve may not open.',
              'Lead Y to a tank without back pressure.',
            ),
          ),
        ]
      : []),
  ],
  elements: (part) => [
    {
      type: 'pressure-valve',
      duty: 'sequence',
      from: 'P',
      to: 'A',
      signals: [
        { port: 'P', factor: 1 },
        { port: ownDrain(part) ? 'Y' : 'A', factor: -1 },
      ],
      setting: readSi(part, SETTING),
      ...readLaw(part),
    },
    ...(readSwitch(part, BYPASS) ? [freeWay(part, 'A', 'P')] : []),
  ],
  draw: (part) => {
    const bypass = readSwitch(part, BYPASS);
    return [
      ...(bypass ? [rectangle('enclosure', boxOf(-8, -4, 14, 8)), ...besideCheck(-6, 3)] : []),
      ...valveBox(5, true),
      stroke('pilot', ...(bypass ? [] : ([[0, -3]] as const)), [-3, -3], [-3, 0], [-2, 0]),
      ...(bypass ? [dot('symbol', [-3, -3])] : []),
      ...(ownDrain(part) ? [stroke('pilot', [3, 1], [3, 5])] : [stroke('pilot', [3, 1], [3, 2.6], [0, 2.6])]),
      ...adjustableSpring(),
    ];
  },
  bounds: (part) => (readSwitch(part, BYPASS) ? boxOf(-8, -5, 14, 10) : boxOf(-3, -5, 8, 10)),
};
