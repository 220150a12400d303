import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../../src/analysis/analyse.ts';
import { equalSets, orInto, emptySet } from '../../../../src/base/bits.ts';
import { unlimited } from '../../../../src/base/budget.ts';
import { Diagrams } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { classSet, openPathSets, PATH_CLASSES } from '../../../../src/engine/paths/diagrams/open-paths.ts';
import { orderInputs } from '../../../../src/engine/paths/diagrams/order.ts';
import { StateTable } from '../../../../src/engine/table/state-table.ts';
import { tabulate } from '../../../../src/engine/table/tabulate.ts';
import { LINE_CLASSES } from '../../../../src/engine/table/words.ts';
import type { Network } from '../../../../src/network/network.ts';
import { family, FAMILIES } from '../../../bench/circuits.ts';
import { circuit } from '../../../notation.ts';
import { randomCircuit } from '../../../random-circuit.ts';

/** Every line, class and combination; returns how many combinations were compared. */
function compare(net: Network, pumpsRunning: boolean, order?: readonly number[]): number {
  const conditions = { pumpsRunning, places: net.actuators.map(() => 'between' as const) };
  const data = tabulate(net, conditions, unlimited, { pressureRows: 0, rowByRow: true });
  const paths = openPathSets(net, conditions, order ? { order } : {});
  const table = new StateTable(data);
  expect(paths.sets.total).toBe(BigInt(data.count));
  const carries = LINE_CLASSES.indexOf('carries displaced oil');
  data.lines.forEach(({ name }, line) => {
    for (const word of PATH_CLASSES) {
      const plane = emptySet(data.count);
      const listed = data.linePlanes[line]?.[LINE_CLASSES.indexOf(word)];
      if (listed) orInto(plane, listed);
      const displaced = data.linePlanes[line]?.[carries];
      if (word === 'cut off' && displaced) orInto(plane, displaced);
      const set = classSet(paths, line, word);
      const found = emptySet(data.count);
      for (let row = 0; row < data.count; row++) {
        if (paths.sets.has(set, table.positionsOf(row)))
          found[row >>> 5] = (found[row >>> 5] as number) | (1 << (row & 31));
      }
      expect(equalSets(found, plane), `${name} ${word}`).toBe(true);
    }
  });
  return data.count;
}

test('line classes are equal to the enumeration on 1,000 random circuits', { timeout: 60_000 }, () => {
  let combinations = 0;
  fc.assert(
    fc.property(randomCircuit(4, 12), fc.boolean(), (drawn, running) => {
      combinations += compare(networkOf(drawn), running);
    }),
    { numRuns: 1000, seed: 20261202 },
  );
  expect(combinations).toBeGreaterThan(4_500);
});

test('line classes of the valve families are equal to the enumeration, whatever the order of the inputs', () => {
  for (const name of FAMILIES) {
    const net = networkOf(family(name, 6));
    compare(net, true);
    compare(net, true, [5, 0, 3, 1, 4, 2]);
  }
});

test('hunting combinations are those that the enumeration calls undetermined for every actuator', () => {
  // The lock check's own pilot is vented through the way that it opens.
  const net = networkOf(
    circuit(
      'P1 fixed-pump, T1 tank, Q1 throttle, L1 lock-check, C1 cylinder | P1.P Q1.A | Q1.B L1.C L1.X | L1.V T1.T P1.S',
    ),
  );
  const conditions = { pumpsRunning: true, places: ['between' as const] };
  const table = new StateTable(tabulate(net, conditions, unlimited, { pressureRows: 0, rowByRow: true }));
  const paths = openPathSets(net, conditions);
  expect(table.actuator(0, 0)).toBe('undetermined');
  expect(paths.sets.count(paths.hunts)).toBe(1n);
});

test('40 valves in a row: closed form of the combinations that feed the last section', () => {
  const net = networkOf(family('SIXWAY', 40));
  const paths = openPathSets(net, { pumpsRunning: true, places: net.actuators.map(() => 'between') });
  const line = net.lineOf.get('V40.C1') as number;
  // Up to section 40 the other 39 stand at rest; the 40th stands anywhere.
  expect(paths.sets.count(paths.fromSource[line] as number)).toBe(3n);
  expect(paths.sets.total).toBe(12157665459056928801n);
});

test('two valves that sit in one branch but far apart in the list come together', () => {
  // Six branches of two valves each: the pump feeds V1…V6, and V(i + 6) stands behind V(i).
  const numbers = [1, 2, 3, 4, 5, 6];
  const net = networkOf(
    circuit(
      `P1 fixed-pump, T1 tank, ${[...numbers, ...numbers.map((i) => i + 6)].map((i) => `V${i} shut-off-valve`).join(', ')}, ` +
        `${numbers.map((i) => `C${i} single-acting-cylinder`).join(', ')} | P1.P ${numbers.map((i) => `V${i}.A`).join(' ')} | ` +
        numbers.map((i) => `V${i}.B V${i + 6}.A | V${i + 6}.B C${i}.A`).join(' | '),
    ),
  );
  const order = orderInputs(net);
  const places = order.map((_, input) => order.indexOf(input));
  for (const i of numbers) expect(Math.abs((places[i - 1] ?? 0) - (places[i + 5] ?? 0))).toBe(1);
  // "Some branch is open": 2 nodes to a branch in this order, exponential in the order of the circuit.
  const some = (sets: Diagrams): number =>
    numbers.reduce((set, i) => sets.or(set, sets.and(sets.literal(i - 1, 1), sets.literal(i + 5, 1))), 0);
  const good = new Diagrams(
    net.inputs.map(() => 2),
    { order },
  );
  const bad = new Diagrams(net.inputs.map(() => 2));
  expect(good.size(some(good))).toBe(12);
  expect(bad.size(some(bad))).toBe(126);
});
