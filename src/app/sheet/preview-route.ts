import type { Point } from '../../base/points.ts';
import type { Circuit, Connection, Part, PortRef } from '../../circuit/model.ts';
import type { Routes } from '../../drawing/geometry.ts';
import { routeConnection, routingSheet } from '../../drawing/routing.ts';
import type { End } from './desk.svelte.ts';

// Ids that no file can hold, so that they never meet a real one.
const LINE = '?line';

const joint = (id: string, at: Point): Part => ({ id, kind: 'junction', at });

/** The way a line would take if it ended here: just as it will be drawn. */
export function previewRoute(circuit: Circuit, routes: Routes, from: End, to: End | Point): Point[] {
  const extra: Part[] = [];
  const portOf = (end: End | Point, id: string): PortRef => {
    if ('type' in end && end.type === 'port') return end.ref;
    extra.push(joint(id, 'type' in end ? end.at : end));
    return { part: id, port: 'J' };
  };
  const connection: Connection = { id: LINE, from: portOf(from, '?from'), to: portOf(to, '?to') };
  const drawn: Circuit = {
    ...circuit,
    parts: [...circuit.parts, ...extra],
    connections: [...circuit.connections, connection],
  };
  return routeConnection(routingSheet(drawn, routes), connection);
}
