import type { ValveData } from './model.ts';
import { parsePath, sayPath } from './valve-path.ts';

/** Paths so that equal ones are equal texts, whatever order and direction they were written in. */
export function pathsKey(paths: readonly string[]): string {
  const said = paths.map((text) => {
    const path = parsePath(text);
    if (!path.ok) return text;
    const { ports, way } = path.value;
    return sayPath({ ...path.value, ports: way === 'both' ? [...ports].sort() : ports });
  });
  return said.sort().join(' ');
}

const shapeOf = ({ ports, positions, crossovers, rest, left, right, coils }: ValveData): string =>
  JSON.stringify([
    ports.map(({ id, side }) => [id, side]),
    positions.map(({ paths }) => pathsKey(paths)),
    (crossovers ?? []).map(pathsKey),
    rest ?? null,
    left,
    right,
    (coils ?? []).map(({ position }) => position),
  ]);

/** Whether two valves are the same but for the names of positions and coils. */
export const sameValve = (a: ValveData, b: ValveData): boolean => a === b || shapeOf(a) === shapeOf(b);

/** A valve with the names of positions and coils of another one, where it has as many. */
export function withNamesOf(valve: ValveData, named: ValveData): ValveData {
  const positions =
    valve.positions.length === named.positions.length
      ? valve.positions.map((each, i) => ({ ...each, name: named.positions[i]?.name ?? each.name }))
      : valve.positions;
  const coils =
    valve.coils?.length === named.coils?.length
      ? valve.coils?.map((each, i) => ({ ...each, name: named.coils?.[i]?.name ?? each.name }))
      : valve.coils;
  return { ...valve, positions, ...(coils && { coils }) };
}
