import { unlimited } from '../base/budget.ts';
import { StateTable } from '../engine/table/state-table.ts';
import { tabulate } from '../engine/table/tabulate.ts';
import type { ActuatorVerdict } from '../engine/table/words.ts';
import { asInputs } from '../network/dependents.ts';
import type { Network } from '../network/network.ts';
import { actuatorEver, INWARD, OUTWARD } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** An actuator that no combination moves, or that can go one way but not back. */
export const actuatorReach: Rule = ({ net, table: given }) => {
  const elsewhere = freeTable(net);
  return net.actuators.flatMap((actuator, i): Finding[] => {
    // A roller trips only at a stop, which this table does not show.
    const tables = elsewhere ? [given, elsewhere] : [given];
    const some = (...verdicts: ActuatorVerdict[]): boolean =>
      tables.some((table) => actuatorEver(table, i, ...verdicts));
    if (some('rests on pressure', 'undetermined')) return [];
    const out = some(...OUTWARD);
    const inward = some(...INWARD);
    const floats = some('floats');
    if (out && inward) return [];
    const part = net.parts[actuator.part];
    const label = part?.label ?? '';
    const base = { rule: 'actuator-reach', parts: part ? [part.id] : [], lines: [], rows: [], rowCount: 0 };
    const [goes, back] = actuator.rotary ? ['turn A→B', 'turn B→A'] : ['extend', 'retract'];
    if (!out && !inward) {
      return [
        {
          ...base,
          level: 'caution',
          title: `Nothing moves ${label}`,
          what: `No combination makes it ${goes} or ${back}.`,
          remedy: 'Check its lines, and that a valve can both feed it and let it out.',
        },
      ];
    }
    if (actuator.rotary || floats) return [];
    const [can, cannot] = out ? [goes, back] : [back, goes];
    return [
      {
        ...base,
        level: 'caution',
        title: `${label} can ${can} but not ${cannot}`,
        what: `Some combination makes it ${can}; none makes it ${cannot}, and it floats in none.`,
        remedy: 'Give the other side a feed, or a spring or load that brings it back over a path to tank.',
      },
    ];
  });
};

/** More combinations than this are not gone through on every edit. */
const MOST_ROWS = 250_000;

/** What could be if the dependent valves stood anywhere: they as further inputs; open paths alone. */
function freeTable(net: Network): StateTable | undefined {
  if (net.dependents.length === 0) return undefined;
  const free = asInputs(net);
  if (free.inputs.reduce((n, input) => n * input.positions.length, 1) > MOST_ROWS) return undefined;
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  return new StateTable(tabulate(free, conditions, unlimited));
}
