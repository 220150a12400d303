import { isCoilTag } from '../base/coil-names.ts';
import type { Rule } from './finding.ts';

/** On electrical drawings a tag stands for one coil (common practice). */
export const coilTagTwice: Rule = ({ net }) => {
  const valves = new Map<string, number[]>();
  for (const { part, coils } of net.inputs)
    for (const { name } of coils) if (isCoilTag(name)) valves.set(name, [...(valves.get(name) ?? []), part]);
  return [...valves].flatMap(([tag, of]) => {
    if (of.length < 2) return [];
    const parts = of.flatMap((part) => net.parts[part] ?? []);
    const labels = parts.map(({ label }) => label);
    return [
      {
        rule: 'coil-tag-twice',
        level: 'caution' as const,
        title: `${of.length} coils are tagged ${tag}`,
        what: `${labels.slice(0, -1).join(', ')} and ${labels.at(-1) ?? ''} each have a coil of this tag, which on an electrical drawing stands for one coil. They are told apart here by their valves, as in ${labels[0] ?? ''}.${tag}.`,
        remedy: 'Give each a tag of its own in the settings of its valve.',
        parts: parts.map(({ id }) => id),
        lines: [],
        rows: [],
        rowCount: 0,
      },
    ];
  });
};
