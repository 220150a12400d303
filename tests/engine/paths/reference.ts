import { alg, Graph } from '@dagrejs/graphlib';
import type { Network } from '../../../src/network/network.ts';

/**
 * Open paths of one state the slow and plain way: a graph built for this state alone, searched by the
 * graph library. Lock checks and shuttle valves are settled round by round, each round with graphs built anew.
 */
export interface PlainState {
  readonly fromSource: readonly boolean[];
  readonly toTank: readonly boolean[];
  readonly freeToTank: readonly boolean[];
  /** False where the lock checks never settle. */
  readonly settled: boolean;
}

export function plainState(net: Network, positions: readonly number[], pumpsRunning: boolean): PlainState {
  let open = new Set<number>();
  for (let round = 0; round < 2 * net.paths.length + 4; round++) {
    const result = search(net, positions, pumpsRunning, open);
    const next = new Set(
      net.paths.flatMap((path, i) => {
        const pressed = (line: number): boolean | undefined => result.fromSource[line] || result.under[line];
        const led = path.pilot >= 0 && pressed(path.pilot) && !result.freeToTank[path.pilot];
        return led || (path.vent >= 0 && !pressed(path.vent) && result.toTank[path.vent]) ? [i] : [];
      }),
    );
    if (next.size === open.size && [...next].every((i) => open.has(i))) return { ...result, settled: true };
    open = next;
  }
  return { ...search(net, positions, pumpsRunning, open), settled: false };
}

function search(net: Network, positions: readonly number[], pumpsRunning: boolean, openPilots: ReadonlySet<number>) {
  const all = new Graph({ directed: true, multigraph: true });
  const free = new Graph({ directed: true, multigraph: true });
  net.lines.forEach((_, line) => {
    all.setNode(String(line));
    free.setNode(String(line));
  });
  net.paths.forEach((path, i) => {
    if (path.input >= 0 && ((path.positions >> (positions[path.input] ?? 0)) & 1) === 0) return;
    if ((path.pilot >= 0 || path.vent >= 0) && !openPilots.has(i)) return;
    for (const graph of path.throttled ? [all] : [all, free]) {
      graph.setEdge(String(path.from), String(path.to), '', `${i}>`);
      if (!path.oneWay) graph.setEdge(String(path.to), String(path.from), '', `${i}<`);
    }
  });
  const sources = [
    ...net.pumps.flatMap((pump) => (pumpsRunning && !pump.atRest ? [pump.outlet] : [])),
    ...net.accumulators.flatMap((store) => (store.charged ? [store.line] : [])),
  ];
  const tanks = net.lines.flatMap((line, i) => (line.tank ? [i] : []));
  const leaks = pumpsRunning ? [] : net.pumps.flatMap((pump) => (pump.tightWhenStopped ? [] : [pump.outlet]));

  const forward = withoutTankOutflow(all, tanks);
  const fromSource = reached(forward, sources);
  const toTank = reached(reversed(all), [...tanks, ...leaks]);
  const freeToTank = reached(reversed(free), tanks);

  // Pressure spreads from the sources where nothing vents it, and through actuators.
  const pressure = new Graph({ directed: true, multigraph: true });
  const stands = (line: number): boolean => !freeToTank[line];
  for (const edge of forward.edges()) {
    if (stands(Number(edge.v)) && stands(Number(edge.w))) pressure.setEdge(edge.v, edge.w, '', edge.name);
  }
  net.actuators.forEach(({ a, b }, i) => {
    if (b < 0 || !stands(a) || !stands(b)) return;
    if (!net.lines[a]?.tank) pressure.setEdge(String(a), String(b), '', `actuator ${i} out`);
    if (!net.lines[b]?.tank) pressure.setEdge(String(b), String(a), '', `actuator ${i} in`);
  });
  net.lines.forEach((_, line) => pressure.setNode(String(line)));
  const under = reached(pressure, sources.filter(stands));
  return { fromSource, toTank, freeToTank, under };
}

function withoutTankOutflow(graph: Graph, tanks: readonly number[]): Graph {
  const out = new Graph({ directed: true, multigraph: true });
  for (const node of graph.nodes()) out.setNode(node);
  for (const edge of graph.edges()) if (!tanks.includes(Number(edge.v))) out.setEdge(edge.v, edge.w, '', edge.name);
  return out;
}

function reversed(graph: Graph): Graph {
  const out = new Graph({ directed: true, multigraph: true });
  for (const node of graph.nodes()) out.setNode(node);
  for (const edge of graph.edges()) out.setEdge(edge.w, edge.v, '', edge.name);
  return out;
}

function reached(graph: Graph, starts: readonly number[]): boolean[] {
  const found = new Set(starts.length > 0 ? alg.preorder(graph, starts.map(String)) : []);
  return graph
    .nodes()
    .sort((a, b) => Number(a) - Number(b))
    .map((node) => found.has(node));
}
