import type { Network } from '../../network/network.ts';
import { compileEdges } from '../paths/edges.ts';
import type { DependentPlanes, EdgeSet } from '../paths/edges.ts';
import { compileLinks } from '../paths/reach.ts';
import type { Links, PathConditions } from '../paths/reach.ts';
import { RunningRows, stridesOf } from './bleed-start.ts';
import type { Standing } from './cautions.ts';
import { initialHeld, settle } from './pressure-state.ts';
import type { Held } from './pressure-state.ts';
import { linesNeverOpen, RowPathsCache } from './row-paths.ts';

/**
 * Where the dependent valves stand in every row, the pumps running and stopped. That pressure which is left
 * behind could hold a pilot is not counted on: neither to vent a line nor to keep it.
 */
export interface DependentSettings {
  readonly running: DependentPlanes;
  readonly stopped: DependentPlanes;
}

/** Everything that stays the same while pressure is let down, worked out once per circuit. */
export class BleedModel {
  readonly net: Network;
  readonly conditions: PathConditions;
  readonly links: Links;
  readonly running: RunningRows;
  /** Pumps stopped. */
  readonly paths: RowPathsCache;
  /** Open paths with the pumps running: dependent valves may stand elsewhere than with the pumps stopped. */
  readonly runningEdges: EdgeSet;
  readonly strides: readonly number[];
  readonly states: number;
  readonly points: readonly number[];
  readonly settings: DependentSettings | undefined;
  readonly #edges: EdgeSet;
  #never: Uint8Array | undefined;

  /** `points`: lines with a bleed valve by hand, which stands open. `settings`: needed where the circuit has dependent valves. */
  constructor(net: Network, conditions: PathConditions, points: readonly number[] = [], settings?: DependentSettings) {
    const edges = compileEdges(net, settings?.stopped);
    const running = settings ? compileEdges(net, settings.running) : edges;
    this.settings = settings;
    this.net = net;
    this.conditions = conditions;
    this.links = compileLinks(net, conditions.places);
    this.running = new RunningRows(net, running, conditions);
    this.paths = new RowPathsCache(net, edges, false, points);
    this.runningEdges = running;
    this.strides = stridesOf(net);
    this.points = points;
    this.states = edges.states;
    this.#edges = edges;
  }

  /** The machine ran in this row, and its pumps have just stopped. */
  before(row: number): Held {
    const lines = this.running.under(row);
    for (const left of this.running.leftBehind(row)) left.lines.forEach((on, line) => on === 1 && (lines[line] = 1));
    return initialHeld(this.net, this.conditions, lines);
  }

  stand(row: number, before: Held): Standing {
    const paths = this.paths.at(row);
    return { row, paths, held: settle(this.net, this.links, paths, before) };
  }

  /** 1 = no combination of positions opens this line to tank. */
  neverOpen(): Uint8Array {
    this.#never ??= linesNeverOpen(this.net, this.#edges, this.conditions, this.points);
    return this.#never;
  }
}
