import type { Point } from '../base/points.ts';
import { omit } from './fields.ts';
import { isId, LIMITS } from './limits.ts';
import { labelOf, sayPort, type Circuit, type Connection, type Label, type Part } from './model.ts';
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
  if (edit.type === 'all') {
    const inverses: Edit[] = [];
    let now = circuit;
    for (const one of edit.edits) {
      const done = applyBoth(now, one);
      now = done.circuit;
      inverses.push(done.inverse);
    }
    return { circuit: now, inverse: all(inverses.reverse()) };
  }
  switch (edit.type) {
    case 'put-part': {
      const { part, index } = edit;
      checkNew('part', circuit.parts, part.id);
      checkShown(circuit, part);
      checkPoints(part.id, [part.at]);
      checkRoom('parts', circuit.parts);
      return {
        circuit: { ...circuit, parts: inserted(circuit.parts, index, part) },
        inverse: { type: 'remove-part', id: part.id },
      };
    }
    case 'remove-part': {
      const index = indexOf('part', circuit.parts, edit.id);
      const held = circuit.connections.find((c) => c.from.part === edit.id || c.to.part === edit.id);
      if (held)
        throw new RefusedEdit(
          edit.id,
          `The connection "${held.id}" still ends at this part.`,
          'Remove its connections first.',
        );
      const part = circuit.parts[index] as Part;
      return {
        circuit: { ...circuit, parts: circuit.parts.toSpliced(index, 1) },
        inverse: { type: 'put-part', index, part },
      };
    }
    case 'change-part': {
      const index = indexOf('part', circuit.parts, edit.id);
      const before = circuit.parts[index] as Part;
      const after = changed(before, edit);
      if (labelOf(after) !== labelOf(before)) checkShown(circuit, after);
      checkPoints(edit.id, [edit.fields.at]);
      return {
        circuit: { ...circuit, parts: circuit.parts.with(index, after) },
        inverse: changePart(edit.id, former(before, edit)),
      };
    }
    case 'put-connection': {
      const { connection, index } = edit;
      checkNew('connection', circuit.connections, connection.id);
      checkEnds(circuit, connection);
      checkPoints(connection.id, connection.bends);
      checkRoom('connections', circuit.connections);
      return {
        circuit: { ...circuit, connections: inserted(circuit.connections, index, connection) },
        inverse: { type: 'remove-connection', id: connection.id },
      };
    }
    case 'remove-connection': {
      const index = indexOf('connection', circuit.connections, edit.id);
      const connection = circuit.connections[index] as Connection;
      return {
        circuit: { ...circuit, connections: circuit.connections.toSpliced(index, 1) },
        inverse: { type: 'put-connection', index, connection },
      };
    }
    case 'change-connection': {
      const index = indexOf('connection', circuit.connections, edit.id);
      const before = circuit.connections[index] as Connection;
      const after = changed(before, edit);
      if (after.from !== before.from || after.to !== before.to) checkEnds(circuit, after);
      checkPoints(edit.id, edit.fields.bends);
      return {
        circuit: { ...circuit, connections: circuit.connections.with(index, after) },
        inverse: changeConnection(edit.id, former(before, edit)),
      };
    }
    case 'put-label': {
      const { label, index } = edit;
      checkNew('label', circuit.labels ?? [], label.id);
      checkPoints(label.id, [label.at]);
      checkRoom('labels', circuit.labels ?? []);
      const inverse: Edit = { type: 'remove-label', id: label.id, ...(circuit.labels === undefined && { list: true }) };
      return { circuit: { ...circuit, labels: inserted(circuit.labels ?? [], index, label) }, inverse };
    }
    case 'remove-label': {
      const labels = circuit.labels ?? [];
      const index = indexOf('label', labels, edit.id);
      const inverse: Edit = { type: 'put-label', index, label: labels[index] as Label };
      if (!edit.list || labels.length > 1)
        return { circuit: { ...circuit, labels: labels.toSpliced(index, 1) }, inverse };
      return { circuit: omit(circuit, 'labels'), inverse };
    }
    case 'change-label': {
      const labels = circuit.labels ?? [];
      const index = indexOf('label', labels, edit.id);
      const before = labels[index] as Label;
      checkPoints(edit.id, [edit.fields.at]);
      return {
        circuit: { ...circuit, labels: labels.with(index, changed(before, edit)) },
        inverse: changeLabel(edit.id, former(before, edit)),
      };
    }
    case 'change-circuit': {
      for (const key of ['parts', 'connections', 'labels']) {
        if (Object.hasOwn(edit.fields, key))
          throw new RefusedEdit(
            'circuit',
            `The list "${key}" cannot be changed whole.`,
            'Put, change or remove its members.',
          );
      }
      return { circuit: changed(circuit, edit), inverse: changeCircuit(former<Circuit>(circuit, edit)) };
    }
  }
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

function inserted<T extends { readonly id: string }>(list: readonly T[], index: number, item: T): readonly T[] {
  if (!Number.isInteger(index) || index < 0 || index > list.length) {
    throw new RefusedEdit(
      item.id,
      `There is no place ${index} in a list of ${list.length}.`,
      'Put it at the end or before one that is there.',
    );
  }
  return list.toSpliced(index, 0, item);
}

function indexOf(noun: string, list: readonly { readonly id: string }[], id: string): number {
  const index = list.findIndex((item) => item.id === id);
  if (index < 0) throw new RefusedEdit(id, `There is no ${noun} "${id}".`, 'It may have been removed before.');
  return index;
}

function checkNew(noun: string, list: readonly { readonly id: string }[], id: string): void {
  if (!isId(id)) throw new RefusedEdit(id, `"${id}" is no ${noun} id.`, 'Use letters, digits, - and _ only.');
  if (list.some((item) => item.id === id))
    throw new RefusedEdit(id, `There is a ${noun} "${id}" already.`, 'Give it another id.');
}

function checkShown(circuit: Circuit, part: Part): void {
  const shown = labelOf(part);
  const other = circuit.parts.find((p) => p.id !== part.id && labelOf(p) === shown);
  if (other)
    throw new RefusedEdit(part.id, `The part ${other.id} is shown as "${shown}" already.`, 'Choose another label.');
}

function checkEnds(circuit: Circuit, { id, from, to }: Connection): void {
  for (const end of [from, to]) {
    if (!circuit.parts.some((part) => part.id === end.part)) {
      throw new RefusedEdit(id, `There is no part "${end.part}".`, 'Connect ports of parts that are there.');
    }
  }
  if (from.part === to.part && from.port === to.port) {
    throw new RefusedEdit(id, `The connection would go from ${sayPort(from)} to itself.`, 'Choose another port.');
  }
}

/** What is refused here is what could not be read from a file again. */
function checkPoints(id: string, points: readonly (Point | undefined)[] = []): void {
  const fits = (n: number): boolean => Math.abs(n) <= LIMITS.coordinate;
  if (points.every((p) => p === undefined || (fits(p.x) && fits(p.y)))) return;
  throw new RefusedEdit(id, 'This place lies off the sheet.', `Stay within ${LIMITS.coordinate} modules.`);
}

function checkRoom(field: 'parts' | 'connections' | 'labels', list: readonly unknown[]): void {
  if (list.length < LIMITS[field]) return;
  throw new RefusedEdit(
    'circuit',
    `The circuit has ${list.length} ${field}, and a file holds no more.`,
    'Start a second circuit.',
  );
}
