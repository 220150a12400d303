import { alg, Graph } from '@dagrejs/graphlib';
import type { Circuit, Connection } from '../circuit/model.ts';
import { labelOf, sayPort } from '../circuit/model.ts';
import type { PartKind } from '../parts/contract.ts';
import type { NetLine } from './network.ts';

interface Port {
  readonly key: string;
  readonly called: string;
  readonly joint: boolean;
  readonly tank: boolean;
}

/**
 * The lines of a circuit: connected ports, in document order of their first port. Ports with nothing
 * on them follow as lines of their own (`shown` counts the drawn ones).
 */
export function findLines(
  circuit: Circuit,
  kindOf: (kind: string) => PartKind,
): { lines: NetLine[]; shown: number; lineOf: Map<string, number> } {
  const ports: Port[] = [];
  for (const part of circuit.parts) {
    const kind = kindOf(part.kind);
    const tanks = new Set(kind.elements(part).flatMap((element) => (element.type === 'tank' ? [element.port] : [])));
    for (const port of kind.ports(part)) {
      ports.push({
        key: `${part.id}.${port.id}`,
        called: `${labelOf(part)}.${port.id}`,
        joint: port.role === 'joint',
        tank: tanks.has(port.id),
      });
    }
  }

  const graph = new Graph({ directed: false, multigraph: true });
  for (const port of ports) graph.setNode(port.key);
  for (const connection of circuit.connections) {
    graph.setEdge(sayPort(connection.from), sayPort(connection.to), connection.id, connection.id);
  }
  const groupOf = new Map<string, number>();
  alg.components(graph).forEach((keys: string[], group: number) => {
    for (const key of keys) groupOf.set(key, group);
  });

  const groups = new Map<number, { ports: Port[]; connections: Connection[] }>();
  for (const port of ports) {
    const group = groupOf.get(port.key) as number;
    const entry = groups.get(group);
    if (entry) entry.ports.push(port);
    else groups.set(group, { ports: [port], connections: [] });
  }
  for (const connection of circuit.connections) {
    groups.get(groupOf.get(sayPort(connection.from)) as number)?.connections.push(connection);
  }

  const all = [...groups.values()];
  const drawn = all.filter((group) => group.connections.length > 0);
  const single = all.filter((group) => group.connections.length === 0);
  const taken = new Set<string>();
  const unique = (name: string): string => {
    let free = name;
    for (let n = 2; taken.has(free); n++) free = `${name} (${n})`;
    taken.add(free);
    return free;
  };
  const lines = [...drawn, ...single].map((group): NetLine => {
    const given = group.connections.find((connection) => connection.name !== undefined)?.name;
    const first = group.ports.find((port) => !port.joint) ?? group.ports[0];
    return {
      name: unique(given ?? first?.called ?? '?'),
      ports: group.ports.map((port) => port.key),
      connections: group.connections.map((connection) => connection.id),
      tank: group.ports.some((port) => port.tank),
    };
  });
  const lineOf = new Map<string, number>();
  lines.forEach((line, index) => {
    for (const key of line.ports) lineOf.set(key, index);
  });
  return { lines, shown: drawn.length, lineOf };
}
