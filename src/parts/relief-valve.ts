import type { PartKind } from './contract.ts';
import { quantitySetting, readSi } from './settings.ts';
import { arrow, boxOf, leftOpen, port, rectangle, spring, stroke } from './shapes.ts';

export const RELIEF_SETTING = quantitySetting(
  { id: 'setting', title: 'Setting', help: 'Inlet pressure at which it begins to let oil out.' },
  'pressure',
  '200 bar',
  { min: '0.1 bar', max: '1000 bar' },
);
export const FULL_FLOW_RISE = quantitySetting(
  {
    id: 'fullFlowRise',
    title: 'Rise at rated flow',
    help: 'How far the pressure climbs over the setting at the rated flow.',
  },
  'pressure',
  '10 bar',
  { min: '0 bar', max: '500 bar' },
);
export const RELIEF_FLOW = quantitySetting(
  { id: 'ratedFlow', title: 'Rated flow', help: 'Flow at which the rise is given.' },
  'flow',
  '60 L/min',
  { min: '0.01 L/min', max: '10000 L/min' },
);

export const reliefValve: PartKind = {
  kind: 'relief-valve',
  title: 'Relief valve',
  group: 'Pressure',
  help: 'Shut until its inlet reaches the setting, then lets oil out to T.',
  words: ['pressure relief', 'safety valve', 'pressure limiting', 'relief'],
  prefix: 'RV',
  settings: [RELIEF_SETTING, FULL_FLOW_RISE, RELIEF_FLOW],
  readyMade: [{ id: 'relief-valve', title: 'Relief valve', make: () => ({}) }],
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
  ],
  elements: (part) => [
    {
      type: 'pressure-opened',
      from: 'P',
      to: 'T',
      duty: 'relief',
      setting: readSi(part, RELIEF_SETTING),
      override: { rise: readSi(part, FULL_FLOW_RISE), flow: readSi(part, RELIEF_FLOW) },
    },
  ],
  draw: () => [
    stroke('symbol', [0, -4], [0, -2]),
    stroke('symbol', [0, 2], [0, 4]),
    stroke('pilot', [0, -3], [-3, -3], [-3, 0], [-2, 0]),
    rectangle('symbol', boxOf(-2, -2, 4, 4), 'paper'),
    ...arrow('symbol', [-0.9, -2], [-0.9, 2]),
    spring('fine', 2, 4.7, 0),
    ...arrow('fine', [2.2, 2], [4.6, -2.2], 0.9, 0.65),
  ],
  bounds: () => boxOf(-3, -4, 8, 8),
};
