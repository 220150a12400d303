import type { Budget } from '../base/budget.ts';
import { Cancelled } from '../base/budget.ts';
import { bad, good } from '../base/result.ts';
import type { Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import type { Diagram } from '../engine/paths/diagrams/diagrams.ts';
import { TooManyCubes } from '../engine/table/fold/cover.ts';
import { foldOutcomes } from '../engine/table/fold/folded-table.ts';
import { supportOf, Unions } from '../engine/table/fold/influence.ts';
import { jointOutcomes } from '../engine/table/fold/outcome-sets.ts';
import type { OutcomeSource } from '../engine/table/fold/outcome-sets.ts';
import { namesOfNetwork } from '../engine/table/rules/names.ts';
import type { Names } from '../engine/table/rules/names.ts';
import type { TableData } from '../engine/table/table-data.ts';
import type { FoldAnswer, FoldBy, FoldItem } from './fold-results.ts';
import { entangled, followersOf, outcomesOf } from './outcomes.ts';
import type { Outcomes } from './outcomes.ts';
import type { Conditions } from './results.ts';

/** Mixtures of outcomes that a group may have; with more, its fold would be as long as the table. */
export const MOST_MIXTURES = 256;
/** Rows for one outcome: nobody reads more, and finding them would take seconds. */
export const MOST_FOLDED = 3000;

/**
 * The table folded by an actuator, pump, line or group: the fewest rows found that say the same. `table`: the table
 * of these conditions, if it is there already. Throws `Cancelled` when the budget says so.
 */
export function foldOf(
  circuit: Circuit,
  conditions: Conditions,
  by: FoldBy,
  budget: Budget,
  table?: TableData,
): Result<FoldAnswer> {
  const outcomes = outcomesOf(circuit, conditions, budget, table);
  return outcomes.ok ? foldFrom(outcomes.value, by, budget) : outcomes;
}

/** The same from outcomes at hand, which may be asked again and again. */
export function foldFrom({ net, source, listed }: Outcomes, by: FoldBy, budget: Budget): Result<FoldAnswer> {
  if (budget.cancelled()) throw new Cancelled();
  const names = namesOfNetwork(net);
  const found = described(() => {
    const groups = groupsOf(source, names);
    const items = itemsOf(by, names, groups);
    const joint = jointOutcomes(
      source.sets,
      items.map(({ of, index }) => source.of(of, index)),
      MOST_MIXTURES,
    );
    if (joint === undefined) return undefined;
    budget.progress(0.3);
    const usual = names.inputs.map((input) => input.rest ?? 0);
    const { rows, otherwise, otherwiseCount, least } = foldOutcomes(source.sets, joint, usual, MOST_FOLDED);
    const rest = joint.find(({ word }) => word === otherwise)?.set as Diagram;
    return {
      by,
      items,
      inputs: names.inputs.map(({ label, positions }) => ({ label, positions })),
      rows: rows.map(({ cube, outcome, count }) => ({ positions: cube, outcome, count })),
      otherwise: { outcome: otherwise, count: otherwiseCount, example: source.sets.example(rest, usual) ?? usual },
      combinations: source.sets.total,
      least,
      groups,
      listed,
      ...(listed ? {} : followersOf(net)),
    };
  });
  if (!found.ok) return found;
  const { value } = found;
  return value === undefined
    ? bad({
        where: 'fold',
        what: `These actuators together have more than ${MOST_MIXTURES} different mixtures of verdicts, so a fold would hardly be shorter than the table.`,
        remedy: 'Fold by one of them.',
      })
    : good(value);
}

/** Sets that do not fit, or take too many rows, are a problem in words. */
function described<T>(work: () => T): Result<T> {
  try {
    return entangled(work);
  } catch (error) {
    if (!(error instanceof TooManyCubes)) throw error;
    return bad({
      where: 'fold',
      what: `One of the verdicts here takes more than ${MOST_FOLDED.toLocaleString('en')} rows of levers to describe, so a fold would be no help.`,
      remedy: 'Hold some levers where they stand and fold what is left, or ask a question about the combinations.',
    });
  }
}

/** Actuators that share a valve, directly or over others; those that share none are in no group. */
export function groupsOf({ sets, of }: OutcomeSource, names: Names): number[][] {
  const inputs = names.inputs.length;
  const unions = new Unions(inputs + names.actuators.length);
  names.actuators.forEach((_, i) => {
    for (const input of supportOf(
      sets,
      of('actuator', i).map(({ set }) => set),
    ).inputs)
      unions.join(input, inputs + i);
  });
  const groups = new Map<number, number[]>();
  names.actuators.forEach((_, i) => {
    const root = unions.find(inputs + i);
    groups.set(root, [...(groups.get(root) ?? []), i]);
  });
  return [...groups.values()].filter((group) => group.length > 1);
}

function itemsOf({ of, index }: FoldBy, names: Names, groups: readonly (readonly number[])[]): FoldItem[] {
  const actuator = (i: number): FoldItem => ({ of: 'actuator', index: i, label: names.actuators[i]?.label ?? '' });
  switch (of) {
    case 'actuator':
      return [actuator(index)];
    case 'pump':
      return [{ of, index, label: names.pumps[index]?.label ?? '' }];
    case 'line':
      return [{ of, index, label: names.lines[index]?.name ?? '' }];
    case 'group':
      return (groups[index] ?? []).map(actuator);
  }
}

/** What a label or line name of the circuit stands for; undefined = nothing. */
export function foldByLabel(names: Names, label: string): FoldBy | undefined {
  const lists = [
    ['actuator', names.actuators.map((each) => each.label)],
    ['pump', names.pumps.map((each) => each.label)],
    ['line', names.lines.map((each) => each.name)],
  ] as const;
  for (const [of, labels] of lists) {
    const index = labels.indexOf(label);
    if (index >= 0) return { of, index };
  }
  return undefined;
}
