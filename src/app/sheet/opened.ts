import type { Circuit } from '../../circuit/model.ts';

/** What was on the sheet. */
export interface Shown {
  readonly circuit: Circuit;
  /** File and circuit name. */
  readonly file: string;
  /** Nothing to undo yet. */
  readonly fresh: boolean;
}

/** Whether another circuit was opened, and not just edited: edits keep some parts, or at least their ids. */
export function isOpened(before: Shown | undefined, now: Shown): boolean {
  if (!before) return true;
  if (now.circuit.parts.length === 0) return before.circuit.parts.length > 0 && now.fresh;
  const former = new Set(before.circuit.parts);
  if (now.circuit.parts.some((part) => former.has(part))) return false;
  if (now.fresh || now.file !== before.file) return true;
  // A first part that is placed on an empty sheet shares no id either.
  const ids = new Set(before.circuit.parts.map(({ id }) => id));
  return now.circuit.parts.length > 1 && !now.circuit.parts.some(({ id }) => ids.has(id));
}
