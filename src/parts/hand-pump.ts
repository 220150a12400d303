import type { PartKind } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { PUMP_PORTS, pumpCircle } from './pump.ts';
import { choiceSetting, numberSetting, quantitySetting, readChoice, readSi } from './settings.ts';
import { boxOf, circle, stroke } from './shapes.ts';

const WORKED = choiceSetting(
  {
    id: 'worked',
    title: 'Lever',
    help: 'At rest nobody pumps: its checks hold the outlet line, and the table shows it as stopped. With the pumps stopped it is at rest too.',
  },
  ['at rest', 'worked'],
  'at rest',
);
const STROKE = quantitySetting(
  { id: 'stroke', title: 'Oil per stroke', help: 'What one full stroke of the lever delivers.' },
  'volume',
  '0.025 L',
  { min: '0.0001 L', max: '10 L' },
);
const STROKES = numberSetting({ id: 'strokes', title: 'Strokes per minute', help: 'How fast it is worked.' }, 30, {
  min: 1,
  max: 120,
});
// The way of its own checks, which let oil in from S and hold it in P.
const FREE = lossSettings('5 L/min', '1 bar');

export const handPump: PartKind = {
  kind: 'hand-pump',
  title: 'Hand pump',
  group: 'Supply',
  help: 'Pump worked by a lever, with its two checks. At rest it neither delivers nor lets anything back.',
  words: ['lever pump', 'emergency pump', 'manual pump', 'lowering in emergency', 'jack'],
  prefix: 'HP',
  settings: [WORKED, STROKE, STROKES, ...FREE.all],
  readyMade: [{ id: 'hand-pump', title: 'Hand pump, with its checks', make: () => ({}) }],
  ports: () => PUMP_PORTS,
  elements: (part) => {
    const worked = readChoice(part, WORKED) === 'worked';
    return [
      {
        type: 'pump',
        outlet: 'P',
        suction: 'S',
        form: 'fixed',
        flow: (readSi(part, STROKE) * readSi(part, STROKES)) / 60,
        tightWhenStopped: true,
        atRest: !worked,
      },
      // Its checks let a line that is sucked on fill itself through the resting pump.
      { type: 'path', from: 'S', to: 'P', way: 'one-way', throttled: false, rated: readLoss(part, FREE) },
    ];
  },
  draw: () => [
    ...pumpCircle(),
    // The lever on its pivot, in place of the shaft.
    stroke('symbol', [-3, 0], [-4, 0]),
    circle('fine', [-4, 0], 0.3, 'paper'),
    stroke('symbol', [-4, -0.3], [-4.9, -3.4]),
    stroke('fine', [-3.4, 1.2], [-4.6, 1.2]),
    stroke('fine', [-4, 0.3], [-4, 1.2]),
  ],
  bounds: () => boxOf(-5, -4, 9, 8),
};
