import { spawnSync } from 'node:child_process';
import { networkOf } from '../../src/analysis/analyse.ts';
import { classSet, openPathSets, PATH_CLASSES } from '../../src/engine/paths/diagrams/open-paths.ts';
import { foldLine } from '../../src/engine/table/fold/folded-table.ts';
import { PanelSets } from '../../src/engine/table/sets/panel-sets.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { FAMILIES, family } from './circuits.ts';
import { randomPanel } from './random-panel.ts';

/**
 * Line classes of every combination as decision diagrams, with exact counts of each class of each line.
 * Cold: the first run of this circuit in the process, which for the first circuit also warms the program up.
 */
function run(print: (line: string) => void): void {
  print(
    'circuit             combinations   cold ms   warm ms   nodes made   nodes kept   fed somewhere   greatest count',
  );
  for (const name of FAMILIES) {
    for (const valves of [8, 16, 24, 40]) {
      const net = networkOf(family(name, valves));
      const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
      const once = () => {
        const began = performance.now();
        const paths = openPathSets(net, conditions);
        const classes = Array.from({ length: net.shown }, (_, line) =>
          PATH_CLASSES.map((word) => classSet(paths, line, word)),
        );
        const counts = classes.map((row) => row.map((set) => paths.sets.count(set)));
        return { ms: performance.now() - began, paths, classes, counts };
      };
      const { ms: cold, paths, classes, counts } = once();
      let warm = Infinity;
      for (let i = 0; i < 5; i++) warm = Math.min(warm, once().ms);
      const fed = counts.map(([count]) => count ?? 0n).filter((count) => count > 0n);
      const most = fed.filter((count) => count < paths.sets.total).reduce((a, b) => (a > b ? a : b), 0n);
      print(
        `${`${name} ${valves}`.padEnd(10)} ${cell(paths.sets.total.toString(), 21)} ${cell(cold.toFixed(1), 9)} ${cell(warm.toFixed(1), 9)} ` +
          `${cell(paths.sets.nodes, 12)} ${cell(paths.sets.size(...classes.flat()), 12)} ${cell(fed.length, 15)}   ${most}`,
      );
    }
  }
}

/** Folded descriptions of the line classes, each checked to be equal to its set; the commonest class is the rest. */
function fold(print: (line: string) => void): void {
  print('\nfolded lines    lines    rows   most rows of a line   ms');
  for (const name of FAMILIES) {
    for (const valves of [10, 20, 40]) {
      const net = networkOf(family(name, valves));
      const paths = openPathSets(net, { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) });
      const began = performance.now();
      const rows = Array.from({ length: net.shown }, (_, line) => foldLine(paths, line).rows.length);
      const ms = performance.now() - began;
      print(
        `${`${name} ${valves}`.padEnd(12)} ${cell(net.shown, 8)} ${cell(
          rows.reduce((a, b) => a + b, 0),
          7,
        )} ${cell(Math.max(...rows), 21)}   ${ms.toFixed(0)}`,
      );
    }
  }
}

/** Processor time of this process so far, in ms. */
function processorMs(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

/** Verdicts of all actuators and pumps, classes and blockages of all lines, each counted. Processor time. */
function everything(drawn: Circuit) {
  const net = networkOf(drawn);
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  const began = processorMs();
  const paths = openPathSets(net, conditions);
  const panel = new PanelSets(net, conditions, paths);
  const found = [
    ...net.actuators.flatMap((_, i) => panel.actuator(i).verdicts),
    ...net.pumps.flatMap((_, i) => panel.pump(i)),
    ...panel.lines.classes.flat(),
    ...panel.lines.blocked.flat(),
  ];
  for (const set of found) paths.sets.count(set);
  return { ms: processorMs() - began, paths, found };
}

const cell = (text: string | number, width: number): string => String(text).padStart(width);

/** Cold, as above, and warm. */
function outcomes(print: (line: string) => void): void {
  print('\nall outcomes     sets   cold ms   warm ms   nodes made   nodes kept   MB');
  for (const name of FAMILIES) {
    for (const valves of [8, 16, 24, 32, 40]) {
      const { ms: cold, paths, found } = everything(family(name, valves));
      let warm = Infinity;
      for (let i = 0; i < 3; i++) warm = Math.min(warm, everything(family(name, valves)).ms);
      print(
        `${`${name} ${valves}`.padEnd(12)} ${cell(found.length, 8)} ${cell(cold.toFixed(0), 9)} ${cell(warm.toFixed(0), 9)} ` +
          `${cell(paths.sets.nodes, 12)} ${cell(paths.sets.size(...found), 12)} ${cell((paths.sets.bytes / 1e6).toFixed(1), 4)}`,
      );
    }
  }
}

/** Panels as somebody might build them, at random: each its first and only run. */
function randomPanels(print: (line: string) => void): void {
  print('\nrandom panels   seeds   middle ms   9 of 10 within   slowest ms   within 1 s   middle nodes   most nodes');
  for (const inputs of [20, 40]) {
    const runs = Array.from({ length: 40 }, (_, i) => everything(randomPanel(inputs, i + 1)));
    const times = runs.map(({ ms }) => ms).sort((a, b) => a - b);
    const nodes = runs.map(({ paths }) => paths.sets.nodes).sort((a, b) => a - b);
    const at = (list: readonly number[], share: number): string =>
      (list[Math.ceil(share * list.length) - 1] ?? 0).toFixed(0);
    print(
      `${`${inputs} inputs`.padEnd(12)} ${cell(runs.length, 8)} ${cell(at(times, 0.5), 11)} ${cell(at(times, 0.9), 16)} ${cell(at(times, 1), 12)} ` +
        `${cell(times.filter((ms) => ms < 1000).length, 12)} ${cell(at(nodes, 0.5), 14)} ${cell(at(nodes, 1), 12)}`,
    );
  }
}

/** Each family in a process of its own, which has run nothing before. */
function colds(print: (line: string) => void): void {
  print('\ncold process    all outcomes ms');
  for (const name of FAMILIES) {
    const { stdout } = spawnSync(process.execPath, [process.argv[1] ?? '', 'cold', name], { encoding: 'utf8' });
    print(`${`${name} 40`.padEnd(12)} ${cell(stdout.trim(), 8)}`);
  }
}

const print = (line: string): void => console.log(line);
const [, , what, which] = process.argv;
if (what === 'cold') {
  print(everything(family(FAMILIES.find((name) => name === which) ?? 'BANK', 40)).ms.toFixed(0));
} else {
  run(print);
  fold(print);
  outcomes(print);
  randomPanels(print);
  colds(print);
}
