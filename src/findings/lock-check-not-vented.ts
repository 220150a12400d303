import type { Rule } from './finding.ts';

/** A lock check closes surely only when its pilot line can drain at rest. */
export const lockCheckNotVented: Rule = ({ net, table }) => {
  const rest = table.restRow();
  const byPart = new Map<number, number[]>();
  for (const path of net.paths) {
    if (path.pilot < 0) continue;
    const name = path.pilot < net.shown ? table.line(path.pilot, rest) : 'cut off';
    if (name !== 'cut off') continue;
    byPart.set(path.part, [...(byPart.get(path.part) ?? []), path.pilot]);
  }
  return [...byPart].map(([index, pilots]) => {
    const part = net.parts[index];
    const lines = pilots.filter((line) => line < net.shown);
    return {
      rule: 'lock-check-not-vented',
      level: 'caution' as const,
      title: `${part?.label ?? ''}: pilot not vented at rest`,
      what: `With every lever at rest (row ${rest + 1}) the pilot ${lines.length > 1 ? 'lines' : 'line'} ${lines.map((line) => net.lines[line]?.name).join(', ')} ${lines.length > 1 ? 'are' : 'is'} cut off. Pressure left there, or leakage past the spool, can hold the check open: the load may creep.`,
      remedy: 'Usual remedy: a float centre (A and B to tank, P shut) on the valve before the lock check.',
      parts: part ? [part.id] : [],
      lines,
      rows: [rest],
      rowCount: 1,
    };
  });
};
