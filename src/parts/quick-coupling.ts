import type { PartKind } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { boxOf, leftOpen, port, stroke } from './shapes.ts';

const LOSS = lossSettings('40 L/min', '2 bar');
const OPEN = leftOpen('note', 'One half of the coupling has no line; it counts as plugged.', 'Connect both halves.');
const POSITIONS = ['joined', 'apart'];

export const quickCoupling: PartKind = {
  kind: 'quick-coupling',
  title: 'Quick coupling',
  group: 'Measure and joints',
  help: 'Joined: open both ways. Apart: each half shuts itself, and pressure can stay behind it.',
  words: ['quick release', 'disconnect', 'coupler', 'hose coupling'],
  prefix: 'QC',
  settings: [...LOSS.all],
  readyMade: [{ id: 'quick-coupling', title: 'Quick coupling', make: () => ({}) }],
  ports: () => [port('A', [0, 3], 'down', 'working', OPEN), port('B', [0, -3], 'up', 'working', OPEN)],
  elements: (part) => [
    { type: 'path', from: 'A', to: 'B', way: 'both', throttled: false, positions: [0], rated: readLoss(part, LOSS) },
  ],
  input: () => ({ positions: POSITIONS, by: 'coupling', coils: [] }),
  draw: (_part, look) => {
    const apart = look.position === 1;
    const gap = apart ? 0.6 : 0.2;
    return [
      stroke('symbol', [0, 3], [0, apart ? 1.7 + gap : -3]),
      ...(apart ? [stroke('symbol', [0, -3], [0, -1.7 - gap])] : []),
      stroke('symbol', [-1.2, gap], [0, 1.2 + gap], [1.2, gap]),
      stroke('symbol', [-1.2, -gap], [0, -1.2 - gap], [1.2, -gap]),
      ...(apart
        ? [
            stroke('symbol', [-0.6, 1.7 + gap], [0.6, 1.7 + gap]),
            stroke('symbol', [-0.6, -1.7 - gap], [0.6, -1.7 - gap]),
          ]
        : []),
    ];
  },
  bounds: () => boxOf(-2, -3, 4, 6),
};
