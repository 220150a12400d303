import { isEmpty } from '../base/bits.ts';
import { actuatorRows, INWARD, OUTWARD } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** An actuator that no combination moves, or that can go one way but not back. */
export const actuatorReach: Rule = ({ net, table }) =>
  net.actuators.flatMap((actuator, i): Finding[] => {
    if (!isEmpty(actuatorRows(table, i, 'rests on pressure', 'undetermined'))) return [];
    const out = !isEmpty(actuatorRows(table, i, ...OUTWARD));
    const inward = !isEmpty(actuatorRows(table, i, ...INWARD));
    const floats = !isEmpty(actuatorRows(table, i, 'floats'));
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
