import { emptySet } from '../base/bits.ts';
import { positionMask } from '../engine/paths/edges.ts';
import { dependentLabel } from '../network/dependents.ts';
import { pumpRows, sayRows, witnesses } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** A two-stage valve that is commanded, and whose main spool stays at rest for want of pilot pressure. */
export const twoStageNoPilot: Rule = ({ net, table }) => {
  if (net.dependents.length === 0) return [];
  const radices = net.inputs.map((input) => input.positions.length);
  const unloaded = net.pumps.map((_, i) => pumpRows(table, i, 'unloaded'));
  return net.dependents.flatMap((valve, d): Finding[] => {
    const rest = table.data.dependentPlanes[d]?.[valve.rest ?? -1];
    if (!rest) return [];
    const rows = emptySet(table.count);
    for (const shift of valve.shifts) {
      if (shift.by !== 'pressure' || shift.input < 0) continue;
      const asked = positionMask(radices, shift.input, shift.stages, table.count);
      for (let w = 0; w < rows.length; w++) {
        // Where only open paths have put it, the pressures may yet find enough.
        const sure = ~(table.data.dependentRests[d]?.[w] ?? 0) & ~(table.data.dependentHunts?.[w] ?? 0);
        rows[w] = (rows[w] as number) | ((asked[w] as number) & (rest[w] as number) & sure);
      }
    }
    const found = witnesses(rows);
    if (found.rowCount === 0) return [];
    const label = dependentLabel(net, d);
    const idle = rows.some((word, w) => unloaded.some((plane) => (word & (plane[w] as number)) !== 0));
    return [
      {
        rule: 'two-stage-no-pilot',
        level: 'caution',
        title: `${label} does not shift for want of pilot pressure`,
        what: `In ${sayRows(found)} its pilot stage is commanded, and the pilot pressure is below what it needs${idle ? ': the unloaded pump gives too little' : ''}.`,
        remedy:
          'Keep a pilot pressure up: a check valve of 5 bar or so in the tank line or behind the pump with the pilot drained past it, an external pilot supply, or a centre that does not unload the pump.',
        parts: [net.parts[valve.part]?.id ?? ''],
        lines: [],
        ...found,
      },
    ];
  });
};
