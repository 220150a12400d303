import { spawnSync } from 'node:child_process';
import { networkOf } from '../../src/analysis/analyse.ts';
import { wordsFor } from '../../src/base/bits.ts';
import { unlimited } from '../../src/base/budget.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import type { TableData } from '../../src/engine/table/table-data.ts';
import { tabulate } from '../../src/engine/table/tabulate.ts';
import type { TableOptions } from '../../src/engine/table/tabulate.ts';
import type { Network } from '../../src/network/network.ts';
import { plainState } from '../engine/paths/reference.ts';
import { FAMILIES, family } from './circuits.ts';
import type { Family } from './circuits.ts';

const BY_SETS: TableOptions = { pressureRows: 0 };
const BY_ROWS: TableOptions = { pressureRows: 0, rowByRow: true };

const conditionsOf = (net: Network) => ({ pumpsRunning: true, places: net.actuators.map(() => 'between' as const) });

/**
 * Milliseconds of processor time of this process so far, compiling and collecting of garbage included: other
 * programs on the machine count less than on the clock.
 */
function processorMs(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

/** Processor time of the quickest of some runs, and what the last one gave. */
function quickest(runs: number, run: () => TableData): { readonly ms: number; readonly data: TableData } {
  let ms = Infinity;
  let data: TableData | undefined;
  for (let i = 0; i < runs; i++) {
    const began = processorMs();
    data = run();
    ms = Math.min(ms, processorMs() - began);
  }
  return { ms, data: data as TableData };
}

/**
 * Whole tables by open paths, all outputs kept, against the reference in the same run: one graph of the graph
 * library per state, which finds the line classes alone. Its states per second are those of the quickest of
 * five batches of rows spread over the table; the table's time is that of its quickest run.
 */
function tables(print: (line: string) => void): void {
  print(
    'circuit     combinations   row by row ms   table ms    states/s   graph library states/s    ratio   all planes MB   kept MB',
  );
  for (const name of FAMILIES) {
    for (const valves of [4, 8, 10, 12, 13]) {
      const net = networkOf(family(name, valves));
      const table = (options: TableOptions) => () => tabulate(net, conditionsOf(net), unlimited, options);
      const { ms, data } = quickest(valves > 10 ? 8 : 20, table(BY_SETS));
      const plain = plainStatesPerSecond(net, new StateTable(data));
      const fast = (data.count / ms) * 1000;
      const rows = valves > 10 ? '-' : quickest(2, table(BY_ROWS)).ms.toFixed(1);
      const { all, kept } = bytes(data);
      print(
        [
          `${name} ${valves}`.padEnd(10),
          cell(data.count, 13),
          cell(rows, 15),
          cell(ms.toFixed(1), 10),
          cell(round(fast), 11),
          cell(round(plain), 24),
          cell(round(fast / plain), 8),
          cell((all / 1e6).toFixed(2), 15),
          cell((kept / 1e6).toFixed(2), 9),
        ].join(' '),
      );
    }
  }
}

function plainStatesPerSecond(net: Network, table: StateTable): number {
  const batch = Math.min(table.count, 80);
  let best = 0;
  for (let b = 0; b < 5; b++) {
    const began = processorMs();
    for (let i = 0; i < batch; i++) {
      plainState(net, table.positionsOf(Math.floor(((i + b / 5) * table.count) / batch)), true);
    }
    best = Math.max(best, (batch / (processorMs() - began)) * 1000);
  }
  return best;
}

/** `all`: planes that have a row × 4 × ⌈rows/32⌉ bytes. `kept`: the memory they stand in, equal planes once. */
function bytes(data: TableData): { readonly all: number; readonly kept: number } {
  const planes = [
    data.actuatorPlanes,
    data.actuatorNotes,
    data.actuatorRests,
    data.pumpPlanes,
    data.linePlanes,
    data.blockedPlanes,
    data.trapPlanes,
  ]
    .flat(2)
    .filter((plane) => plane !== undefined);
  const buffers = new Set(planes.map((plane) => plane.buffer));
  return {
    all: planes.length * 4 * wordsFor(data.count),
    kept: [...buffers].reduce((sum, buffer) => sum + buffer.byteLength, 0),
  };
}

/** An edit makes a new network and a new table. */
function edits(print: (line: string) => void): void {
  print('\nafter an edit    valves   network and table ms, quickest and middle of 40');
  for (const name of FAMILIES) {
    const circuit = family(name, 8);
    const times = Array.from({ length: 40 }, () => {
      const began = processorMs();
      const net = networkOf(circuit);
      tabulate(net, conditionsOf(net), unlimited, BY_SETS);
      return processorMs() - began;
    }).sort((a, b) => a - b);
    print(
      `${name.padEnd(13)} ${cell(8, 9)} ${cell((times[0] ?? 0).toFixed(1), 8)} ${cell((times[20] ?? 0).toFixed(1), 8)}`,
    );
  }
}

/** Each in a process of its own, which has run nothing before. */
function colds(print: (line: string) => void): void {
  print('\ncold process    valves   table ms   since the process began ms (on the clock)');
  for (const name of FAMILIES) {
    const { stdout } = spawnSync(process.execPath, [process.argv[1] ?? '', 'cold', name], { encoding: 'utf8' });
    print(stdout.trimEnd());
  }
}

function cold(name: Family, print: (line: string) => void): void {
  const began = processorMs();
  const net = networkOf(family(name, 12));
  tabulate(net, conditionsOf(net), unlimited, BY_SETS);
  const now = processorMs();
  print(
    [
      name.padEnd(13),
      cell(12, 8),
      cell((now - began).toFixed(0), 10),
      cell(now.toFixed(0), 12),
      `(${performance.now().toFixed(0)})`,
    ].join(' '),
  );
}

const cell = (value: string | number, width: number): string => String(value).padStart(width);
const round = (n: number): string => Number(n.toPrecision(3)).toLocaleString('en', { useGrouping: false });

const print = (line: string): void => console.log(line);
const [, , what, which] = process.argv;
if (what === 'cold') {
  cold(FAMILIES.find((name) => name === which) ?? 'BANK', print);
} else {
  tables(print);
  edits(print);
  colds(print);
}
