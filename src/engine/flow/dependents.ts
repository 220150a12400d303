import { combinations, mayStand, sameSetting, staged, standsAt, trips } from '../../network/dependents.ts';
import type { ActuatorPlace } from '../../network/dependents.ts';
import type { NetDependent, Network } from '../../network/network.ts';
import { setState } from './compile.ts';
import type { FlowModel } from './compile.ts';
import { describe } from './result.ts';
import type { FlowResult } from './result.ts';

export type { ActuatorPlace } from '../../network/dependents.ts';

/** Where the fixpoint starts, and what it may spend. */
export interface DependentStart {
  /** Position of every input. */
  readonly commanded: readonly number[];
  /** Per actuator; absent = between its stops. */
  readonly places?: readonly ActuatorPlace[];
  /** Where the dependent valves stood before; absent = where their springs put them, detented ones in their first position. */
  readonly before?: readonly number[];
  /** Settings that it may try one by one to look for further answers; 0 = it looks for none unless it hunts. Default 256. */
  readonly mostSettings?: number;
  /** Says where a setting leads that has no steady state; without it the search ends there, and it is no further answer. */
  readonly unsolved?: (setting: readonly number[]) => readonly number[];
}

export interface DependentAnswer {
  /** Position of every dependent valve, by their order in the network. */
  readonly setting: readonly number[];
  /** No setting agrees with the pressures that it causes; `setting` is then one of `tried`. */
  readonly hunts: boolean;
  /** Where it hunts: the settings that it runs through in turn. */
  readonly cycle: readonly (readonly number[])[];
  /** Other settings that agree with their own pressures: which of them holds depends on what came before. */
  readonly others: readonly (readonly number[])[];
  /** False where there were too many settings to look for others. */
  readonly searched: boolean;
}

/** Settings tried at most where nothing else is asked. */
export const MOST_SETTINGS = 256;

/** Gauge pressure of a line of the network, Pa. */
export type Pressure = (line: number) => number;

/** Pa that a signal may lack and still count as reaching its setting: rounding of the solver, no hysteresis. */
const slack = (setting: number): number => 1 + 1e-6 * Math.abs(setting);

/** Σ factor·p of a shift, Pa. */
export const signalOf = (
  signals: readonly { readonly line: number; readonly factor: number }[],
  at: Pressure,
): number => signals.reduce((sum, { line, factor }) => sum + factor * at(line), 0);

/** The position that a valve goes to from `now` under these pressures. */
export function shiftedTo(
  valve: NetDependent,
  now: number,
  commanded: readonly number[],
  places: readonly ActuatorPlace[],
  at: Pressure,
): number {
  const acting = valve.shifts.find((shift) =>
    shift.by === 'roller'
      ? trips(shift, places)
      : staged(shift, commanded) && signalOf(shift.signals, at) >= shift.setting - slack(shift.setting),
  );
  return acting?.position ?? valve.rest ?? now;
}

/**
 * The positions of the dependent valves that agree with the pressures they cause: from where they stood,
 * each to where the pressures shift it, until nothing moves. `solve` gives the pressures of a setting, undefined where there is
 * no steady state.
 */
export function settle(
  net: Network,
  start: DependentStart,
  solve: (setting: readonly number[]) => Pressure | undefined,
): DependentAnswer {
  const { commanded, places = [], before, mostSettings = MOST_SETTINGS, unsolved } = start;
  const { dependents } = net;
  const known = new Map<string, readonly number[] | undefined>();
  const next = (setting: readonly number[]): readonly number[] | undefined => {
    const key = setting.join();
    if (!known.has(key)) {
      const at = solve(setting);
      const to = at && dependents.map((valve, d) => shiftedTo(valve, setting[d] as number, commanded, places, at));
      known.set(key, to ?? unsolved?.(setting));
    }
    return known.get(key);
  };
  const agrees = (setting: readonly number[]): boolean => sameSetting(next(setting) ?? [-1], setting);

  const may = dependents.map((valve, d) => mayStand(valve, commanded, places, before?.[d]));
  const settings = may.reduce((n, list) => n * list.length, 1);
  const path: (readonly number[])[] = [];
  let setting: readonly number[] = dependents.map((valve, d) => before?.[d] ?? valve.rest ?? may[d]?.[0] ?? 0);
  while (!path.some((earlier) => sameSetting(earlier, setting)) && path.length <= MOST_SETTINGS) {
    path.push(setting);
    setting = next(setting) ?? setting;
  }
  const last = path.at(-1) as readonly number[];
  const found = sameSetting(last, setting) ? last : undefined;
  const searched = settings <= (found ? mostSettings : Math.max(mostSettings, MOST_SETTINGS));
  const agreeing = searched ? combinations(may).filter(agrees) : found ? [found] : [];
  const chosen = found ?? agreeing[0];
  const from = path.findIndex((earlier) => sameSetting(earlier, setting));
  return {
    setting: chosen ?? setting,
    hunts: chosen === undefined,
    cycle: chosen === undefined ? path.slice(Math.max(0, from)) : [],
    others: agreeing.filter((other) => !sameSetting(other, chosen ?? [])),
    searched,
  };
}

/**
 * `settle` by the steady pressures of a compiled circuit, and the pressures of the setting that it finds:
 * for whoever plays events and so knows where valves stood (`before`) and how far actuators have come
 * (`places`). The model is left in that state. The places of `model` and of `start` are two things: the one says which
 * way a cylinder can still go, the other which rollers it trips.
 */
export function settleDependents(
  net: Network,
  model: FlowModel,
  start: DependentStart,
): DependentAnswer & { readonly result: FlowResult } {
  let warm: Float64Array | undefined;
  const solve = (setting: readonly number[]): FlowResult => {
    setState(
      model,
      standsAt(net, (input) => start.commanded[input] ?? 0, setting),
    );
    const solution = model.solver.solve(warm ? { warm } : {});
    const result = describe(model.solver, solution);
    warm = result.status === 'solved' ? Float64Array.from(solution.pressures) : undefined;
    return result;
  };
  const answer = settle(net, start, (setting) => {
    const result = solve(setting);
    if (result.status !== 'solved') return undefined;
    return (line) => {
      const at = line < 0 ? -1 : (model.lineOf[line] as number);
      return at < 0 ? 0 : (result.lines[at]?.pressure ?? 0);
    };
  });
  return { ...answer, result: solve(answer.setting) };
}
