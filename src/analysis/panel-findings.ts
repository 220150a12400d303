import type { Budget } from '../base/budget.ts';
import { Cancelled, unlimited } from '../base/budget.ts';
import type { Circuit } from '../circuit/model.ts';
import { TooManyNodes } from '../engine/paths/diagrams/diagrams.ts';
import { openPathSets } from '../engine/paths/diagrams/open-paths.ts';
import { PanelSets } from '../engine/table/sets/panel-sets.ts';
import type { Finding } from '../findings/finding.ts';
import { findPanelFaults } from '../findings/panel.ts';
import { networkOf, pathConditions } from './analyse.ts';
import type { Conditions } from './results.ts';

/**
 * Design faults of a panel with too many combinations to list, whatever levers are held. Where sets cannot tell them, a
 * note says so. Throws `Cancelled` when the budget says so.
 */
export function panelFindings(circuit: Circuit, conditions: Conditions, budget: Budget = unlimited): Finding[] {
  const { held: _, ...free } = conditions;
  const net = networkOf(circuit, free);
  if (net.dependents.length > 0)
    return [
      untold(
        'Some of its valves follow from pressures or from where an actuator stands, which open paths alone only guess.',
      ),
    ];
  const where = pathConditions(net, { ...free, pumps: 'running' });
  const heartbeat = (): void => {
    if (budget.cancelled()) throw new Cancelled();
  };
  try {
    return findPanelFaults(new PanelSets(net, where, openPathSets(net, where, { heartbeat })));
  } catch (error) {
    if (!(error instanceof TooManyNodes)) throw error;
    return [untold('Its combinations are too entangled to be held as sets.')];
  }
}

const untold = (why: string): Finding => ({
  rule: 'not-looked-for',
  level: 'note',
  title: 'Design faults were not looked for',
  what: `The circuit has too many combinations to list. ${why}`,
  remedy: 'Look at a part of the circuit by itself.',
  parts: [],
  lines: [],
  rows: [],
  rowCount: 0,
});

/** The findings of the panel on show, which do not change as its levers move. */
export class PanelFindings {
  #key: string | undefined;
  #found: readonly Finding[] = [];

  of(circuit: Circuit, conditions: Conditions): readonly Finding[] {
    const { held: _, ...free } = conditions;
    const key = JSON.stringify([circuit, free]);
    if (this.#key !== key) {
      this.#found = panelFindings(circuit, conditions);
      this.#key = key;
    }
    return this.#found;
  }
}
