import type { PartKind } from './contract.ts';
import { PUMP_BOUNDS, PUMP_FLOW, PUMP_PORTS, pumpBody, TIGHT_WHEN_STOPPED } from './pump.ts';
import { readSi, readSwitch } from './settings.ts';

export const fixedPump: PartKind = {
  kind: 'fixed-pump',
  title: 'Fixed pump',
  group: 'Supply',
  help: 'Delivers the same flow at any pressure; needs a relief valve on its outlet.',
  words: ['fixed displacement pump', 'gear pump', 'constant pump', 'power unit', 'supply'],
  prefix: 'PUMP',
  settings: [PUMP_FLOW, TIGHT_WHEN_STOPPED],
  readyMade: [{ id: 'fixed-pump', title: 'Fixed pump', make: () => ({}) }],
  ports: () => PUMP_PORTS,
  elements: (part) => [
    {
      type: 'pump',
      outlet: 'P',
      suction: 'S',
      form: 'fixed',
      flow: readSi(part, PUMP_FLOW),
      tightWhenStopped: readSwitch(part, TIGHT_WHEN_STOPPED),
    },
  ],
  draw: () => pumpBody(),
  bounds: () => PUMP_BOUNDS,
};
