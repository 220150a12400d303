import { add, emptySet, isEmpty } from '../base/bits.ts';
import type { Network } from '../network/network.ts';
import { standsAt } from '../network/dependents.ts';
import { sayRows, witnesses } from './evidence.ts';
import type { Finding, Rule } from './finding.ts';

/** Moving with its load. */
const WITH_LOAD: Readonly<Record<'in' | 'out', readonly string[]>> = {
  in: ['moved in by load', 'retracts', 'driven B→A by load', 'turns B→A'],
  out: ['moved out by load', 'extends', 'driven A→B by load', 'turns A→B'],
};
const MOST_ROWS = 5_000;

/**
 * A load that comes down through nothing but open ways, all of them switched by coils or not at all. A hand on a
 * lever meters the way down, so that valves moved by hand count as control.
 */
export const loweringNotControlled: Rule = ({ net, table }) =>
  net.actuators.flatMap((actuator, i): Finding[] => {
    const { way, by, size } = actuator.push;
    if (net.dependents.length > 0 || by !== 'load' || (way !== 'in' && way !== 'out') || size === 0) return [];
    const loaded = way === 'in' ? actuator.a : actuator.b;
    if (loaded < 0) return [];
    const rows = emptySet(table.count);
    for (let row = 0; row < Math.min(table.count, MOST_ROWS); row++) {
      if (!WITH_LOAD[way].includes(table.actuator(i, row))) continue;
      const positions = table.positionsOf(row);
      const at = standsAt(net, (input) => positions[input] ?? 0, []);
      if (freeToTank(net, at, loaded)) add(rows, row);
    }
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

/** True if an open way leads from the line to a tank with no throttle on it and no valve that a hand moves. */
function freeToTank(net: Network, position: (input: number) => number, from: number): boolean {
  const seen = new Set([from]);
  const queue = [from];
  for (let line = queue.pop(); line !== undefined; line = queue.pop()) {
    if (net.lines[line]?.tank) return true;
    for (const path of net.paths) {
      if (path.throttled) continue;
      if (path.input >= 0 && ((path.positions >>> position(path.input)) & 1) === 0) continue;
      if (path.input >= 0 && net.inputs[path.input]?.by !== 'coil') continue;
      for (const [a, b] of path.oneWay
        ? [[path.from, path.to]]
        : [
            [path.from, path.to],
            [path.to, path.from],
          ])
        if (a === line && b !== undefined && !seen.has(b)) {
          seen.add(b);
          queue.push(b);
        }
    }
  }
  return false;
}
