import type { Network } from '../../network/network.ts';
import { compileEdges } from '../paths/edges.ts';
import type { EdgeSet } from '../paths/edges.ts';
import { compileLinks } from '../paths/reach.ts';
import type { Links, PathConditions } from '../paths/reach.ts';
import { RunningRows, stridesOf } from './bleed-start.ts';
import type { Standing } from './cautions.ts';
import { initialHeld, settle } from './pressure-state.ts';
import type { Held } from './pressure-state.ts';
import { linesNeverOpen, RowPathsCache } from './row-paths.ts';

/** Everything that stays the same while pressure is let down, worked out once per circuit. */
export class BleedModel {
  readonly net: Network;
  readonly conditions: PathConditions;
  readonly links: Links;
  readonly running: RunningRows;
  /** Pumps stopped. */
  readonly paths: RowPathsCache;
  readonly strides: readonly number[];
  readonly states: number;
  readonly points: readonly number[];
  readonly #edges: EdgeSet;
  #never: Uint8Array | undefined;

  /** `points`: lines with a bleed valve by hand, which stands open. */
  constructor(net: Network, conditions: PathConditions, points: readonly number[] = []) {
    const edges = compileEdges(net);
    this.net = net;
    this.conditions = conditions;
    this.links = compileLinks(net, conditions.places);
    this.running = new RunningRows(net, edges, conditions);
    this.paths = new RowPathsCache(net, edges, false, points);
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
