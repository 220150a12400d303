import { sayPort, type Circuit, type PortRef } from './model.ts';

export const samePort = (a: PortRef, b: PortRef): boolean => a.part === b.part && a.port === b.port;

/** Ids of the connections that form one line with the given one, itself among them: those that share ports. */
export function lineOf(circuit: Circuit, connectionId: string): ReadonlySet<string> {
  const at = new Map<string, string[]>();
  const ends = new Map<string, readonly string[]>();
  for (const { id, from, to } of circuit.connections) {
    const both = [sayPort(from), sayPort(to)];
    ends.set(id, both);
    for (const end of both) {
      const here = at.get(end);
      if (here) here.push(id);
      else at.set(end, [id]);
    }
  }
  const line = new Set([connectionId]);
  // A set that grows while it is walked is walked to its new end.
  for (const id of line) for (const end of ends.get(id) ?? []) for (const next of at.get(end) ?? []) line.add(next);
  return line;
}
