import { shiftSet } from '../base/bits.ts';
import type { BitSet } from '../base/bits.ts';
import { positionMask } from '../engine/paths/edges.ts';
import { strides } from '../engine/table/strides.ts';
import type { Finding, Rule } from './finding.ts';

/** Past this many rows the comparison takes longer than it is worth on every edit. */
const MOST_ROWS = 250_000;

/** Two positions of a valve between which no outcome differs, whatever the other levers do. */
export const positionChangesNothing: Rule = ({ net, table }) => {
  if (table.count > MOST_ROWS) return [];
  const { data } = table;
  const radices = net.inputs.map((input) => input.positions.length);
  const steps = strides(radices);
  const planes = new Set<BitSet>();
  for (const list of [data.actuatorPlanes, data.pumpPlanes, data.linePlanes]) {
    for (const row of list) for (const plane of row) if (plane) planes.add(plane);
  }
  return net.inputs.flatMap((input, i): Finding[] => {
    const part = net.parts[input.part];
    for (let p = 0; p + 1 < input.positions.length; p++) {
      for (let q = p + 1; q < input.positions.length; q++) {
        const here = positionMask(radices, i, 1 << p, table.count);
        const by = (q - p) * (steps[i] as number);
        const same = [...planes].every((plane) => {
          const there = shiftSet(plane, by, table.count);
          return here.every((word, w) => (word & ((plane[w] as number) ^ (there[w] as number))) === 0);
        });
        if (!same) continue;
        return [
          {
            rule: 'position-changes-nothing',
            level: 'note',
            title: `${part?.label ?? ''}: ${input.positions[p]} and ${input.positions[q]} do the same`,
            what: 'No actuator, pump or line differs between these two positions, whatever the other levers do.',
            remedy: 'Check its connections, or use a valve with fewer positions.',
            parts: part ? [part.id] : [],
            lines: [],
            rows: [],
            rowCount: 0,
          },
        ];
      }
    }
    return [];
  });
};
