import { ACTUATOR_VERDICTS, BLOCKED_KINDS, LINE_CLASSES, PUMP_VERDICTS, TRAP_REASONS } from '../words.ts';
import type { ActuatorVerdict, BlockedKind, LineClass, PumpVerdict, TrapReason } from '../words.ts';

/** What can be said of an actuator, pump or line: the words, and the outcomes that they stand for. */
export interface Says<W> {
  readonly words: string;
  readonly means: readonly W[];
}

const OUTWARD: readonly ActuatorVerdict[] = [
  'extends',
  'turns A→B',
  'moved out by load',
  'moved out by spring',
  'driven A→B by load',
];
const INWARD: readonly ActuatorVerdict[] = [
  'retracts',
  'turns B→A',
  'moved in by load',
  'moved in by spring',
  'driven B→A by load',
];
const STANDING: readonly ActuatorVerdict[] = ['at stop', 'stalled', 'held', 'held one way', 'floats'];

const group = <W>(means: readonly W[], ...words: string[]): Says<W>[] => words.map((word) => ({ words: word, means }));

export const ACTUATOR_SAYS: readonly Says<ActuatorVerdict>[] = [
  ...group([...OUTWARD, ...INWARD], 'moves', 'move'),
  ...group(OUTWARD, 'moves out', 'move out'),
  ...group(INWARD, 'moves in', 'move in'),
  ...group(STANDING, 'stands still', 'stand still'),
  ...group<ActuatorVerdict>(['extends'], 'extend'),
  ...group<ActuatorVerdict>(['retracts'], 'retract'),
  ...group<ActuatorVerdict>(['turns A→B'], 'turns A>B', 'turns A->B'),
  ...group<ActuatorVerdict>(['turns B→A'], 'turns B>A', 'turns B->A'),
  ...group<ActuatorVerdict>(['floats'], 'float'),
  ...ACTUATOR_VERDICTS.filter((word) => word !== 'undetermined' && word !== 'rests on pressure').flatMap((word) =>
    group([word], word),
  ),
];

export const PUMP_SAYS: readonly Says<PumpVerdict>[] = [
  ...group<PumpVerdict>(['working', 'working, part over relief'], 'works', 'work'),
  ...PUMP_VERDICTS.filter((word) => word !== 'rests on pressure').flatMap((word) => group([word], word)),
];

export const LINE_SAYS: readonly Says<LineClass>[] = LINE_CLASSES.flatMap((word) => group([word], word));

export const BLOCKED_SAYS: readonly Says<BlockedKind>[] = [
  ...group(BLOCKED_KINDS, 'blocked'),
  ...group<BlockedKind>(['under pressure'], 'blocked under pressure'),
];

/** Warming alone is not counted, unless it is asked for. */
export const TRAPPED_SAYS: readonly Says<TrapReason>[] = [
  ...group(
    TRAP_REASONS.filter((reason) => reason !== 'heat'),
    'trapped',
  ),
  ...TRAP_REASONS.flatMap((reason) => group([reason], `trapped by ${reason}`)),
];
