import type { Circuit } from '../circuit/model.ts';
import { LateSolver } from '../engine/table/late-rows.ts';
import type { LateRows } from '../engine/table/late-rows.ts';
import { networkOf, pathConditions } from './analyse.ts';
import { BACKGROUND_ROWS } from './limits.ts';
import type { Conditions } from './results.ts';

/** Rows ahead of their table, one circuit after another: the solver is kept as long as the circuit is the same. */
export class Late {
  #key: string | undefined;
  #solver: LateSolver | undefined;

  /** What the table of these conditions will say of rows (0-based); empty where valves follow from pressures. */
  rows(circuit: Circuit, conditions: Conditions, rows: readonly number[]): LateRows[] {
    const key = JSON.stringify([circuit.parts, circuit.connections, circuit.loadCases, conditions]);
    if (this.#key !== key) {
      const net = networkOf(circuit, conditions);
      const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
      this.#solver =
        net.dependents.length > 0
          ? undefined
          : new LateSolver(net, pathConditions(net, conditions), count <= BACKGROUND_ROWS);
      this.#key = key;
    }
    return this.#solver?.solve(rows) ?? [];
  }
}
