import type { Circuit, PortRef } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import type { PathElement } from '../../parts/contract.ts';
import type { RowNumbers, StateTable } from '../../worker/client.ts';

/** What `rated` stands for where a path gives none: m³/s at Pa. */
const RATED = { flow: 1e-3, drop: 5e5 };
/** Share of the largest flow in a line below which a connection counts as still. */
const STILL = 0.02;
/** Share that may be missing at the ports of a line before nothing is read from it. */
const LOST = 0.25;
/** Pa: less says nothing about the way. */
const LEVEL = 50;

/** m³/s through a connection from its `from` end, and what counts as still in its line. */
export interface RealFlow {
  readonly flow: number;
  readonly still: number;
}

/**
 * Which way oil runs through each connection of the lines that lead to tank, from the pressures and speeds of the
 * row: what every port takes out of its line or puts into it, summed along the line.
 * A line whose ports do not add up, because a part passes oil in a way not known here, is left out.
 */
export function realFlows(
  circuit: Circuit,
  table: StateTable,
  numbers: RowNumbers,
  positionOf: (part: string) => number,
): Map<string, RealFlow> {
  const lineOf = new Map<string, number>();
  table.data.lines.forEach(({ ports }, line) => ports.forEach((port) => lineOf.set(port, line)));
  const { into, tanks } = portFlows(circuit, table, numbers, lineOf, positionOf);
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
  lineOf: ReadonlyMap<string, number>,
  positionOf: (part: string) => number,
): { readonly into: Map<string, number>; readonly tanks: Set<string> } {
  const into = new Map<string, number>();
  const tanks = new Set<string>();
  const add = (part: string, port: string, flow: number): void => {
    into.set(`${part}.${port}`, (into.get(`${part}.${port}`) ?? 0) + flow);
  };
  const pressure = (part: string, port: string): number => numbers.lines[lineOf.get(`${part}.${port}`) ?? -1] ?? 0;
  const actuators = new Map(table.data.actuators.map(({ part }, i) => [part, numbers.actuators[i]]));
  const pumps = new Map(table.data.pumps.map(({ part }, i) => [part, numbers.pumps[i]]));
  for (const part of circuit.parts) {
    const relief = numbers.reliefs.find(({ label }) => label === (part.label ?? part.id))?.flow ?? 0;
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
      } else if (element.type === 'pressure-opened') {
        add(part.id, element.from, -relief);
        add(part.id, element.to, relief);
      } else if (element.type === 'path' && (element.positions?.includes(positionOf(part.id)) ?? true)) {
        const flow = throughPath(element, (port) => pressure(part.id, port));
        add(part.id, element.from, -flow);
        add(part.id, element.to, flow);
      }
    }
  }
  return { into, tanks };
}

/** m³/s from → to by the drop, as the square root of it. */
function throughPath(path: PathElement, pressure: (port: string) => number): number {
  const drop = pressure(path.from) - pressure(path.to);
  if (Math.abs(drop) < LEVEL || (path.way === 'one-way' && drop < 0)) return 0;
  if (path.pilot && pressure(path.pilot.port) * path.pilot.ratio < pressure(path.from)) return 0;
  const { flow, drop: at } = path.rated ?? RATED;
  return Math.sign(drop) * flow * Math.sqrt(Math.max(0, Math.abs(drop) - (path.cracking ?? 0)) / at);
}
