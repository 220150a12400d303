import type { NetDependent, NetRollerShift, NetShift, Network } from './network.ts';

/** Where an actuator stands; `travel` in m from the inner stop, where it is known. */
export interface ActuatorPlace {
  readonly stop: 'between' | 'in' | 'out';
  readonly travel?: number;
}

const BETWEEN: ActuatorPlace = { stop: 'between' };

/** A travel within this, m, counts as reached. */
const TRAVEL = 1e-6;

/** True if the actuator stands where it trips the roller. Between its stops, its travel not known, it trips none. */
export function trips(shift: NetRollerShift, places: readonly ActuatorPlace[]): boolean {
  if (shift.actuator < 0) return false;
  const { stop, travel } = places[shift.actuator] ?? BETWEEN;
  const { trip } = shift;
  if ('at' in trip) return stop === trip.at;
  if ('from' in trip) return travel === undefined ? stop === 'out' : travel >= trip.from - TRAVEL;
  return travel === undefined ? stop === 'in' : travel <= trip.upTo + TRAVEL;
}

/** True if the pilot stage lets this shift act. */
export const staged = (shift: NetShift, commanded: readonly number[]): boolean =>
  shift.by === 'roller' || shift.input < 0 || ((shift.stages >>> (commanded[shift.input] ?? 0)) & 1) === 1;

/** Positions that a valve may stand in under these commands, whatever the pressures; where it starts from comes first. */
export function mayStand(
  valve: NetDependent,
  commanded: readonly number[],
  places: readonly ActuatorPlace[],
  before?: number,
): number[] {
  const roller = valve.shifts.find((shift) => shift.by === 'roller' && trips(shift, places));
  if (roller) return [roller.position];
  const acting = valve.shifts.filter((shift) => shift.by === 'pressure' && staged(shift, commanded));
  // A detented valve keeps whatever it has been shifted to.
  const left = valve.rest === undefined ? valve.positions.map((_, position) => position) : [valve.rest];
  const first = before ?? valve.rest ?? 0;
  const all = [...left, ...acting.map((shift) => shift.position)];
  return all.includes(first) ? [...new Set([first, ...all])] : [...new Set(all)];
}

/** Label of a dependent valve: the part's, and what it is called where the part is an input as well. */
export function dependentLabel(net: Network, dependent: number): string {
  const valve = net.dependents[dependent];
  const label = net.parts[valve?.part ?? -1]?.label ?? '';
  return valve?.called === undefined ? label : `${label} ${valve.called}`;
}

/** Where the valve of path index `input` stands: a commanded one, or a dependent one of this setting. */
export const standsAt =
  (net: Network, commanded: (input: number) => number, setting: readonly number[]) =>
  (input: number): number =>
    input < net.inputs.length ? commanded(input) : (setting[input - net.inputs.length] ?? 0);

/** The same circuit with its dependent valves as further inputs, moved by hand: what could be, wherever they stand. */
export const asInputs = (net: Network): Network => ({
  ...net,
  inputs: [
    ...net.inputs,
    ...net.dependents.map(({ part, positions, rest }) => ({
      part,
      positions,
      ...(rest !== undefined && { rest }),
      by: 'hand' as const,
      coils: [],
    })),
  ],
  dependents: [],
});

/** Every choice of one from each list, the first list slowest. */
export function combinations(lists: readonly (readonly number[])[]): number[][] {
  return lists.reduce<number[][]>((all, list) => all.flatMap((one) => list.map((p) => [...one, p])), [[]]);
}

export const sameSetting = (a: readonly number[], b: readonly number[]): boolean =>
  a.length === b.length && a.every((p, i) => p === b[i]);
