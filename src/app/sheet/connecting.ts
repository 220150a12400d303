import type { Point } from '../../base/points.ts';
import { connect, connectToConnection } from '../../circuit/build.ts';
import { all, applyEdit } from '../../circuit/edit.ts';
import type { Edit } from '../../circuit/edit.ts';
import { lineOf } from '../../circuit/lines.ts';
import { sayPort } from '../../circuit/model.ts';
import type { Circuit, Connection, PortRef } from '../../circuit/model.ts';
import { RefusedEdit } from '../../circuit/refused.ts';
import { placedPorts } from '../../drawing/shapes.ts';
import type { End } from './desk.svelte.ts';
import { routeAt } from './hit.ts';
import type { Hit, HitMap, HitPort } from './hit.ts';
import { snap } from './viewport.ts';

export const portEnd = (port: HitPort): End => ({
  type: 'port',
  ref: { part: port.part, port: port.port },
  at: port.at,
  side: port.side,
});

/** The end that a line would take at what is hit; undefined on paper and on the body of a part. */
export function endAt(hit: Hit): End | undefined {
  if (hit.type === 'port') return portEnd(hit.port);
  return hit.type === 'connection' ? { type: 'line', connection: hit.id, at: snap(hit.at) } : undefined;
}

/** The same end of a line, at the nearest spot of its route to `p`. */
export function endOnLine(map: HitMap, connection: string, p: Point): End | undefined {
  const one = { ...map, routes: map.routes.filter((route) => route.id === connection) };
  const found = routeAt(one, p, Infinity);
  return found && { type: 'line', connection, at: snap(found.at) };
}

/** Pilot and drain ports make pilot and drain lines. */
function useOf(circuit: Circuit, refs: readonly PortRef[]): NonNullable<Connection['use']> | undefined {
  const roles = refs.map((ref) => {
    const part = circuit.parts.find(({ id }) => id === ref.part);
    return part && placedPorts(part).find((port) => port.ref.port === ref.port)?.role;
  });
  return roles.includes('pilot') ? 'pilot' : roles.includes('drain') ? 'drain' : undefined;
}

/** The edit that draws a line between two ends; throws `RefusedEdit`. */
export function joinEnds(circuit: Circuit, from: End, to: End): Edit {
  if (from.type === 'port' && to.type === 'port') {
    const use = useOf(circuit, [from.ref, to.ref]);
    return connect(circuit, from.ref, to.ref, use ? { use } : {});
  }
  if (from.type === 'port' && to.type === 'line') return tee(circuit, from.ref, to);
  if (from.type === 'line' && to.type === 'port') return tee(circuit, to.ref, from);
  if (from.type === 'line' && to.type === 'line') return bridge(circuit, from, to);
  throw new RefusedEdit('line', 'A line needs two ends.', 'End it at a port or on a line.');
}

type LineEnd = Extract<End, { type: 'line' }>;
const onSheet = ({ sheet }: LineEnd): { sheet?: string } => (sheet === undefined ? {} : { sheet });

function tee(circuit: Circuit, ref: PortRef, end: LineEnd): Edit {
  const use = useOf(circuit, [ref]);
  return connectToConnection(circuit, ref, end.connection, end.at, { ...(use && { use }), ...onSheet(end) });
}

/** A junction on each of two lines, and a connection between them. */
function bridge(circuit: Circuit, from: LineEnd, to: LineEnd): Edit {
  if (lineOf(circuit, from.connection).has(to.connection)) {
    throw new RefusedEdit(from.connection, 'Both ends are on one line already.', 'End on another line or at a port.');
  }
  const far = circuit.connections.find(({ id }) => id === to.connection);
  if (!far) throw new RefusedEdit(to.connection, 'That line is gone.', 'End on another line or at a port.');
  // A tee from the far line's own end splits the near line; its branch is then left out.
  const teed = connectToConnection(circuit, far.from, from.connection, from.at, onSheet(from));
  const [put, ...rest] = teed.type === 'all' ? teed.edits : [];
  if (put?.type !== 'put-part')
    throw new RefusedEdit(from.connection, 'That line cannot be split here.', 'Start at another spot.');
  const split = all([put, ...rest.slice(0, 2)]);
  const after = applyEdit(circuit, split);
  return all([split, connectToConnection(after, { part: put.part.id, port: 'J' }, to.connection, to.at, onSheet(to))]);
}

export const sayEnd = (circuit: Circuit, end: End): string => {
  if (end.type === 'line')
    return `line ${circuit.connections.find(({ id }) => id === end.connection)?.name ?? 'in between'}`;
  const part = circuit.parts.find(({ id }) => id === end.ref.part);
  return sayPort({ part: part?.label ?? end.ref.part, port: end.ref.port });
};
