import { omit } from './fields.ts';
import { isId, isOneLine } from './limits.ts';
import type { Operator, ValveCoil, ValveData, ValvePort, ValvePosition } from './model.ts';
import { RefusedEdit } from './refused.ts';
import { parsePath, PORT_NAME, sayPath } from './valve-path.ts';

/** Changes of a valve's ports and positions. All of them give a new valve, or throw `RefusedEdit`. */

export const WAYS = { least: 2, most: 8 } as const;
export const POSITIONS = { least: 2, most: 4 } as const;

export type End = 'left' | 'right';

const TOP_NAMES = ['A', 'B', 'C', 'D', 'E', 'F', 'G', 'H'];
const BOTTOM_NAMES = ['P', 'T', 'R', 'S', 'U', 'V', 'W', 'Z'];
const POSITION_NAMES = ['a', '0', 'b', 'c', 'd'];

const free = (names: readonly string[], taken: readonly string[]): string =>
  names.find((name) => !taken.includes(name)) ?? '';

/** A port at the end of an edge, with the next letter. */
export function addPort(valve: ValveData, side: ValvePort['side']): ValveData {
  if (valve.ports.length >= WAYS.most)
    throw new RefusedEdit('valve ports', `A valve has at most ${WAYS.most} ways.`, 'Remove a port first.');
  const id = free(
    side === 'top' ? TOP_NAMES : BOTTOM_NAMES,
    valve.ports.map((port) => port.id),
  );
  return { ...valve, ports: [...valve.ports, { id, side }] };
}

/** Its paths go with it; ports that were joined through it stay joined. */
export function removePort(valve: ValveData, id: string): ValveData {
  const { length } = valve.ports;
  portPlace(valve, id);
  if (length <= WAYS.least)
    throw new RefusedEdit('valve ports', `A valve has at least ${WAYS.least} ways.`, 'Add another port first.');
  const ports = valve.ports.filter((port) => port.id !== id);
  return withPaths({ ...valve, ports }, (list) =>
    list.flatMap((text) => {
      const path = parsePath(text);
      if (!path.ok || !path.value.ports.includes(id)) return [text];
      const left = path.value.ports.filter((port) => port !== id);
      return left.length > 1 ? [sayPath({ ...path.value, ports: left })] : [];
    }),
  );
}

export function renamePort(valve: ValveData, id: string, name: string): ValveData {
  const at = portPlace(valve, id);
  if (name === id) return valve;
  if (!PORT_NAME.test(name) || !isId(name))
    throw new RefusedEdit(
      `valve port ${id}`,
      `"${name}" cannot be the name of a port.`,
      'Use a letter, then letters or digits, such as P or T2.',
    );
  if (valve.ports.some((port) => port.id === name))
    throw new RefusedEdit(`valve port ${id}`, `Another port is called ${name}.`, 'Choose another letter.');
  const ports = valve.ports.with(at, { ...(valve.ports[at] as ValvePort), id: name });
  return withPaths({ ...valve, ports }, (list) =>
    list.map((text) => {
      const path = parsePath(text);
      if (!path.ok || !path.value.ports.includes(id)) return text;
      return sayPath({ ...path.value, ports: path.value.ports.map((port) => (port === id ? name : port)) });
    }),
  );
}

/** By so many places along its edge; stays on it. */
export function movePort(valve: ValveData, id: string, by: number): ValveData {
  const at = portPlace(valve, id);
  const side = valve.ports[at]?.side;
  const edge = valve.ports.flatMap((port, i) => (port.side === side ? [i] : []));
  const to = edge[Math.min(edge.length - 1, Math.max(0, edge.indexOf(at) + by))] ?? at;
  return { ...valve, ports: valve.ports.toSpliced(at, 1).toSpliced(to, 0, valve.ports[at] as ValvePort) };
}

export function setPortSide(valve: ValveData, id: string, side: ValvePort['side']): ValveData {
  const at = portPlace(valve, id);
  return { ...valve, ports: valve.ports.with(at, { ...(valve.ports[at] as ValvePort), side }) };
}

/** A position with all ports shut, before the one at `index` or at the end. */
export function addPosition(valve: ValveData, index = valve.positions.length): ValveData {
  const { positions } = valve;
  if (positions.length >= POSITIONS.most)
    throw new RefusedEdit('valve positions', `A valve has at most ${POSITIONS.most} positions.`, 'Remove one first.');
  const name = free(
    POSITION_NAMES,
    positions.map((each) => each.name),
  );
  const order: (number | ValvePosition)[] = positions.map((_, i) => i);
  return reordered(valve, order.toSpliced(index, 0, { name, paths: [] }));
}

/** Coils that lead to it go with it, drawn ones too; a crossover that it parted is not known any more. */
export function removePosition(valve: ValveData, index: number): ValveData {
  positionAt(valve, index);
  if (valve.positions.length <= POSITIONS.least)
    throw new RefusedEdit('valve positions', `A valve has at least ${POSITIONS.least} positions.`, 'Add one first.');
  return reordered(
    valve,
    valve.positions.flatMap((_, i) => (i === index ? [] : [i])),
  );
}

/** By so many places to the right; rest, coils and the crossovers that still stand between the same two go along. */
export function movePosition(valve: ValveData, index: number, by: number): ValveData {
  positionAt(valve, index);
  const order = valve.positions.map((_, i) => i);
  const to = Math.min(order.length - 1, Math.max(0, index + by));
  return reordered(valve, order.toSpliced(index, 1).toSpliced(to, 0, index));
}

