import { emptySet, wordsFor } from '../../base/bits.ts';
import type { UnitSystem } from '../../base/units.ts';
import { standsAt } from '../../network/dependents.ts';
import type { NetPath, Network } from '../../network/network.ts';
import { PathSolver } from '../paths/block.ts';
import type { SettledBlock } from '../paths/block.ts';
import type { DependentAnswer } from '../flow/dependents.ts';
import { constantPlanes } from '../paths/dependents.ts';
import { compileEdges, follow } from '../paths/edges.ts';
import type { EdgeSet } from '../paths/edges.ts';
import type { Field } from '../paths/field.ts';
import type { PathConditions } from '../paths/reach.ts';
import { RowSettler } from './dependents.ts';
import { PressureSolver } from './resolve.ts';

/** One state, solved by the same engine as the table, with searches that remember their way. */
export interface OneState {
  readonly net: Network;
  readonly row: number;
  readonly conditions: PathConditions;
  readonly block: SettledBlock;
  readonly edges: EdgeSet;
  /** Where the dependent valves stand, and of whom to ask it for other rows. */
  readonly settled: DependentAnswer;
  readonly settlers: Settlers;
  readonly is: (plane: Uint32Array | undefined) => boolean;
  /** Bit of a line in a field. */
  readonly on: (field: Field, line: number) => boolean;
  /** Directed hops that are open in this state. */
  readonly hops: readonly Hop[];
  /** Also of dependent valves, which count on behind the inputs. */
  readonly position: (input: number) => number;
  /** Of the quantities in the sentences. */
  readonly units: UnitSystem;
}

/** Oil can go from one line to the next through a path of a part. */
export interface Hop {
  readonly from: number;
  readonly to: number;
  readonly path: NetPath;
  readonly fromPort: string;
  readonly toPort: string;
}

/** What the states of one network have in common: where its dependent valves stand, its open paths, its equations. */
export class Settlers {
  readonly net: Network;
  readonly #settlers = new Map<boolean, RowSettler>();
  /** By conditions; the last word of open paths that was solved, since states of one word come together. */
  readonly #pressures = new Map<string, PressureSolver>();
  readonly #blocks = new Map<string, { readonly word: number; readonly block: SettledBlock }>();
  #base: EdgeSet | undefined;

  constructor(net: Network) {
    this.net = net;
  }

  at(conditions: PathConditions, row: number): DependentAnswer {
    let settler = this.#settlers.get(conditions.pumpsRunning);
    if (settler === undefined) {
      settler = new RowSettler(new PressureSolver(this.net, conditions), conditions);
      this.#settlers.set(conditions.pumpsRunning, settler);
    }
    return settler.at(row);
  }

  /** Steady pressures of rows without dependent valves. */
  pressures(conditions: PathConditions): PressureSolver {
    const key = keyOf(conditions);
    const solver = this.#pressures.get(key) ?? new PressureSolver(this.net, conditions);
    this.#pressures.set(key, solver);
    return solver;
  }

  /** Open paths of the rows of a word. */
  block(edges: EdgeSet, conditions: PathConditions, word: number): SettledBlock {
    if (this.net.dependents.length > 0) return new PathSolver(this.net, edges, conditions, 1).solve(word, 1);
    const key = keyOf(conditions);
    const last = this.#blocks.get(key);
    if (last?.word === word) return last.block;
    const block = new PathSolver(this.net, edges, conditions, 1).solve(word, 1);
    this.#blocks.set(key, { word, block });
    return block;
  }

