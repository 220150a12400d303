import type { NetPath, Network } from './network.ts';

/** One commanded valve on its way between two positions: the paths that are open there. */
export interface Shifting {
  readonly input: number;
  readonly paths: readonly NetPath[];
}

/**
 * The circuit with every commanded valve as it stands, or one of them on its way: a network of one combination,
 * however many the circuit has. Lines, actuators, pumps and dependent valves keep their numbers, paths do not.
 */
export function frozenAt(net: Network, positions: readonly number[], shifting?: Shifting): Network {
  const commanded = net.inputs.length;
  const standing = net.paths.flatMap((path): NetPath[] => {
    const { input } = path;
    if (input < 0 || input >= commanded) return [path];
    const open = input !== shifting?.input && ((path.positions >>> (positions[input] ?? 0)) & 1) === 1;
    return open ? [{ ...path, input: -1, positions: 0 }] : [];
  });
  return {
    ...net,
    inputs: net.inputs.map(({ part, positions: names, by }, i) => ({
      part,
      positions: [names[positions[i] ?? 0] ?? ''],
      by,
      coils: [],
    })),
    dependents: net.dependents.map((dependent) => ({
      ...dependent,
      shifts: dependent.shifts.map((shift) =>
        shift.by === 'roller' || shift.input < 0
          ? shift
          : { ...shift, stages: (shift.stages >>> (positions[shift.input] ?? 0)) & 1 },
      ),
    })),
    paths: [...standing, ...(shifting?.paths ?? [])],
  };
}
