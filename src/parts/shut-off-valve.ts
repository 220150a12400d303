import type { PartKind } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { boxOf, leftOpen, port, shape, stroke } from './shapes.ts';

const LOSS = lossSettings('60 L/min', '0.5 bar');
const OPEN = leftOpen(
  'note',
  'One port of the shut-off valve has no line; it counts as plugged, so nothing passes.',
  'Connect both ports.',
);
const POSITIONS = ['open', 'shut'];

export const shutOffValve: PartKind = {
  kind: 'shut-off-valve',
  title: 'Shut-off valve',
  group: 'Direction',
  help: 'Opened and shut by hand; stays where it is left. One input of the table.',
  words: ['ball valve', 'stop valve', 'isolating valve', 'hand valve', 'bleed valve'],
  prefix: 'SV',
  settings: [...LOSS.all],
  readyMade: [{ id: 'shut-off-valve', title: 'Shut-off valve, by hand', make: () => ({}) }],
  ports: () => [port('A', [0, 3], 'down', 'working', OPEN), port('B', [0, -3], 'up', 'working', OPEN)],
  elements: (part) => [
    { type: 'path', from: 'A', to: 'B', way: 'both', throttled: false, positions: [0], rated: readLoss(part, LOSS) },
  ],
  input: () => ({ positions: POSITIONS, by: 'hand', coils: [] }),
  draw: (_part, look) => {
    // Shut is told by the filled body and by the bar across, not by tone alone.
    const shut = look.position === 1;
    const fill = shut ? 'ink' : 'paper';
    return [
      stroke('symbol', [0, 3], [0, 2]),
      stroke('symbol', [0, -2], [0, -3]),
      shape('symbol', fill, [0, 0], [-1.2, 2], [1.2, 2]),
      shape('symbol', fill, [0, 0], [-1.2, -2], [1.2, -2]),
      ...(shut ? [stroke('symbol', [-1.4, 0], [1.4, 0])] : []),
    ];
  },
  bounds: () => boxOf(-2, -3, 4, 6),
};
