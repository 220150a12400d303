import type { NetPath, NetPressureValve, Network } from '../../network/network.ts';
import { FlowBuilder } from './builder.ts';
import type { Loss } from './builder.ts';
import { layDivider } from './dividers.ts';
import { TANK } from './problem.ts';
import type { Branch, FlowProblem } from './problem.ts';
import { FlowSolver } from './solver.ts';

/** What holds for every state. */
export interface FlowConditions {
  readonly pumpsRunning: boolean;
  readonly places: readonly ('between' | 'in' | 'out')[];
}

/** A circuit laid out for the solver once; states are set by switching paths. */
export interface FlowModel {
  readonly solver: FlowSolver;
  readonly problem: FlowProblem;
  /** Line of the network → line of the problem, or TANK. */
  readonly lineOf: Int32Array;
  /** Per actuator, relief: its branch. Per pump: its number. */
  readonly actuators: readonly number[];
  readonly reliefs: readonly number[];
  /** Per relief: the branch of its pilot stage; -1 without. */
  readonly vents: readonly number[];
  /** Per pressure valve of the network: its branch; -1 where both ends are one line. */
  readonly valves: readonly number[];
  readonly pumps: readonly number[];
  /** Per accumulator: its branch, whose flow is what it takes in. */
  readonly stores: readonly number[];
  /** Branch of every path; -1 where another branch stands for it. */
  readonly paths: readonly number[];
  readonly switched: readonly { readonly branch: number; readonly input: number; readonly positions: number }[];
}

/** m³/s per Pa by which a stopped pump lets its outlet down: 0.01 L/min per bar, common practice. */
const STOPPED_LEAKAGE = (0.01 * 1e-3) / 60 / 1e5;

export function compileFlow(net: Network, conditions: FlowConditions): FlowModel {
  const builder = new FlowBuilder();
  const lineOf = Int32Array.from(net.lines, (line) => (line.tank ? TANK : builder.line(line.name)));
  const at = (line: number): number => (line < 0 ? TANK : (lineOf[line] as number));
  const label = (part: number): string => net.parts[part]?.label ?? '';

  const valves = net.valves.map((valve) => layValve(builder, valve, at, label(valve.part)));
  const dividers = net.dividers.map((divider) => layDivider(builder, divider, at, label(divider.part)));
  const paths = net.paths.map((path) =>
    path.divider !== undefined
      ? (dividers[path.divider.index]?.[path.divider.outlet] ?? -1)
      : path.valve === undefined
        ? layPath(builder, net, path, at, label(path.part))
        : -1,
  );
  const switched = net.paths.flatMap((path, i) => {
    const branch = paths[i] as number;
    return path.input >= 0 && branch >= 0 ? [{ branch, input: path.input, positions: path.positions }] : [];
  });
  const reliefs = net.reliefs.map((relief) => {
    const id = label(relief.part);
    const override = relief.override > 0 ? relief.override : undefined;
    const [from, to] = [at(relief.from), at(relief.to)];
    return relief.vent && from !== to
      ? builder.pilotRelief(id, from, to, at(relief.vent.line), relief.vent.pressure, override)
      : builder.relief(id, from, to, relief.setting, override);
  });
  const vents = net.reliefs.map(({ part, to, setting, vent }) =>
    vent ? builder.relief(`${label(part)} pilot`, at(vent.line), at(to), setting - vent.pressure) : -1,
  );
  const stores = net.accumulators.map((store) =>
    builder.accumulator(label(store.part), at(store.line), store.charged ? store.pressure : store.precharge),
  );
  const actuators = net.actuators.map((actuator, i) => {
    const { forces, areaA, areaB } = actuator;
    const load = {
      pressing: forces.pressing,
      resisting: forces.resisting,
      friction: forces.friction,
      spring: forces.spring,
    };
    if (actuator.rotary)
      return builder.motor(label(actuator.part), at(actuator.a), at(actuator.b), {
        displacement: areaA,
        load,
        leakage: actuator.leakage,
        ...(actuator.drain && { drain: at(actuator.drain.line), drainLeakage: actuator.drain.leakage }),
      });
    const place = conditions.places[i];
    return builder.cylinder(label(actuator.part), at(actuator.a), at(actuator.b), {
      areaA,
      areaB: actuator.b < 0 ? 0 : areaB,
      load,
      ...(place === 'in' || place === 'out' ? { at: place } : {}),
    });
  });
  const pumps = net.pumps.map((pump) => {
    const id = label(pump.part);
    if (!conditions.pumpsRunning || pump.atRest)
      return builder.pumpStopped(id, at(pump.outlet), pump.tightWhenStopped ? 0 : STOPPED_LEAKAGE);
    return pump.compensated
      ? builder.pumpCompensated(id, at(pump.outlet), pump.flow, pump.setting)
      : builder.pumpFixed(id, at(pump.outlet), pump.flow);
  });
  const built = builder.build();
  // A charged accumulator gives oil and takes none; an empty one takes it at its pre-charge and gives none.
  const branches = [...built.branches];
  net.accumulators.forEach((store, i) => {
    const branch = stores[i] as number;
    branches[branch] = { ...(branches[branch] as Branch), ...(store.charged ? { hi: 0 } : { lo: 0 }) };
  });
  const problem = { ...built, branches };
  const solver = new FlowSolver(problem);
  return { solver, problem, lineOf, actuators, reliefs, vents, valves, pumps, stores, paths, switched };
}