export function renamePosition(valve: ValveData, index: number, name: string): ValveData {
  const position = positionAt(valve, index);
  const wanted = name.trim();
  if (wanted === '' || !isOneLine(wanted))
    throw new RefusedEdit('valve position', 'A position needs a name of one line.', 'Type one, such as a or raise.');
  if (valve.positions.some((each, i) => i !== index && each.name === wanted))
    throw new RefusedEdit('valve position', `Another position is called "${wanted}".`, 'Choose another name.');
  return { ...valve, positions: valve.positions.with(index, { ...position, name: wanted }) };
}

/** What would go, besides its paths, if the position did; in words, empty = nothing. */
export function lostWithPosition(valve: ValveData, index: number): string[] {
  const coils = (valve.coils ?? []).filter((coil) => coil.position === index).map((coil) => `coil ${coil.name}`);
  const inner = index > 0 && index + 1 < valve.positions.length;
  const known = (valve.crossovers?.length ?? 0) > index - 1;
  return [
    ...coils,
    ...(valve.rest === index ? ['the rest position'] : []),
    ...(valve.crossovers && inner && known ? ['the crossovers from there on'] : []),
  ];
}

export function setRest(valve: ValveData, rest: number | undefined): ValveData {
  if (rest === undefined) return omit(valve, 'rest');
  positionAt(valve, rest);
  return { ...valve, rest };
}

/** What is open while shifting, for all pairs of neighbours; `unknown` takes the data away. */
export function setCrossovers(valve: ValveData, to: 'unknown' | 'shut' | 'joined' | 'complete'): ValveData {
  if (to === 'unknown') return omit(valve, 'crossovers');
  const all = valve.ports.map(({ id }) => id).join('-');
  const between = valve.positions.slice(1).map((_, gap): readonly string[] => {
    if (to === 'complete') return valve.crossovers?.[gap] ?? [];
    return to === 'shut' ? [] : [all];
  });
  return { ...valve, crossovers: between };
}

function portPlace(valve: ValveData, id: string): number {
  const at = valve.ports.findIndex((port) => port.id === id);
  if (at >= 0) return at;
  throw new RefusedEdit(`valve port ${id}`, `The valve has no port ${id}.`, 'It may have been removed before.');
}

function positionAt(valve: ValveData, index: number): ValvePosition {
  const position = valve.positions[index];
  if (position) return position;
  throw new RefusedEdit('valve positions', `The valve has no position ${index + 1}.`, 'It may have been removed.');
}

function withPaths(valve: ValveData, change: (paths: readonly string[]) => readonly string[]): ValveData {
  return {
    ...valve,
    positions: valve.positions.map((position) => ({ ...position, paths: change(position.paths) })),
    ...(valve.crossovers && { crossovers: valve.crossovers.map(change) }),
  };
}

/** The positions in another order, old ones by their index; what refers to one follows it. */
function reordered(valve: ValveData, order: readonly (number | ValvePosition)[]): ValveData {
  const positions = order.map((each) => (typeof each === 'number' ? (valve.positions[each] as ValvePosition) : each));
  const rest = valve.rest === undefined ? -1 : order.indexOf(valve.rest);
  const lost = (valve.coils ?? []).flatMap((coil, i) => (order.includes(coil.position) ? [] : [i]));
  const kept = lost.reduceRight((now, coil) => withoutCoil(now, coil), valve);
  const coils = kept.coils?.map((coil): ValveCoil => ({ ...coil, position: order.indexOf(coil.position) }));
  const crossovers = valve.crossovers && crossoversOf(valve.crossovers, order);
  return {
    ...omit(kept, 'rest', 'coils', 'crossovers'),
    positions,
    ...(crossovers && crossovers.length > 0 && { crossovers }),
    ...(rest >= 0 && { rest }),
    ...(coils && coils.length > 0 && { coils }),
  };
}

/** A crossover is known as long as it lies between two that were neighbours; the first that is not ends the list. */
function crossoversOf(
  before: readonly (readonly string[])[],
  order: readonly (number | ValvePosition)[],
): (readonly string[])[] {
  const out: (readonly string[])[] = [];
  for (const [i, b] of order.slice(1).entries()) {
    const a = order[i];
    const paths =
      typeof a === 'number' && typeof b === 'number' && Math.abs(a - b) === 1 ? before[Math.min(a, b)] : undefined;
    if (paths === undefined) break;
    out.push(paths);
  }
  return out;
}

/** Where each drawn coil stands, in the order of `coils`: left to right. */
export function coilPlaces(valve: ValveData): { readonly end: End; readonly at: number }[] {
  const at = (operators: readonly Operator[]): number[] => operators.flatMap((each, i) => (each === 'coil' ? [i] : []));
  return [
    ...at(valve.left)
      .toReversed()
      .map((i) => ({ end: 'left', at: i }) as const),
    ...at(valve.right).map((i) => ({ end: 'right', at: i }) as const),
  ];
}

/** Takes a coil away together with its drawn one. */
export function withoutCoil(valve: ValveData, coil: number): ValveData {
  const place = coilPlaces(valve)[coil];
  const coils = (valve.coils ?? []).toSpliced(coil, 1);
  return {
    ...omit(valve, 'coils'),
    ...(place && { [place.end]: valve[place.end].toSpliced(place.at, 1) }),
    ...(coils.length > 0 && { coils }),
  };
}
