import type { Budget } from '../base/budget.ts';
import type { Circuit } from '../circuit/model.ts';
import { withLeftBehind } from '../engine/table/left-behind.ts';
import type { TableData } from '../engine/table/table-data.ts';
import { movesOfHeld, networkOf, pathConditions, tabulate } from './analyse.ts';
import type { Conditions } from './results.ts';

/**
 * The table of the levers that are not held (`conditions.held`), for panels with too many combinations to list. What a
 * move of a held lever would leave behind is in it. Throws as `tabulate` does.
 */
export function tabulateHeld(circuit: Circuit, conditions: Conditions, budget: Budget): TableData {
  const data = tabulate(circuit, conditions, budget);
  const running =
    conditions.pumps === 'running' ? data : tabulate(circuit, { ...conditions, pumps: 'running' }, budget);
  const { held: _, ...free } = conditions;
  const net = networkOf(circuit, free);
  const moved = movesOfHeld(net, conditions).map(({ held }) => held);
  return withLeftBehind(data, running, net, pathConditions(net, conditions), moved);
}
