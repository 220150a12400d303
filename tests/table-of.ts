import { unlimited } from '../src/base/budget.ts';
import { explainRow, networkOf, tabulate } from '../src/analysis/analyse.ts';
import type { Conditions, Explanation } from '../src/analysis/results.ts';
import type { Circuit } from '../src/circuit/model.ts';
import { StateTable } from '../src/engine/table/state-table.ts';
import { findFaults } from '../src/findings/index.ts';
import type { TableOptions } from '../src/engine/table/tabulate.ts';
import type { Finding } from '../src/findings/finding.ts';

/** A table that is asked by names, as people would. */
export class Asked {
  readonly table: StateTable;
  readonly circuit: Circuit;
  readonly conditions: Conditions;

  /** `pressureRows` 0: what open paths say by themselves. */
  constructor(
    circuit: Circuit,
    conditions: Conditions = { pumps: 'running' },
    options: TableOptions = { pressureRows: 20_000 },
  ) {
    this.circuit = circuit;
    this.conditions = conditions;
    this.table = new StateTable(tabulate(circuit, conditions, unlimited, options));
  }

  /** `V1=a V2=0` (or with commas, where names have blanks) → row; valves not named stand at rest. */
  row(state: string): number {
    const positions = this.table.positionsOf(this.table.restRow());
    for (const word of state.split(state.includes(',') ? ',' : ' ').filter((w) => w !== '')) {
      const [label = '', name = ''] = word.trim().split('=');
      const input = this.table.data.inputs.findIndex((entry) => entry.label === label);
      const position = this.table.data.inputs[input]?.positions.indexOf(name) ?? -1;
      if (position < 0) throw new Error(`no such position: ${word}`);
      positions[input] = position;
    }
    return this.table.rowOf(positions);
  }

  actuator(label: string, state: string): string {
    return this.table.actuator(index(this.table.data.actuators, 'label', label), this.row(state));
  }

  notes(label: string, state: string): string[] {
    return this.table.actuatorNotes(index(this.table.data.actuators, 'label', label), this.row(state));
  }

  rests(label: string, state: string): string[] {
    return this.table.actuatorRests(index(this.table.data.actuators, 'label', label), this.row(state));
  }

  pump(state: string, label = this.table.data.pumps[0]?.label ?? ''): string {
    return this.table.pump(index(this.table.data.pumps, 'label', label), this.row(state));
  }

  line(name: string, state: string): string {
    return this.table.line(index(this.table.data.lines, 'name', name), this.row(state));
  }

  blocked(name: string, state: string): string | undefined {
    return this.table.blocked(index(this.table.data.lines, 'name', name), this.row(state));
  }

  trapped(name: string, state: string): string[] {
    return this.table.trapped(index(this.table.data.lines, 'name', name), this.row(state));
  }

  explain(state: string): Explanation {
    return explainRow(this.circuit, this.conditions, this.row(state));
  }

  findings(): Finding[] {
    return findFaults({ net: networkOf(this.circuit), table: this.table });
  }
}

function index<K extends string>(list: readonly Readonly<Record<K, string>>[], key: K, value: string): number {
  const at = list.findIndex((entry) => entry[key] === value);
  if (at < 0) throw new Error(`no ${value} among ${list.map((entry) => entry[key]).join(', ')}`);
  return at;
}
