import { SLIP_AT } from '../flow/dividers.ts';
import type { FlowModel } from '../flow/compile.ts';
import type { FlowResult, Solved } from '../flow/result.ts';
import type { NetPath, Network } from '../../network/network.ts';
import type { PressureAnswer, PressureSolver } from './resolve.ts';

/** SI numbers of one row, by the order of the table's lines, actuators and pumps. */
export interface RowNumbers {
  readonly row: number;
  readonly status: FlowResult['status'];
  /** Why there are no numbers; absent when solved. */
  readonly words?: string;
  /** Pa per shown line. */
  readonly lines: readonly number[];
  /** Speed m/s (rad/s), outwards (A→B) positive; flow m³/s into or out of the larger side; force N (N·m) that the oil exerts outwards. */
  readonly actuators: readonly { readonly speed: number; readonly flow: number; readonly force: number }[];
  /** Pa at the outlet, m³/s delivered and over pressure valves, W. */
  readonly pumps: readonly { readonly pressure: number; readonly delivered: number; readonly power: number }[];
  /** Per relief valve of the circuit: its label and m³/s over it. */
  readonly reliefs: readonly { readonly label: string; readonly flow: number }[];
  /** m³/s through each path of the network, from → to positive; 0 where it is shut, or where both ends are one line. */
  readonly paths: readonly number[];
  /** What passes something: open paths, relief and pressure valves, accumulators. Still ones are left out. */
  readonly flows: readonly PartFlow[];
  /** W: who gives power, who uses it and who turns it into heat. Parts without any are left out. */
  readonly shares: readonly PowerShare[];
  /** W. `pumps + loads + stores = useful + lost`; stores are springs and accumulators, negative while they are charged. */
  readonly power: {
    readonly pumps: number;
    readonly loads: number;
    readonly stores: number;
    readonly useful: number;
    readonly lost: number;
  };
}

/** m³/s through a part, in the direction of `from` → `to` if positive. */
export interface PartFlow {
  /** Part id. */
  readonly part: string;
  readonly label: string;
  /** Ports; `to` is absent for an accumulator, which takes the flow in. */
  readonly from: string;
  readonly to?: string;
  readonly flow: number;
  /** Pa from `from` to `to`; over tank for an accumulator. */
  readonly drop: number;
}

export interface PowerShare {
  readonly part: string;
  readonly label: string;
  /** By a pump, a load that drives, a spring or an accumulator. */
  readonly given: number;
  readonly useful: number;
  readonly lost: number;
}

/** m³/s (0.01 L/min): less is still. */
const STILL = 0.01e-3 / 60;
/** W */
const NO_POWER = 0.05;

const NOTHING = { lines: [], actuators: [], pumps: [], reliefs: [], paths: [], flows: [], shares: [] } as const;

export function rowNumbers(solver: PressureSolver, row: number, answer = solver.solve(row)): RowNumbers {
  const { result } = answer;
  if (result.status !== 'solved') {
    const power = { pumps: 0, loads: 0, stores: 0, useful: 0, lost: 0 };
    return { row, status: result.status, words: result.words, ...NOTHING, power };
  }
  const { net, model } = solver;
  const paths = net.paths.map(
    (path, i) => answer.flows[branchOf(net, model, i)] ?? gearFlow(solver, result, path.divider) ?? 0,
  );
  const flows = partFlows(solver, result, answer, paths);
  return {
    row,
    status: 'solved',
    lines: Array.from({ length: net.shown }, (_, line) => solver.pressure(result, line)),
    actuators: result.actuators.map(({ speed, flowIn, flowOut, force }) => ({
      speed,
      flow: Math.max(Math.abs(flowIn), Math.abs(flowOut)),
      force,
    })),
    pumps: result.pumps.map(({ pressure, delivered, power }) => ({ pressure, delivered, power })),
    reliefs: net.reliefs.map((relief, i) => ({
      label: net.parts[relief.part]?.label ?? '',
      flow: Math.max(0, answer.flows[model.reliefs[i] ?? -1] ?? 0),
    })),
    paths,
    flows,
    shares: powerShares(solver, result, answer, flows),
    power: { ...result.power },
  };
}

/** m³/s to an outlet of a gear divider, whose two motors on one shaft are no branches of two lines: see `FlowBuilder.divider`. */
function gearFlow(solver: PressureSolver, result: Solved, way: NetPath['divider']): number | undefined {
  const divider = way && solver.net.dividers[way.index];
  if (divider?.form !== 'gear') return undefined;
  const { inlet, outlets, share, rest, rated } = divider;
  const [into = 0, first = 0, second = 0] = [inlet, ...outlets].map((line) => solver.pressure(result, line));
  const own = way?.outlet === 0 ? share : 1 - share;
  const turned = ((into - share * first - (1 - share) * second) * rated.flow) / rated.drop;
  const slip = ((into - (way?.outlet === 0 ? first : second)) * rest * rated.flow) / SLIP_AT;
  return own * (turned + slip);
}

