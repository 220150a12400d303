import type { Network } from '../../../network/network.ts';
import { standsAt } from '../../../network/dependents.ts';
import { PathSolver } from '../../paths/block.ts';
import { compileEdges } from '../../paths/edges.ts';
import { compileLinks } from '../../paths/reach.ts';
import type { Links } from '../../paths/reach.ts';
import { initialHeld, settle } from '../pressure-state.ts';
import { RowPathsCache } from '../row-paths.ts';
import type { RowPaths } from '../row-paths.ts';
import type { Machine } from './machine.ts';
import type { Steady } from './steady.ts';

/** Pa at which a line counts as under pressure: 1 bar. */
export const UNDER = 1e5;
const MOST_KEPT = 500;

/** Open paths of one setting of all valves. */
interface Standing {
  readonly net: Network;
  readonly links: Links;
  readonly paths: RowPaths;
  /** 1 = an open path from a running pump or charged accumulator; the same with ways over valves that pressures may open. */
  readonly fed: Uint8Array;
  readonly overValve: Uint8Array;
}

/** Remembers which lines were shut in with pressure, and with how much. Settings are worked out once each. */
export class PressureMemory {
  readonly net: Network;
  readonly #known = new Map<string, Standing>();

  constructor(net: Network) {
    this.net = net;
  }

  /** The lines under pressure now, and what stands in them at most. */
  keep(machine: Machine, steady: Steady): Pick<Machine, 'held' | 'shut' | 'pressures'> {
    const now = this.#standing(machine);
    const under = machine.held.map((on, line) => (on === 1 || (steady.pressures[line] ?? 0) >= UNDER ? 1 : 0));
    const places = { pumpsRunning: machine.running.includes(true), places: machine.stops };
    const before = {
      ...initialHeld(now.net, places, under),
      stores: Uint8Array.from(machine.stored, (oil) => (oil > 0 ? 1 : 0)),
    };
    const { lines } = settle(now.net, now.links, now.paths, before);
    const resting = (line: number): boolean =>
      this.net.actuators.every(({ a, b }, i) => (a !== line && b !== line) || steady.speeds[i] === 0);
    // Behind a valve that pressures open, the pump stands as long as the steady pressure says so.
    const behind = (line: number): boolean =>
      now.fed[line] === 1 || (now.overValve[line] === 1 && (steady.pressures[line] ?? 0) >= UNDER);
    const shut = lines.map((on, line) => (on === 1 && !behind(line) && resting(line) ? 1 : 0));
    const pressures = steady.pressures.map((pressure, line) =>
      shut[line] === 1 ? Math.max(pressure, machine.pressures[line] ?? 0) : pressure,
    );
    const held = lines.map((on, line) => (on === 1 && (pressures[line] ?? 0) >= UNDER ? 1 : 0));
    return { held, shut, pressures };
  }

  /** Shown lines that hold pressure without a pump or accumulator behind it. */
  trapped(machine: Machine): number[] {
    return this.#shown((line) => machine.held[line] === 1 && machine.shut[line] === 1);
  }

  /** Shown lines under pressure, whatever keeps it up. */
  under(machine: Machine): number[] {
    return this.#shown((line) => machine.held[line] === 1 || (machine.pressures[line] ?? 0) >= UNDER);
  }

  /** True if both chambers are open to tank, so that nothing holds the actuator. */
  floats(machine: Machine, actuator: number): boolean {
    const { a, b } = this.net.actuators[actuator] ?? { a: -1, b: -1 };
    const { paths } = this.#standing(machine);
    const free = (line: number): boolean => line < 0 || (paths.firm[line] === 1 && paths.fills[line] === 1);
    return free(a) && free(b);
  }

  #shown(is: (line: number) => boolean): number[] {
    return Array.from({ length: this.net.shown }, (_, line) => line).filter(is);
  }

  #standing(machine: Machine): Standing {
    const charged = machine.stored.map((oil) => oil > 0);
    const key = [machine.positions, machine.dependents, machine.stops, machine.running, charged].join('|');
    const known = this.#known.get(key);
    if (known) return known;
    if (this.#known.size >= MOST_KEPT) this.#known.clear();
    const made = standingOf(this.net, machine, charged);
    this.#known.set(key, made);
    return made;
  }
}

/** The circuit with its valves as they stand, all their open paths drawn for good: a table of one row. */
function standingOf(net: Network, machine: Machine, charged: readonly boolean[]): Standing {
  const position = standsAt(net, (input) => machine.positions[input] ?? 0, machine.dependents);
  const still: Network = {
    ...net,
    inputs: [],
    dependents: [],
    paths: net.paths.flatMap((path) => {
      if (path.input < 0) return [path];
      return ((path.positions >>> position(path.input)) & 1) === 1 ? [{ ...path, input: -1, positions: 0 }] : [];
    }),
    pumps: net.pumps.map((pump, i) => (machine.running[i] ? pump : { ...pump, atRest: true })),
    accumulators: net.accumulators.map((store, i) => ({ ...store, charged: charged[i] ?? false })),
  };
  const running = machine.running.includes(true);
  const edges = compileEdges(still);
  const places = machine.stops;
  const { reach } = new PathSolver(still, edges, { pumpsRunning: running, places }, 1).solve(0, 1);
  const plane = (field: ArrayLike<number> | undefined): Uint8Array =>
    Uint8Array.from(net.lines, (_, line) => (field?.[line] ?? 0) & 1);
  const paths = new RowPathsCache(still, edges, running).at(0);
  // A pump that stands still beside running ones lets its own outlet down as well.
  return {
    net: still,
    links: compileLinks(still, places),
    paths,
    fed: plane(reach.fromSource),
    overValve: plane(reach.valves?.pressed),
  };
}
