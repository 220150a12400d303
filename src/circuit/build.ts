import type { Point } from '../base/points.ts';
import {
  all,
  applyEdit,
  changeCircuit,
  changeConnection,
  changePart,
  type Edit,
  type PutConnection,
  type PutLabel,
  type PutPart,
} from './edit.ts';
import { omit } from './fields.ts';
import { CONNECTION_PREFIX, connectionNames, LABEL_PREFIX, labelNames, partNames } from './ids.ts';
import { isOneLine } from './limits.ts';
import { lineOf, samePort } from './lines.ts';
import {
  sayPort,
  type Circuit,
  type Connection,
  type Part,
  type PortRef,
  type Setting,
  type ValveData,
} from './model.ts';
import { isFreeLabel } from './paste.ts';
import { partOf, partsOf } from './place.ts';
import { RefusedEdit } from './refused.ts';
import { crosses, onSheet, sheetLookup } from './sheets.ts';

export { copyOut, duplicate, isFreeLabel, paste, type Pasted } from './paste.ts';
export { flipParts, moveLabel, movePart, moveParts, turnParts, type Places } from './place.ts';

// Every builder returns an edit that fits the circuit it was given, or throws `RefusedEdit`.

/** A new part at the end of the list; its id is the prefix and the next free number. */
export function placePart(circuit: Circuit, prefix: string, part: Omit<Part, 'id'>): PutPart {
  if (part.label !== undefined) checkLabel(circuit, '', part.label);
  return { type: 'put-part', index: circuit.parts.length, part: { id: partNames(circuit).fresh(prefix), ...part } };
}

export function placeLabel(circuit: Circuit, at: Point, text: string, sheet?: string): PutLabel {
  checkText('label', text);
  return {
    type: 'put-label',
    index: (circuit.labels ?? []).length,
    label: {
      id: labelNames(circuit).fresh(LABEL_PREFIX),
      ...(sheet !== undefined && onSheet(circuit, sheet)),
      at,
      text,
    },
  };
}

export interface RemoveOptions {
  /** Join what a removed part stood between, if it stood between just two connections. */
  readonly heal?: boolean;
}

/** Remove parts with all their connections. */
export function removeParts(circuit: Circuit, ids: Iterable<string>, options: RemoveOptions = {}): Edit {
  const chosen = new Set(ids);
  const parts = partsOf(circuit, chosen);
  if (!options.heal) {
    const held = circuit.connections.filter(({ from, to }) => chosen.has(from.part) || chosen.has(to.part));
    return all([
      ...held.map((c): Edit => ({ type: 'remove-connection', id: c.id })),
      ...parts.map(({ id }): Edit => ({ type: 'remove-part', id })),
    ]);
  }
  const edits: Edit[] = [];
  let now = circuit;
  for (const { id } of parts) {
    const edit = removeAndHeal(now, id);
    now = applyEdit(now, edit);
    edits.push(...edit.edits);
  }
  return all(edits);
}

function removeAndHeal(circuit: Circuit, id: string): { readonly type: 'all'; readonly edits: readonly Edit[] } {
  const part = partOf(circuit, id);
  const own = circuit.connections.filter(({ from, to }) => from.part === id || to.part === id);
  const removals: Edit[] = [
    ...own.map((c): Edit => ({ type: 'remove-connection', id: c.id })),
    { type: 'remove-part', id },
  ];
  const bridge = bridgeOver(circuit, part, own);
  if (bridge === undefined) return { type: 'all', edits: removals };
  const index = circuit.connections.findIndex((c) => c.id === bridge.id);
  return { type: 'all', edits: [...removals, { type: 'put-connection', index, connection: bridge }] };
}

