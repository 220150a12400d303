import { add, emptySet, has } from '../base/bits.ts';
import { pumpRows, witnesses } from './evidence.ts';
import type { Rule } from './finding.ts';

/** The whole flow over the relief valve while nobody asks for anything: heat, and nothing for it. */
export const overReliefAtRest: Rule = ({ net, table }) => {
  const rest = table.restRow();
  return net.pumps.flatMap((pump, i) => {
    if (!has(pumpRows(table, i, 'over relief'), rest)) return [];
    const part = net.parts[pump.part];
    const rows = emptySet(table.count);
    add(rows, rest);
    return [
      {
        rule: 'over-relief-at-rest',
        level: 'caution' as const,
        title: `${part?.label ?? ''} blows over its relief at rest`,
        what: `With every lever at rest (row ${rest + 1}) all of its flow goes over the relief valve and turns to heat.`,
        remedy: 'Usual ways out: a bypass centre, an unloading valve, or a pressure-compensated pump.',
        parts: part ? [part.id] : [],
        lines: [],
        ...witnesses(rows),
      },
    ];
  });
};
