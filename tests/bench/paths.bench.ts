import { networkOf } from '../../src/analysis/analyse.ts';
import { unlimited } from '../../src/base/budget.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import type { TableData } from '../../src/engine/table/table-data.ts';
import { tabulate } from '../../src/engine/table/tabulate.ts';
import { plainState } from '../engine/paths/reference.ts';
import { FAMILIES, family } from './circuits.ts';

/**
 * Whole tables, all outputs kept, against the reference in the same run: one graph of the graph library
 * per state, for the line classes alone.
 */
function run(print: (line: string) => void): void {
  print('circuit      combinations   table ms   states/s   graph library states/s    ratio   kept MB');
  for (const name of FAMILIES) {
    for (const valves of [4, 8, 10, 12]) {
      const net = networkOf(family(name, valves));
      const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
      let best = Infinity;
      let data: TableData | undefined;
      for (let i = 0; i < (valves > 10 ? 2 : 4); i++) {
        const began = performance.now();
        data = tabulate(net, conditions, unlimited);
        best = Math.min(best, performance.now() - began);
      }
      if (!data) return;
      const table = new StateTable(data);
      const sample = Math.min(data.count, 300);
      const began = performance.now();
      for (let i = 0; i < sample; i++) plainState(net, table.positionsOf(Math.floor((i * data.count) / sample)), true);
      const plain = (sample / (performance.now() - began)) * 1000;
      const fast = (data.count / best) * 1000;
      print(
        `${`${name} ${valves}`.padEnd(12)} ${String(data.count).padStart(12)} ${best.toFixed(1).padStart(10)} ${round(fast).padStart(10)} ${round(plain).padStart(24)} ${round(fast / plain).padStart(8)} ${(keptBytes(data) / 1e6).toFixed(2).padStart(9)}`,
      );
    }
  }
}

const round = (n: number): string => Number(n.toPrecision(3)).toLocaleString('en', { useGrouping: false });

function keptBytes(data: TableData): number {
  const buffers = new Set<ArrayBufferLike>();
  for (const list of [
    data.actuatorPlanes,
    data.actuatorNotes,
    data.actuatorRests,
    data.pumpPlanes,
    data.linePlanes,
    data.blockedPlanes,
    data.trapPlanes,
  ]) {
    for (const row of list) for (const plane of row) if (plane) buffers.add(plane.buffer);
  }
  return [...buffers].reduce((sum, buffer) => sum + buffer.byteLength, 0);
}

run((line) => console.log(line));
