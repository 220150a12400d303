import type { Point } from '../base/points.ts';
import type { Circuit, Connection, Part } from '../circuit/model.ts';
import { hasSheets, saySheet, sheetLookup, sheetNumber, sheetOf, sheetsOf } from '../circuit/sheets.ts';
import { findLines } from '../network/lines.ts';
import { kindOf } from '../parts/catalogue.ts';
import { isReference, REFERENCE_PORT, referenceId, referencePart } from './reference-symbol.ts';
import type { Reference, References } from './references.ts';
import { placeReferences } from './references.ts';
import type { Scene } from './scene.ts';
import { placementOf, drawnKind } from './shapes.ts';
import { placePrimitives } from './turned.ts';
import { nameless } from './nameless.ts';

/** The zone of a sheet that a point lies in, such as `B3`; empty where the sheet has no zones. */
export type ZoneOf = (sheet: string, at: Point) => string;

/** Connection id → the name of its line, as the table has it. */
export function lineNames(circuit: Circuit): (connection: string) => string {
  const { lines } = findLines(circuit, (kind) => kindOf(kind) ?? nameless(kind));
  const names = new Map(lines.flatMap(({ name, connections }) => connections.map((id) => [id, name] as const)));
  return (connection) => names.get(connection) ?? '';
}

/** The references of a circuit whose parts all have their places. `before`: see `placeReferences`. */
const NONE: References = new Map();

export function referencesOf(circuit: Circuit, before?: References): References {
  if (!hasSheets(circuit)) return NONE;
  return placeReferences(circuit, before ? () => '' : lineNames(circuit), before);
}

/**
 * What one sheet shows, as a circuit of its own: its parts, texts and lines. A line to another sheet ends at a stand-in
 * for its reference, and keeps its id. A circuit of one sheet is its own face.
 */
export function faceOf(circuit: Circuit, sheet: string, references: References, zoneOf: ZoneOf): Circuit {
  if (!hasSheets(circuit)) return circuit;
  const stands = [...references.values()].filter((each) => each.sheet === sheet);
  return {
    ...circuit,
    name: `${circuit.name}, ${saySheet(circuit, sheet)}`,
    parts: [
      ...circuit.parts.filter((part) => sheetOf(circuit, part) === sheet),
      ...stands.map((reference) => standIn(reference, sayTarget(circuit, reference, references, zoneOf))),
    ],
    connections: connectionsOn(circuit, sheet),
    ...(circuit.labels && { labels: circuit.labels.filter((label) => sheetOf(circuit, label) === sheet) }),
  };
}

/** `2/B3`: number of the sheet and zone where the line goes on. */
export function sayTarget(circuit: Circuit, { other }: Reference, references: References, zoneOf: ZoneOf): string {
  const there = references.get(other);
  if (!there) return '';
  const zone = zoneOf(there.sheet, there.at);
  return `${sheetNumber(circuit, there.sheet)}${zone === '' ? '' : `/${zone}`}`;
}

const standIns = new Map<string, Part>();
/** Flags of that many ends are kept, so that what did not change is the same object. */
const MOST = 2_000;

function standIn({ id, at, way, name }: Reference, target: string): Part {
  const known = standIns.get(id);
  const { settings } = known ?? {};
  if (
    known?.at?.x === at.x &&
    known.at.y === at.y &&
    settings?.['way'] === way &&
    settings['name'] === name &&
    settings['target'] === target
  )
    return known;
  if (standIns.size >= MOST) standIns.clear();
  const part = referencePart(id, at, { way, name, target });
  standIns.set(id, part);
  return part;
}

interface Shared {
  readonly of: ReadonlyMap<string, string>;
  readonly lists: Map<string, readonly Connection[]>;
}

/** The lists are the same objects while parts only move about on their sheets. */
const shared = new WeakMap<Circuit['connections'], Shared>();

function connectionsOn(circuit: Circuit, sheet: string): readonly Connection[] {
  const of = sheetLookup(circuit);
  const { connections } = circuit;
  let known = shared.get(connections);
  if (!known || circuit.parts.some(({ id }) => known?.of.get(id) !== of(id))) {
    known = { of: new Map(circuit.parts.map(({ id }) => [id, of(id)])), lists: new Map() };
    shared.set(connections, known);
  }
  let list = known.lists.get(sheet);
  if (!list) {
    list = connections.flatMap((connection) => {
      const here = [of(connection.from.part) === sheet, of(connection.to.part) === sheet] as const;
      if (here[0] && here[1]) return [connection];
      return here[0] || here[1] ? [half(connection, here[0] ? 'from' : 'to')] : [];
    });
    known.lists.set(sheet, list);
  }
  return list;
}

const halves = new WeakMap<Connection, Partial<Record<'from' | 'to', Connection>>>();

/** One end of a connection, with the reference in place of the other; the name of its line stands in the flag. */
function half(connection: Connection, end: 'from' | 'to'): Connection {
  const known = halves.get(connection) ?? {};
  const made = known[end] ?? halfOf(connection, end);
  halves.set(connection, { ...known, [end]: made });
  return made;
}

function halfOf(connection: Connection, end: 'from' | 'to'): Connection {
  const { id, from, to, use, size } = connection;
  const flag = { part: referenceId(id, end), port: REFERENCE_PORT };
  return {
    id,
    from: end === 'from' ? from : flag,
    to: end === 'from' ? flag : to,
    ...(use !== undefined && { use }),
    ...(size !== undefined && { size }),
  };
}

/** The same drawing with its references named for other zones, such as those of a sheet of paper. */
export function withZones(scene: Scene, circuit: Circuit, references: References, zoneOf: ZoneOf): Scene {
  return {
    ...scene,
    parts: scene.parts.map((drawn) => {
      const reference = isReference(drawn) ? references.get(drawn.id) : undefined;
      if (!reference) return drawn;
      const target = sayTarget(circuit, reference, references, zoneOf);
      const part = referencePart(drawn.id, reference.at, { ...reference, target });
      return { ...drawn, primitives: placePrimitives(drawnKind(part)?.draw(part, {}) ?? [], placementOf(part)) };
    }),
  };
}

/** Every sheet with something on it, or with nothing: ids in their order. */
export const sheetIds = (circuit: Circuit): string[] => sheetsOf(circuit).map(({ id }) => id);
