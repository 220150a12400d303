import type { PartKind } from './contract.ts';
import { choiceSetting, quantitySetting, readChoice, readSi } from './settings.ts';
import { boxOf, leftOpen, port, shape, stroke } from './shapes.ts';

const CHARGE = choiceSetting(
  {
    id: 'charge',
    title: 'State of charge',
    help: 'Charged: it holds oil under pressure and feeds its line also when the pumps stand.',
  },
  ['charged', 'empty'],
  'charged',
);
const VOLUME = quantitySetting(
  { id: 'volume', title: 'Gas volume', help: 'Volume of the gas when no oil is in it.' },
  'volume',
  '4 L',
  { min: '0.01 L', max: '10000 L' },
);
const PRECHARGE = quantitySetting(
  { id: 'precharge', title: 'Gas pre-charge', help: 'Gas pressure when no oil is in it.' },
  'pressure',
  '90 bar',
  { min: '0 bar', max: '1000 bar' },
);
const PRESSURE = quantitySetting(
  {
    id: 'pressure',
    title: 'Charged to',
    help: 'Pressure of gas and oil while it is charged: it feeds its line at this pressure. A full one takes no more oil.',
  },
  'pressure',
  '135 bar',
  { min: '0 bar', max: '1000 bar' },
);

export const accumulator: PartKind = {
  kind: 'accumulator',
  title: 'Accumulator',
  group: 'Store',
  help: 'Stores oil against gas. It keeps pressure when the pumps stop: it must vent by itself, be isolated, or carry a warning.',
  words: ['bladder', 'gas loaded', 'nitrogen', 'energy store', 'pressure store'],
  prefix: 'ACC',
  settings: [CHARGE, VOLUME, PRECHARGE, PRESSURE],
  readyMade: [{ id: 'accumulator', title: 'Accumulator, gas loaded', make: () => ({}) }],
  ports: () => [
    port(
      'A',
      [0, 5],
      'down',
      'working',
      leftOpen(
        'caution',
        'The accumulator has no line; A counts as plugged and what is stored in it stays there.',
        'Connect A, with a way to vent it.',
      ),
    ),
  ],
  elements: (part) => [
    {
      type: 'accumulator',
      port: 'A',
      charged: readChoice(part, CHARGE) === 'charged',
      volume: readSi(part, VOLUME),
      precharge: readSi(part, PRECHARGE),
      pressure: readSi(part, PRESSURE),
    },
  ],
  draw: () => [
    stroke('symbol', [0, 4], [0, 5]),
    { type: 'box', x: -2, y: -4, width: 4, height: 8, pen: 'symbol', fill: 'paper', corner: 2 },
    stroke('symbol', [-2, 0], [2, 0]),
    shape('fine', 'none', [-0.9, -2.6], [0.9, -2.6], [0, -1.1]),
  ],
  bounds: () => boxOf(-2, -4, 4, 9),
  check: (part) =>
    readChoice(part, CHARGE) === 'empty' || readSi(part, PRESSURE) >= readSi(part, PRECHARGE)
      ? []
      : [
          {
            level: 'warning',
            where: 'settings.pressure',
            what: 'It is charged to less than its gas pre-charge, at which it holds no oil; the pre-charge is taken instead.',
            remedy: 'Give the pressure to which the pump charges it, above the pre-charge, or set it as empty.',
          },
        ],
};
