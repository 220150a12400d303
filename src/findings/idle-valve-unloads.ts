import { add, emptySet } from '../base/bits.ts';
import { sayRows, witnesses } from './evidence.ts';
import type { Rule } from './finding.ts';
import type { StateTable } from '../engine/table/state-table.ts';

/** Bypass centres in parallel: the valve at rest lets the flow of the shifted one go. */
export const idleValveUnloads: Rule = ({ net, table }) => {
  const rest = table.positionsOf(table.restRow());
  const spoiled = net.inputs.flatMap((input, i) => {
    if (input.rest === undefined) return [];
    const alone: number[] = [];
    for (let p = 0; p < input.positions.length; p++) {
      if (p === input.rest) continue;
      const positions = [...rest];
      positions[i] = p;
      const row = table.rowOf(positions);
      if (nothingDriven(table, row) && unloaded(table, row) && drivenTogether(table, net.inputs, rest, i, p))
        alone.push(row);
    }
    return alone.length > 0 ? [{ input, rows: alone }] : [];
  });
  if (spoiled.length < 2) return [];
  const rows = emptySet(table.count);
  for (const entry of spoiled) for (const row of entry.rows) add(rows, row);
  const seen = witnesses(rows);
  const parts = spoiled.flatMap((entry) => net.parts[entry.input.part] ?? []);
  return [
    {
      rule: 'idle-valve-unloads',
      level: 'caution',
      title: 'A valve at rest unloads the others',
      what: `${parts.map((part) => part.label).join(', ')}: shifted alone (${sayRows(seen)}), nothing moves, because the flow leaves freely through the ones at rest. They work only when shifted together.`,
      remedy:
        'Usual ways out: connect them in series, use carry-over sections, or closed centres with one valve that unloads the pump.',
      parts: parts.map((part) => part.id),
      lines: [],
      ...seen,
    },
  ];
};

const DRIVEN = ['extends', 'retracts', 'turns A→B', 'turns B→A', 'rests on pressure'];

const nothingDriven = (table: StateTable, row: number): boolean =>
  table.data.actuators.every((_, i) => !DRIVEN.includes(table.actuator(i, row)));

const unloaded = (table: StateTable, row: number): boolean =>
  table.data.pumps.length > 0 && table.data.pumps.every((_, i) => table.pump(i, row) === 'unloaded');

/** With every other sprung valve shifted too, in some way, this position does drive something. */
function drivenTogether(
  table: StateTable,
  inputs: readonly { positions: readonly string[]; rest?: number }[],
  rest: readonly number[],
  input: number,
  position: number,
): boolean {
  for (const end of ['first', 'last'] as const) {
    const positions = inputs.map((entry, i) => {
      if (i === input) return position;
      if (entry.rest === undefined) return rest[i] ?? 0;
      const wanted = end === 'first' ? 0 : entry.positions.length - 1;
      return wanted === entry.rest ? (end === 'first' ? entry.positions.length - 1 : 0) : wanted;
    });
    if (!nothingDriven(table, table.rowOf(positions))) return true;
  }
  return false;
}
