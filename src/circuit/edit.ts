import { checkPoints, Draft, type DraftList } from './draft.ts';
import type { Circuit, Connection, Label, Part } from './model.ts';
import { RefusedEdit } from './refused.ts';

/**
 * A change of a circuit as plain data: it can be applied, inverted, saved as JSON and read again.
 * `fields` are set, `without` names the fields that are removed.
 */
export type Edit =
  | PutPart
  | { readonly type: 'remove-part'; readonly id: string }
  | {
      readonly type: 'change-part';
      readonly id: string;
      readonly fields: Fields<Part>;
      readonly without?: readonly Optional<Part>[];
    }
  | PutConnection
  | { readonly type: 'remove-connection'; readonly id: string }
  | {
      readonly type: 'change-connection';
      readonly id: string;
      readonly fields: Fields<Connection>;
      readonly without?: readonly Optional<Connection>[];
    }
  | PutLabel
  /** `list`: the last label takes the list itself with it. */
  | { readonly type: 'remove-label'; readonly id: string; readonly list?: true }
  | {
      readonly type: 'change-label';
      readonly id: string;
      readonly fields: Fields<Label>;
      readonly without?: readonly Optional<Label>[];
    }
  | { readonly type: 'change-circuit'; readonly fields: Fields<Sheet>; readonly without?: readonly Optional<Sheet>[] }
  | All;

/** Put at `index` of its list; those from there on move up. */
export interface PutPart {
  readonly type: 'put-part';
  readonly index: number;
  readonly part: Part;
}
export interface PutConnection {
  readonly type: 'put-connection';
  readonly index: number;
  readonly connection: Connection;
}
export interface PutLabel {
  readonly type: 'put-label';
  readonly index: number;
  readonly label: Label;
}
/** One after another. */
export interface All {
  readonly type: 'all';
  readonly edits: readonly Edit[];
}

type Sheet = Omit<Circuit, 'parts' | 'connections' | 'labels'>;
type Fields<T> = Partial<Omit<T, 'id'>>;
type Optional<T> = {
  [K in keyof T]-?: undefined extends T[K] ? K : Record<string, never> extends Pick<T, K> ? K : never;
}[keyof T];
type Open<T> = { [K in Exclude<keyof T, 'id'>]?: T[K] | undefined };

export const all = (edits: readonly Edit[]): All => ({ type: 'all', edits });

function split<T extends object>(fields: Open<T>): { fields: Fields<T>; without?: readonly Optional<T>[] } {
  const set: Record<string, unknown> = {};
  const without: string[] = [];
  for (const [key, value] of Object.entries(fields)) {
    if (value === undefined) without.push(key);
    else set[key] = value;
  }
  return { fields: set as Fields<T>, ...(without.length > 0 && { without: without as unknown as Optional<T>[] }) };
}

/** A field given as `undefined` is removed. */
export const changePart = (id: string, fields: Open<Part>): Edit => ({
  type: 'change-part',
  id,
  ...split<Part>(fields),
});
export const changeConnection = (id: string, fields: Open<Connection>): Edit => ({
  type: 'change-connection',
  id,
  ...split<Connection>(fields),
});
export const changeLabel = (id: string, fields: Open<Label>): Edit => ({
  type: 'change-label',
  id,
  ...split<Label>(fields),
});
export const changeCircuit = (fields: Open<Sheet>): Edit => ({ type: 'change-circuit', ...split<Sheet>(fields) });

/** Throws `RefusedEdit` where the edit does not fit; the circuit given stays as it is. */
export const applyEdit = (circuit: Circuit, edit: Edit): Circuit => applyBoth(circuit, edit).circuit;

/** The edit that takes `edit` back, given the circuit as it is before `edit`. */
export const invertEdit = (circuit: Circuit, edit: Edit): Edit => applyBoth(circuit, edit).inverse;

