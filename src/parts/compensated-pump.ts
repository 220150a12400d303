import type { PartKind } from './contract.ts';
import { PUMP_BOUNDS, PUMP_FLOW, PUMP_PORTS, pumpBody, TIGHT_WHEN_STOPPED } from './pump.ts';
import { quantitySetting, readSi, readSwitch } from './settings.ts';
import { arrow } from './shapes.ts';

const SETTING = quantitySetting(
  { id: 'setting', title: 'Compensator setting', help: 'Pressure at which the pump strokes back to next to no flow.' },
  'pressure',
  '200 bar',
  { min: '1 bar', max: '1000 bar' },
);

export const compensatedPump: PartKind = {
  kind: 'compensated-pump',
  title: 'Compensated pump',
  group: 'Supply',
  help: 'Variable pump that holds its pressure: full flow up to the setting, then only what is taken.',
  words: ['pressure compensated pump', 'variable displacement pump', 'piston pump', 'supply'],
  prefix: 'PUMP',
  settings: [PUMP_FLOW, SETTING, TIGHT_WHEN_STOPPED],
  readyMade: [{ id: 'compensated-pump', title: 'Compensated pump', make: () => ({}) }],
  ports: () => PUMP_PORTS,
  elements: (part) => [
    {
      type: 'pump',
      outlet: 'P',
      suction: 'S',
      form: 'compensated',
      flow: readSi(part, PUMP_FLOW),
      setting: readSi(part, SETTING),
      tightWhenStopped: readSwitch(part, TIGHT_WHEN_STOPPED),
    },
  ],
  draw: () => [
    ...pumpBody(),
    ...arrow('symbol', [-3.2, 3.2], [3.6, -3.6]),
    ...arrow('fine', [1.7, 1.6], [1.7, -0.4], 0.8, 0.6),
  ],
  bounds: () => PUMP_BOUNDS,
};
