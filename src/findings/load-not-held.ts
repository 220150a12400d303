import type { Finding, Rule } from './finding.ts';

const MOVED = ['moved in by load', 'moved out by load', 'driven A→B by load', 'driven B→A by load', 'floats'];

/** A load that presses at rest, and nothing to hold it when every lever is let go. */
export const loadNotHeld: Rule = ({ net, table }) => {
  const rest = table.restRow();
  return net.actuators.flatMap((actuator, i): Finding[] => {
    const { push } = actuator;
    if (push.by !== 'load' || push.way === 'none' || !MOVED.includes(table.actuator(i, rest))) return [];
    const part = net.parts[actuator.part];
    return [
      {
        rule: 'load-not-held',
        level: 'danger',
        title: `Nothing holds the load of ${part?.label ?? ''} at rest`,
        what: `With every lever at rest (row ${rest + 1}) it is ${table.actuator(i, rest)}.`,
        remedy:
          'Usual remedy: a lock check or counterbalance valve on the loaded side, close to the cylinder. Prop the load mechanically before working under it.',
        parts: part ? [part.id] : [],
        lines: [],
        rows: [rest],
        rowCount: 1,
      },
    ];
  });
};
