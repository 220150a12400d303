import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../../src/analysis/analyse.ts';
import { countBits } from '../../../../src/base/bits.ts';
import { unlimited } from '../../../../src/base/budget.ts';
import type { Diagram, Diagrams } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { NONE } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { openPathSets } from '../../../../src/engine/paths/diagrams/open-paths.ts';
import { planeToDiagram } from '../../../../src/engine/paths/diagrams/plane.ts';
import { PanelSets } from '../../../../src/engine/table/sets/panel-sets.ts';
import type { Plane } from '../../../../src/engine/table/table-data.ts';
import { tabulate } from '../../../../src/engine/table/tabulate.ts';
import { ACTUATOR_VERDICTS } from '../../../../src/engine/table/words.ts';
import type { Network } from '../../../../src/network/network.ts';
import { family, FAMILIES } from '../../../bench/circuits.ts';
import { circuit } from '../../../notation.ts';
import { randomCircuit } from '../../../random-circuit.ts';

type Place = 'between' | 'in' | 'out';

/** All outcome sets against the rows gone through one by one; returns how many sets are not empty. */
function compare(net: Network, pumpsRunning: boolean, place: Place = 'between', order?: readonly number[]): number {
  const conditions = { pumpsRunning, places: net.actuators.map(() => place) };
  const rows = tabulate(net, conditions, unlimited, { pressureRows: 0, rowByRow: true });
  const paths = openPathSets(net, conditions, order ? { order } : {});
  const panel = new PanelSets(net, conditions, paths);
  // In the order of the table equal sets are equal numbers; in another one they have equal counts, and members.
  const inOrder = paths.sets.order.every((input, level) => input === level);
  let some = 0;
  const same = (planes: readonly (Plane | undefined)[] | undefined, sets: readonly Diagram[], what: string): void => {
    sets.forEach((set, i) => {
      const plane = planes?.[i];
      if (set !== NONE) some += 1;
      if (inOrder) expect(set, `${what}, ${i}`).toBe(planeToDiagram(paths.sets, plane));
      else {
        expect(paths.sets.count(set), `${what}, ${i}`).toBe(BigInt(plane ? countBits(plane) : 0));
        expect(members(paths.sets, set), `${what}, ${i}`).toEqual(plane ? bitsOf(plane) : []);
      }
    });
  };
  net.actuators.forEach((_, i) => {
    same(rows.actuatorPlanes[i], panel.actuator(i).verdicts, `actuator ${i}`);
    same(rows.actuatorNotes[i], panel.actuator(i).notes, `notes of actuator ${i}`);
  });
  net.pumps.forEach((_, i) => same(rows.pumpPlanes[i], panel.pump(i), `pump ${i}`));
  for (let line = 0; line < net.shown; line++) {
    same(rows.linePlanes[line], panel.lines.classes[line] ?? [], `line ${line}`);
    same(rows.blockedPlanes[line], panel.lines.blocked[line] ?? [], `blocked line ${line}`);
  }
  return some;
}

const bitsOf = (plane: Plane): number[] =>
  [...plane].flatMap((word, w) =>
    Array.from({ length: 32 }, (_, bit) => bit).flatMap((bit) => (((word >>> bit) & 1) === 1 ? [32 * w + bit] : [])),
  );

function members(sets: Diagrams, set: Diagram): number[] {
  const rows = Number(sets.total);
  return Array.from({ length: rows }, (_, row) => row).filter((row) => {
    let rest = row;
    const at = [...sets.radices];
    for (let i = at.length - 1; i >= 0; i--) {
      at[i] = rest % (sets.radices[i] as number);
      rest = Math.floor(rest / (sets.radices[i] as number));
    }
    return sets.has(set, at);
  });
}

test(
  'every verdict, note, pump, line class and blockage is equal to the enumeration on 1,000 random circuits',
  { timeout: 60_000 },
  () => {
    let some = 0;
    fc.assert(
      fc.property(
        randomCircuit(4, 14),
        fc.boolean(),
        fc.constantFrom<Place>('between', 'in', 'out'),
        fc.boolean(),
        (drawn, running, place, ownOrder) => {
          const net = networkOf(drawn);
          if (net.dependents.length > 0) return;
          some += compare(net, running, place, ownOrder ? net.inputs.map((_, i) => i) : undefined);
        },
      ),
      { numRuns: 1000, seed: 20261203 },
    );
    expect(some).toBeGreaterThan(8_000);
  },
);

test('the valve families, series circuits with displaced oil among them', () => {
  for (const name of FAMILIES) {
    for (const running of [true, false]) expect(compare(networkOf(family(name, 5)), running)).toBeGreaterThan(10);
  }
});

const CENTRES = [
  'valve-4/3-shut',
  'valve-4/3-bypass',
  'valve-4/3-float',
  'valve-4/3-joined',
  'valve-4/3-regenerative',
  'valve-4/3-b-t',
];

test(
  'rows of five valves of any centres, some loaded, with lines across: oil goes from one to the next',
  { timeout: 60_000 },
  () => {
    let displaced = 0;
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.constantFrom(...CENTRES), fc.nat(5)), { minLength: 5, maxLength: 5 }),
        fc.array(fc.tuple(fc.nat(4), fc.constantFrom('A', 'B'), fc.nat(4), fc.constantFrom('A', 'B')), {
          maxLength: 2,
        }),
        (valves, across) => {
          const numbers = valves.map((_, i) => i + 1);
          const parts = valves.map(
            ([form, load], i) =>
              `V${i + 1} directional-valve:${form}, C${i + 1} cylinder${load === 0 ? '{load=5 kN;loadSense=pushes in}' : ''}`,
          );
          const lines = [
            'P1.P R1.P V1.P',
            ...numbers.slice(1).map((i) => `V${i - 1}.T V${i}.P`),
            'V5.T R1.T T1.T P1.S',
            ...numbers.flatMap((i) => [`V${i}.A C${i}.A`, `V${i}.B C${i}.B`]),
            ...across
              .filter(([from, port, to, other]) => from !== to || port !== other)
              .map(([from, port, to, other]) => `V${from + 1}.${port} V${to + 1}.${other}`),
          ];
          const net = networkOf(
            circuit(`P1 fixed-pump, R1 relief-valve, T1 tank, ${parts.join(', ')} | ${lines.join(' | ')}`),
          );
          compare(net, true);
          const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
          const { motions } = new PanelSets(net, conditions, openPathSets(net, conditions));
          if (motions.actuators.some((motion) => motion.displaced !== NONE)) displaced += 1;
        },
      ),
      { numRuns: 40, seed: 20261207 },
    );
    expect(displaced).toBeGreaterThan(12);
  },
);

test('bypass centres in series, 10 valves: a cylinder extends in one of three combinations of its own valve', () => {
  // Check case of series circuits: with the displaced oil counted, each cylinder answers to its own valve alone.
  const net = networkOf(family('SERIES', 10));
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  const paths = openPathSets(net, conditions);
  const { verdicts } = new PanelSets(net, conditions, paths).actuator(7);
  expect(paths.sets.count(verdicts[ACTUATOR_VERDICTS.indexOf('extends')] ?? NONE)).toBe(3n ** 9n);
});
