import { labelOf, type Circuit } from './model.ts';

/** `V12` → `V`; a name of digits alone stays. */
export const stem = (id: string): string => id.replace(/\d+$/, '') || id;

/** `CLAMP 2` → `CLAMP`. */
const nameStem = (name: string): string => name.replace(/ \d+$/, '');

/** Hands out names that nobody has; each is taken from then on. */
export interface Names {
  /** Prefix and the next free number, from 1: `V3`. */
  readonly fresh: (prefix: string) => string;
  /** The name itself if free, or with the next free number from 2: `LIFT 2`. */
  readonly like: (name: string) => string;
}

export function names(taken: Iterable<string>): Names {
  const used = new Set(taken);
  const next = new Map<string, number>();
  const number = (prefix: string, first: number): string => {
    let n = next.get(prefix) ?? first;
    while (used.has(`${prefix}${n}`)) n++;
    next.set(prefix, n + 1);
    used.add(`${prefix}${n}`);
    return `${prefix}${n}`;
  };
  return {
    fresh: (prefix) => number(prefix, 1),
    like: (name) => {
      if (used.has(name)) return number(`${nameStem(name)} `, 2);
      used.add(name);
      return name;
    },
  };
}

/** A new part's id is shown until it gets a label, so it avoids shown names too. */
export const partNames = (circuit: Circuit): Names =>
  names([...circuit.parts.map((part) => part.id), ...circuit.parts.map(labelOf)]);
export const connectionNames = (circuit: Circuit): Names =>
  names(circuit.connections.map((connection) => connection.id));
export const labelNames = (circuit: Circuit): Names => names((circuit.labels ?? []).map((label) => label.id));

/** Prefixes of ids that are never shown. */
export const CONNECTION_PREFIX = 'c';
export const LABEL_PREFIX = 't';
