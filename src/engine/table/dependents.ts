import { add, emptySet } from '../../base/bits.ts';
import type { Budget } from '../../base/budget.ts';
import { Cancelled } from '../../base/budget.ts';
import { mayStand } from '../../network/dependents.ts';
import type { Network } from '../../network/network.ts';
import { MOST_SETTINGS, settle } from '../flow/dependents.ts';
import type { DependentAnswer } from '../flow/dependents.ts';
import { constantPlanes, PathDependents, settleByPaths } from '../paths/dependents.ts';
import type { DependentPlanes } from '../paths/edges.ts';
import type { PathConditions } from '../paths/reach.ts';
import { PressureSolver } from './resolve.ts';
import type { Plane } from './table-data.ts';

/** Where the dependent valves stand in every row, and how far that is certain. */
export interface DependentRows {
  readonly planes: DependentPlanes;
  /** Rows in which no setting agrees with the pressures that it causes. */
  readonly hunts: Plane;
  /** A further setting that agrees has the valve there: which one holds depends on what came before. */
  readonly others: DependentPlanes;
  /** Per valve: rows in which something may shift it. */
  readonly moved: readonly Plane[];
  /** The pressures have said so; false = open paths, which the pressures may overrule. */
  readonly byPressure: boolean;
  /** False where there were too many settings to look for further answers. */
  readonly searched: boolean;
}

/** Settles single rows by pressures, and by open paths where there is no steady state. */
export class RowSettler {
  readonly net: Network;
  readonly conditions: PathConditions;
  readonly #solver: PressureSolver;
  readonly #places: readonly { readonly stop: 'between' | 'in' | 'out' }[];
  #paths: PathDependents | undefined;

  constructor(solver: PressureSolver, conditions: PathConditions) {
    this.net = solver.net;
    this.conditions = conditions;
    this.#solver = solver;
    this.#places = conditions.places.map((stop) => ({ stop }));
  }

  commanded(row: number): number[] {
    return this.net.inputs.map((_, input) => this.#solver.commanded(row, input));
  }

  /** How many settings the valves may have in a row. */
  settings(row: number): number {
    const commanded = this.commanded(row);
    return this.net.dependents.reduce((n, valve) => n * mayStand(valve, commanded, this.#places).length, 1);
  }

  at(row: number, mostSettings = MOST_SETTINGS): DependentAnswer {
    const solver = this.#solver;
    const start = {
      commanded: this.commanded(row),
      places: this.#places,
      mostSettings,
      unsolved: (setting: readonly number[]) => this.byPaths(row, setting),
    };
    return settle(this.net, start, (setting) => {
      const { result } = solver.solve(row, setting);
      return result.status === 'solved' ? (line) => solver.pressure(result, line) : undefined;
    });
  }

  /** Where open paths lead from a setting. */
  byPaths(row: number, setting: readonly number[]): number[] {
    this.#paths ??= new PathDependents(this.net, this.conditions, 1);
    const word = row >>> 5;
    const states = this.#paths.edges.states;
    this.#paths.put(constantPlanes(this.net, setting, states), word, 1);
    const next = this.#paths.next(this.#paths.solve(word, 1));
    return next.map((planes) =>
      Math.max(
        0,
        planes.findIndex((plane) => (((plane[0] as number) >>> (row & 31)) & 1) === 1),
      ),
    );
  }
}

/**
 * Settles every row: by pressures if `rows` allows for that, else by open paths. `solver`: needed for pressures.
 * Throws `Cancelled` when the budget says so.
 */
export function settleRows(
  net: Network,
  conditions: PathConditions,
  budget: Budget,
  rows: number,
  solver: PressureSolver | undefined,
): DependentRows | undefined {
  if (net.dependents.length === 0) return undefined;
  const heartbeat = (): void => {
    if (budget.cancelled()) throw new Cancelled();
  };
  const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
  const places = conditions.places.map((stop) => ({ stop }));
  const radices = net.inputs.map((input) => input.positions.length);
  const moved = net.dependents.map(() => emptySet(count));
  if (solver === undefined || count > rows) {
    const found = settleByPaths(net, conditions, heartbeat);
    return {
      planes: found.planes,
      hunts: found.hunts,
      others: found.others,
      moved: found.open,
      byPressure: false,
      searched: found.searched,
    };
  }
  const settler = new RowSettler(solver, conditions);
  // Looking for further answers solves every setting of a row; where that is too much, each row gives its first answer.
  let sum = 0;
  for (let row = 0; row < count && sum <= 4 * rows; row++) sum += Math.min(settler.settings(row), MOST_SETTINGS);
  const most = sum <= 4 * rows ? MOST_SETTINGS : 0;
  const empty = (): Plane[][] => net.dependents.map(({ positions }) => positions.map(() => emptySet(count)));
  const planes = empty();
  const others = empty();
  const hunts = emptySet(count);
  let searched = true;
  for (let row = 0; row < count; row++) {
    if ((row & 31) === 0) heartbeat();
    const found = settler.at(row, most);
    const commanded = radices.map((_, input) => solver.commanded(row, input));
    net.dependents.forEach((valve, d) => {
      if (mayStand(valve, commanded, places).length > 1) add(moved[d] as Plane, row);
      add(planes[d]?.[found.setting[d] as number] as Plane, row);
    });
    for (const other of found.others) other.forEach((p, d) => add(others[d]?.[p] as Plane, row));
    if (found.hunts) add(hunts, row);
    searched &&= found.searched;
  }
  return { planes, hunts, others, moved, byPressure: true, searched };
}

/** Where the dependent valves of every row stand, for engines that only need their paths; undefined if there are none. */
export function settledPlanes(
  net: Network,
  conditions: PathConditions,
  budget: Budget,
  rows: number,
): DependentPlanes | undefined {
  if (net.dependents.length === 0) return undefined;
  return settleRows(net, conditions, budget, rows, new PressureSolver(net, conditions))?.planes;
}

/** Rows in which some other setting agrees as well. */
export function historyRows(others: DependentPlanes, count: number): Plane {
  const out = emptySet(count);
  for (const plane of others[0] ?? [])
    if (plane) for (let w = 0; w < out.length; w++) out[w] = (out[w] as number) | (plane[w] as number);
  return out;
}
