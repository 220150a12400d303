import type { Part } from '../circuit/model.ts';
import type { Rating } from './contract.ts';
import { quantitySetting, readSetting, type QuantitySpec } from './settings.ts';

/** Most pressure that a part is built for; a finding says where the table goes beyond it. */
export const ratingSetting = (preset: string): QuantitySpec =>
  quantitySetting(
    {
      id: 'rating',
      title: 'Rated pressure',
      help: 'The most that it is built for. A row that goes beyond it is reported; nothing else follows from it.',
    },
    'pressure',
    preset,
    { min: '1 bar', max: '2000 bar' },
  );

export const TANK_PORT_RATING = quantitySetting(
  {
    id: 'tankRating',
    title: 'Rated pressure of T',
    help: 'The most that its tank port is built for, where another valve stands behind it. A row that goes beyond it is reported.',
  },
  'pressure',
  '210 bar',
  { min: '1 bar', max: '2000 bar' },
);

export const readRating = (part: Part, spec: QuantitySpec, ports: readonly string[], tankPort = false): Rating => {
  const { si, assumed } = readSetting(part, spec);
  return { ports, pressure: si, assumed, tankPort };
};
