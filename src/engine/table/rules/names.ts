import { coilNames, isCoilTag } from '../../../base/coil-names.ts';
import type { Network } from '../../../network/network.ts';
import type { TableData } from '../table-data.ts';

/** The names that a rule may use, numbered as in the table. */
export interface Names {
  readonly inputs: readonly {
    readonly label: string;
    readonly positions: readonly string[];
    readonly rest?: number;
    readonly coils: readonly { readonly name: string; readonly position: number }[];
  }[];
  readonly actuators: readonly { readonly label: string; readonly motion: 'linear' | 'rotary' }[];
  readonly pumps: readonly { readonly label: string }[];
  /** `ports`: by the labels of their parts. */
  readonly lines: readonly { readonly name: string; readonly ports?: readonly string[] }[];
}

export type NamedKind = 'valve' | 'coil' | 'actuator' | 'pump' | 'line';

export interface Named {
  readonly kind: NamedKind;
  readonly name: string;
  /** Number of the input, actuator, pump or line. */
  readonly index: number;
  /** Coils: the position that the coil holds. */
  readonly position: number;
}

/** Names of a circuit too large for a table. */
export function namesOfNetwork(net: Network): Names {
  const label = (part: number): string => net.parts[part]?.label ?? '';
  return {
    inputs: net.inputs.map(({ part, positions, rest, coils }) => ({
      label: label(part),
      positions,
      coils,
      ...(rest === undefined ? {} : { rest }),
    })),
    actuators: net.actuators.map(({ part, rotary }) => ({ label: label(part), motion: rotary ? 'rotary' : 'linear' })),
    pumps: net.pumps.map(({ part }) => ({ label: label(part) })),
    lines: net.lines
      .slice(0, net.shown)
      .map(({ name, ports }) => ({ name, ports: ports.map((port) => labelled(net, port)) })),
  };
}

export const namesOfTable = ({ inputs, actuators, pumps, lines }: TableData): Names => ({
  inputs,
  actuators,
  pumps,
  lines: lines.map(({ name }) => ({ name })),
});

/** A port says its part by id; people know the label. */
function labelled(net: Network, port: string): string {
  const dot = port.lastIndexOf('.');
  const part = net.parts.find(({ id }) => id === port.slice(0, dot));
  return part ? `${part.label}${port.slice(dot)}` : port;
}

/** Where a pressure can be asked for: lines by their names and ports, and pumps for their outlets. */
export function pressurePoints(names: Names): Named[] {
  return [
    ...names.lines.map(({ name }, index): Named => ({ kind: 'line', name, index, position: 0 })),
    ...names.pumps.map(({ label }, index): Named => ({ kind: 'pump', name: label, index, position: 0 })),
    ...names.lines.flatMap(({ ports = [] }, index) =>
      ports.map((name): Named => ({ kind: 'line', name, index, position: 0 })),
    ),
  ];
}

/** A name that the rules' language reads back as this name. */
export function sayName(name: string): string {
  const plain = /^[\p{L}\p{N}][\p{L}\p{N}_.→+-]*( [\p{L}\p{N}][\p{L}\p{N}_.→+-]*)*$/u.test(name) && !/[.]$/.test(name);
  const words = name
    .split(' ')
    .some((word) =>
      /^(and|or|not|when|while|whenever|if|only|unless|is|at|every|all|each|any|some|no|a|an|never|always|rest)$/i.test(
        word,
      ),
    );
  return (plain && !words) || name.includes('"') ? name : `"${name}"`;
}

interface NamedCoil extends Named {
  /** As its valve knows it. */
  readonly own: string;
}

/** All coils by the names that they have anywhere. */
function namedCoils({ inputs }: Names): NamedCoil[] {
  const coils = inputs.flatMap(({ label, coils: own }, index) =>
    own.map(({ name, position }) => ({ label, name, index, position })),
  );
  return coilNames(coils).map((name, i): NamedCoil => {
    const { index = 0, position = 0, name: own = '' } = coils[i] ?? {};
    return { kind: 'coil', name, index, position, own };
  });
}

/** Names of coils, by input, in the order of its coils. */
export function coilNamesByInput(names: Names): string[][] {
  const all = namedCoils(names);
  return names.inputs.map((_, input) => all.filter(({ index }) => index === input).map(({ name }) => name));
}

/** What else a rule may call a coil: a letter that only one valve has, or a tag with its valve. */
export function otherCoilNames(names: Names): Named[] {
  const all = namedCoils(names);
  return all.flatMap(({ own, ...coil }) => {
    if (all.some((other) => other.own === own && other.index !== coil.index)) return [];
    const label = names.inputs[coil.index]?.label ?? '';
    return [{ ...coil, name: isCoilTag(own) ? `${label}.${own}` : own }];
  });
}

/** Everything that has a name. */
export function namedThings(names: Names): Named[] {
  return [
    ...names.inputs.map(({ label }, index): Named => ({ kind: 'valve', name: label, index, position: 0 })),
    ...names.actuators.map(({ label }, index): Named => ({ kind: 'actuator', name: label, index, position: 0 })),
    ...names.pumps.map(({ label }, index): Named => ({ kind: 'pump', name: label, index, position: 0 })),
    ...namedCoils(names).map(({ own: _, ...coil }): Named => coil),
    ...names.lines.map(({ name }, index): Named => ({ kind: 'line', name, index, position: 0 })),
  ];
}
