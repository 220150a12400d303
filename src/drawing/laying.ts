import type { Box, Point } from '../base/points.ts';
import type { Circuit, Connection, Part } from '../circuit/model.ts';
import type { Routes } from './geometry.ts';
import { boxOfPoints } from './geometry.ts';
import { partLetters } from './letters.ts';
import { lineNumbers } from './lines.ts';
import { Near } from './near.ts';
import { lay, layingOrder, routeWith, routingSheet } from './routing.ts';
import { partReach, placedPorts } from './shapes.ts';

/** All lines of a circuit as laid, with how far each one had to look for its way. */
export interface Laying {
  readonly circuit: Circuit;
  /** Those of `routeAll`; in the circuit's order. */
  readonly routes: Routes;
  readonly looked: ReadonlyMap<string, Box | undefined>;
}

/**
 * Lays the lines of a circuit, with the very result of `routeAll`, but searching only those whose surroundings differ
 * from how they were `before`: where a part stood or stands that moved, came or went, or a line that runs elsewhere now.
 * Hands over what is still to be searched after each search, so that the work can be spread over frames; returns the
 * laying at its end.
 */
export function* laying(circuit: Circuit, before?: Laying): Generator<void, Laying> {
  const sheet = routingSheet(circuit);
  const fresh = before && comparable(before.circuit, circuit) ? before : undefined;
  const { changed, anew } = fresh ? differences(fresh, circuit) : { changed: new Near<Box>(), anew: undefined };
  const note = (points: readonly Point[] | undefined): void => {
    for (const box of stretches(points ?? [])) changed.add(box, box);
  };
  const routes = new Map<string, readonly Point[]>();
  const looked = new Map<string, Box | undefined>();
  for (const connection of layingOrder(sheet, circuit.connections)) {
    const { id } = connection;
    const was = fresh?.routes.get(id);
    const saw = fresh?.looked.get(id);
    const stays = was && saw && anew && !anew.has(id) && changed.touching(saw).length === 0;
    if (stays) {
      routes.set(id, was);
      looked.set(id, saw);
    } else {
      const found = routeWith(sheet, connection);
      const same = was !== undefined && samePoints(was, found.points);
      routes.set(id, same ? was : found.points);
      looked.set(id, found.looked);
      if (fresh && !same) {
        note(was);
        note(found.points);
      }
      yield;
    }
    lay(sheet, id, routes.get(id) ?? []);
  }
  return {
    circuit,
    routes: new Map(circuit.connections.map(({ id }) => [id, routes.get(id) ?? []])),
    looked,
  };
}

/** Lays all at once. */
export function layAll(circuit: Circuit, before?: Laying): Laying {
  const work = laying(circuit, before);
  for (;;) {
    const { done, value } = work.next();
    if (done) return value;
  }
}

/** Lines of equal length are laid in the order of the list, so what both have must stand in the same order. */
function comparable(before: Circuit, circuit: Circuit): boolean {
  const places = new Map(before.connections.map(({ id }, i) => [id, i]));
  let last = -1;
  for (const { id } of circuit.connections) {
    const place = places.get(id);
    if (place === undefined) continue;
    if (place < last) return false;
    last = place;
  }
  return true;
}

/** Where the sheet differs before any line is laid, and the lines that are searched whatever their surroundings. */
function differences(before: Laying, circuit: Circuit): { readonly changed: Near<Box>; readonly anew: Set<string> } {
  const changed = new Near<Box>();
  const anew = new Set<string>();
  const moved = new Set<string>();
  const stood = new Map(before.circuit.parts.map((part) => [part.id, part]));
  const stands = new Map(circuit.parts.map((part) => [part.id, part]));
  for (const id of new Set([...stood.keys(), ...stands.keys()])) {
    const [was, now] = [stood.get(id), stands.get(id)];
    if (was === now || (was && now && shapeOf(was) === shapeOf(now))) continue;
    moved.add(id);
    for (const part of [was, now])
      for (const box of part ? [partReach(part), ...partLetters(part)] : []) changed.add(box, box);
  }
  const known = new Map(before.circuit.connections.map((connection) => [connection.id, connection]));
  const mixed = mixedLines(before.circuit, circuit);
  for (const connection of circuit.connections) {
    const was = known.get(connection.id);
    known.delete(connection.id);
    const ends = [connection.from.part, connection.to.part];
    if (!was || !sameRun(was, connection) || mixed.has(connection.id) || ends.some((part) => moved.has(part)))
      anew.add(connection.id);
  }
  // What they ran along may be run along now, by lines laid before them too.
  for (const id of [...anew, ...known.keys()])
    for (const box of stretches(before.routes.get(id) ?? [])) changed.add(box, box);
  return { changed, anew };
}

/** All of a part that routes reckon with. */
const shapes = new WeakMap<Part, string>();
function shapeOf(part: Part): string {
  let shape = shapes.get(part);
  if (shape === undefined) {
    const ports = placedPorts(part).map(({ ref, at, side, role }) => [ref.port, at.x, at.y, side, role]);
    shapes.set(part, (shape = JSON.stringify([partReach(part), partLetters(part), ports, part.at])));
  }
  return shape;
}

const sameRun = (a: Connection, b: Connection): boolean =>
  a.from.part === b.from.part &&
  a.from.port === b.from.port &&
  a.to.part === b.to.part &&
  a.to.port === b.to.port &&
  (a.bends === b.bends || JSON.stringify(a.bends ?? []) === JSON.stringify(b.bends ?? []));

/** Connections of lines that grew together or fell apart: they follow one another now, or keep apart. */
function mixedLines(before: Circuit, circuit: Circuit): Set<string> {
  const [old, now] = [lineNumbers(before), lineNumbers(circuit)];
  const [there, back] = [new Map<number, number>(), new Map<number, number>()];
  const [mixedOld, mixedNow] = [new Set<number>(), new Set<number>()];
  for (const [id, line] of now) {
    const was = old.get(id);
    if (was === undefined) continue;
    if ((there.get(was) ?? line) !== line || (back.get(line) ?? was) !== was) {
      mixedOld.add(was).add(back.get(line) ?? was);
      mixedNow.add(line).add(there.get(was) ?? line);
    }
    there.set(was, line);
    back.set(line, was);
  }
  const out = new Set<string>();
  for (const [id, line] of now) {
    const was = old.get(id);
    if (mixedNow.has(line) || (was !== undefined && mixedOld.has(was))) out.add(id);
  }
  return out;
}

const stretches = (points: readonly Point[]): Box[] =>
  points.slice(1).map((b, i) => boxOfPoints([points[i] as Point, b]) as Box);

const samePoints = (a: readonly Point[], b: readonly Point[]): boolean =>
  a.length === b.length && a.every((p, i) => p.x === b[i]?.x && p.y === b[i]?.y);
