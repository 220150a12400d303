import { unlimited } from '../base/budget.ts';
import type { Links, PathConditions } from '../engine/paths/reach.ts';
import { compileLinks } from '../engine/paths/reach.ts';
import { initialHeld, settle } from '../engine/sequence/pressure-state.ts';
import type { Held } from '../engine/sequence/pressure-state.ts';
import { RowPathsCache } from '../engine/sequence/row-paths.ts';
import type { RowPaths } from '../engine/sequence/row-paths.ts';
import { mostPressures } from '../engine/table/most-pressures.ts';
import type { OneState } from '../engine/table/one-state.ts';
import { solveOne } from '../engine/table/one-state.ts';
import { StateTable } from '../engine/table/state-table.ts';
import { tabulate } from '../engine/table/tabulate.ts';
import type { ActuatorVerdict, LineClass, PumpVerdict } from '../engine/table/words.ts';
import { frozenAt } from '../network/freeze.ts';
import type { Network } from '../network/network.ts';

/** One moment of the machine: what its state table says, and where pressure stands. */
export interface Snapshot {
  readonly net: Network;
  readonly actuators: readonly ActuatorVerdict[];
  readonly pumps: readonly PumpVerdict[];
  readonly dependents: readonly number[];
  /** Of shown lines. */
  readonly classes: readonly LineClass[];
  /** What is under pressure, of all lines, and what still presses; follows from what was before. */
  readonly held: Held;
  /** 1 = open to tank, also through a stopped pump. */
  readonly toTank: Uint8Array;
  /** Line → number of the group of lines that open paths join. */
  readonly groups: readonly number[];
}

/** What a network of one combination is apart from what was before. */
interface Still {
  readonly links: Links;
  readonly paths: RowPaths;
  /** 1 = a source presses on it. */
  readonly pressed: Uint8Array;
  readonly groups: readonly number[];
}

/** Takes snapshots of a circuit with its valves standing, or one of them on its way. */
export class MoveBench {
  readonly net: Network;
  readonly conditions: PathConditions;
  readonly #known = new Map<string, Network>();
  readonly #stills = new WeakMap<Network, Still>();

  constructor(net: Network, conditions: PathConditions) {
    this.net = net;
    this.conditions = conditions;
  }

  at(positions: readonly number[]): Network {
    const key = positions.join();
    const known = this.#known.get(key) ?? frozenAt(this.net, positions);
    this.#known.set(key, known);
    return known;
  }

  /** The machine ran in these positions; the pumps are now as in the conditions, and nothing is left from earlier. */
  start(positions: readonly number[]): Snapshot {
    const net = this.at(positions);
    const running = solveOne(net, { ...this.conditions, pumpsRunning: true }, 0);
    return this.#take(net, initialHeld(net, this.conditions, under(running)));
  }

  /** What comes of a snapshot in this network, in which pressure keeps standing wherever nothing lets it down. */
  next(net: Network, before: Snapshot): Snapshot {
    return this.#take(net, before.held);
  }

  /** Where pressure stands if this network comes next, which costs less than a snapshot. */
  heldIn(net: Network, before: Pick<Snapshot, 'held'>): Held {
    const { links, paths, pressed } = this.#still(net);
    const settled = settle(net, links, paths, before.held, pressed);
    return { ...settled, lines: settled.lines.map((on, line) => on | (pressed[line] as number)) };
  }

  /** Pa by line: the most that stands in it before a move, whatever has come to its stop meanwhile. */
  most(net: Network): readonly number[] {
    return mostPressures(solveOne(net, this.conditions, 0));
  }

  #take(net: Network, before: Held): Snapshot {
    const { paths, groups } = this.#still(net);
    const table = new StateTable(tabulate(net, this.conditions, unlimited, { pressureRows: 1 }));
    return {
      net,
      actuators: net.actuators.map((_, i) => table.actuator(i, 0)),
      pumps: net.pumps.map((_, i) => table.pump(i, 0)),
      dependents: net.dependents.map((_, i) => table.dependent(i, 0)),
      classes: Array.from({ length: net.shown }, (_, line) => table.line(line, 0)),
      held: this.heldIn(net, { held: before }),
      toTank: paths.toTank,
      groups,
    };
  }

  #still(net: Network): Still {
    const known = this.#stills.get(net);
    if (known) return known;
    const { conditions } = this;
    const state = solveOne(net, conditions, 0);
    const made = {
      links: compileLinks(net, conditions.places),
      paths: new RowPathsCache(net, state.edges, conditions.pumpsRunning).at(0),
      pressed: under(state),
      groups: groupsOf(state),
    };
    this.#stills.set(net, made);
    return made;
  }
}

/** 1 = a source presses on it, straight, over a piston or over a valve that pressures may open. */
function under({ net, block, on }: OneState): Uint8Array {
  return Uint8Array.from(net.lines, (_, line) => (on(block.reach.leaves, line) ? 1 : 0));
}

function groupsOf({ net, hops }: OneState): number[] {
  const group = net.lines.map((_, line) => line);
  const find = (line: number): number => {
    let at = line;
    while (group[at] !== at) at = group[at] as number;
    return at;
  };
  for (const { from, to } of hops) if (!net.lines[from]?.tank && !net.lines[to]?.tank) group[find(from)] = find(to);
  return group.map((_, line) => find(line));
}
