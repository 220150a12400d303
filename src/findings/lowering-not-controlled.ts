import { emptySet, isEmpty, orInto } from '../base/bits.ts';
import type { BitSet } from '../base/bits.ts';
import { positionMask } from '../engine/paths/edges.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import type { ActuatorVerdict } from '../engine/table/words.ts';
import type { NetPath, Network } from '../network/network.ts';
import { actuatorRows, sayRows, witnesses } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** Moving with its load. */
const WITH_LOAD: Readonly<Record<'in' | 'out', readonly ActuatorVerdict[]>> = {
  in: ['moved in by load', 'retracts', 'driven B→A by load', 'turns B→A'],
  out: ['moved out by load', 'extends', 'driven A→B by load', 'turns A→B'],
};

/**
 * A load that comes down through nothing but open ways, all of them switched by coils or rollers or not at all. A
 * hand on a lever meters the way down, so that valves moved by hand count as control.
 */
export const loweringNotControlled: Rule = ({ net, table }) =>
  net.actuators.flatMap((actuator, i): Finding[] => {
    const { way, by, size } = actuator.push;
    if (by !== 'load' || (way !== 'in' && way !== 'out') || size === 0) return [];
    const loaded = way === 'in' ? actuator.a : actuator.b;
    if (loaded < 0) return [];
    const rows = freeToTank(net, table, loaded, actuatorRows(table, i, ...WITH_LOAD[way]));
    if (isEmpty(rows)) return [];
    const part = net.parts[actuator.part];
    const seen = witnesses(rows);
    return [
      {
        rule: 'lowering-not-controlled',
        level: 'caution',
        title: `Nothing controls how fast the load of ${part?.label ?? ''} comes down`,
        what: `In ${sayRows(seen)} its oil goes to tank through open ways alone: only their losses slow it down, and it may run ahead of the pump.`,
        remedy:
          'Usual remedy: a throttle that meters what the load pushes out, a pressure-compensated flow control, or a counterbalance valve, close to the cylinder.',
        parts: part ? [part.id] : [],
        lines: [loaded],
        ...seen,
      },
    ];
  });

/** Those of `rows` in which an open way leads from the line to a tank with no throttle on it and no valve that a hand moves. */
function freeToTank(net: Network, table: StateTable, from: number, rows: BitSet): BitSet {
  const out = emptySet(table.count);
  const ways = net.paths.flatMap((path) => {
    const open = openRows(net, table, path);
    if (open === undefined) return [];
    const there = { from: path.from, to: path.to, open };
    return path.oneWay ? [there] : [there, { from: path.to, to: path.from, open }];
  });
  const reached = new Map([[from, rows]]);
  const queue = isEmpty(rows) ? [] : [from];
  for (let line = queue.shift(); line !== undefined; line = queue.shift()) {
    const here = reached.get(line) as BitSet;
    if (net.lines[line]?.tank) {
      orInto(out, here);
      continue;
    }
    for (const { from: start, to, open } of ways) {
      if (start !== line) continue;
      const on = open === 'always' ? here : here.map((word, w) => word & (open[w] as number));
      const there = reached.get(to) ?? emptySet(table.count);
      reached.set(to, there);
      if (orInto(there, on) && !queue.includes(to)) queue.push(to);
    }
  }
  return out;
}

/** Rows in which the way is open without anybody metering it; undefined = a throttle or a hand does. */
function openRows(
  net: Network,
  table: StateTable,
  { throttled, input, positions }: NetPath,
): BitSet | 'always' | undefined {
  if (throttled) return undefined;
  if (input < 0) return 'always';
  if (input < net.inputs.length) {
    if (net.inputs[input]?.by !== 'coil') return undefined;
    const radices = net.inputs.map((each) => each.positions.length);
    return positionMask(radices, input, positions, table.count);
  }
  const valve = net.dependents[input - net.inputs.length];
  // The hand on a pilot valve meters too; which one that is, is not known here.
  const switched = valve?.shifts.every((shift) => shift.by === 'roller' || net.inputs[shift.input]?.by === 'coil');
  if (!valve || !switched) return undefined;
  const out = emptySet(table.count);
  const { dependentPlanes, dependentRests, dependentHunts } = table.data;
  dependentPlanes[input - net.inputs.length]?.forEach((plane, p) => {
    if (plane && ((positions >>> p) & 1) === 1) orInto(out, plane);
  });
  // Where it may stand elsewhere nothing is claimed.
  for (const unsure of [dependentRests[input - net.inputs.length], dependentHunts])
    unsure?.forEach((word, w) => (out[w] = (out[w] as number) & ~word));
  return out;
}
