import type { Circuit, PortRef } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import type { RowNumbers, StateTable } from '../../worker/client.ts';

/** Share of the largest flow in a line below which a connection counts as still. */
const STILL = 0.02;
/** Share that may be missing at the ports of a line before nothing is read from it. */
const LOST = 0.25;

/** m³/s through a connection from its `from` end, and what counts as still in its line. */
export interface RealFlow {
  readonly flow: number;
  readonly still: number;
}

/**
 * Which way oil runs through each connection of the lines that lead to tank, from the flows of the row: what every
 * port takes out of its line or puts into it, summed along the line.
 * A line whose ports do not add up, because a part passes oil in a way not known here, is left out.
 */
export function realFlows(
  circuit: Circuit,
  table: StateTable,
  numbers: RowNumbers,
): Map<string, RealFlow> {
  const { into, tanks } = portFlows(circuit, table, numbers);
  const out = new Map<string, RealFlow>();
  const byId = new Map(circuit.connections.map((each) => [each.id, each]));
  table.data.lines.forEach(({ ports, connections }, line) => {
    if (table.line(line, numbers.row) !== 'flows to tank') return;
    const flows = new Map(ports.map((port) => [port, into.get(port) ?? 0]));
    const sum = [...flows.values()].reduce((all, each) => all + each, 0);
    const most = Math.max(0, ...[...flows.values()].map(Math.abs));
    const own = ports.filter((port) => tanks.has(port));
    // The tank takes what is over; two on one line are not told apart.
    if (own.length === 1) flows.set(own[0] as string, -sum);
    else if (own.length > 1 || Math.abs(sum) > LOST * most) return;
    if (most === 0) return;
    const drawn = connections.flatMap((id) => byId.get(id) ?? []);
    for (const { id, from } of drawn) {
      const flow = reached(drawn, id, from).reduce((all, port) => all + (flows.get(port) ?? 0), 0);
      out.set(id, { flow, still: STILL * most });
    }
  });
  return out;
}

const key = ({ part, port }: PortRef): string => `${part}.${port}`;

/** Ports on the near side of a connection, its `from` among them; in a ring that is all of them, hence no flow. */
function reached(drawn: readonly { readonly id: string; readonly from: PortRef; readonly to: PortRef }[], cut: string, from: PortRef): string[] {
  const seen = new Set([key(from)]);
  for (let grown = true; grown; ) {
    grown = false;
    for (const each of drawn) {
      if (each.id === cut || seen.has(key(each.from)) === seen.has(key(each.to))) continue;
      seen.add(key(each.from)).add(key(each.to));
      grown = true;
    }
  }
  return [...seen];
}

/** m³/s that each port puts into its line; and the ports of tanks, which take what comes. */
function portFlows(
  circuit: Circuit,
  table: StateTable,
  numbers: RowNumbers,
): { readonly into: Map<string, number>; readonly tanks: Set<string> } {
  const into = new Map<string, number>();
  const tanks = new Set<string>();
  const add = (part: string, port: string, flow: number): void => {
    into.set(`${part}.${port}`, (into.get(`${part}.${port}`) ?? 0) + flow);
  };
  const actuators = new Map(table.data.actuators.map(({ part }, i) => [part, numbers.actuators[i]]));
  const pumps = new Map(table.data.pumps.map(({ part }, i) => [part, numbers.pumps[i]]));
  for (const part of circuit.parts) {
    for (const element of kindOf(part.kind)?.elements(part) ?? []) {
      if (element.type === 'tank') tanks.add(`${part.id}.${element.port}`);
      else if (element.type === 'pump') {
        const flow = pumps.get(part.id)?.delivered ?? 0;
        add(part.id, element.outlet, flow);
        add(part.id, element.suction, -flow);
      } else if (element.type === 'actuator') {
        const speed = actuators.get(part.id)?.speed ?? 0;
        add(part.id, element.a, -element.areaA * speed);
        if (element.b !== undefined) add(part.id, element.b, element.areaB * speed);
      }
    }
  }
  for (const { part, from, to, flow } of numbers.flows) {
    add(part, from, -flow);
    if (to !== undefined) add(part, to, flow);
  }
  return { into, tanks };
}
