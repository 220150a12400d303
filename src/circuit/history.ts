import { bad, good, type Result } from '../base/result.ts';
import { all, applyBoth, applyEdit, type Edit } from './edit.ts';
import { omit } from './fields.ts';
import { readCircuit, writeCircuit } from './file.ts';
import { parseJson } from './json.ts';
import type { Circuit } from './model.ts';

/** One undo step. */
export interface HistoryStep {
  /** From the circuit before to the one after. */
  readonly edit: Edit;
  /** And back. */
  readonly inverse: Edit;
}

/**
 * The circuit and every step to and from it, without limit. Plain data: it goes through JSON and back,
 * so undo survives a reload.
 */
export interface History {
  /** Oldest first. */
  readonly past: readonly HistoryStep[];
  readonly present: Circuit;
  /** Next to be redone first. */
  readonly future: readonly HistoryStep[];
  /** Key of the burst that the last step may still grow by. */
  readonly burst?: string;
  /** How many steps were past when the file was saved; absent = that state is not among the steps. */
  readonly saved?: number;
}

/** `saved`: whether the circuit stands in a file as it is. */
export const begin = (circuit: Circuit, saved = true): History => ({
  past: [],
  present: circuit,
  future: [],
  ...(saved && { saved: 0 }),
});

/**
 * Apply an edit as an undo step. Edits with the same `burst` key, one right after another, become one step:
 * a drag, a run of arrow keys, typing in one field. Throws `RefusedEdit` where the edit does not fit.
 */
export function commit(history: History, edit: Edit, burst?: string): History {
  const { circuit, inverse } = applyBoth(history.present, edit);
  const last = history.past.at(-1);
  // Undo, redo and saving end a burst, so a step that a saved state stands on never grows.
  const grows = burst !== undefined && burst === history.burst && last !== undefined;
  const step: HistoryStep = grows
    ? { edit: join(last.edit, edit), inverse: join(inverse, last.inverse) }
    : { edit, inverse };
  const past = grows ? history.past.with(-1, step) : [...history.past, step];
  const kept = history.saved !== undefined && history.saved < past.length;
  return {
    past,
    present: circuit,
    future: [],
    ...(burst !== undefined && { burst }),
    ...(kept && { saved: history.saved }),
  };
}

export const canUndo = (history: History): boolean => history.past.length > 0;
export const canRedo = (history: History): boolean => history.future.length > 0;

/** The same history if there is nothing to undo. */
export function undo(history: History): History {
  const step = history.past.at(-1);
  if (step === undefined) return history;
  return {
    ...endBurst(history),
    past: history.past.slice(0, -1),
    present: applyEdit(history.present, step.inverse),
    future: [step, ...history.future],
  };
}

/** The same history if there is nothing to redo. */
export function redo(history: History): History {
  const [step, ...future] = history.future;
  if (step === undefined) return history;
  return {
    ...endBurst(history),
    past: [...history.past, step],
    present: applyEdit(history.present, step.edit),
    future,
  };
}

/** The next edit starts a step of its own, whatever its key. */
export function endBurst(history: History): History {
  return omit(history, 'burst');
}

export const markSaved = (history: History): History => ({ ...endBurst(history), saved: history.past.length });
export const isSaved = (history: History): boolean => history.saved === history.past.length;

export const saveHistory = (history: History): string => JSON.stringify(history);

/** Read what `saveHistory` wrote. Every step is tried, so that a damaged one is found now and not at some later undo. */
export function loadHistory(text: string): Result<History> {
  const parsed = parseJson(text);
  if (!parsed.ok) return parsed;
  try {
    // A store that was written by something else fails on the way, and is refused below.
    const history = parsed.value as History;
    const { past, present, future, saved } = history;
    if (!Array.isArray(past) || !Array.isArray(future)) throw new Error('no steps');
    if (saved !== undefined && !(Number.isInteger(saved) && saved >= 0)) throw new Error('no place');
    const checked = readCircuit(writeCircuit(present));
    if (!checked.ok) return checked;
    past.reduceRight((circuit, step) => applyEdit(circuit, step.inverse), present);
    future.reduce((circuit, step) => applyEdit(circuit, step.edit), present);
    return good({ past, present, future, ...(saved !== undefined && { saved }) });
  } catch {
    return bad({
      where: 'history',
      what: 'The kept undo steps do not fit the circuit.',
      remedy: 'Open the file again; its undo steps are lost.',
    });
  }
}

/** `second` after `first`, as short as it can be said: a drag would otherwise leave hundreds of moves. */
function join(first: Edit, second: Edit): Edit {
  const edits = [...listed(first), ...listed(second)];
  if (!edits.every(isChange)) return all(edits);
  const merged = new Map<string, Change>();
  for (const edit of edits) {
    const key = edit.type === 'change-circuit' ? edit.type : `${edit.type} ${edit.id}`;
    const before = merged.get(key);
    merged.set(key, before === undefined ? edit : merge(before, edit));
  }
  const kept = [...merged.values()];
  if (kept.length === 1) return kept[0] as Edit;
  // Labels handed from one part to another only fit in the order in which they were given.
  return kept.some(touchesLabel) ? all(edits) : all(kept);
}

const touchesLabel = (edit: Change): boolean =>
  edit.type === 'change-part' && ('label' in edit.fields || (edit.without ?? []).includes('label'));

type Change = Extract<Edit, { readonly fields: object }>;
const isChange = (edit: Edit): edit is Change => 'fields' in edit;
const listed = (edit: Edit): readonly Edit[] => (edit.type === 'all' ? edit.edits.flatMap(listed) : [edit]);

/** Two changes of the same thing: the later one has the last word on each field. */
function merge(first: Change, second: Change): Change {
  const fields: Record<string, unknown> = { ...first.fields };
  const without = new Set<string>(first.without ?? []);
  for (const [key, value] of Object.entries(second.fields)) {
    fields[key] = value;
    without.delete(key);
  }
  for (const key of second.without ?? []) {
    Reflect.deleteProperty(fields, key);
    without.add(key);
  }
  return { ...omit(first, 'without'), fields, ...(without.size > 0 && { without: [...without] }) } as Change;
}
