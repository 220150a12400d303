import type { NetPath, Network } from './network.ts';

/**
 * The circuit with some inputs held in one position: combinations of the others alone. Lines, inputs, actuators, pumps
 * and dependent valves keep their numbers, paths do not. Per input its position; undefined = it stays free.
 */
export function hold(net: Network, held: readonly (number | undefined)[]): Network {
  if (held.every((position) => position === undefined)) return net;
  const at = (input: number): number | undefined => (input < net.inputs.length ? held[input] : undefined);
  return {
    ...net,
    inputs: net.inputs.map((input, i) => {
      const position = held[i];
      if (position === undefined) return input;
      const { part, by, rest, positions, coils } = input;
      return {
        part,
        by,
        positions: [positions[position] ?? ''],
        ...(rest === position && { rest: 0 }),
        coils: coils.filter((coil) => coil.position === position).map(({ name }) => ({ name, position: 0 })),
      };
    }),
    dependents: net.dependents.map((dependent) => ({
      ...dependent,
      shifts: dependent.shifts.map((shift) => {
        const position = shift.by === 'roller' ? undefined : at(shift.input);
        return shift.by === 'roller' || position === undefined
          ? shift
          : { ...shift, stages: (shift.stages >>> position) & 1 };
      }),
    })),
    paths: net.paths.flatMap((path): NetPath[] => {
      const position = at(path.input);
      if (position === undefined) return [path];
      return ((path.positions >>> position) & 1) === 1 ? [{ ...path, positions: 1 }] : [];
    }),
  };
}
