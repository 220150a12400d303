import { unlimited } from '../../base/budget.ts';
import type { Network } from '../../network/network.ts';
import { PathSolver } from '../paths/block.ts';
import { compileEdges } from '../paths/edges.ts';
import type { PathConditions } from '../paths/reach.ts';
import { actuatorOutcome } from './actuator-outcomes.ts';
import { pumpOutcome } from './pump-outcomes.ts';
import { resolveBlock } from './resolve-block.ts';
import { PressureSolver } from './resolve.ts';

/**
 * What the pressures make of some rows of one word of a table, in the bits of these rows: all that they change in the
 * table of open paths.
 */
export interface LateRows {
  /** Rows 32·word … 32·word + 31. */
  readonly word: number;
  /** Bits of the rows that are in it. */
  readonly rows: number;
  /** [actuator][verdict], [actuator][note], [pump][verdict], as in `TableData`, one word each. */
  readonly actuators: readonly (readonly number[])[];
  readonly notes: readonly (readonly number[])[];
  readonly pumps: readonly (readonly number[])[];
  readonly valuedActuators: readonly number[];
  readonly valuedPumps: readonly number[];
  /** [line]: oil passes it over a valve that pressures open, so it is neither blocked nor trapped. */
  readonly flowing: readonly number[];
}

const firstOf = (plane: Uint32Array | undefined): number => plane?.[0] ?? 0;

/**
 * Asks the pressures about single rows, ahead of the table that they are still at, and gives what that table will say.
 * For circuits without dependent valves.
 */
export class LateSolver {
  readonly #net: Network;
  readonly #conditions: PathConditions;
  readonly #paths: PathSolver;
  readonly #pressures: PressureSolver;
  /** The pressures are asked about rows that open paths decide as well. */
  readonly #every: boolean;

  /** `every`: as the table has it (see `Allowance`). */
  constructor(net: Network, conditions: PathConditions, every: boolean) {
    if (net.dependents.length > 0) throw new RangeError('rows with dependent valves are not settled by themselves');
    this.#net = net;
    this.#conditions = conditions;
    this.#every = every;
    this.#paths = new PathSolver(net, compileEdges(net), conditions, 1);
    this.#pressures = new PressureSolver(net, conditions);
  }

  /** Rows are 0-based; each word comes once. */
  solve(rows: readonly number[]): LateRows[] {
    const words = new Map<number, number>();
    for (const row of rows) words.set(row >>> 5, (words.get(row >>> 5) ?? 0) | (1 << (row & 31)));
    return [...words].map(([word, bits]) => this.#word(word, bits));
  }

  #word(word: number, rows: number): LateRows {
    const net = this.#net;
    const conditions = this.#conditions;
    const block = this.#paths.solve(word, 1);
    const actuators = net.actuators.map((actuator, i) => actuatorOutcome(i, actuator, block, conditions));
    const pumps = net.pumps.map((pump, i) => pumpOutcome(i, pump, net, block, conditions));
    const allowance = { rows: 32, every: this.#every, only: Uint32Array.of(rows) };
    const resolved = resolveBlock(block, actuators, pumps, this.#pressures, allowance, unlimited);
    return {
      word,
      rows,
      actuators: actuators.map(({ verdicts }) => verdicts.map(firstOf)),
      notes: actuators.map(({ notes }) => notes.map(firstOf)),
      pumps: pumps.map((planes) => planes.map(firstOf)),
      valuedActuators: resolved.actuators.map(firstOf),
      valuedPumps: resolved.pumps.map(firstOf),
      flowing: Array.from({ length: net.shown }, (_, line) => firstOf(resolved.flowing.get(line))),
    };
  }
}
