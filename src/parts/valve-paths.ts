import type { ValveData } from '../circuit/model.ts';
import { parsePath, type ValvePath } from '../circuit/valve-path.ts';
import type { CrossingSpec, PathElement } from './contract.ts';

export { parsePath, type ValvePath };

/** Two ports of a path; joined ports give every pair, so that the order they were typed in does not matter. */
export interface PathPair {
  readonly from: string;
  readonly to: string;
  readonly way: 'both' | 'one-way';
  readonly throttled: boolean;
}

export function pairsOf(path: ValvePath): PathPair[] {
  const { way, throttled } = path;
  return path.ports.flatMap((from, index) => path.ports.slice(index + 1).map((to) => ({ from, to, way, throttled })));
}

/** Equal for two pairs that do the same; a both-way pair has no direction. */
export function pairKey({ from, to, way, throttled }: PathPair): string {
  const ends = way === 'both' && to < from ? [to, from] : [from, to];
  return `${ends.join(' ')} ${way} ${throttled}`;
}

/** The readable paths of a position whose ports exist; the rest is for `checkValve` to report. */
export const pathsOf = (data: ValveData, position: number): ValvePath[] =>
  readable(data, data.positions[position]?.paths ?? []);

function readable(data: ValveData, paths: readonly string[]): ValvePath[] {
  const known = new Set(data.ports.map((port) => port.id));
  return paths.flatMap((text) => {
    const parsed = parsePath(text);
    return parsed.ok && parsed.value.ports.every((id) => known.has(id)) ? [parsed.value] : [];
  });
}

/** Elements of all positions; a pair that several positions share is one element with all of them. */
export function valveElements(data: ValveData, rated: { readonly flow: number; readonly drop: number }): PathElement[] {
  const found = new Map<string, { pair: PathPair; positions: number[] }>();
  data.positions.forEach((_, position) => {
    for (const pair of pathsOf(data, position).flatMap(pairsOf)) {
      const key = pairKey(pair);
      const entry = found.get(key);
      if (!entry) found.set(key, { pair, positions: [position] });
      else if (!entry.positions.includes(position)) entry.positions.push(position);
    }
  });
  return [...found.values()].map(({ pair, positions }) => ({ type: 'path', ...pair, positions, rated }));
}

/** What is open while the valve shifts from one position to the next. */
export function valveCrossing(data: ValveData, rated: { readonly flow: number; readonly drop: number }): CrossingSpec {
  const elements = (paths: readonly ValvePath[]): PathElement[] =>
    paths.flatMap(pairsOf).map((pair): PathElement => ({ type: 'path', ...pair, rated }));
  const between = data.positions.slice(1).map((_, gap) => {
    const paths = data.crossovers?.[gap];
    return paths && elements(readable(data, paths));
  });
  const all: ValvePath = { ports: data.ports.map(({ id }) => id), way: 'both', throttled: false };
  return { between, allJoined: elements([all]) };
}
