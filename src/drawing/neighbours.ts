import type { Circuit, PortRef } from '../circuit/model.ts';
import { lineNumbers } from './lines.ts';

/** Which parts share a line, for placing: part id → the ports met from each of its own ports. */
export interface Meeting {
  readonly own: string;
  readonly other: PortRef;
}

export type Meetings = ReadonlyMap<string, readonly Meeting[]>;

/** In the circuit's order, so that equal circuits are placed alike. */
export function meetings(circuit: Circuit): Meetings {
  const numbers = lineNumbers(circuit);
  const lines = new Map<number, Map<string, PortRef>>();
  for (const connection of circuit.connections) {
    const number = numbers.get(connection.id) ?? -1;
    const refs = lines.get(number) ?? new Map<string, PortRef>();
    for (const ref of [connection.from, connection.to]) refs.set(`${ref.part}.${ref.port}`, ref);
    lines.set(number, refs);
  }
  const out = new Map<string, Meeting[]>(circuit.parts.map((p) => [p.id, []]));
  for (const refs of lines.values()) {
    for (const a of refs.values()) {
      for (const b of refs.values()) {
        if (a !== b && a.part !== b.part) out.get(a.part)?.push({ own: a.port, other: b });
      }
    }
  }
  return out;
}

export interface Reached {
  readonly part: string;
  /** Lines between the start and the part. */
  readonly distance: number;
  /** Port of the start part through which it was reached. */
  readonly through: string;
}

/** Parts in the order of distance from one part, setting out from `ports` only and not going on through `ends`. */
export function reach(
  all: Meetings,
  start: string,
  ports: (port: string) => boolean,
  ends: (part: string) => boolean,
): Reached[] {
  const found = new Map<string, Reached>();
  let edge: Reached[] = [];
  for (const { own, other } of all.get(start) ?? []) {
    if (!ports(own) || found.has(other.part)) continue;
    const reached = { part: other.part, distance: 1, through: own };
    found.set(other.part, reached);
    edge.push(reached);
  }
  while (edge.length > 0) {
    const next: Reached[] = [];
    for (const at of edge) {
      if (ends(at.part)) continue;
      for (const { other } of all.get(at.part) ?? []) {
        if (other.part === start || found.has(other.part)) continue;
        const reached = { part: other.part, distance: at.distance + 1, through: at.through };
        found.set(other.part, reached);
        next.push(reached);
      }
    }
    edge = next;
  }
  return [...found.values()];
}
