import type { Budget } from '../base/budget.ts';
import type { UnitSystem } from '../base/units.ts';
import { withLoadCase } from '../circuit/load-case.ts';
import type { Circuit } from '../circuit/model.ts';
import type { PathConditions } from '../engine/paths/reach.ts';
import { dumpProblem, problemNow } from '../engine/flow/dump.ts';
import { RowSettler } from '../engine/table/dependents.ts';
import { explain } from '../engine/table/explain.ts';
import { besidesOf } from '../engine/table/left-behind.ts';
import type { Beside } from '../engine/table/left-behind.ts';
import { PressureSolver } from '../engine/table/resolve.ts';
import { rowNumbers } from '../engine/table/row-numbers.ts';
import type { RowNumbers } from '../engine/table/row-numbers.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import type { TableData } from '../engine/table/table-data.ts';
import { tabulate as tabulateNetwork } from '../engine/table/tabulate.ts';
import type { TableOptions } from '../engine/table/tabulate.ts';
import { findFaults } from '../findings/index.ts';
import type { Finding } from '../findings/finding.ts';
import { compileNetwork } from '../network/compile.ts';
import { hold } from '../network/hold.ts';
import type { Network } from '../network/network.ts';
import { kindOf } from '../parts/catalogue.ts';
import { MOST_ROWS } from './limits.ts';
import type { Conditions, Explanation } from './results.ts';

export { MOST_ROWS } from './limits.ts';

/** Dense arrays of a circuit that has passed the checks. Throws on a kind that the catalogue lacks, or a load case that it does not have. */
export function networkOf(circuit: Circuit, conditions?: Pick<Conditions, 'loadCase' | 'held'>): Network {
  const net = compileNetwork(withLoadCase(circuit, conditions?.loadCase), (name) => {
    const kind = kindOf(name);
    if (!kind) throw new Error(`unknown part kind ${name}`);
    return kind;
  });
  return conditions?.held ? hold(net, heldIn(net, conditions)) : net;
}

/** Per input the position in which it is held; undefined = it is free. */
export const heldIn = (net: Network, { held }: Pick<Conditions, 'held'>): (number | undefined)[] =>
  net.inputs.map(({ part }) => held?.[net.parts[part]?.id ?? '']);

/** Every move of a held lever, in words, and where the held inputs of the free circuit then stand. */
export function movesOfHeld(
  net: Network,
  conditions: Conditions,
): { readonly held: readonly (number | undefined)[]; readonly text: string }[] {
  const held = heldIn(net, conditions);
  return net.inputs.flatMap(({ part, positions }, i) => {
    const now = held[i];
    if (now === undefined) return [];
    return positions.flatMap((name, p) =>
      p === now
        ? []
        : [
            {
              held: held.map((at, other) => (other === i ? p : at)),
              text: `${net.parts[part]?.label ?? ''} from ${name} to ${positions[now] ?? ''}`,
            },
          ],
    );
  });
}

/** The states one move of a held lever away. */
function besides(circuit: Circuit, conditions: Conditions): Beside[] {
  if (!conditions.held) return [];
  const { held: _, ...free } = conditions;
  const net = networkOf(circuit, free);
  return besidesOf(net, movesOfHeld(net, conditions));
}

/** The whole state table. Throws `Cancelled`, and a plain Error when there are more states than it can list. */
export function tabulate(
  circuit: Circuit,
  conditions: Conditions,
  budget: Budget,
  options: TableOptions = { pressureRows: MOST_SOLVED },
): TableData {
  const net = networkOf(circuit, conditions);
  refuseTooMany(net);
  return tabulateNetwork(net, pathConditions(net, conditions), budget, options);
}

/** Rows that the pressure layer solves before an answer is given, 3¹⁰ and some more: several seconds. */
export const MOST_SOLVED = 60_000;

/** Design faults, from the table with the pumps running. */
export function findings(circuit: Circuit, running: StateTable, conditions?: Conditions): Finding[] {
  return findFaults({ net: networkOf(circuit, conditions), table: running });
}

/** One row (0-based) in words, with quantities in these units. */
export function explainRow(
  circuit: Circuit,
  conditions: Conditions,
  row: number,
  units: UnitSystem = 'metric',
): Explanation {
  const net = networkOf(circuit, conditions);
  const answer = explain(net, pathConditions(net, conditions), row, units, besides(circuit, conditions));
  const held = heldIn(net, conditions);
  const positions = positionsOf(net, row).map((position, i) => held[i] ?? position);
  const notes = answer.actuators.flatMap((actuator) => actuator.notes.map((note) => `${actuator.label}: ${note}`));
  return { row, positions, ...answer, notes };
}

/** Pressures, flows and speeds of rows (0-based), in the order asked; SI. */
export function numbersOf(circuit: Circuit, conditions: Conditions, rows: readonly number[]): RowNumbers[] {
  const net = networkOf(circuit, conditions);
  const where = pathConditions(net, conditions);
  const solver = new PressureSolver(net, where);
  const settler = new RowSettler(solver, where);
  // Memory and hunting do not matter here: the figures are those of the setting that the row gives.
  return rows.map((row) => rowNumbers(solver, row, solver.solve(row, settler.at(row).setting)));
}

/** The flow problem of a row (0-based) as the solver gets it, in JSON: for a report of a fault, or another solver. */
export function dumpRow(circuit: Circuit, conditions: Conditions, row: number): string {
  const net = networkOf(circuit, conditions);
  const where = pathConditions(net, conditions);
  const solver = new PressureSolver(net, where);
  solver.solve(row, new RowSettler(solver, where).at(row).setting);
  return `${dumpProblem(problemNow(solver.model.solver))}\n`;
}

function refuseTooMany(net: Network): void {
  const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
  if (count > MOST_ROWS) {
    throw new Error(
      `The circuit has ${count.toLocaleString('en')} combinations of valve positions; up to ${MOST_ROWS.toLocaleString('en')} can be listed. Table a part of it by itself.`,
    );
  }
}

function positionsOf(net: Network, row: number): number[] {
  let rest = row;
  const out: number[] = [];
  for (let i = net.inputs.length - 1; i >= 0; i--) {
    const radix = net.inputs[i]?.positions.length ?? 1;
    out.unshift(rest % radix);
    rest = Math.floor(rest / radix);
  }
  return out;
}

export function pathConditions(net: Network, conditions: Conditions): PathConditions {
  return {
    pumpsRunning: conditions.pumps === 'running',
    places: net.actuators.map((actuator) => conditions.places?.[net.parts[actuator.part]?.id ?? ''] ?? 'between'),
  };
}
