import type { Network } from '../../network/network.ts';
import type { Links, PathConditions } from '../paths/reach.ts';
import type { PilotWay, RowPaths } from './row-paths.ts';

/** Pa: what the atmosphere can push with where a chamber is sealed and stretched. */
const ATMOSPHERE = 101_325;

/**
 * Where pressure stands, apart from the row: a line keeps what it has until it is open to tank.
 * All three are 0 or 1 for each item.
 */
export interface Held {
  /** Lines that hold pressure. */
  readonly lines: Uint8Array;
  /** Accumulators that are still charged. */
  readonly stores: Uint8Array;
  /** Actuator sides on which a load or spring still presses: `2 i` for side A, `2 i + 1` for side B. */
  readonly pressed: Uint8Array;
}

/** Side `2 i + 0` or `2 i + 1` of actuator i: its line, -1 if it breathes to atmosphere. */
export const sideLine = (net: Network, side: number): number => {
  const actuator = net.actuators[side >> 1];
  return actuator ? (side % 2 === 0 ? actuator.a : actuator.b) : -1;
};

/** What presses and is charged before anything is let down. */
export function initialHeld(net: Network, conditions: PathConditions, lines: Uint8Array): Held {
  const pressed = new Uint8Array(2 * net.actuators.length);
  net.actuators.forEach(({ a, b, push }, i) => {
    const place = conditions.places[i];
    if (a >= 0 && place !== 'in' && (push.way === 'in' || push.way === 'both')) pressed[2 * i] = 1;
    if (b >= 0 && place !== 'out' && (push.way === 'out' || push.way === 'both')) pressed[2 * i + 1] = 1;
  });
  return { lines, stores: Uint8Array.from(net.accumulators, (store) => (store.charged ? 1 : 0)), pressed };
}

/** A lock check counts as a way to tank only while a charged accumulator, itself not let down, holds its pilot. */
export function settleTank(
  net: Network,
  paths: RowPaths,
  stores: Uint8Array,
): { toTank: Uint8Array; open: readonly PilotWay[] } {
  let toTank = paths.toTank;
  const open: PilotWay[] = [];
  if (paths.pilots.length === 0 || !stores.includes(1)) return { toTank, open };
  const fedWith = (ways: readonly PilotWay[], tank: Uint8Array): Uint8Array => {
    const fed = new Uint8Array(net.lines.length);
    const queue: number[] = [];
    const reach = (line: number): void => {
      if (fed[line] === 1 || tank[line] === 1) return;
      fed[line] = 1;
      queue.push(line);
    };
    net.accumulators.forEach((store, i) => stores[i] === 1 && reach(store.line));
    for (let head = 0; head < queue.length; head++) {
      const line = queue[head] as number;
      for (const to of paths.onward[line] ?? []) reach(to);
      for (const way of ways) if (way.from === line) reach(way.to);
    }
    return fed;
  };
  for (let again = true; again;) {
    again = false;
    for (const way of paths.pilots) {
      if (open.includes(way)) continue;
      const ways = [...open, way];
      const tank = tankWith(paths, ways);
      const fed = fedWith(open, toTank);
      const after = fedWith(ways, tank);
      // One that lets its own pilot down does not stay open long enough to be counted on.
      if (fed[way.pilot] !== 1 || !ways.every(({ pilot }) => after[pilot] === 1)) continue;
      open.push(way);
      toTank = tank;
      again = true;
    }
  }
  return { toTank, open };
}

function tankWith(paths: RowPaths, ways: readonly PilotWay[]): Uint8Array {
  const tank = paths.toTank.slice();
  for (let grown = true; grown;) {
    grown = false;
    const lead = (from: number, to: number): void => {
      if (tank[to] !== 1 || tank[from] === 1) return;
      tank[from] = 1;
      grown = true;
    };
    for (const { from, to } of ways) lead(from, to);
    paths.onward.forEach((list, from) => list.forEach((to) => lead(from, to)));
  }
  return tank;
}

/**
 * What is left under pressure once a row has stood for a while: lines open to tank lose theirs,
 * accumulators on them run empty, loads on them come down and rest on their stop or prop; what is
 * still held spreads on along open paths, and through a piston into a sealed chamber behind it.
 * `fed`: lines that running pumps press on.
 */
export function settle(net: Network, links: Links, paths: RowPaths, before: Held, fed?: Uint8Array): Held {
  const { toTank, open } = settleTank(net, paths, before.stores);
  const lines = new Uint8Array(before.lines.length);
  const stores = before.stores.slice();
  const pressed = before.pressed.slice();
  const queue: number[] = [];
  const hold = (line: number): void => {
    if (line < 0 || lines[line] === 1 || toTank[line] === 1) return;
    lines[line] = 1;
    queue.push(line);
  };
  net.accumulators.forEach((store, i) => {
    if (toTank[store.line] === 1) stores[i] = 0;
    else if (stores[i] === 1) hold(store.line);
  });
  pressed.forEach((on, side) => {
    if (on === 0) return;
    const line = sideLine(net, side);
    if (toTank[line] === 1) pressed[side] = comesDown(net, paths, side) ? 0 : 1;
    else hold(line);
  });
  before.lines.forEach((on, line) => on === 1 && hold(line));
  fed?.forEach((on, line) => on === 1 && hold(line));

  const ways = (line: number): void => {
    for (const way of paths.pilots) {
      // Pressure left in a pilot line may hold the check open: it may spread, but is not counted on to vent.
      if (way.from === line && (lines[way.pilot] === 1 || open.includes(way))) hold(way.to);
      if (way.pilot === line && lines[way.from] === 1) hold(way.to);
    }
  };
  for (let head = 0; head < queue.length; head++) {
    const line = queue[head] as number;
    for (const to of paths.onward[line] ?? []) hold(to);
    for (const { to, actuator } of links.push[line] ?? []) {
      // The pressure that a load makes is borne by the load, and passes nothing on to the other side.
      const side = 2 * actuator + (net.actuators[actuator]?.a === line ? 0 : 1);
      if (pressed[side] !== 1) hold(to);
    }
    ways(line);
  }
  return { lines, stores, pressed };
}

/** The load can go all the way: the chamber that grows can fill, or the load outweighs the suction in it. */
function comesDown(net: Network, paths: RowPaths, side: number): boolean {
  const actuator = net.actuators[side >> 1];
  if (!actuator) return false;
  const other = sideLine(net, side ^ 1);
  if (other < 0 || paths.fills[other] === 1) return true;
  const growing = side % 2 === 0 ? actuator.areaB : actuator.areaA;
  return actuator.push.size > ATMOSPHERE * growing;
}

/** Equal states have equal keys. */
export function keyOf(row: number, { lines, stores, pressed }: Held): string {
  let key = `${row}:`;
  for (const list of [lines, stores, pressed]) {
    let code = 1;
    for (let i = 0; i < list.length; i++) {
      code = 2 * code + (list[i] as number);
      if (code < 0x4000) continue;
      key += String.fromCharCode(code);
      code = 1;
    }
    key += String.fromCharCode(code);
  }
  return key;
}
