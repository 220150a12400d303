import type { Circuit, PortRef } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';

/** Which way oil runs through a connection, seen from its `from` end. */
export type FlowWay = 'forward' | 'backward';

interface Edge {
  readonly a: number;
  readonly b: number;
  readonly oneWay: boolean;
  readonly connection?: string;
}

const SWEEPS = 400;
/** Share of the whole drop from pump to tank below which a connection counts as still. */
const STILL = 1e-5;

/**
 * Directions for the flow marks of lines that are open from pump to tank: the circuit as equal resistances
 * between running pumps (1) and tanks (0), oil running from high to low. Branches without an outlet come out
 * level, hence still. A drawing aid only: no pressure is read from it.
 */
export function flowWays(circuit: Circuit, positionOf: (part: string) => number, running: boolean): Map<string, FlowWay> {
  const nodes = new Map<string, number>();
  const node = (part: string, port: string): number => {
    const key = `${part}.${port}`;
    const known = nodes.get(key);
    if (known !== undefined) return known;
    nodes.set(key, nodes.size);
    return nodes.size - 1;
  };
  const at = (ref: PortRef): number => node(ref.part, ref.port);
  const edges: Edge[] = circuit.connections.map((c) => ({ a: at(c.from), b: at(c.to), oneWay: false, connection: c.id }));
  const fixed = new Map<number, number>();
  for (const part of circuit.parts) {
    for (const element of kindOf(part.kind)?.elements(part) ?? []) {
      if (element.type === 'pump' && running) fixed.set(node(part.id, element.outlet), 1);
      if (element.type === 'tank') fixed.set(node(part.id, element.port), 0);
      if (element.type !== 'path' || element.pilot) continue;
      if (element.positions && !element.positions.includes(positionOf(part.id))) continue;
      edges.push({ a: node(part.id, element.from), b: node(part.id, element.to), oneWay: element.way === 'one-way' });
    }
  }
  const level = settle(nodes.size, edges, fixed);
  const ways = new Map<string, FlowWay>();
  for (const { a, b, connection } of edges) {
    const drop = (level[a] ?? NaN) - (level[b] ?? NaN);
    if (connection !== undefined && Math.abs(drop) > STILL) ways.set(connection, drop > 0 ? 'forward' : 'backward');
  }
  return ways;
}

/** Gauss–Seidel; a node that nothing reaches stays NaN, so that no direction is read from it. */
function settle(count: number, edges: readonly Edge[], fixed: ReadonlyMap<number, number>): Float64Array {
  const level = new Float64Array(count).fill(NaN);
  for (const [node, value] of fixed) level[node] = value;
  const near: Edge[][] = Array.from({ length: count }, () => []);
  for (const edge of edges) {
    near[edge.a]?.push(edge);
    near[edge.b]?.push(edge);
  }
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    let moved = 0;
    // Forth and back, so that long chains settle in few sweeps.
    for (let k = 0; k < count; k++) {
      const n = sweep % 2 === 0 ? k : count - 1 - k;
      if (fixed.has(n)) continue;
      const before = level[n] as number;
      let sum = 0;
      let weight = 0;
      for (const edge of near[n] ?? []) {
        const other = level[edge.a === n ? edge.b : edge.a] as number;
        if (Number.isNaN(other)) continue;
        if (edge.oneWay && !Number.isNaN(before)) {
          // A check passes from a to b only.
          if (edge.a === n ? other > before : other < before) continue;
        }
        sum += other;
        weight++;
      }
      const next = weight > 0 ? sum / weight : before;
      if (Number.isNaN(before) ? !Number.isNaN(next) : Math.abs(next - before) > 1e-8) moved++;
      level[n] = next;
    }
    if (moved === 0) break;
  }
  return level;
}