/** The connection that replaces a part and its two connections; it goes on as the first of them. */
function bridgeOver(circuit: Circuit, part: Part, own: readonly Connection[]): Connection | undefined {
  const [first, second] = own;
  if (own.length !== 2 || first === undefined || second === undefined) return undefined;
  const isOut = first.to.part === part.id;
  const near = isOut ? first.to : first.from;
  const secondIsIn = second.from.part === part.id;
  const other = secondIsIn ? second.from : second.to;
  // Two connections on one port make a branch there, unless the port is a junction's only one.
  if (samePort(near, other) && part.kind !== 'junction') return undefined;
  const from = isOut ? first.from : first.to;
  const to = secondIsIn ? second.to : second.from;
  if (from.part === part.id || to.part === part.id || samePort(from, to)) return undefined;
  if (isConnected(circuit, from, to)) return undefined;
  const before = isOut ? (first.bends ?? []) : (first.bends ?? []).toReversed();
  const after = secondIsIn ? (second.bends ?? []) : (second.bends ?? []).toReversed();
  const bends = crosses(sheetLookup(circuit), { from, to }) ? [] : [...before, ...after];
  const name = first.name ?? second.name;
  return { ...omit(first, 'bends'), from, to, ...(name !== undefined && { name }), ...(bends.length > 0 && { bends }) };
}

export const isConnected = (circuit: Circuit, a: PortRef, b: PortRef): boolean =>
  circuit.connections.some(
    ({ from, to }) => (samePort(from, a) && samePort(to, b)) || (samePort(from, b) && samePort(to, a)),
  );

export const removeConnections = (ids: Iterable<string>): Edit =>
  all([...ids].map((id): Edit => ({ type: 'remove-connection', id })));
export const removeLabels = (ids: Iterable<string>): Edit =>
  all([...ids].map((id): Edit => ({ type: 'remove-label', id })));

/** Connect two ports. Refuses a port with itself, and two that are connected to each other already. */
export function connect(
  circuit: Circuit,
  from: PortRef,
  to: PortRef,
  more: Pick<Connection, 'name' | 'use' | 'bends'> = {},
): PutConnection {
  for (const end of [from, to]) partOf(circuit, end.part);
  if (samePort(from, to))
    throw new RefusedEdit(sayPort(from), 'A port cannot be connected to itself.', 'End at another port.');
  if (isConnected(circuit, from, to))
    throw new RefusedEdit(sayPort(from), `It is connected to ${sayPort(to)} already.`, 'End at another port.');
  if (more.name !== undefined) checkText('name', more.name);
  const id = connectionNames(circuit).fresh(CONNECTION_PREFIX);
  return { type: 'put-connection', index: circuit.connections.length, connection: { id, from, to, ...more } };
}

export interface TeeOptions {
  /** How many of the bends lie before the point; found from the places of the parts if absent. */
  readonly bendsBefore?: number;
  readonly use?: NonNullable<Connection['use']>;
  readonly bends?: readonly Point[];
  /** Which sheet the junction stands on, for a connection between two; else, and by default, that of its first end. */
  readonly sheet?: string;
}

/**
 * Connect a port to an existing connection: a junction goes in at `at`, the old connection ends there
 * keeping its id and name, a new one goes on to its far end, and a third comes from the port.
 */
export function connectToConnection(
  circuit: Circuit,
  from: PortRef,
  connectionId: string,
  at: Point,
  options: TeeOptions = {},
): Edit {
  const old = connectionOf(circuit, connectionId);
  partOf(circuit, from.part);
  if (samePort(from, old.from) || samePort(from, old.to)) {
    throw new RefusedEdit(sayPort(from), 'This port is an end of that connection already.', 'Start from another port.');
  }
  const bends = old.bends ?? [];
  const cut = options.bendsBefore ?? bendsBefore(circuit, old, at);
  const [before, after] = [bends.slice(0, cut), bends.slice(cut)];
  const of = sheetLookup(circuit);
  const sheet = options.sheet !== undefined && crosses(of, old) ? options.sheet : of(old.from.part);
  const junction: Part = { id: partNames(circuit).fresh('J'), kind: 'junction', at, ...onSheet(circuit, sheet) };
  const middle: PortRef = { part: junction.id, port: 'J' };
  const ids = connectionNames(circuit);
  const next = circuit.connections.findIndex((c) => c.id === old.id) + 1;
  const onward: Connection = {
    id: ids.fresh(CONNECTION_PREFIX),
    from: middle,
    to: old.to,
    ...(old.use !== undefined && { use: old.use }),
    ...(after.length > 0 && { bends: after }),
  };
  const branch: Connection = {
    id: ids.fresh(CONNECTION_PREFIX),
    from,
    to: middle,
    ...(options.use !== undefined && { use: options.use }),
    ...(options.bends !== undefined && { bends: options.bends }),
  };
  return all([
    { type: 'put-part', index: circuit.parts.length, part: junction },
    changeConnection(old.id, { to: middle, ...(old.bends && { bends: before.length > 0 ? before : undefined }) }),
    { type: 'put-connection', index: next, connection: onward },
    { type: 'put-connection', index: circuit.connections.length + 1, connection: branch },
  ]);
}

