import type { Connection, PortRef } from '../../circuit/model.ts';
import type { Cursor } from './reading-order.ts';

type Ends = Pick<Connection, 'id' | 'from' | 'to'>;

const isAt = (ref: PortRef, { part, port }: PortRef): boolean => ref.part === part && ref.port === port;

/**
 * Where the keyboard goes along a line: from a port (or a part with lines) to a line there, from a line to its other
 * end. `before` is where it came from: a port with several lines gives them in turn, and a line leads away from there.
 */
export function followed(
  connections: readonly Ends[],
  at: Cursor | undefined,
  before: Cursor | undefined,
): Cursor | undefined {
  if (at?.type === 'connection') {
    const line = connections.find(({ id }) => id === at.id);
    if (!line) return undefined;
    const back = before?.type === 'port' && isAt(line.to, before) ? line.from : line.to;
    return { type: 'port', ...back };
  }
  const own = connections.filter(({ from, to }) =>
    at?.type === 'port'
      ? isAt(from, at) || isAt(to, at)
      : at?.type === 'part' && (from.part === at.id || to.part === at.id),
  );
  const last = before?.type === 'connection' ? own.findIndex(({ id }) => id === before.id) : -1;
  const next = own[(last + 1) % own.length];
  return next && { type: 'connection', id: next.id };
}
