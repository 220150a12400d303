import type { Point } from '../../base/points.ts';
import type { Circuit, Part } from '../../circuit/model.ts';
import type { Routes } from '../../drawing/geometry.ts';
import { reroute, routeAll } from '../../drawing/routing.ts';

/**
 * Up to here every edit lays all lines, so that the sheet shows what the file shows when it is opened or printed,
 * and undo brings back the very same drawing. Beyond, that would hold up the hand: about 0.2 s of computing for
 * 350 connections, against 0.014 s for the lines of one part (measured).
 */
const ALL = 200;

/** Routes from one form of the circuit to the next; a route that came out the same stays the same object. */
export class SheetRoutes {
  #before: Circuit | undefined;
  #routes: Routes = new Map();

  of(circuit: Circuit): Routes {
    if (circuit === this.#before) return this.#routes;
    const changed = movedParts(this.#before, circuit);
    if (changed.length === 0 && this.#before && sameLines(this.#before, circuit)) {
      this.#before = circuit;
      return this.#routes;
    }
    // Most of it new: another circuit was opened.
    const afresh = !this.#before || circuit.connections.length <= ALL || changed.length * 2 > circuit.parts.length;
    const next: Routes = afresh ? routeAll(circuit) : reroute(this.#routes, circuit, changed);
    this.#routes = new Map([...next].map(([id, points]) => [id, keep(this.#routes.get(id), points)]));
    this.#before = circuit;
    return this.#routes;
  }
}

/** Parts whose ports may stand elsewhere than before: names and settings move nothing. */
function movedParts(before: Circuit | undefined, circuit: Circuit): string[] {
  const known = new Map(before?.parts.map((part) => [part.id, part]));
  return circuit.parts.filter((part) => !standsAsBefore(known.get(part.id), part)).map((part) => part.id);
}

const standsAsBefore = (a: Part | undefined, b: Part): boolean =>
  a === b ||
  (a !== undefined &&
    a.kind === b.kind &&
    a.valve === b.valve &&
    a.turn === b.turn &&
    a.flip === b.flip &&
    a.at?.x === b.at?.x &&
    a.at?.y === b.at?.y);

/** The same parts, and the same connections but for their names. */
function sameLines(before: Circuit, after: Circuit): boolean {
  if (before.parts.length !== after.parts.length || before.connections.length !== after.connections.length)
    return false;
  return before.connections.every((c, i) => {
    const now = after.connections[i];
    return (
      now === c ||
      (now?.id === c.id && now.from === c.from && now.to === c.to && now.bends === c.bends && now.use === c.use)
    );
  });
}

function keep(before: readonly Point[] | undefined, after: readonly Point[]): readonly Point[] {
  const same = before?.length === after.length && before.every((p, i) => p.x === after[i]?.x && p.y === after[i]?.y);
  return same ? before : after;
}