/** Branch that stands for a path; -1 if none. */
function branchOf(net: Network, model: FlowModel, index: number): number {
  const own = model.paths[index] ?? -1;
  const path = net.paths[index];
  if (own >= 0 || !path) return own;
  if (path.valve !== undefined) return model.valves[path.valve] ?? -1;
  if (!path.oneWay) return -1;
  // The free way of a lock check is the branch laid just before its piloted one.
  const piloted = net.paths.findIndex(
    (other) => other.pilot >= 0 && other.part === path.part && other.from === path.to && other.to === path.from,
  );
  return piloted < 0 ? -1 : Math.max(-1, (model.paths[piloted] ?? -1) - 1);
}

function partFlows(
  solver: PressureSolver,
  result: Solved,
  { flows }: PressureAnswer,
  paths: readonly number[],
): PartFlow[] {
  const { net, model } = solver;
  const out: PartFlow[] = [];
  const add = (part: number, ports: { from: string; to?: string }, flow: number, from: number, to: number): void => {
    if (Math.abs(flow) < STILL) return;
    const { id = '', label = '' } = net.parts[part] ?? {};
    out.push({ part: id, label, ...ports, flow, drop: solver.pressure(result, from) - solver.pressure(result, to) });
  };
  net.paths.forEach(({ part, fromPort, toPort, from, to, valve }, i) => {
    if (valve === undefined) add(part, { from: fromPort, to: toPort }, paths[i] ?? 0, from, to);
  });
  net.valves.forEach(({ part, fromPort, toPort, from, to }, i) =>
    add(part, { from: fromPort, to: toPort }, flows[model.valves[i] ?? -1] ?? 0, from, to),
  );
  net.reliefs.forEach(({ part, from, to }, i) =>
    add(
      part,
      { from: portOn(net, part, from), to: portOn(net, part, to) },
      flows[model.reliefs[i] ?? -1] ?? 0,
      from,
      to,
    ),
  );
  net.accumulators.forEach(({ part, line }, i) =>
    add(part, { from: portOn(net, part, line) }, flows[model.stores[i] ?? -1] ?? 0, line, -1),
  );
  return out;
}

/** Port by which a part hangs on a line. */
function portOn(net: Network, part: number, line: number): string {
  const start = `${net.parts[part]?.id ?? ''}.`;
  return net.lines[line]?.ports.find((port) => port.startsWith(start))?.slice(start.length) ?? '';
}

function powerShares(
  { net, model }: PressureSolver,
  result: Solved,
  answer: PressureAnswer,
  flows: readonly PartFlow[],
): PowerShare[] {
  const shares = new Map<string, { given: number; useful: number; lost: number }>();
  const of = (part: string): { given: number; useful: number; lost: number } => {
    const known = shares.get(part) ?? { given: 0, useful: 0, lost: 0 };
    shares.set(part, known);
    return known;
  };
  const idOf = (part: number): string => net.parts[part]?.id ?? '';
  net.pumps.forEach(({ part }, i) => (of(idOf(part)).given += result.pumps[i]?.power ?? 0));
  net.actuators.forEach(({ part }, i) => {
    const state = result.actuators[i];
    if (!state) return;
    const share = of(idOf(part));
    share.useful += Math.max(0, state.useful);
    share.given += Math.max(0, -state.useful) - state.sprung;
    share.lost += state.lost;
  });
  for (const { part, flow, drop, to } of flows) if (to !== undefined) of(part).lost += flow * drop;
  net.accumulators.forEach(({ part, line }, i) => {
    const branch = model.stores[i] ?? -1;
    const flow = answer.flows[branch] ?? 0;
    if (flow === 0) return;
    const stands = model.problem.branches[branch]?.forward ?? 0;
    const at = model.lineOf[line] ?? -1;
    of(idOf(part)).given -= stands * flow;
    of(idOf(part)).lost += ((at < 0 ? 0 : (result.lines[at]?.pressure ?? 0)) - stands) * flow;
  });
  return net.parts.flatMap(({ id, label }) => {
    const share = shares.get(id);
    if (!share || Math.max(Math.abs(share.given), share.useful, share.lost) < NO_POWER) return [];
    return [{ part: id, label, ...share }];
  });
}
