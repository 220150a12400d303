import type { PowerLossAnswer, PowerLossOutcome, PowerLossVerdict } from '../analysis/results.ts';

/** What can be lost; `key` picks its column of the answer. */
export const LOSS_CASES = [
  { key: 'running', title: 'Coils off, pumps running on' },
  { key: 'stopped', title: 'Coils off, pumps stopped' },
  { key: 'alone', title: 'Pumps stopped, coils on' },
] as const;
export type LossCase = (typeof LOSS_CASES)[number]['key'];

const COMES: Record<PowerLossOutcome, string> = {
  drops: 'the load moves it',
  'moves by spring': 'its spring moves it',
  'goes on': 'goes on',
  starts: 'starts to move',
  holds: 'holds',
  floats: 'floats',
  open: 'left open',
};

/** `the load moves it: moved in by load`; the verdict is left out where it says no more. */
export const sayLoss = ({ comes, verdict }: PowerLossVerdict): string =>
  comes === 'floats' || (comes === 'holds' && verdict === 'held') ? COMES[comes] : `${COMES[comes]}: ${verdict}`;

/** Something moves by itself, or may. */
export const isAlarming = ({ comes }: PowerLossVerdict): boolean =>
  comes === 'drops' || comes === 'moves by spring' || comes === 'starts' || comes === 'open';

export const sayReturned = ({ returned }: PowerLossAnswer): string =>
  returned.length === 0
    ? 'No valve goes back by itself when the coils lose their power.'
    : `Springs take back: ${returned.map(({ label, from, to }) => `${label} from ${from} to ${to}`).join(', ')}.`;

/** Common practice and published safety alerts; the machine's documents go before them. */
export const LOSS_WORDS: readonly string[] = [
  'Worked out for valves that shift at once, from the open paths and values of the drawing; levers stay where they are, detented valves where they were.',
  'What is said to hold can still sink through a worn valve, hose or seal: support every load before anyone goes under or beside it.',
  'The documents of the machine, the local codes and qualified people decide what is done; they go before this.',
];
