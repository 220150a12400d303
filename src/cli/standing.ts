import { MOST_ROWS } from '../analysis/analyse.ts';
import type { Network } from '../network/network.ts';
import { Failure, sayProblems } from './failure.ts';
import { readState } from './state.ts';

/** How the inputs stand, and what to say of it. */
export interface Standing {
  readonly positions: readonly number[];
  /** Label → position, of all inputs and of those that nobody gave. */
  readonly state: Readonly<Record<string, string>>;
  readonly assumed: Readonly<Record<string, string>>;
}

/** Reads `--state`, without listing any rows. Throws a `Failure` that names what it cannot read. */
export function stateOf(file: string, net: Network, texts: readonly string[]): Standing {
  const inputs = net.inputs.map(({ part, positions, rest }) => ({
    label: net.parts[part]?.label ?? '',
    positions,
    ...(rest === undefined ? {} : { rest }),
  }));
  const read = readState(texts, inputs);
  if (!read.ok) throw new Failure(sayProblems(file, read.problems));
  const { positions, assumed } = read.value;
  const state = inputs.map(({ label, positions: names }, i): [string, string] => [
    label,
    names[positions[i] ?? 0] ?? '',
  ]);
  return { positions, state: Object.fromEntries(state), assumed };
}

/** Part id → position, for `Conditions.held`, where the combinations are too many to list; undefined where they are not. */
export function heldWhereLarge(
  net: Network,
  positions: readonly number[],
): Readonly<Record<string, number>> | undefined {
  if (net.inputs.reduce((n, input) => n * input.positions.length, 1) <= MOST_ROWS) return undefined;
  return Object.fromEntries(net.inputs.map(({ part }, i) => [net.parts[part]?.id ?? '', positions[i] ?? 0]));
}

/** 0-based row of these positions. Throws a `Failure` where the combinations are too many to be listed. */
export function listedRow(file: string, net: Network, positions: readonly number[]): number {
  const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
  if (count > MOST_ROWS) {
    throw new Failure(
      `${file}: It has ${count.toLocaleString('en')} combinations of positions; up to ${MOST_ROWS.toLocaleString('en')} can be listed. Plan a part of it by itself.`,
    );
  }
  return positions.reduce((at, position, i) => at * (net.inputs[i]?.positions.length ?? 1) + position, 0);
}
