import { isEmpty } from '../base/bits.ts';
import { lineRows, witnesses } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** A sequence valve whose spring chamber drains into its outlet, which comes under pressure: that adds to its setting. */
export const sequenceDrain: Rule = ({ net, table }) =>
  net.valves.flatMap((valve): Finding[] => {
    const part = net.parts[valve.part];
    if (part?.kind !== 'sequence-valve' || valve.duty !== 'sequence' || net.lines[valve.to]?.tank) return [];
    const inside = valve.signals.some(({ line, factor }) => line === valve.to && factor < 0);
    if (!inside || valve.to >= net.shown) return [];
    const drives = net.actuators.some(({ a, b }) => a === valve.to || b === valve.to);
    const fed = lineRows(table, valve.to, 'fed', 'cut off');
    if (!drives && isEmpty(fed)) return [];
    return [
      {
        rule: 'sequence-drain',
        level: 'caution',
        title: `${part.label} has no drain of its own`,
        what: `Its spring chamber drains into ${net.lines[valve.to]?.name ?? ''}, which comes under pressure. That pressure adds to the setting, so that the valve shuts again or opens late.`,
        remedy: 'Usual remedy: drain the spring chamber by Y straight to the tank.',
        parts: [part.id],
        lines: [valve.to],
        ...witnesses(fed),
      },
    ];
  });
