import { lineEver } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** ISO 4413 (paraphrased): an accumulator must vent by itself or be isolated positively, else it carries a warning. */
export const undischargedAccumulator: Rule = ({ net, table }) =>
  net.accumulators.flatMap((store): Finding[] => {
    if (store.line >= net.shown || lineEver(table, store.line, 'flows to tank', 'vented')) return [];
    const part = net.parts[store.part];
    return [
      {
        rule: 'undischarged-accumulator',
        level: 'danger',
        title: `Nothing discharges ${part?.label ?? ''}`,
        what: 'No combination opens this accumulator to tank: it keeps its line under pressure after the stop.',
        remedy:
          'Usual remedy: a discharge valve that opens when power goes, or a hand valve to isolate and one to discharge it, and a warning on the machine and the diagram. Follow ISO 4413, the machine’s documents and local codes.',
        parts: part ? [part.id] : [],
        lines: [store.line],
        rows: [],
        rowCount: 0,
      },
    ];
  });
