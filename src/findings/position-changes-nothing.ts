import { has } from '../base/bits.ts';
import type { BitSet } from '../base/bits.ts';
import { positionMask } from '../engine/paths/edges.ts';
import { strides } from '../engine/table/strides.ts';
import { spreadOver } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** Rows that are compared before all of them are: what differs mostly does so in many. */
const GLANCES = 64;

/** Whether `plane` has another bit `by` rows on from some row of `here`. */
function differsIn(plane: BitSet, here: BitSet, by: number): boolean {
  const words = by >>> 5;
  const bits = by & 31;
  for (let w = 0; w < here.length; w++) {
    const low = plane[w + words] ?? 0;
    const there = bits === 0 ? low : (low >>> bits) | ((plane[w + words + 1] ?? 0) << (32 - bits));
    if (((here[w] as number) & ((plane[w] as number) ^ there)) !== 0) return true;
  }
  return false;
}

/** Two positions of a valve between which no outcome differs, whatever the other levers do. */
export const positionChangesNothing: Rule = ({ net, table }) => {
  const { data } = table;
  const radices = net.inputs.map((input) => input.positions.length);
  const steps = strides(radices);
  const all = new Set<BitSet>();
  for (const list of [data.actuatorPlanes, data.pumpPlanes, data.linePlanes]) {
    for (const row of list) for (const plane of row) if (plane) all.add(plane);
  }
  const planes = [...all];
  const glances = spreadOver(table.count, GLANCES);
  return net.inputs.flatMap((input, i): Finding[] => {
    const part = net.parts[input.part];
    for (let p = 0; p + 1 < input.positions.length; p++) {
      for (let q = p + 1; q < input.positions.length; q++) {
        const stride = steps[i] as number;
        const by = (q - p) * stride;
        const seen = glances.map((row) => row + (p - table.position(i, row)) * stride);
        if (planes.some((plane) => seen.some((row) => has(plane, row) !== has(plane, row + by)))) continue;
        const here = positionMask(radices, i, 1 << p, table.count);
        if (planes.some((plane) => differsIn(plane, here, by))) continue;
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
