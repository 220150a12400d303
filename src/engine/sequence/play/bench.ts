import type { Network } from '../../../network/network.ts';
import { compileFlow } from '../../flow/compile.ts';
import type { FlowModel } from '../../flow/compile.ts';
import type { Branch } from '../../flow/problem.ts';
import { FlowSolver } from '../../flow/solver.ts';
import { fullAt, gasPressure, gasStiffness, isEndless, springForce, springRate } from './machine.ts';
import type { Machine } from './machine.ts';

/** Models kept; a plan comes back to the same few states. */
const MOST_MODELS = 200;

/** The circuit laid out for the flow solver, once for each set of stops, pumps, springs and gas pressures. */
export class Bench {
  readonly net: Network;
  readonly #models = new Map<string, FlowModel>();

  constructor(net: Network) {
    this.net = net;
  }

  /**
   * `ahead`: s by which springs and gas are taken ahead of the moment, as a resistance to their own motion
   * (implicit midpoint with half an interval, backward Euler with a whole one).
   */
  model(machine: Machine, ahead: number): FlowModel {
    const key = this.#keyOf(machine, ahead);
    const known = this.#models.get(key);
    if (known) return known;
    if (this.#models.size >= MOST_MODELS) this.#models.clear();
    const made = this.#build(machine, ahead);
    this.#models.set(key, made);
    return made;
  }

  /** J per s that the look-ahead puts into springs and gas, which is no heat. */
  storedPower(
    machine: Machine,
    ahead: number,
    flows: { readonly speeds: readonly number[]; readonly stores: readonly number[] },
  ): number {
    if (ahead === 0) return 0;
    const { net } = this;
    const springs = net.actuators.reduce((sum, a, i) => sum + springRate(a) * (flows.speeds[i] ?? 0) ** 2, 0);
    const gas = net.accumulators.reduce(
      (sum, store, i) => sum + gasStiffness(store, machine.stored[i] ?? 0) * (flows.stores[i] ?? 0) ** 2,
      0,
    );
    return ahead * (springs + gas);
  }

  #keyOf({ stops, running, stored, strokes }: Machine, ahead: number): string {
    const springs = this.net.actuators.map((a, i) => (a.forces.spring === 0 ? '' : (strokes[i] ?? 0)));
    return [stops.join(), running.join(), stored.join(), springs.join(), ahead].join('|');
  }

  #build(machine: Machine, ahead: number): FlowModel {
    const { net } = this;
    const variant: Network = {
      ...net,
      pumps: net.pumps.map((pump, i) => (machine.running[i] ? pump : { ...pump, atRest: true })),
      accumulators: net.accumulators.map((store, i) => ({
        ...store,
        charged: true,
        pressure: gasPressure(store, machine.stored[i] ?? 0),
      })),
      actuators: net.actuators.map((actuator, i) => ({
        ...actuator,
        forces: { ...actuator.forces, spring: springForce(actuator, machine.strokes[i] ?? 0) },
      })),
    };
    const model = compileFlow(variant, { pumpsRunning: true, places: machine.stops });
    if (net.accumulators.length === 0 && (ahead === 0 || net.actuators.every(({ forces }) => forces.spring === 0)))
      return model;
    const branches = [...model.problem.branches];
    const change = (index: number | undefined, by: (branch: Branch) => Partial<Branch>): void => {
      const branch = branches[index ?? -1];
      if (branch) branches[index as number] = { ...branch, ...by(branch) };
    };
    net.accumulators.forEach((store, i) => {
      const oil = machine.stored[i] ?? 0;
      const bounds = isEndless(store)
        ? store.charged
          ? { lo: -Infinity, hi: 0 }
          : { lo: 0, hi: Infinity }
        : { lo: oil <= 0 ? 0 : -Infinity, hi: oil >= fullAt(store) ? 0 : Infinity };
      change(model.stores[i], ({ r }) => ({ ...bounds, r: r + ahead * gasStiffness(store, oil) }));
    });
    net.actuators.forEach((actuator, i) => {
      if (actuator.forces.spring === 0) return;
      change(model.actuators[i], ({ r }) => ({ r: r + ahead * springRate(actuator) }));
    });
    const problem = { ...model.problem, branches };
    return { ...model, problem, solver: new FlowSolver(problem) };
  }
}
