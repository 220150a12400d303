import { isEmpty } from '../base/bits.ts';
import { pumpRows, sayRows, witnesses } from './evidence.ts';
import type { Rule } from './finding.ts';

/** A fixed pump with nowhere to go: always a danger. */
export const deadHeadedPump: Rule = ({ net, table }) =>
  net.pumps.flatMap((pump, i) => {
    const rows = pumpRows(table, i, 'dead-headed');
    if (isEmpty(rows)) return [];
    const seen = witnesses(rows);
    const part = net.parts[pump.part];
    return [
      {
        rule: 'dead-headed-pump',
        level: 'danger' as const,
        title: `${part?.label ?? ''} can be dead-headed`,
        what: `In ${sayRows(seen)} its flow has no open path, moves nothing, and no pressure valve is within reach. Pressure climbs until something gives way.`,
        remedy: 'Fit a relief valve at the pump outlet, before anything that can shut it off.',
        parts: part ? [part.id] : [],
        lines: pump.outlet < net.shown ? [pump.outlet] : [],
        ...seen,
      },
    ];
  });