/** A valve that closes is one that opens while its signals, turned round, are above the setting, turned round. */
function layValve(builder: FlowBuilder, valve: NetPressureValve, at: (line: number) => number, label: string): number {
  const [from, to] = [at(valve.from), at(valve.to)];
  if (from === to) return -1;
  const sign = valve.duty === 'closes' ? -1 : 1;
  const signals = valve.signals.map(({ line, factor }) => ({ line: at(line), factor: sign * factor }));
  return builder.pressureValve(`${label} ${valve.fromPort}–${valve.toPort}`, from, to, signals, {
    setting: sign * valve.setting,
    ...(valve.override > 0 && { gradient: valve.override }),
    ...(valve.rated && { loss: valve.rated }),
  });
}

function layPath(
  builder: FlowBuilder,
  net: Network,
  path: NetPath,
  at: (line: number) => number,
  label: string,
): number {
  const id = `${label} ${path.fromPort}–${path.toPort}`;
  const [from, to] = [at(path.from), at(path.to)];
  if (from === to) return -1;
  const loss: Loss = path.rated ?? {};
  const on = path.input < 0;
  if (path.limit !== undefined) return builder.flowControl(id, from, to, path.limit, loss, !path.oneWay, on);
  if (path.pilot >= 0) {
    // The lock check's own free way is part of the same element.
    return builder.lockCheck(id, to, from, at(path.pilot), path.pilotRatio, {
      cracking: freeWayOf(net, path)?.cracking ?? 0,
      loss,
    });
  }
  if (path.vent >= 0) return builder.shuttleBack(id, from, to, at(path.vent), loss);
  if (path.oneWay && net.paths.some((other) => other.pilot >= 0 && freeWayOf(net, other) === path)) return -1;
  if (path.throttled) {
    // A throttled path inside a box without data of its own still takes away more than an open one.
    return path.oneWay
      ? builder.check(id, from, to, path.cracking, loss, on)
      : builder.throttle(id, from, to, loss, on);
  }
  return path.oneWay ? builder.check(id, from, to, path.cracking, loss, on) : builder.openPath(id, from, to, loss, on);
}

/** The one-way path of the same part that runs the other way. */
const freeWayOf = (net: Network, pilot: NetPath): NetPath | undefined =>
  net.paths.find(
    (path) => path.part === pilot.part && path.pilot < 0 && path.from === pilot.to && path.to === pilot.from,
  );

/** Opens the paths of a state and shuts the others. */
export function setState(model: FlowModel, position: (input: number) => number): void {
  for (const { branch, input, positions } of model.switched) {
    model.solver.setOn(branch, ((positions >>> position(input)) & 1) === 1);
  }
}