  /** Open paths with this setting, good for the word of this row. */
  edges(setting: readonly number[], row: number): EdgeSet {
    const { net } = this;
    const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
    const planes = constantPlanes(net, setting, count);
    if (net.dependents.length === 0) return (this.#base ??= compileEdges(net));
    this.#base ??= compileEdges(net, planes);
    const follows = new Set(this.#base.follows.map(({ mask }) => mask));
    const masks = this.#base.masks.map((mask, i) => (follows.has(i) ? emptySet(count) : mask));
    follow(masks, this.#base.follows, planes, row >>> 5, 1);
    return { ...this.#base, masks };
  }
}

const keyOf = ({ pumpsRunning, places }: PathConditions): string => `${pumpsRunning} ${places.join(' ')}`;

const NOTHING: DependentAnswer = { setting: [], hunts: false, cycle: [], others: [], searched: true };

export function solveOne(
  net: Network,
  conditions: PathConditions,
  row: number,
  settlers: Settlers = new Settlers(net),
  units: UnitSystem = 'metric',
): OneState {
  const word = row >>> 5;
  const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
  if (word >= wordsFor(count)) throw new RangeError(`row ${row} is past the last of ${count}`);
  const settled = net.dependents.length === 0 ? NOTHING : settlers.at(conditions, row);
  const edges = settlers.edges(settled.setting, row);
  const block = settlers.block(edges, conditions, word);
  const bit = row & 31;
  const is = (plane: Uint32Array | undefined): boolean => (((plane?.[0] ?? 0) >>> bit) & 1) === 1;
  const on = (field: Field, line: number): boolean => line >= 0 && (((field[line] as number) >>> bit) & 1) === 1;
  const radices = net.inputs.map((input) => input.positions.length);
  const commanded = (input: number): number => {
    const stride = radices.slice(input + 1).reduce((n, r) => n * r, 1);
    return Math.floor(row / stride) % (radices[input] ?? 1);
  };
  const position = standsAt(net, commanded, settled.setting);
  const r = block.reach;
  const hops = net.paths.flatMap((path): Hop[] => {
    if (path.input >= 0 && ((path.positions >>> position(path.input)) & 1) === 0) return [];
    if (path.pilot >= 0) {
      const pressed = on(r.fromSource, path.pilot) || on(r.underPressure, path.pilot);
      if (!pressed || !on(r.notFreeToTank, path.pilot)) return [];
    }
    if (path.vent >= 0) {
      const pressed = on(r.fromSource, path.vent) || on(r.underPressure, path.vent);
      if (pressed || !on(r.toTank, path.vent)) return [];
    }
    const ahead: Hop = { from: path.from, to: path.to, path, fromPort: path.fromPort, toPort: path.toPort };
    if (path.oneWay) return [ahead];
    return [ahead, { from: path.to, to: path.from, path, fromPort: path.toPort, toPort: path.fromPort }];
  });
  return { net, row, conditions, block, edges, settled, settlers, is, on, hops, position, units };
}

/** A way along open paths: lines passed, and the hop before each but the first. */
export interface Way {
  readonly lines: readonly number[];
  readonly hops: readonly Hop[];
}

/** Shortest way from one of `from` to a line that `arrived` accepts; tanks absorb. */
export function findWay(
  state: OneState,
  from: readonly number[],
  arrived: (line: number) => boolean,
  allowed: (line: number) => boolean = () => true,
): Way | undefined {
  const cameBy = new Map<number, Hop | undefined>();
  const queue: number[] = [];
  for (const line of from) {
    if (line < 0 || cameBy.has(line) || !allowed(line)) continue;
    cameBy.set(line, undefined);
    queue.push(line);
  }
  for (let head = 0; head < queue.length; head++) {
    const line = queue[head] as number;
    if (arrived(line)) return wayTo(line, cameBy);
    if (state.net.lines[line]?.tank) continue;
    for (const hop of state.hops) {
      if (hop.from !== line || cameBy.has(hop.to) || !allowed(hop.to)) continue;
      cameBy.set(hop.to, hop);
      queue.push(hop.to);
    }
  }
  return undefined;
}

function wayTo(end: number, cameBy: ReadonlyMap<number, Hop | undefined>): Way {
  const lines = [end];
  const hops: Hop[] = [];
  for (let hop = cameBy.get(end); hop !== undefined; hop = cameBy.get(hop.from)) {
    hops.unshift(hop);
    lines.unshift(hop.from);
  }
  return { lines, hops };
}

/** Lines that oil can get to from `line`, itself included; tanks absorb. */
export function spreadFrom(state: OneState, line: number): number[] {
  const seen = new Set([line]);
  const queue = [line];
  for (let head = 0; head < queue.length; head++) {
    const here = queue[head] as number;
    if (state.net.lines[here]?.tank) continue;
    for (const hop of state.hops) {
      if (hop.from !== here || seen.has(hop.to)) continue;
      seen.add(hop.to);
      queue.push(hop.to);
    }
  }
  return queue;
}
