import type { Budget } from '../base/budget.ts';
import { Cancelled } from '../base/budget.ts';
import { bad, good } from '../base/result.ts';
import type { Problem, Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import { TooManyNodes } from '../engine/paths/diagrams/diagrams.ts';
import { settledPathSets } from '../engine/paths/diagrams/settled-paths.ts';
import { pathOutcomes, tableOutcomes } from '../engine/table/fold/outcome-sets.ts';
import type { OutcomeSource } from '../engine/table/fold/outcome-sets.ts';
import type { TableData } from '../engine/table/table-data.ts';
import { dependentLabel } from '../network/dependents.ts';
import type { Network } from '../network/network.ts';
import { MOST_ROWS, networkOf, pathConditions, tabulate } from './analyse.ts';
import type { Conditions } from './results.ts';

/** Outcomes of a circuit as sets of combinations. */
export interface Outcomes {
  readonly net: Network;
  readonly source: OutcomeSource;
  /** False where there are too many combinations to list: then open paths alone answer. */
  readonly listed: boolean;
}

/**
 * Outcomes from the table of these conditions where one can be listed (`table`, if it is there already), and from
 * open paths otherwise. Throws `Cancelled` when the budget says so, also later, while sets are made.
 */
export function outcomesOf(
  circuit: Circuit,
  conditions: Conditions,
  budget: Budget,
  table?: TableData,
): Result<Outcomes> {
  const net = networkOf(circuit, conditions);
  const heartbeat = (): void => {
    if (budget.cancelled()) throw new Cancelled();
  };
  if (net.inputs.reduce((n, input) => n * input.positions.length, 1) <= MOST_ROWS) {
    const data = table ?? tabulate(circuit, conditions, budget);
    return good({ net, source: tableOutcomes(data, heartbeat), listed: true });
  }
  return entangled(() => {
    const where = pathConditions(net, conditions);
    const paths = settledPathSets(net, where, { heartbeat });
    return { net, source: pathOutcomes(net, where, paths), listed: false };
  });
}

/** Labels of valves that pressures or actuators move, for answers of open paths; empty if there are none. */
export function followersOf(net: Network): { readonly followers?: readonly string[] } {
  const followers = net.dependents.map((_, d) => dependentLabel(net, d));
  return followers.length > 0 ? { followers } : {};
}

/**
 * Open paths only guess where a valve stands that pressures or actuators move, which is not enough to say where
 * pressure is trapped or let down; undefined if there are none.
 */
export function refuseDependents(net: Network): Problem | undefined {
  const labels = followersOf(net).followers ?? [];
  if (labels.length === 0) return undefined;
  return {
    where: 'circuit',
    what: `There are too many combinations to list, and ${labels.join(', ')} ${labels.length > 1 ? 'follow' : 'follows'} from pressures or from where an actuator stands, which open paths alone only guess.`,
    remedy: `Ask about a part of the circuit by itself, with at most ${MOST_ROWS.toLocaleString('en')} combinations.`,
  };
}

/** Sets that do not fit are a problem in words. */
export function entangled<T>(work: () => T): Result<T> {
  try {
    return good(work());
  } catch (error) {
    if (!(error instanceof TooManyNodes)) throw error;
    return bad({
      where: 'circuit',
      what: 'The combinations are too entangled to be held as sets.',
      remedy: `Ask about a part of the circuit by itself, with at most ${MOST_ROWS.toLocaleString('en')} combinations.`,
    });
  }
}

/** Wherever open paths alone have answered. */
export const PATHS_ONLY =
  'Too many combinations to list, so open paths alone have answered: what loads, rivals or settings decide is left open.';