/** On which stretch between bends a point lies; the outer stretches are taken to the middles of the parts. */
export function bendsBefore(circuit: Circuit, connection: Connection, at: Point): number {
  const bends = connection.bends ?? [];
  const start = partOf(circuit, connection.from.part).at ?? bends[0] ?? at;
  const end = partOf(circuit, connection.to.part).at ?? bends.at(-1) ?? at;
  const route = [start, ...bends, end];
  let best = 0;
  let least = Infinity;
  for (let i = 0; i + 1 < route.length; i++) {
    const away = distance(at, route[i] as Point, route[i + 1] as Point);
    if (away < least) [best, least] = [i, away];
  }
  return best;
}

function distance(p: Point, a: Point, b: Point): number {
  const [dx, dy] = [b.x - a.x, b.y - a.y];
  const length = dx * dx + dy * dy;
  const along = length === 0 ? 0 : Math.min(1, Math.max(0, ((p.x - a.x) * dx + (p.y - a.y) * dy) / length));
  return Math.hypot(p.x - a.x - along * dx, p.y - a.y - along * dy);
}

/** An empty label, or one that equals the id, takes the label away. */
export function renamePart(circuit: Circuit, id: string, label: string | undefined): Edit {
  const wanted = label?.trim() ?? '';
  partOf(circuit, id);
  checkLabel(circuit, id, wanted === '' ? id : wanted);
  return changePart(id, { label: wanted === '' || wanted === id ? undefined : wanted });
}

/** Name the line that a connection belongs to; an empty name takes it away. One connection of the line carries it. */
export function renameLine(circuit: Circuit, connectionId: string, name: string | undefined): Edit {
  const wanted = name?.trim() ?? '';
  connectionOf(circuit, connectionId);
  checkText('name', wanted);
  const line = lineOf(circuit, connectionId);
  const other = circuit.connections.find((c) => c.name === wanted && !line.has(c.id));
  if (wanted !== '' && other)
    throw new RefusedEdit(connectionId, `Another line is called "${wanted}" already.`, 'Choose another name.');
  const members = circuit.connections.filter((c) => line.has(c.id));
  const carrier = members.find((c) => c.name !== undefined)?.id ?? connectionId;
  const edits: Edit[] = [];
  for (const { id, name: had } of members) {
    const has = id === carrier && wanted !== '' ? wanted : undefined;
    if (has !== had) edits.push(changeConnection(id, { name: has }));
  }
  return all(edits);
}

/** `undefined` takes the setting back to its default. */
export function setSetting(circuit: Circuit, partId: string, settingId: string, value: Setting | undefined): Edit {
  const { settings = {} } = partOf(circuit, partId);
  if (typeof value === 'string') checkText(settingId, value);
  if (typeof value === 'number' && !Number.isFinite(value))
    throw new RefusedEdit(settingId, 'This is not a finite number.', 'Enter a number.');
  const kept = value === undefined ? omit(settings, settingId) : { ...settings, [settingId]: value };
  return changePart(partId, { settings: Object.keys(kept).length === 0 ? undefined : kept });
}

export function setValve(circuit: Circuit, partId: string, valve: ValveData | undefined): Edit {
  partOf(circuit, partId);
  return changePart(partId, { valve });
}

export function renameCircuit(name: string): Edit {
  checkText('name', name);
  return changeCircuit({ name });
}

function connectionOf(circuit: Circuit, id: string): Connection {
  const connection = circuit.connections.find((c) => c.id === id);
  if (connection === undefined)
    throw new RefusedEdit(id, `There is no connection "${id}".`, 'It may have been removed before.');
  return connection;
}

function checkText(where: string, text: string): void {
  if (!isOneLine(text))
    throw new RefusedEdit(
      where,
      'This text is longer than 200 characters or holds a control character.',
      'Shorten it to one line.',
    );
}

function checkLabel(circuit: Circuit, id: string, label: string): void {
  checkText('label', label);
  if (!isFreeLabel(circuit, id, label))
    throw new RefusedEdit(id || 'label', `Another part is shown as "${label}" already.`, 'Choose another label.');
}
