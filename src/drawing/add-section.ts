import { union } from '../base/points.ts';
import { connect, copyOut, isConnected, paste } from '../circuit/build.ts';
import { all, applyEdit, changeConnection } from '../circuit/edit.ts';
import type { Edit } from '../circuit/edit.ts';
import type { Circuit, Part, PortRef } from '../circuit/model.ts';
import { RefusedEdit } from '../circuit/refused.ts';
import { sheetLookup } from '../circuit/sheets.ts';
import { namingSettings } from '../parts/naming.ts';
import { inflate, overlaps } from './geometry.ts';
import { meetings, reach } from './neighbours.ts';
import { partReach, portSpecs } from './shapes.ts';

export interface AddedSection {
  readonly edit: Edit;
  readonly parts: readonly string[];
  /** The new valve. */
  readonly valve: string;
}

const VALVE = 'directional-valve';
/** Where a section ends: what it shares with others. */
const SHARED = new Set([
  VALVE,
  'tank',
  'fixed-pump',
  'compensated-pump',
  'hand-pump',
  'relief-valve',
  'pilot-relief-valve',
]);
/** Modules between two sections. */
const SPACE = 5;

/**
 * One more section beside a valve: the valve again with all that hangs on its upper working ports, joined to the lines
 * that the first one stands on. Where the first hands its oil on (C2, or T to the P of another valve), the new
 * one comes in between; its other ports stand on the same lines. Every part needs its place.
 */
export function appendSection(circuit: Circuit, valveId: string): AddedSection {
  const valve = circuit.parts.find(({ id }) => id === valveId);
  if (valve?.kind !== VALVE)
    throw new RefusedEdit(valveId, 'A section begins at a directional valve.', 'Select the valve of a section.');
  const upper = upperPorts(valve);
  const kinds = new Map(circuit.parts.map(({ id, kind }) => [id, kind]));
  const isShared = (id: string): boolean => SHARED.has(kinds.get(id) ?? '');
  const sheet = sheetLookup(circuit);
  const own = sheet(valveId);
  const above = reach(meetings(circuit), valveId, (port) => upper.has(port), isShared).filter(
    ({ part }) => !isShared(part) && sheet(part) === own,
  );
  const ids = [valveId, ...above.map(({ part }) => part)];
  const copied = copyOut(circuit, ids);
  // Named lines and coils of the first are its own.
  const fragment = {
    ...copied,
    connections: copied.connections.filter(
      ({ from, to }) => within(from, valveId, upper) && within(to, valveId, upper),
    ),
  };
  const box = union(fragment.parts.map(partReach)) ?? { x: 0, y: 0, width: 0, height: 0 };
  const others = circuit.parts.filter(({ id }) => sheet(id) === own).map(partReach);
  const step = Math.ceil(box.width + SPACE);
  let dx = step;
  while (others.some((other) => overlaps(other, inflate({ ...box, x: box.x + dx }, 1)))) dx += 2;
  const pasted = paste(circuit, fragment, dx, 0, namingSettings, own);
  const added = pasted.parts[fragment.parts.findIndex(({ id }) => id === valveId)] as string;
  const edits: Edit[] = [pasted.edit];
  let now = applyEdit(circuit, pasted.edit);
  const run = (edit: Edit): void => {
    edits.push(edit);
    now = applyEdit(now, edit);
  };
  const ports = new Set(portSpecs(valve).map(({ id }) => id));
  const port = (part: string, id: string): PortRef => ({ part, port: id });
  const join = (from: PortRef, to: PortRef): void => {
    if (!isConnected(now, from, to)) run(connect(now, from, to));
  };
  /** The line that goes on from the first section goes on from the new one, which comes in between. */
  const between = (out: string, back: string): void => {
    for (const { id, from, to } of now.connections) {
      if (same(from, valveId, out)) run(changeConnection(id, { from: port(added, out), bends: undefined }));
      else if (same(to, valveId, out)) run(changeConnection(id, { to: port(added, out), bends: undefined }));
    }
    join(port(valveId, out), port(added, back));
  };
  const inSeries = !ports.has('C2') && ports.has('P') && handsOn(circuit, kinds, valveId);
  if (ports.has('C1') && ports.has('C2')) between('C2', 'C1');
  if (inSeries) between('T', 'P');
  for (const id of ports) {
    if (upper.has(id) || id === 'C1' || id === 'C2' || (inSeries && (id === 'P' || id === 'T'))) continue;
    const isJoined = circuit.connections.some(({ from, to }) => same(from, valveId, id) || same(to, valveId, id));
    if (isJoined) join(port(valveId, id), port(added, id));
  }
  return { edit: all(edits), parts: pasted.parts, valve: added };
}

const same = (ref: PortRef, part: string, port: string): boolean => ref.part === part && ref.port === port;

/** A to the actuators: the working ports on the upper edge, the carry-over apart. */
const upperPorts = (valve: Part): ReadonlySet<string> =>
  new Set(
    (valve.valve?.ports ?? []).filter(({ id, side }) => side === 'top' && !/^(C\d|P|T)$/.test(id)).map(({ id }) => id),
  );

const within = (ref: PortRef, valve: string, upper: ReadonlySet<string>): boolean =>
  ref.part !== valve || upper.has(ref.port);

/** Its T leads to the P of another valve, or its P comes from the T of one. */
function handsOn(circuit: Circuit, kinds: ReadonlyMap<string, string>, valve: string): boolean {
  const leads = (from: string, to: string): boolean =>
    (meetings(circuit).get(valve) ?? []).some(
      ({ own, other }) => own === from && other.port === to && kinds.get(other.part) === VALVE,
    );
  return leads('T', 'P') || leads('P', 'T');
}
