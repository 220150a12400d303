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

/** States of `holdEach` at once: as many positions as a bit mask holds. */
export const MOST_HELD = 30;

/**
 * The same for several choices of held positions at once: choice k is position k of one more input, the last and so
 * the fastest. At most `MOST_HELD` of them, all holding the same inputs; for circuits without dependent valves.
 */
export function holdEach(net: Network, choices: readonly (readonly (number | undefined)[])[]): Network {
  const [first = []] = choices;
  if (net.dependents.length > 0 || choices.length > MOST_HELD)
    throw new RangeError('these choices cannot be one input');
  const one = hold(net, first);
  const choice = net.inputs.length;
  return {
    ...one,
    inputs: [...one.inputs, { part: -1, by: 'lever', positions: choices.map((_, k) => String(k)), coils: [] }],
    paths: net.paths.flatMap((path): NetPath[] => {
      if (path.input < 0 || first[path.input] === undefined) return [path];
      let positions = 0;
      choices.forEach((held, k) => {
        if (((path.positions >>> (held[path.input] ?? 0)) & 1) === 1) positions |= 1 << k;
      });
      return positions === 0 ? [] : [{ ...path, input: choice, positions }];
    }),
  };
}
