import type { Primitive } from '../base/primitives.ts';
import type { PortSpec } from './contract.ts';
import { quantitySetting, switchSetting } from './settings.ts';
import { boxOf, circle, leftOpen, port, shape, stroke } from './shapes.ts';

/** What the two pumps share. */
export const PUMP_FLOW = quantitySetting(
  { id: 'flow', title: 'Flow', help: 'Delivery at the working speed; a compensated pump gives at most this.' },
  'flow',
  '30 L/min',
  { min: '0.01 L/min', max: '10000 L/min' },
);

export const TIGHT_WHEN_STOPPED = switchSetting(
  {
    id: 'tightWhenStopped',
    title: 'Tight when stopped',
    help: 'Off: the stopped pump slowly lets its outlet line down to tank through its own leakage.',
  },
  false,
);

export const PUMP_PORTS: readonly PortSpec[] = [
  port(
    'P',
    [0, -4],
    'up',
    'supply',
    leftOpen(
      'danger',
      'The pump outlet has no line, so it counts as plugged: running, the pump has nowhere to deliver to.',
      'Lead P to a relief valve and to the circuit.',
    ),
  ),
  port(
    'S',
    [0, 4],
    'down',
    'working',
    leftOpen(
      'caution',
      'The pump has no suction line; it is computed as if it drew from the tank.',
      'Lead S to a tank.',
    ),
  ),
];

export const PUMP_BOUNDS = boxOf(-5, -4, 9, 8);

/** Circle, outlet triangle, shaft and both stubs. */
export const pumpBody = (): Primitive[] => [
  stroke('fine', [-4.6, -0.35], [-2.98, -0.35]),
  stroke('fine', [-4.6, 0.35], [-2.98, 0.35]),
  ...pumpCircle(),
];

/** The same without a shaft. */
export const pumpCircle = (): Primitive[] => [
  stroke('symbol', [0, -4], [0, -3]),
  stroke('symbol', [0, 3], [0, 4]),
  circle('symbol', [0, 0], 3, 'paper'),
  shape('symbol', 'ink', [0, -3], [-1.1, -1.1], [1.1, -1.1]),
];
