import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../../src/analysis/analyse.ts';
import { isEmpty } from '../../../../src/base/bits.ts';
import { Cancelled, unlimited } from '../../../../src/base/budget.ts';
import { pathPlanes } from '../../../../src/engine/table/sets/path-planes.ts';
import type { PathPlanes } from '../../../../src/engine/table/sets/path-planes.ts';
import type { Plane } from '../../../../src/engine/table/table-data.ts';
import { tabulate } from '../../../../src/engine/table/tabulate.ts';
import type { Network } from '../../../../src/network/network.ts';
import { FAMILIES, family } from '../../../bench/circuits.ts';
import { randomPanel } from '../../../bench/random-panel.ts';
import { randomCircuit } from '../../../random-circuit.ts';

const KINDS = [
  'actuatorPlanes',
  'actuatorNotes',
  'actuatorRests',
  'pumpPlanes',
  'linePlanes',
  'blockedPlanes',
  'trapPlanes',
] as const;

const words = (plane: Plane | undefined): number[] => (plane === undefined || isEmpty(plane) ? [] : [...plane]);

/** All planes of both ways to make them, bit for bit; returns how many have a row. */
function compare(net: Network, pumpsRunning: boolean, place: 'between' | 'in' | 'out' = 'between'): number {
  const conditions = { pumpsRunning, places: net.actuators.map(() => place) };
  const rows = tabulate(net, conditions, unlimited, { pressureRows: 0, rowByRow: true });
  const found = pathPlanes(net, conditions, unlimited) as PathPlanes;
  let some = 0;
  for (const kind of KINDS) {
    expect(found[kind].length, kind).toBe(rows[kind].length);
    found[kind].forEach((planes, item) => {
      expect(planes.length).toBe(rows[kind][item]?.length);
      planes.forEach((plane, index) => {
        expect(words(plane), `${kind} of ${item}, ${index}`).toEqual(words(rows[kind][item]?.[index]));
        if (plane) some += 1;
      });
    });
  }
  return some;
}

test(
  'sets of rows give the same table as the rows one block at a time, on 300 random circuits',
  { timeout: 60_000 },
  () => {
    let planes = 0;
    fc.assert(
      fc.property(
        randomCircuit(5, 16),
        fc.boolean(),
        fc.constantFrom('between' as const, 'in' as const, 'out' as const),
        (drawn, running, place) => {
          const net = networkOf(drawn);
          if (net.dependents.length === 0) planes += compare(net, running, place);
        },
      ),
      { numRuns: 300, seed: 20261204 },
    );
    expect(planes).toBeGreaterThan(3_000);
  },
);

test('panels as somebody might build them, at random, running and stopped', { timeout: 60_000 }, () => {
  let planes = 0;
  for (let seed = 1; seed <= 40; seed++) planes += compare(networkOf(randomPanel(6, seed)), seed % 3 !== 0);
  expect(planes).toBeGreaterThan(3_000);
});

test('the valve families, running and stopped, over several words and blocks', () => {
  for (const name of FAMILIES) {
    for (const valves of [2, 3, 4, 6]) {
      for (const running of [true, false])
        expect(compare(networkOf(family(name, valves)), running)).toBeGreaterThan(10);
    }
  }
  // 6,561 rows: more than one block.
  compare(networkOf(family('SERIES', 8)), true);
  compare(networkOf(family('MIX', 8)), true);
});

test('equal planes of a table share their memory', () => {
  const net = networkOf(family('BANK', 8));
  const planes = pathPlanes(net, { pumpsRunning: true, places: net.actuators.map(() => 'between') }, unlimited);
  const all = KINDS.flatMap((kind) => (planes as PathPlanes)[kind].flat()).filter((plane) => plane !== undefined);
  const kept = new Set(all);
  expect(kept.size).toBe(new Set(all.map((plane) => plane.join())).size);
  expect(kept.size).toBeLessThan(all.length / 2);
});

test('a table can be given up while its sets are made', () => {
  const net = networkOf(family('SERIES', 14));
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  const impatient = { cancelled: () => true, progress: () => undefined };
  expect(() => pathPlanes(net, conditions, impatient)).toThrow(Cancelled);
});
