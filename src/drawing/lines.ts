import type { Circuit, PortRef } from '../circuit/model.ts';

/** Connection id → the line it belongs to. Lines are numbered in the order of their first connection. */
export type LineNumbers = ReadonlyMap<string, number>;

const key = (ref: PortRef): string => `${ref.part}.${ref.port}`;

/** Connections that share a port are one line. Lines of different number never join where they cross. */
export function lineNumbers(circuit: Circuit): LineNumbers {
  let numbers = known.get(circuit.connections);
  if (!numbers) known.set(circuit.connections, (numbers = numbered(circuit)));
  return numbers;
}

/** Parts may move as they like: the lines are those of the list of connections. */
const known = new WeakMap<Circuit['connections'], LineNumbers>();

function numbered(circuit: Circuit): LineNumbers {
  const parent = new Map<string, string>();
  const find = (start: string): string => {
    let at = start;
    for (let up = parent.get(at); up !== undefined && up !== at; up = parent.get(at)) at = up;
    // Shorten the way for the next search.
    for (let step = start; step !== at;) {
      const up = parent.get(step) as string;
      parent.set(step, at);
      step = up;
    }
    return at;
  };
  for (const { from, to } of circuit.connections) {
    for (const ref of [from, to]) if (!parent.has(key(ref))) parent.set(key(ref), key(ref));
    parent.set(find(key(from)), find(key(to)));
  }
  const numbers = new Map<string, number>();
  const out = new Map<string, number>();
  for (const connection of circuit.connections) {
    const root = find(key(connection.from));
    const known = numbers.get(root) ?? numbers.size;
    numbers.set(root, known);
    out.set(connection.id, known);
  }
  return out;
}
