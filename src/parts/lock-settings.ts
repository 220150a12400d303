import type { Part } from '../circuit/model.ts';
import type { PathElement } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { numberSetting, quantitySetting, readSi } from './settings.ts';

/** What single and double lock checks share. */
const CRACKING = quantitySetting(
  {
    id: 'cracking',
    title: 'Cracking pressure',
    help: 'Pressure at which the free way to the cylinder begins to open.',
  },
  'pressure',
  '1 bar',
  { min: '0 bar', max: '100 bar' },
);
const RATIO = numberSetting(
  { id: 'ratio', title: 'Pilot ratio', help: 'Area of the pilot piston over the area of the seat.' },
  3,
  { min: 1, max: 100 },
);
const LOSS = lossSettings('40 L/min', '3 bar');

export const LOCK_SETTINGS = [CRACKING, RATIO, ...LOSS.all];

/** Free from the valve side to the cylinder side; back only while the pilot is fed. */
export function lockPaths(part: Part, valve: string, cylinder: string, pilot: string): PathElement[] {
  const rated = readLoss(part, LOSS);
  return [
    {
      type: 'path',
      from: valve,
      to: cylinder,
      way: 'one-way',
      throttled: false,
      cracking: readSi(part, CRACKING),
      rated,
    },
    {
      type: 'path',
      from: cylinder,
      to: valve,
      way: 'one-way',
      throttled: false,
      pilot: { port: pilot, ratio: readSi(part, RATIO) },
      rated,
    },
  ];
}
