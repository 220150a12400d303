import type { Budget } from '../base/budget.ts';
import { Cancelled } from '../base/budget.ts';
import type { Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import type { Diagram } from '../engine/paths/diagrams/diagrams.ts';
import { fedFrom, supportOf, Unions } from '../engine/table/fold/influence.ts';
import type { OutcomeSet } from '../engine/table/fold/outcome-sets.ts';
import { namesOfNetwork } from '../engine/table/rules/names.ts';
import type { TableData } from '../engine/table/table-data.ts';
import type { Network } from '../network/network.ts';
import type { Influence, InfluenceOf, InfluenceRow, SubCircuit } from './fold-results.ts';
import { entangled, followersOf, outcomesOf } from './outcomes.ts';
import type { Outcomes } from './outcomes.ts';
import type { Conditions } from './results.ts';

/**
 * Which inputs can change which outcome, which positions change nothing, and which parts of the circuit are
 * independent. Throws `Cancelled` when the budget says so.
 */
export function influence(
  circuit: Circuit,
  conditions: Conditions,
  budget: Budget,
  table?: TableData,
): Result<Influence> {
  const outcomes = outcomesOf(circuit, conditions, budget, table);
  return outcomes.ok ? influenceFrom(outcomes.value, budget) : outcomes;
}

/** The same from outcomes at hand. */
export function influenceFrom({ net, source, listed }: Outcomes, budget: Budget): Result<Influence> {
  const names = namesOfNetwork(net);
  const { sets } = source;
  return entangled(() => {
    const all: Diagram[] = [];
    const rows: InfluenceRow[] = [];
    const steps = names.actuators.length + names.pumps.length + 3 * names.lines.length;
    const add = (of: InfluenceOf, index: number, label: string, list: readonly OutcomeSet[] | undefined): void => {
      if (budget.cancelled()) throw new Cancelled();
      budget.progress(rows.length / steps);
      if (list === undefined) return;
      const found = list.map(({ set }) => set);
      all.push(...found);
      rows.push({ of, index, label, inputs: supportOf(sets, found).inputs });
    };
    names.actuators.forEach(({ label }, i) => add('actuator', i, label, source.of('actuator', i)));
    names.pumps.forEach(({ label }, i) => add('pump', i, label, source.of('pump', i)));
    names.lines.forEach(({ name }, i) => add('line', i, name, source.of('line', i)));
    names.lines.forEach(({ name }, i) => add('blocked', i, name, source.blocked(i)));
    names.lines.forEach(({ name }, i) => add('trapped', i, name, source.trapped(i)));
    return {
      inputs: net.inputs.map(({ part, positions, rest }) => ({
        part: net.parts[part]?.id ?? '',
        label: net.parts[part]?.label ?? '',
        positions,
        ...(rest !== undefined && { rest }),
      })),
      rows,
      alike: supportOf(sets, all).alike,
      parts: partsOf(net, rows),
      combinations: sets.total,
      listed,
      ...(listed ? {} : followersOf(net)),
    };
  });
}

/** Inputs and items that some outcome or a common source of oil ties together. */
function partsOf(net: Network, rows: readonly InfluenceRow[]): SubCircuit[] {
  const actuators = net.inputs.length;
  const pumps = actuators + net.actuators.length;
  const lines = pumps + net.pumps.length;
  const end = lines + net.shown;
  const unions = new Unions(end);
  const numberOf = ({ of, index }: Pick<InfluenceRow, 'of' | 'index'>): number =>
    (of === 'actuator' ? actuators : of === 'pump' ? pumps : lines) + index;
  for (const row of rows) for (const input of row.inputs) unions.join(numberOf(row), input);
  const gather = (start: number, source: number): void => {
    const fed = fedFrom(net, start);
    for (const input of fed.inputs) unions.join(source, input);
    for (const actuator of fed.actuators) unions.join(source, actuators + actuator);
    for (const line of fed.lines) unions.join(source, lines + line);
  };
  net.pumps.forEach(({ outlet }, i) => gather(outlet, pumps + i));
  for (const { line } of net.accumulators) if (line < net.shown) gather(line, lines + line);

  const parts = new Map<number, number[]>();
  for (let each = 0; each < end; each++) {
    const root = unions.find(each);
    parts.set(root, [...(parts.get(root) ?? []), each]);
  }
  return [...parts.values()]
    .filter(([first]) => (first as number) < lines)
    .map((members) => {
      const from = (low: number, high: number): number[] =>
        members.filter((each) => each >= low && each < high).map((each) => each - low);
      const inputs = from(0, actuators);
      return {
        inputs,
        actuators: from(actuators, pumps),
        pumps: from(pumps, lines),
        lines: from(lines, end),
        combinations: inputs.reduce((n, input) => n * BigInt(net.inputs[input]?.positions.length ?? 1), 1n),
      };
    });
}
