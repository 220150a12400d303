import type { ValveData } from './model.ts';
import { RefusedEdit } from './refused.ts';
import { parsePath, sayPath, type ValvePath } from './valve-path.ts';

/** A box of a valve: a position, or the crossover between position `index` and the next. */
export interface BoxRef {
  readonly of: 'position' | 'crossover';
  readonly index: number;
}

/** What joins two ports of a box, seen from the first: `there` leads to the second, `back` to the first. */
export type PathKind =
  'none' | 'open' | 'there' | 'back' | 'throttled' | 'throttled-there' | 'throttled-back' | 'joined';

/** As drawing the same path again goes on. */
const TURN: readonly PathKind[] = ['none', 'open', 'there', 'back', 'throttled'];

/** The paths of a box as written; a crossover that is not known has none. */
export const pathsIn = (valve: ValveData, box: BoxRef): readonly string[] =>
  (box.of === 'position' ? valve.positions[box.index]?.paths : valve.crossovers?.[box.index]) ?? [];

/** All boxes in drawn order; crossovers only as far as they are known. */
export function boxesOf(valve: ValveData): BoxRef[] {
  return valve.positions.flatMap((_, index): BoxRef[] => [
    { of: 'position', index },
    ...(valve.crossovers?.[index] && index + 1 < valve.positions.length ? [{ of: 'crossover', index } as const] : []),
  ]);
}

/** Gives a box other paths. Throws `RefusedEdit` where there is no such box. */
export function setPaths(valve: ValveData, box: BoxRef, paths: readonly string[]): ValveData {
  const list = box.of === 'position' ? valve.positions : (valve.crossovers ?? []);
  if (list[box.index] === undefined)
    throw new RefusedEdit('valve', 'The valve has no such box.', 'It may have been removed before.');
  if (box.of === 'crossover') return { ...valve, crossovers: (valve.crossovers ?? []).with(box.index, paths) };
  const positions = valve.positions.map((position, i) => (i === box.index ? { ...position, paths } : position));
  return { ...valve, positions };
}

const read = (text: string): ValvePath | undefined => {
  const parsed = parsePath(text);
  return parsed.ok ? parsed.value : undefined;
};
const has = (path: ValvePath | undefined, ...ports: string[]): path is ValvePath =>
  path !== undefined && ports.every((port) => path.ports.includes(port));

/** How two ports of a box are joined; of several paths between them the first. */
export function kindBetween(valve: ValveData, box: BoxRef, from: string, to: string): PathKind {
  const path = pathsIn(valve, box)
    .map(read)
    .find((each) => has(each, from, to));
  if (!path) return 'none';
  if (path.ports.length > 2) return 'joined';
  if (path.way === 'both') return path.throttled ? 'throttled' : 'open';
  const ahead = path.ports[0] === from;
  if (path.throttled) return ahead ? 'throttled-there' : 'throttled-back';
  return ahead ? 'there' : 'back';
}

function pathOf(kind: Exclude<PathKind, 'none' | 'joined'>, from: string, to: string): ValvePath {
  const back = kind === 'back' || kind === 'throttled-back';
  return {
    ports: back ? [to, from] : [from, to],
    way: kind === 'open' || kind === 'throttled' ? 'both' : 'one-way',
    throttled: kind.startsWith('throttled'),
  };
}

/**
 * Joins two ports of a box in one way only: whatever else led from one to the other goes. Out of ports that are all
 * joined, the second is taken. `joined` joins both with all that either is joined to.
 */
export function setPath(valve: ValveData, box: BoxRef, from: string, to: string, kind: PathKind): ValveData {
  checkPair(valve, from, to);
  if (kind === 'joined') return joinPorts(valve, box, from, to);
  const out: string[] = [];
  let place = -1;
  for (const text of pathsIn(valve, box)) {
    const path = read(text);
    if (!has(path, from, to)) {
      out.push(text);
      continue;
    }
    if (place < 0) place = out.length;
    const rest = path.ports.length > 2 ? path.ports.filter((port) => port !== to) : [];
    if (rest.length > 0) out.push(sayPath({ ...path, ports: rest }));
  }
  if (kind !== 'none') out.splice(place < 0 ? out.length : place, 0, sayPath(pathOf(kind, from, to)));
  return setPaths(valve, box, withoutTwins(out));
}

/** Open, one way, the other way, throttled, none: what drawing a path again makes of it. */
export function cyclePath(valve: ValveData, box: BoxRef, from: string, to: string): ValveData {
  const at = TURN.indexOf(kindBetween(valve, box, from, to));
  return setPath(valve, box, from, to, at < 0 ? 'none' : (TURN[(at + 1) % TURN.length] ?? 'none'));
}

/** Joins two ports, and all that either has an open path to, into one. */
export function joinPorts(valve: ValveData, box: BoxRef, from: string, to: string): ValveData {
  checkPair(valve, from, to);
  const all = new Set([from, to]);
  const isOpen = (path: ValvePath | undefined): path is ValvePath =>
    path !== undefined && path.way === 'both' && !path.throttled;
  for (const path of pathsIn(valve, box).map(read))
    if (isOpen(path) && (path.ports.includes(from) || path.ports.includes(to)))
      for (const port of path.ports) all.add(port);
  const ports = valve.ports.map(({ id }) => id).filter((id) => all.has(id));
  const out: string[] = [];
  let place = -1;
  for (const text of pathsIn(valve, box)) {
    const path = read(text);
    const within = path?.ports.every((port) => all.has(port)) ?? false;
    if (!within) out.push(text);
    else if (place < 0) place = out.length;
  }
  out.splice(place < 0 ? out.length : place, 0, ports.join('-'));
  return setPaths(valve, box, out);
}

function checkPair(valve: ValveData, from: string, to: string): void {
  if (from === to)
    throw new RefusedEdit(
      `valve port ${from}`,
      'A path cannot lead to the port it comes from.',
      'End at another port.',
    );
  for (const id of [from, to])
    if (!valve.ports.some((port) => port.id === id))
      throw new RefusedEdit(`valve port ${id}`, `The valve has no port ${id}.`, 'It may have been removed before.');
}

/** Two ports left of more that were joined may have a path of their own already. */
function withoutTwins(paths: readonly string[]): string[] {
  const key = (text: string): string => {
    const path = read(text);
    if (!path) return text;
    return sayPath(path.way === 'both' ? { ...path, ports: [...path.ports].sort() } : path);
  };
  return paths.filter((text, i) => paths.findIndex((other) => key(other) === key(text)) === i);
}
