import type { ActuatorNote } from '../engine/table/words.ts';

/** A motor knows no in and out. */
const ROTARY: Readonly<Record<ActuatorNote, string>> = {
  'outward by suction only': 'A→B by suction only',
  'inward by suction only': 'B→A by suction only',
  'void forms': 'void forms',
  'free outward': 'free A→B',
  'free inward': 'free B→A',
  'creeps outward on back pressure': 'creeps A→B on back pressure',
  'creeps inward on back pressure': 'creeps B→A on back pressure',
  'creeps through its own leakage': 'creeps through its own leakage',
};

/** A note as people read it; one that the table does not know stays as it is. */
export const sayNote = (note: string, motor: boolean): string =>
  motor && Object.hasOwn(ROTARY, note) ? ROTARY[note as ActuatorNote] : note;

/** `DRUM: outward by suction only` → what it is called on a motor, for the motors of these labels. */
export const motorNotes = (labels: readonly string[]): ReadonlyMap<string, string> =>
  new Map(
    labels.flatMap((label) => Object.entries(ROTARY).map(([note, said]) => [`${label}: ${note}`, `${label}: ${said}`])),
  );
