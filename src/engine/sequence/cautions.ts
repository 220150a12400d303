import type { NetInput, Network } from '../../network/network.ts';
import { settleTank, sideLine } from './pressure-state.ts';
import type { Held } from './pressure-state.ts';
import type { RowPaths } from './row-paths.ts';

/** What has to be known before a lever is moved. Numbers are indices in the network. */
export type MoveCaution =
  /** A load or spring that pressed on this side comes down: its oil gets a way to tank, straight or through other actuators. `slow`: only through the leakage of a stopped pump. */
  | {
      readonly kind: 'drop';
      readonly actuator: number;
      readonly way: 'in' | 'out';
      readonly by: 'load' | 'spring';
      readonly slow: boolean;
    }
  /** Stored oil reaches one side while the other lets out. */
  | { readonly kind: 'driven'; readonly actuator: number; readonly way: 'in' | 'out' }
  | { readonly kind: 'discharge'; readonly accumulator: number }
  /** Lines that lose their pressure only through the leakage of a stopped pump. */
  | { readonly kind: 'leak'; readonly lines: readonly number[] }
  /** Lines that had no pressure get some. */
  | { readonly kind: 'spread'; readonly lines: readonly number[] }
  /** The valve is moved by a coil: it needs the control voltage. */
  | { readonly kind: 'coil'; readonly input: number }
  /** A coupling would be parted or joined with pressure on it. */
  | { readonly kind: 'coupling'; readonly input: number };

/** A state of the machine with its pumps stopped. */
export interface Standing {
  readonly row: number;
  readonly held: Held;
  readonly paths: RowPaths;
}

/** Cautions of a move, in the order of their weight. `before` undefined: the pumps stop here. */
export function cautionsOf(
  net: Network,
  before: Standing | undefined,
  start: Held,
  after: Standing,
  input: number,
  position: number,
): MoveCaution[] {
  const found: MoveCaution[] = [];
  const { held, paths } = after;
  const { toTank } = settleTank(net, paths, start.stores);
  const tankBefore = before && settleTank(net, before.paths, before.held.stores).toTank;
  const slow = (line: number): boolean => paths.toTank[line] === 1 && paths.firm[line] === 0;
  start.pressed.forEach((on, side) => {
    const line = sideLine(net, side);
    if (on !== 1 || !letsOut(net, paths, toTank, side)) return;
    // It came into reach of the tank by an earlier move, and was told then.
    if (held.pressed[side] === 1 && before && tankBefore && letsOut(net, before.paths, tankBefore, side)) return;
    const by = net.actuators[side >> 1]?.push.by ?? 'load';
    found.push({ kind: 'drop', actuator: side >> 1, way: side % 2 === 0 ? 'in' : 'out', by, slow: slow(line) });
  });
  const now = drivenSides(net, after, start);
  const earlier = before ? drivenSides(net, before, before.held) : new Set<number>();
  for (const side of now) {
    if (!earlier.has(side)) found.push({ kind: 'driven', actuator: side >> 1, way: side % 2 === 0 ? 'out' : 'in' });
  }
  start.stores.forEach((on, i) => {
    if (on === 1 && held.stores[i] === 0) found.push({ kind: 'discharge', accumulator: i });
  });
  const spec = net.inputs[input];
  if (spec?.by === 'coupling' && touchesPressure(net, spec, start)) found.push({ kind: 'coupling', input });
  const shown = Array.from({ length: net.shown }, (_, line) => line);
  const leaking = shown.filter((line) => start.lines[line] === 1 && held.lines[line] === 0 && slow(line));
  if (leaking.length > 0) found.push({ kind: 'leak', lines: leaking });
  const fresh = shown.filter((line) => held.lines[line] === 1 && start.lines[line] === 0);
  if (before && fresh.length > 0) found.push({ kind: 'spread', lines: fresh });
  if (spec?.coils.some((coil) => coil.position === position)) found.push({ kind: 'coil', input });
  return found;
}

/** Oil can leave this side to tank, straight or by driving other actuators on its way. */
function letsOut(net: Network, paths: RowPaths, toTank: Uint8Array, side: number): boolean {
  const queue = [sideLine(net, side)];
  const seen = new Set(queue);
  for (let head = 0; head < queue.length; head++) {
    const line = queue[head] as number;
    if (toTank[line] === 1) return true;
    const through = net.actuators.flatMap(({ a, b }, i) => {
      if (i === side >> 1 || b < 0) return [];
      return a === line ? [b] : b === line ? [a] : [];
    });
    for (const to of [...(paths.onward[line] ?? []), ...through]) {
      if (seen.has(to)) continue;
      seen.add(to);
      queue.push(to);
    }
  }
  return false;
}

/** Sides that a charged accumulator presses on while the other side is open to tank or breathes. */
function drivenSides(net: Network, { paths }: Standing, held: Held): Set<number> {
  const found = new Set<number>();
  if (!held.stores.includes(1)) return found;
  const { toTank, open } = settleTank(net, paths, held.stores);
  const fed = new Uint8Array(net.lines.length);
  const queue = net.accumulators.flatMap((store, i) =>
    held.stores[i] === 1 && toTank[store.line] !== 1 ? [store.line] : [],
  );
  for (const line of queue) fed[line] = 1;
  for (let head = 0; head < queue.length; head++) {
    const line = queue[head] as number;
    const next = [...(paths.onward[line] ?? []), ...open.filter((way) => way.from === line).map((way) => way.to)];
    for (const to of next) {
      if (fed[to] === 1 || toTank[to] === 1) continue;
      fed[to] = 1;
      queue.push(to);
    }
  }
  for (let side = 0; side < 2 * net.actuators.length; side++) {
    const line = sideLine(net, side);
    const other = sideLine(net, side ^ 1);
    if (line >= 0 && fed[line] === 1 && (other < 0 || toTank[other] === 1)) found.add(side);
  }
  return found;
}

function touchesPressure(net: Network, { part }: NetInput, held: Held): boolean {
  return net.paths.some((path) => path.part === part && (held.lines[path.from] === 1 || held.lines[path.to] === 1));
}

/** Among equally short lists the one with the least of this is taken: what falls counts most. */
export function weightOf(cautions: readonly MoveCaution[]): number {
  const fall = cautions.filter(({ kind }) => kind === 'drop' || kind === 'driven').length;
  const slow = cautions.filter((caution) => caution.kind === 'drop' && caution.slow).length;
  return 1000 * fall + 500 * slow + cautions.length;
}
