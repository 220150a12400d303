import { standsAt } from '../../../network/dependents.ts';
import type { Network } from '../../../network/network.ts';
import { setState } from '../../flow/compile.ts';
import type { FlowModel } from '../../flow/compile.ts';
import { settleDependents } from '../../flow/dependents.ts';
import { describe } from '../../flow/result.ts';
import type { FlowResult, Solved } from '../../flow/result.ts';
import { ties } from '../../flow/ties.ts';
import type { Bench } from './bench.ts';
import type { Machine } from './machine.ts';

/** Flow that counts as motion, and as void: 0.01 and 5e-4 L/min in m³/s. */
export const MOTION = 0.01e-3 / 60;
const VOID = 5e-7 / 60;
/** Pa; a chamber below it is not pressed on. */
const PRESSED = 1e4;

/** What goes on at one moment, or over one interval. Lists run as in the network. */
export interface Steady {
  readonly dependents: readonly number[];
  /** m/s, rad/s; 0 below the flow that counts as motion. */
  readonly speeds: readonly number[];
  /** N or N·m that the oil exerts outwards. */
  readonly forces: readonly number[];
  /** m³/s that each accumulator takes in; 0 below the flow that counts. */
  readonly stores: readonly number[];
  /** Pa per line. */
  readonly pressures: readonly number[];
  readonly powerIn: number;
  readonly powerLost: number;
  /** m³/s that the pumps deliver. */
  readonly delivered: number;
  /** W that go over relief valves near their setting. */
  readonly relieved: number;
  /** Actuators whose growing chamber fills with void. */
  readonly voids: readonly number[];
  /** Actuators that share one flow by the losses alone. */
  readonly rivals: readonly number[];
  /** Dependent valves find no rest. */
  readonly hunts: boolean;
}

export type SteadyAnswer =
  { readonly ok: true; readonly steady: Steady } | { readonly ok: false; readonly words: string };

/** The steady state at this moment, the dependent valves settled from where they stand. */
export function steadyNow(bench: Bench, machine: Machine): SteadyAnswer {
  const { net } = bench;
  const model = bench.model(machine, 0);
  const places = machine.stops.map((stop, i) => ({ stop, travel: machine.strokes[i] ?? 0 }));
  const answer = settleDependents(net, model, {
    commanded: machine.positions,
    places,
    before: machine.dependents,
    mostSettings: 0,
  });
  return read(net, model, machine, answer.setting, answer.result, { hunts: answer.hunts, rivals: true, kept: 0 });
}

/** The mean over an interval of which `ahead` is looked ahead; valves stay as they are. */
export function steadyOver(bench: Bench, machine: Machine, ahead: number): SteadyAnswer {
  const { net } = bench;
  const model = bench.model(machine, ahead);
  setState(
    model,
    standsAt(net, (input) => machine.positions[input] ?? 0, machine.dependents),
  );
  const result = describe(model.solver, model.solver.solve({}));
  const answer = read(net, model, machine, machine.dependents, result, { hunts: false, rivals: false, kept: 0 });
  if (!answer.ok) return answer;
  const kept = bench.storedPower(machine, ahead, answer.steady);
  return { ok: true, steady: { ...answer.steady, powerLost: answer.steady.powerLost - kept } };
}

function read(
  net: Network,
  model: FlowModel,
  machine: Machine,
  dependents: readonly number[],
  result: FlowResult,
  ask: { readonly hunts: boolean; readonly rivals: boolean; readonly kept: number },
): SteadyAnswer {
  if (result.status !== 'solved') return { ok: false, words: result.words };
  const at = (line: number): number => (line < 0 ? -1 : (model.lineOf[line] as number));
  const pressures = net.lines.map((_, line) => (at(line) < 0 ? 0 : (result.lines[at(line)]?.pressure ?? 0)));
  const speeds = result.actuators.map(({ speed, flowIn, flowOut }) =>
    Math.max(Math.abs(flowIn), Math.abs(flowOut)) > MOTION ? speed : 0,
  );
  const flowOf = branchFlows(model, result);
  const stores = net.accumulators.map((_, i) => {
    const flow = flowOf(model.stores[i] ?? -1);
    return Math.abs(flow) > MOTION ? flow : 0;
  });
  const voids = net.actuators.flatMap(({ a, b }, i) => {
    const grows = at((speeds[i] ?? 0) > 0 ? a : b);
    return speeds[i] !== 0 && grows >= 0 && (result.lines[grows]?.voidFlow ?? 0) > VOID ? [i] : [];
  });
  return {
    ok: true,
    steady: {
      dependents,
      speeds,
      forces: result.actuators.map(({ force }) => force),
      stores,
      pressures,
      powerIn: result.power.pumps,
      powerLost: result.power.lost,
      delivered: result.pumps.reduce((sum, pump) => sum + pump.delivered, 0),
      relieved: relievedPower(net, model, result),
      voids,
      rivals: ask.rivals ? rivalsOf(net, model, machine, result, speeds, pressures) : [],
      hunts: ask.hunts,
    },
  };
}

/** Branches that are off are not in the result, and names may be given twice: they are taken in their order. */
function branchFlows({ problem, solver }: FlowModel, result: Solved): (branch: number) => number {
  const flows = new Map<number, number>();
  let next = 0;
  problem.branches.forEach((branch, j) => {
    if (solver.system.on[j] !== 1) return;
    if (branch.kind === 'compensator' || branch.kind === 'cylinder' || branch.kind === 'motor') return;
    flows.set(j, result.branches[next]?.flow ?? 0);
    next += 1;
  });
  return (branch) => flows.get(branch) ?? 0;
}

function relievedPower(net: Network, model: FlowModel, result: Solved): number {
  const flowOf = branchFlows(model, result);
  return net.reliefs.reduce((sum, relief, i) => {
    const branch = model.reliefs[i] ?? -1;
    const line = (index: number): number => (index < 0 ? 0 : (result.lines[index]?.pressure ?? 0));
    const law = model.problem.branches[branch];
    const flow = flowOf(branch);
    if (!law || flow <= MOTION) return sum;
    const drop = line(law.a) - line(law.b);
    return drop > 0.5 * relief.setting ? sum + drop * flow : sum;
  }, 0);
}

/** At least two that are pressed on, of which one moves, and whose speeds rest on the losses. */
function rivalsOf(
  net: Network,
  model: FlowModel,
  machine: Machine,
  result: Solved,
  speeds: readonly number[],
  pressures: readonly number[],
): number[] {
  if (speeds.every((speed) => speed === 0)) return [];
  const pressed = net.actuators.flatMap(({ a, b }, i) => {
    const speed = speeds[i] ?? 0;
    const side = speed > 0 || (speed === 0 && machine.stops[i] === 'in') ? a : b;
    return side >= 0 && (pressures[side] ?? 0) > PRESSED ? [i] : [];
  });
  // The search for what swings costs several solves, and one alone has no rival.
  if (pressed.length < 2) return [];
  const swinging = ties(
    model.solver,
    result.lines.map(({ pressure }) => pressure),
  );
  const found = pressed.filter((i) => swinging.includes(model.actuators[i] as number));
  return found.length > 1 ? found : [];
}
