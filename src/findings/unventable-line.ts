import { lineEver, lineRows, witnesses } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** A line that can be cut off under pressure and that no lever position opens to tank. */
export const unventableLine: Rule = ({ net, table }) => {
  const lines = net.lines.slice(0, net.shown).flatMap((_, line) => {
    if (!lineEver(table, line, 'cut off') || lineEver(table, line, 'vented', 'flows to tank')) return [];
    return [{ line, cutOff: lineRows(table, line, 'cut off') }];
  });
  return lines.map(({ line, cutOff }): Finding => {
    const name = net.lines[line]?.name ?? '';
    return {
      rule: 'unventable-line',
      level: 'caution',
      title: `No lever position vents ${name}`,
      what: `It is cut off in some combinations and has no open path to tank in any. Pressure that gets in stays in.`,
      remedy:
        'Usually a bleed valve or a test point with a hose to tank is added there. Never crack a fitting to let pressure off; follow the machine’s documents, local codes and qualified people.',
      parts: [],
      lines: [line],
      ...witnesses(cutOff),
    };
  });
};
