import type { NetPath, Network } from '../../../src/network/network.ts';

/**
 * The same meaning as the engine, written once more from the words: sets of names instead of bits, plain
 * fixpoints, no caches, every list of moves tried. Actuators stand between their stops.
 */
export interface Told {
  readonly row: number;
  readonly lines: ReadonlySet<number>;
  readonly stores: ReadonlySet<number>;
  /** `3A`: a load presses on side A of actuator 3. */
  readonly pressed: ReadonlySet<string>;
}

const ATMOSPHERE = 101_325;

export const positionsOf = (net: Network, row: number): number[] => {
  const out: number[] = [];
  for (const { positions } of [...net.inputs].reverse()) {
    out.unshift(row % positions.length);
    row = Math.floor(row / positions.length);
  }
  return out;
};

export const rowOf = (net: Network, positions: readonly number[]): number =>
  net.inputs.reduce((row, input, i) => row * input.positions.length + (positions[i] ?? 0), 0);

type Hop = readonly [from: number, to: number];

function hops(net: Network, row: number, pilots: (path: NetPath) => boolean): Hop[] {
  const back = drained(net, row);
  return waysOf(net, row, (path) => (path.vent >= 0 ? back.has(path) : pilots(path)));
}

/** Ways back through shuttle valves: the other inlet is open to tank, and no charged accumulator feeds it. */
function drained(net: Network, row: number): Set<NetPath> {
  const open = new Set<NetPath>();
  if (net.paths.every((path) => path.vent < 0)) return open;
  for (let size = -1; size !== open.size;) {
    size = open.size;
    const ways = waysOf(net, row, (path) => open.has(path));
    const tank = closure(
      tanksOf(net),
      ways.map(([from, to]): Hop => [to, from]),
      () => true,
    );
    const tanks = tanksOf(net);
    const fed = closure(
      net.accumulators.filter((store) => store.charged).map((store) => store.line),
      ways.filter(([from]) => !tanks.includes(from)),
      () => true,
    );
    for (const path of net.paths) if (path.vent >= 0 && tank.has(path.vent) && !fed.has(path.vent)) open.add(path);
  }
  return open;
}

function waysOf(net: Network, row: number, led: (path: NetPath) => boolean): Hop[] {
  const at = positionsOf(net, row);
  return net.paths.flatMap((path): Hop[] => {
    if (path.input >= 0 && ((path.positions >> (at[path.input] ?? 0)) & 1) === 0) return [];
    if ((path.pilot >= 0 || path.vent >= 0) && !led(path)) return [];
    return path.oneWay || path.pilot >= 0
      ? [[path.from, path.to]]
      : [
          [path.from, path.to],
          [path.to, path.from],
        ];
  });
}

function closure(seeds: Iterable<number>, ways: readonly Hop[], allowed: (line: number) => boolean): Set<number> {
  const found = new Set([...seeds].filter(allowed));
  for (let size = -1; size !== found.size;) {
    size = found.size;
    for (const [from, to] of ways) if (found.has(from) && allowed(to)) found.add(to);
  }
  return found;
}

const tanksOf = (net: Network): number[] => net.lines.flatMap((line, i) => (line.tank ? [i] : []));

function openToTank(net: Network, row: number, open: ReadonlySet<NetPath>): Set<number> {
  const ends = [...tanksOf(net), ...net.pumps.filter((pump) => !pump.tightWhenStopped).map((pump) => pump.outlet)];
  const back = hops(net, row, (path) => open.has(path)).map(([from, to]): Hop => [to, from]);
  return closure(ends, back, () => true);
}

/** Lock checks that a charged accumulator holds open without being let down by them. */
function heldOpen(net: Network, row: number, stores: ReadonlySet<number>): Set<NetPath> {
  const open = new Set<NetPath>();
  const fed = (ways: ReadonlySet<NetPath>): Set<number> => {
    const tank = openToTank(net, row, ways);
    return closure(
      [...stores].map((i) => net.accumulators[i]?.line ?? -1),
      hops(net, row, (path) => ways.has(path)),
      (line) => !tank.has(line),
    );
  };
  const possible = net.paths.filter((path) => path.pilot >= 0);
  for (let again = true; again;) {
    again = false;
    for (const path of possible) {
      if (open.has(path)) continue;
      const more = new Set([...open, path]);
      const after = fed(more);
      if (!fed(open).has(path.pilot) || [...more].some((one) => !after.has(one.pilot))) continue;
      open.add(path);
      again = true;
    }
  }
  return open;
}

export function tell(net: Network, row: number, before: Omit<Told, 'row'>): Told {
  const open = heldOpen(net, row, before.stores);
  const tank = openToTank(net, row, open);
  const stores = new Set([...before.stores].filter((i) => !tank.has(net.accumulators[i]?.line ?? -1)));
  const fills = closure(
    tanksOf(net),
    hops(net, row, () => false),
    () => true,
  );
  const pressed = new Set(
    [...before.pressed].filter((side) => {
      const actuator = net.actuators[parseInt(side, 10)];
      if (!actuator) return false;
      const onA = side.endsWith('A');
      if (!tank.has(onA ? actuator.a : actuator.b)) return true;
      const other = onA ? actuator.b : actuator.a;
      const growing = onA ? actuator.areaB : actuator.areaA;
      return !(other < 0 || fills.has(other) || actuator.push.size > ATMOSPHERE * growing);
    }),
  );
  const seeds = new Set<number>([...before.lines, ...[...stores].map((i) => net.accumulators[i]?.line ?? -1)]);
  for (const side of pressed) {
    const actuator = net.actuators[parseInt(side, 10)];
    if (actuator) seeds.add(side.endsWith('A') ? actuator.a : actuator.b);
  }
  let lines = new Set([...seeds].filter((line) => !tank.has(line)));
  for (let size = -1; size !== lines.size;) {
    size = lines.size;
    const ways = hops(net, row, (path) => open.has(path) || lines.has(path.pilot));
    const through = net.actuators.flatMap(({ a, b }, i): Hop[] =>
      b < 0
        ? []
        : [...(pressed.has(`${i}A`) ? [] : [[a, b] as const]), ...(pressed.has(`${i}B`) ? [] : [[b, a] as const])],
    );
    lines = closure(lines, [...ways, ...through], (line) => !tank.has(line));
  }
  return { row, lines, stores, pressed };
}

export const shownOf = (net: Network, told: Told): number[] =>
  [...told.lines].filter((line) => line < net.shown).sort((x, y) => x - y);

/** Rows one lever move away. */
export function neighbours(net: Network, row: number): number[] {
  const at = positionsOf(net, row);
  return net.inputs.flatMap(({ positions }, i) =>
    positions.flatMap((_, p) =>
      p === at[i]
        ? []
        : [
            rowOf(
              net,
              at.map((now, j) => (j === i ? p : now)),
            ),
          ],
    ),
  );
}

/** For lists of 0, 1, … `most` moves: the fewest shown lines that any list of this length leaves. */
export function fewestLeft(net: Network, start: Told, most: number): number[] {
  const fewest = Array.from({ length: most + 1 }, () => Infinity);
  const go = (told: Told, depth: number): void => {
    fewest[depth] = Math.min(fewest[depth] as number, shownOf(net, told).length);
    if (depth === most) return;
    for (const row of neighbours(net, told.row)) go(tell(net, row, told), depth + 1);
  };
  go(start, 0);
  return fewest;
}
