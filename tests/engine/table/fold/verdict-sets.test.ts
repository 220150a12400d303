import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../../src/analysis/analyse.ts';
import { unlimited } from '../../../../src/base/budget.ts';
import type { Diagram } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { motionSets } from '../../../../src/engine/paths/diagrams/motion-sets.ts';
import { classSet, openPathSets } from '../../../../src/engine/paths/diagrams/open-paths.ts';
import { verdictSets } from '../../../../src/engine/table/fold/verdict-sets.ts';
import { StateTable } from '../../../../src/engine/table/state-table.ts';
import { tabulate } from '../../../../src/engine/table/tabulate.ts';
import type { Network } from '../../../../src/network/network.ts';
import { family, FAMILIES } from '../../../bench/circuits.ts';
import { randomCircuit } from '../../../random-circuit.ts';

/** Every actuator and cut-off line in every combination; returns how many verdicts were compared. */
function compare(net: Network, pumpsRunning: boolean, place: 'between' | 'in' | 'out' = 'between'): number {
  const conditions = { pumpsRunning, places: net.actuators.map(() => place) };
  const table = new StateTable(tabulate(net, conditions, unlimited, { pressureRows: 0, rowByRow: true }));
  const paths = openPathSets(net, conditions);
  const motions = motionSets(net, conditions, paths);
  let compared = 0;
  net.actuators.forEach((actuator, i) => {
    const verdicts = verdictSets(net, conditions, paths, motions, i);
    for (let row = 0; row < table.count; row++) {
      const at = table.positionsOf(row);
      const words = [...verdicts].filter(([, set]) => paths.sets.has(set, at)).map(([word]) => word);
      expect(words, `${net.parts[actuator.part]?.label ?? ''} in row ${row + 1}`).toEqual([table.actuator(i, row)]);
      compared += 1;
    }
  });
  table.data.lines.forEach((_, line) => {
    const set = paths.sets.and(classSet(paths, line, 'cut off'), motions.carries[line] as Diagram);
    for (let row = 0; row < table.count; row++) {
      expect(paths.sets.has(set, table.positionsOf(row))).toBe(table.line(line, row) === 'carries displaced oil');
    }
  });
  return compared;
}

test(
  'actuator verdicts and displaced oil are equal to the enumeration on 1,000 random circuits',
  { timeout: 60_000 },
  () => {
    let verdicts = 0;
    fc.assert(
      fc.property(
        randomCircuit(4, 14),
        fc.boolean(),
        fc.constantFrom('between' as const, 'in' as const, 'out' as const),
        (drawn, running, place) => {
          verdicts += compare(networkOf(drawn), running, place);
        },
      ),
      { numRuns: 1000, seed: 20261203 },
    );
    expect(verdicts).toBeGreaterThan(5_000);
  },
);

test('the valve families, series circuits with displaced oil among them', () => {
  for (const name of FAMILIES) compare(networkOf(family(name, 5)), true);
});

test('bypass centres in series, 10 valves: a cylinder extends in one of three combinations of its own valve', () => {
  // Check case of series circuits: with the displaced oil counted, each cylinder answers to its own valve alone.
  const net = networkOf(family('SERIES', 10));
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  const paths = openPathSets(net, conditions);
  const verdicts = verdictSets(net, conditions, paths, motionSets(net, conditions, paths), 7);
  expect(paths.sets.count(verdicts.get('extends') as Diagram)).toBe(3n ** 9n);
});
