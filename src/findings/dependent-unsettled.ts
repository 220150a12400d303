import { dependentLabel } from '../network/dependents.ts';
import { sayRows, witnesses } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** Valves that find no position, and rollers that nothing trips. */
export const dependentUnsettled: Rule = ({ net, table }) => {
  const hunts = table.data.dependentHunts;
  const found = hunts && witnesses(hunts);
  const hunting: Finding[] = found
    ? [
        {
          rule: 'dependent-hunts',
          level: 'caution',
          title: `${net.dependents.map((_, d) => dependentLabel(net, d)).join(', ')}: no position agrees with the pressures`,
          what: `In ${sayRows(found)} each position causes pressures that shift the valve to another one, so it hunts between them.`,
          remedy:
            'Take the pilot from a line whose pressure does not fall when the valve shifts, or raise the pressure behind it.',
          parts: net.dependents.map(({ part }) => net.parts[part]?.id ?? ''),
          lines: [],
          ...found,
        },
      ]
    : [];
  const untripped = net.dependents.flatMap((valve, d): Finding[] =>
    valve.shifts.some((shift) => shift.by === 'roller' && shift.actuator < 0)
      ? [
          {
            rule: 'roller-not-tripped',
            level: 'caution',
            title: `${dependentLabel(net, d)}: nobody says which actuator trips its roller`,
            what: 'It counts as never tripped.',
            remedy: 'Name the actuator in its settings, and where it trips the roller.',
            parts: [net.parts[valve.part]?.id ?? ''],
            lines: [],
            rows: [],
            rowCount: 0,
          },
        ]
      : [],
  );
  return [...hunting, ...untripped];
};