/** Both at once, for the cost of one. */
export function applyBoth(circuit: Circuit, edit: Edit): { circuit: Circuit; inverse: Edit } {
  const draft = new Draft(circuit);
  const inverse = perform(draft, edit);
  return { circuit: draft.done(), inverse };
}

/** Does the edit to the draft, and tells what takes it back. */
function perform(draft: Draft, edit: Edit): Edit {
  switch (edit.type) {
    case 'all':
      return all(edit.edits.map((one) => perform(draft, one)).reverse());
    case 'put-part':
      draft.putPart(edit.index, edit.part);
      return { type: 'remove-part', id: edit.part.id };
    case 'remove-part':
      return { type: 'put-part', ...draft.removePart(edit.id) };
    case 'change-part': {
      const index = draft.parts.indexOf(edit.id);
      const before = draft.parts.at(index);
      draft.changePart(index, before, changed(before, edit));
      return changePart(edit.id, former(before, edit));
    }
    case 'put-connection':
      draft.putConnection(edit.index, edit.connection);
      return { type: 'remove-connection', id: edit.connection.id };
    case 'remove-connection': {
      const index = draft.connections.indexOf(edit.id);
      return { type: 'put-connection', index, connection: draft.removeConnection(index) };
    }
    case 'change-connection': {
      const index = draft.connections.indexOf(edit.id);
      const before = draft.connections.at(index);
      draft.changeConnection(index, before, changed(before, edit));
      return changeConnection(edit.id, former(before, edit));
    }
    case 'put-label': {
      const first = draft.labels === undefined;
      checkPoints(edit.label.id, [edit.label.at]);
      draft.beginLabels().put(edit.index, edit.label);
      return { type: 'remove-label', id: edit.label.id, ...(first && { list: true }) };
    }
    case 'remove-label': {
      const labels = labelsOf(draft, edit.id);
      const index = labels.indexOf(edit.id);
      const label = labels.remove(index);
      if (edit.list && labels.items.length === 0) draft.dropLabels();
      return { type: 'put-label', index, label };
    }
    case 'change-label': {
      const labels = labelsOf(draft, edit.id);
      const index = labels.indexOf(edit.id);
      const before = labels.at(index);
      const after = changed(before, edit);
      checkPoints(edit.id, [after.at]);
      labels.change(index, after);
      return changeLabel(edit.id, former(before, edit));
    }
    case 'change-circuit': {
      for (const key of ['parts', 'connections', 'labels']) {
        if (!Object.hasOwn(edit.fields, key)) continue;
        throw new RefusedEdit(
          'circuit',
          `The list "${key}" cannot be changed whole.`,
          'Put, change or remove its members.',
        );
      }
      const before = draft.sheet;
      draft.sheet = changed(before, edit);
      return changeCircuit(former(before, edit));
    }
    default:
      throw new RefusedEdit(
        'edit',
        'This edit is of no known type.',
        'It may come from a newer version of this program.',
      );
  }
}

function labelsOf(draft: Draft, id: string): DraftList<Label> {
  if (draft.labels) return draft.labels;
  throw new RefusedEdit(id, `There is no label "${id}".`, 'It may have been removed before.');
}

interface Change {
  readonly fields: object;
  readonly without?: readonly PropertyKey[];
}

function changed<T extends object>(before: T, change: Change): T {
  const after: T = { ...before, ...change.fields };
  for (const key of change.without ?? []) Reflect.deleteProperty(after, key);
  const fixed = (before as { id?: string }).id;
  if (fixed !== (after as { id?: string }).id)
    throw new RefusedEdit(String(fixed), 'An id cannot be changed.', 'Remove it and put it in again.');
  return after;
}

/** What the touched fields were before. */
function former<T extends object>(before: T, change: Change): { [K in keyof T]?: T[K] | undefined } {
  const was: { [K in keyof T]?: T[K] | undefined } = {};
  for (const key of [...Object.keys(change.fields), ...(change.without ?? [])] as (keyof T)[]) was[key] = before[key];
  return was;
}
