import fc from 'fast-check';
import { expect, test } from 'vitest';
import { spreadApart } from '../../../../src/engine/paths/diagrams/apart.ts';
import { Diagrams, ALL, NONE } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import type { Diagram } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { Elimination } from '../../../../src/engine/paths/diagrams/eliminate.ts';
import type { Ways } from '../../../../src/engine/paths/diagrams/eliminate.ts';
import type { Link } from '../../../../src/engine/paths/field.ts';
import type { Network } from '../../../../src/network/network.ts';

const LINES = 7;
const line = fc.nat({ max: LINES - 1 });

/** Edges (from, to, mask), links (from, to, actuator), tanks, seeds, gate. */
const drawn = fc.record({
  edges: fc.array(fc.tuple(line, line, fc.nat({ max: 6 })), { maxLength: 16 }),
  links: fc.array(fc.tuple(line, line, fc.nat({ max: 2 })), { maxLength: 6 }),
  tanks: fc.array(line, { maxLength: 2 }),
  fromTank: fc.boolean(),
  seeds: fc.array(fc.tuple(line, fc.nat({ max: 6 })), { minLength: 1, maxLength: 3 }),
  gated: fc.option(fc.array(fc.nat({ max: 6 }), { minLength: LINES, maxLength: LINES }), { nil: undefined }),
  again: fc.array(fc.tuple(line, fc.nat({ max: 6 })), { maxLength: 2 }),
});

const masksOf = (sets: Diagrams): Diagram[] => [
  ALL,
  NONE,
  sets.literal(0, 1),
  sets.literal(0, 6),
  sets.literal(1, 1),
  sets.literal(2, 5),
  sets.literal(2, 2),
];

type Drawn = typeof drawn extends fc.Arbitrary<infer T> ? T : never;

function waysOf(sets: Diagrams, masks: readonly Diagram[], { edges, links, fromTank, gated }: Drawn): Ways {
  const leaving = Array.from({ length: LINES }, (_, from) => edges.filter(([start]) => start === from));
  const start = Int32Array.from({ length: LINES + 1 }, (_, from) => leaving.slice(0, from).flat().length);
  const all = leaving.flat();
  const linked: Link[][] = Array.from({ length: LINES }, (_, from) =>
    links.filter(([begin]) => begin === from).map(([, to, actuator]) => ({ from, to, actuator })),
  );
  return {
    edges: { start, to: Int32Array.from(all, ([, to]) => to), mask: Int32Array.from(all, ([, , mask]) => mask) },
    open: masks,
    links: linked,
    fromTank,
    gate: gated?.map((mask) => sets.not(masks[mask] as Diagram)),
  };
}

/** Step by step until nothing changes. */
function grow(sets: Diagrams, net: Network, ways: Ways, seeds: readonly Diagram[], without = -1): Diagram[] {
  const field = [...seeds];
  for (let changed = true; changed;) {
    changed = false;
    const reach = (from: number, to: number, open: Diagram): void => {
      if (net.lines[from]?.tank && !ways.fromTank) return;
      const more = sets.and(sets.and(field[from] as Diagram, open), ways.gate?.[to] ?? ALL);
      const after = sets.or(field[to] as Diagram, more);
      if (after !== field[to]) changed = true;
      field[to] = after;
    };
    for (let from = 0; from < LINES; from++) {
      for (let e = ways.edges.start[from] as number; e < (ways.edges.start[from + 1] as number); e++)
        reach(from, ways.edges.to[e] as number, ways.open[ways.edges.mask[e] as number] as Diagram);
      for (const { to, actuator } of ways.links?.[from] ?? [])
        if (actuator !== without) reach(from, to, ways.passes?.(actuator, to) ?? ALL);
    }
  }
  return field;
}

test('elimination finds what growing step by step finds', () => {
  let somewhere = 0;
  fc.assert(
    fc.property(drawn, (circuit) => {
      const sets = new Diagrams([3, 2, 3]);
      const masks = masksOf(sets);
      const net = {
        lines: Array.from({ length: LINES }, (_, at) => ({ tank: circuit.tanks.includes(at) })),
      } as unknown as Network;
      const seedsOf = (list: Drawn['seeds']): Diagram[] => {
        const field: Diagram[] = Array.from({ length: LINES }, () => NONE);
        for (const [at, mask] of list) field[at] = masks[mask] as Diagram;
        return field;
      };
      const ways = waysOf(sets, masks, circuit);
      const search = new Elimination(sets, net, ways);
      for (const seeds of [seedsOf(circuit.seeds), seedsOf(circuit.again)]) {
        const found = search.spread([...seeds]);
        expect(found).toEqual(grow(sets, net, ways, seeds));
        if (found.some((set, at) => set !== seeds[at])) somewhere += 1;
      }
      for (const wanted of [0, 4]) {
        const seeds = seedsOf(circuit.seeds);
        expect(search.spread([...seeds], [wanted])[wanted]).toBe(grow(sets, net, ways, seeds)[wanted]);
      }
    }),
    { numRuns: 400, seed: 11 },
  );
  expect(somewhere).toBeGreaterThan(200);
});

const actuator = fc.record({ a: line, b: fc.option(line, { nil: -1 }), swallows: fc.boolean() });

test('searches without one actuator each find, all together, what growing step by step without it finds', () => {
  let apart = 0;
  fc.assert(
    fc.property(
      drawn,
      fc.array(actuator, { minLength: 1, maxLength: 6 }),
      fc.array(fc.boolean(), { minLength: 6, maxLength: 6 }),
      (circuit, actuators, asks) => {
        const sets = new Diagrams([3, 2, 3]);
        const masks = masksOf(sets);
        const net = {
          lines: Array.from({ length: LINES }, (_, at) => ({ tank: circuit.tanks.includes(at) })),
          actuators,
        } as unknown as Network;
        const links: Link[][] = Array.from({ length: LINES }, (_, from) =>
          actuators.flatMap(({ a, b }, index) => {
            if (b < 0) return [];
            return [
              ...(a === from ? [{ from, to: b, actuator: index }] : []),
              ...(b === from ? [{ from, to: a, actuator: index }] : []),
            ];
          }),
        );
        const passes = (index: number, to: number): Diagram => masks[(index + to) % 7] as Diagram;
        const ways: Ways = { ...waysOf(sets, masks, circuit), links, ...(circuit.fromTank && { passes }) };
        const seeds: Diagram[] = Array.from({ length: LINES }, () => NONE);
        for (const [at, mask] of circuit.seeds) seeds[at] = masks[mask] as Diagram;
        const swallows = (index: number): number => (actuators[index]?.swallows ? (actuators[index]?.a ?? -1) : -1);
        const asked = actuators.map((_, i) => i).filter((i) => asks[i]);
        const found = spreadApart(sets, net, ways, seeds, asked, swallows);
        expect([...found.keys()].sort()).toEqual(asked);
        const withAll = grow(sets, net, ways, seeds);
        for (const index of asked) {
          const { a, b } = actuators[index] as (typeof actuators)[number];
          const own = [...seeds];
          actuators.forEach((_, i) => {
            if (i !== index && swallows(i) >= 0) own[swallows(i)] = ALL;
          });
          const expected = grow(sets, net, ways, own, index);
          expect(found.get(index)).toEqual([expected[a], b < 0 ? NONE : expected[b]]);
          if (expected[a] !== withAll[a]) apart += 1;
        }
      },
    ),
    { numRuns: 600, seed: 12 },
  );
  expect(apart).toBeGreaterThan(200);
});
