import type { Rule } from './finding.ts';

/** The whole flow over the relief valve while nobody asks for anything: heat, and nothing for it. */
export const overReliefAtRest: Rule = ({ net, table }) => {
  const rest = table.restRow();
  return net.pumps.flatMap((pump, i) => {
    if (table.pump(i, rest) !== 'over relief') return [];
    const part = net.parts[pump.part];
    return [
      {
        rule: 'over-relief-at-rest',
        level: 'caution' as const,
        title: `${part?.label ?? ''} blows over its relief at rest`,
        what: `With every lever at rest (row ${rest + 1}) all of its flow goes over the relief valve and turns to heat.`,
        remedy: 'Usual ways out: a bypass centre, an unloading valve, or a pressure-compensated pump.',
        parts: part ? [part.id] : [],
        lines: [],
        rows: [rest],
        rowCount: 1,
      },
    ];
  });
};
