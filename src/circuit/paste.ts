import { isCoilTag } from '../base/coil-names.ts';
import { coilTags } from './coil-tags.ts';
import { all, type Edit } from './edit.ts';
import { omit } from './fields.ts';
import {
  CONNECTION_PREFIX,
  connectionNames,
  LABEL_PREFIX,
  labelNames,
  names,
  partNames,
  stem,
  type Names,
} from './ids.ts';
import { labelOf, type Circuit, type Connection, type Label, type Part, type ValveData } from './model.ts';
import { partsOf } from './place.ts';
import { RefusedEdit } from './refused.ts';
import { onSheet } from './sheets.ts';

/**
 * Some parts of a circuit with the connections between them: itself a circuit, so it can be written as a file. They stand
 * on one sheet then.
 */
export function copyOut(circuit: Circuit, ids: Iterable<string>, labelIds: Iterable<string> = []): Circuit {
  const chosen = new Set(ids);
  const chosenLabels = new Set(labelIds);
  const labels = (circuit.labels ?? [])
    .filter((label) => chosenLabels.has(label.id))
    .map((label) => omit(label, 'sheet'));
  return {
    name: circuit.name,
    parts: partsOf(circuit, chosen).map((part) => (part.sheet === undefined ? part : omit(part, 'sheet'))),
    connections: circuit.connections.filter(({ from, to }) => chosen.has(from.part) && chosen.has(to.part)),
    ...(labels.length > 0 && { labels }),
  };
}

export interface Pasted {
  readonly edit: Edit;
  /** Ids of the new parts and labels, in the order of the fragment. */
  readonly parts: readonly string[];
  readonly labels: readonly string[];
}

/** Settings of a part that name another part by its id; kinds of parts are not known here. */
export type NamingSettings = (part: Part) => readonly string[];

/**
 * Add a fragment, moved by dx, dy modules, under fresh ids, labels, line names and coil tags. A setting that names a part of the
 * fragment names its copy afterwards; any other stays as it is. `sheet`: where it goes, the first when absent.
 */
export function paste(
  circuit: Circuit,
  fragment: Circuit,
  dx: number,
  dy: number,
  naming: NamingSettings,
  sheet?: string,
): Pasted {
  const move = <P extends { x: number; y: number }>(p: P) => ({ x: p.x + dx, y: p.y + dy });
  const standing = sheet === undefined ? {} : onSheet(circuit, sheet);
  const partName = partNames(circuit);
  const connectionName = connectionNames(circuit);
  const labelName = labelNames(circuit);
  const lineName = names(circuit.connections.flatMap(({ name }) => name ?? []));
  const tags = names(coilTags(circuit));
  const newIds = new Map(fragment.parts.map((part) => [part.id, partName.fresh(stem(part.id))]));
  const lines = new Map<string, string>();
  const renamed = (name: string): string => {
    const fresh = lines.get(name) ?? lineName.like(name);
    lines.set(name, fresh);
    return fresh;
  };
  const remap = (ref: { part: string; port: string }) => {
    const part = newIds.get(ref.part);
    if (part === undefined)
      throw new RefusedEdit(
        ref.part,
        `What is pasted has no part "${ref.part}".`,
        'Copy both ends of each connection.',
      );
    return { part, port: ref.port };
  };
  const parts = fragment.parts.map((part): Part => {
    const { label, at, ...rest } = omit(part, 'sheet');
    const { settings, valve } = part;
    const own = naming(part).flatMap((id): [string, string][] => {
      const named = settings?.[id];
      const copy = typeof named === 'string' ? newIds.get(named) : undefined;
      return copy === undefined ? [] : [[id, copy]];
    });
    return {
      ...rest,
      ...(valve?.coils && { valve: { ...valve, coils: freshTags(valve.coils, tags) } }),
      ...(own.length > 0 && { settings: { ...settings, ...Object.fromEntries(own) } }),
      id: newIds.get(part.id) as string,
      ...standing,
      ...(label !== undefined && { label: partName.like(label) }),
      ...(at && { at: move(at) }),
    };
  });
  const connections = fragment.connections.map((connection): Connection => {
    const { name, bends, ...rest } = connection;
    return {
      ...rest,
      id: connectionName.fresh(CONNECTION_PREFIX),
      from: remap(connection.from),
      to: remap(connection.to),
      ...(name !== undefined && { name: renamed(name) }),
      ...(bends && { bends: bends.map(move) }),
    };
  });
  const labels = (fragment.labels ?? []).map((label): Label => ({
    ...omit(label, 'sheet'),
    id: labelName.fresh(LABEL_PREFIX),
    ...standing,
    at: move(label.at),
  }));
  const edit = all([
    ...parts.map((part, i): Edit => ({ type: 'put-part', index: circuit.parts.length + i, part })),
    ...connections.map((connection, i): Edit => ({
      type: 'put-connection',
      index: circuit.connections.length + i,
      connection,
    })),
    ...labels.map((label, i): Edit => ({ type: 'put-label', index: (circuit.labels ?? []).length + i, label })),
  ]);
  return { edit, parts: parts.map((part) => part.id), labels: labels.map((label) => label.id) };
}

/** `Y1` → `Y2` where `Y1` is taken; a letter stays. */
const freshTags = (coils: NonNullable<ValveData['coils']>, { like, fresh }: Names): NonNullable<ValveData['coils']> =>
  coils.map((coil) => {
    if (!isCoilTag(coil.name)) return coil;
    const own = like(coil.name);
    return { ...coil, name: own === coil.name ? own : fresh(stem(coil.name)) };
  });

export const duplicate = (
  circuit: Circuit,
  ids: Iterable<string>,
  dx: number,
  dy: number,
  naming: NamingSettings,
  labelIds: Iterable<string> = [],
  sheet?: string,
): Pasted => paste(circuit, copyOut(circuit, ids, labelIds), dx, dy, naming, sheet);

/** Whether a shown name is free for this part. */
export const isFreeLabel = (circuit: Circuit, id: string, label: string): boolean =>
  !circuit.parts.some((part) => part.id !== id && labelOf(part) === label);
