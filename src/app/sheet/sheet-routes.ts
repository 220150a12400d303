import type { Point } from '../../base/points.ts';
import type { Circuit, Part } from '../../circuit/model.ts';
import type { Routes } from '../../drawing/geometry.ts';
import { quickRoute } from '../../drawing/quick-route.ts';
import { reroute, routeAll, routingSheet } from '../../drawing/routing.ts';
import type { RoutingSheet } from '../../drawing/routing.ts';

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

  /** As laid last at rest. */
  get settled(): Routes {
    return this.#routes;
  }

  /** `passing`: a form that is shown during a drag; see `layPassing`. */
  of(circuit: Circuit, passing: boolean): Routes {
    if (circuit === this.#before) return this.#routes;
    const changed = movedParts(this.#before, circuit);
    if (passing && this.#before) return layPassing(this.#routes, this.#before, circuit, changed);
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

/**
 * The lines of moved parts only, without a search: a drag must follow the hand on a sheet of hundreds of parts. What
 * moves as a whole keeps its lines as they were. Lines give way to one another when the parts are put down.
 */
function layPassing(routes: Routes, before: Circuit, circuit: Circuit, changed: readonly string[]): Routes {
  const stood = new Map(before.parts.map((part) => [part.id, part]));
  const moved = new Map<string, Point>();
  for (const part of circuit.parts) {
    const was = stood.get(part.id);
    if (was === part) continue;
    const turned = !was || was.turn !== part.turn || was.flip !== part.flip || !was.at || !part.at;
    moved.set(
      part.id,
      turned ? NOWHERE : { x: (part.at?.x ?? 0) - (was.at?.x ?? 0), y: (part.at?.y ?? 0) - (was.at?.y ?? 0) },
    );
  }
  const gone = new Set(changed);
  const known = new Map(before.connections.map((connection) => [connection.id, connection]));
  const out = new Map(routes);
  let sheet: RoutingSheet | undefined;
  for (const connection of circuit.connections) {
    const { id, from, to } = connection;
    const was = known.get(id);
    const route = routes.get(id);
    const touched = gone.has(from.part) || gone.has(to.part);
    if (was === connection && !touched && route) continue;
    const [a, b] = [moved.get(from.part), moved.get(to.part)];
    const together = was && route && a && b && a !== NOWHERE && b !== NOWHERE && a.x === b.x && a.y === b.y;
    if (together) {
      out.set(
        id,
        keep(
          route,
          route.map((p) => ({ x: p.x + a.x, y: p.y + a.y })),
        ),
      );
      continue;
    }
    sheet ??= routingSheet(circuit);
    out.set(id, keep(route, quickRoute(sheet, connection)));
  }
  return out;
}

/** Stands for a way that cannot be told: the part turned, or was not there. */
const NOWHERE: Point = { x: NaN, y: NaN };
