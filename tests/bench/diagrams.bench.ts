import { networkOf } from '../../src/analysis/analyse.ts';
import { classSet, openPathSets, PATH_CLASSES } from '../../src/engine/paths/diagrams/open-paths.ts';
import { foldLine } from '../../src/engine/table/fold/folded-table.ts';
import { PanelSets } from '../../src/engine/table/sets/panel-sets.ts';
import { FAMILIES, family } from './circuits.ts';

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
      const cell = (text: string | number, width: number): string => String(text).padStart(width);
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
      const cell = (n: number, width: number): string => String(n).padStart(width);
      print(
        `${`${name} ${valves}`.padEnd(12)} ${cell(net.shown, 8)} ${cell(
          rows.reduce((a, b) => a + b, 0),
          7,
        )} ${cell(Math.max(...rows), 21)}   ${ms.toFixed(0)}`,
      );
    }
  }
}

/** Verdicts of all actuators and pumps, classes and blockages of all lines, each counted. Processor time, cold and warm. */
function outcomes(print: (line: string) => void): void {
  print('\nall outcomes     sets   cold ms   warm ms   nodes made   nodes kept   MB');
  for (const name of FAMILIES) {
    for (const valves of [8, 16, 24, 32, 40]) {
      const net = networkOf(family(name, valves));
      const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
      const once = () => {
        const began = process.cpuUsage();
        const paths = openPathSets(net, conditions);
        const panel = new PanelSets(net, conditions, paths);
        const found = [
          ...net.actuators.flatMap((_, i) => panel.actuator(i).verdicts),
          ...net.pumps.flatMap((_, i) => panel.pump(i)),
          ...panel.lines.classes.flat(),
          ...panel.lines.blocked.flat(),
        ];
        for (const set of found) paths.sets.count(set);
        const { user, system } = process.cpuUsage(began);
        return { ms: (user + system) / 1000, paths, found };
      };
      const { ms: cold, paths, found } = once();
      let warm = Infinity;
      for (let i = 0; i < 3; i++) warm = Math.min(warm, once().ms);
      const cell = (text: string | number, width: number): string => String(text).padStart(width);
      print(
        `${`${name} ${valves}`.padEnd(12)} ${cell(found.length, 8)} ${cell(cold.toFixed(0), 9)} ${cell(warm.toFixed(0), 9)} ` +
          `${cell(paths.sets.nodes, 12)} ${cell(paths.sets.size(...found), 12)} ${cell((paths.sets.bytes / 1e6).toFixed(1), 4)}`,
      );
    }
  }
}

run((line) => console.log(line));
fold((line) => console.log(line));
outcomes((line) => console.log(line));
