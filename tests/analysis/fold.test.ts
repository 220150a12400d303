import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf, tabulate } from '../../src/analysis/analyse.ts';
import { foldByLabel, foldFrom, foldOf, MOST_FOLDED } from '../../src/analysis/fold.ts';
import type { FoldAnswer, FoldBy } from '../../src/analysis/fold-results.ts';
import { outcomesOf } from '../../src/analysis/outcomes.ts';
import { Cancelled, unlimited } from '../../src/base/budget.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { namesOfNetwork } from '../../src/engine/table/rules/names.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import { family } from '../bench/circuits.ts';
import { randomPanel } from '../bench/random-panel.ts';
import { pathsOnly } from '../../src/report/paths-only.ts';
import { circuit } from '../notation.ts';
import { randomCircuit } from '../random-circuit.ts';

const RUNNING = { pumps: 'running' } as const;

function fold(drawn: Circuit, by: FoldBy, data?: ReturnType<typeof tabulate>): FoldAnswer {
  const found = foldOf(drawn, RUNNING, by, unlimited, data);
  if (!found.ok) throw new Error(found.problems.map(({ what }) => what).join(' '));
  return found.value;
}

const inside = (positions: readonly number[], at: readonly number[]): boolean =>
  positions.every((mask, i) => ((mask >> (at[i] ?? 0)) & 1) === 1);

/** What a fold says of one combination: one outcome only, from its rows or from the rest. */
function said(folded: FoldAnswer, at: readonly number[]): string {
  const words = new Set(
    folded.rows.filter((row) => inside(row.positions, at)).map(({ outcome }) => outcome.join(' + ')),
  );
  expect(words.size).toBeLessThan(2);
  return [...words][0] ?? folded.otherwise.outcome.join(' + ');
}

function word(table: StateTable, { of, index }: { readonly of: string; readonly index: number }, row: number): string {
  return of === 'actuator'
    ? table.actuator(index, row)
    : of === 'pump'
      ? table.pump(index, row)
      : table.line(index, row);
}

/** Every fold of a circuit says of every row what the row says; returns how many were folds of groups. */
function compare(drawn: Circuit, pressureRows: number): number {
  const data = tabulate(drawn, RUNNING, unlimited, { pressureRows });
  const table = new StateTable(data);
  const first: FoldBy[] = [
    ...data.actuators.map((_, index): FoldBy => ({ of: 'actuator', index })),
    ...data.pumps.map((_, index): FoldBy => ({ of: 'pump', index })),
    ...data.lines.slice(0, 4).map((_, index): FoldBy => ({ of: 'line', index })),
  ];
  const groups = (first[0] ? fold(drawn, first[0], data).groups : []).map((_, index): FoldBy => ({
    of: 'group',
    index,
  }));
  for (const by of [...first, ...groups]) {
    const folded = fold(drawn, by, data);
    expect(folded.combinations).toBe(BigInt(table.count));
    let otherwise = 0n;
    for (let row = 0; row < table.count; row++) {
      const at = table.positionsOf(row);
      expect(said(folded, at)).toBe(folded.items.map((item) => word(table, item, row)).join(' + '));
      if (!folded.rows.some(({ positions }) => inside(positions, at))) otherwise += 1n;
    }
    expect(folded.otherwise.count).toBe(otherwise);
    expect(said(folded, folded.otherwise.example)).toBe(folded.otherwise.outcome.join(' + '));
  }
  return groups.length;
}

test('every fold of random tables says of every row what the row says', { timeout: 120_000 }, () => {
  fc.assert(
    fc.property(randomCircuit(4), (drawn) => {
      compare(drawn, 100);
    }),
    { numRuns: 60, seed: 31 },
  );
});

test('the same for actuators that share valves, folded together', () => {
  // Carry-over valves pass oil to those after them, closed centres in parallel have one pump for all.
  for (const name of ['SIXWAY', 'BANK'] as const) expect(compare(family(name, 3), 100)).toBe(1);
});

test('a cylinder behind its own closed-centre valve is two rows and a rest', () => {
  // Closed centres in parallel, one pump for each (practice): V1 alone works C1.
  const two = circuit(
    'P1 fixed-pump, R1 relief-valve, T1 tank, V1 directional-valve:valve-4/3-shut, C1 cylinder,' +
      ' P2 fixed-pump, R2 relief-valve, T2 tank, V2 directional-valve:valve-4/3-shut, C2 cylinder' +
      ' | P1.P R1.P V1.P | V1.T R1.T T1.T P1.S | V1.A C1.A | V1.B C1.B' +
      ' | P2.P R2.P V2.P | V2.T R2.T T2.T P2.S | V2.A C2.A | V2.B C2.B',
  );
  const names = namesOfNetwork(networkOf(two));
  expect(fold(two, foldByLabel(names, 'C1') ?? { of: 'line', index: 0 })).toMatchObject({
    items: [{ of: 'actuator', label: 'C1' }],
    rows: [
      { positions: [0b001, 0b111], outcome: ['extends'], count: 3n },
      { positions: [0b100, 0b111], outcome: ['retracts'], count: 3n },
    ],
    otherwise: { outcome: ['held'], count: 3n, example: [1, 1] },
    combinations: 9n,
    least: true,
    groups: [],
    listed: true,
  });
  expect(foldByLabel(names, 'C9')).toBeUndefined();
});

test('a panel too large to list is folded from open paths, and says so', () => {
  const bank = fold(family('BANK', 20), { of: 'actuator', index: 7 });
  expect(bank).toMatchObject({ listed: false, combinations: 3n ** 20n });
  // V8 at rest shuts both sides of C8 in, whatever the others do: two thirds of the combinations it drives C8.
  expect(
    bank.otherwise.count + bank.rows.reduce((n, row) => n + (row.outcome[0] === 'held' ? row.count : 0n), 0n),
  ).toBeGreaterThan(0n);
  const held = bank.rows.filter((row) => row.outcome[0] === 'held');
  expect(held).toEqual([
    { positions: Array.from({ length: 20 }, (_, i) => (i === 7 ? 0b010 : 0b111)), outcome: ['held'], count: 3n ** 19n },
  ]);
});

test('a fold with more rows than anybody reads is refused in words', () => {
  const drawn = randomPanel(40, 5);
  const outcomes = outcomesOf(drawn, RUNNING, unlimited);
  if (!outcomes.ok) throw new Error('refused');
  const folds = outcomes.value.net.actuators.map((_, index) =>
    foldFrom(outcomes.value, { of: 'actuator', index }, unlimited),
  );
  const refused = folds.flatMap((found) => (found.ok ? [] : found.problems));
  expect(refused.length).toBeGreaterThan(0);
  expect(refused.length).toBeLessThan(folds.length);
  for (const { what, remedy } of refused) {
    expect(what).toContain(`more than ${MOST_FOLDED.toLocaleString('en')} rows`);
    expect(remedy).toContain('Hold some levers');
  }
  for (const found of folds) {
    if (!found.ok) continue;
    const words = new Set(found.value.rows.map(({ outcome }) => outcome.join()));
    expect(found.value.rows.length).toBeLessThanOrEqual(words.size * MOST_FOLDED);
  }
});

test('a fold that nobody waits for any more is given up', () => {
  expect(() =>
    foldOf(family('BANK', 16), RUNNING, { of: 'pump', index: 0 }, { ...unlimited, cancelled: () => true }),
  ).toThrow(Cancelled);
});

test('valves that follow pilots are no hindrance on a panel too large to list, and the answer says where they stand', () => {
  // Each of 16 lever valves has a cylinder, and the first one's line B pilots a valve with one more.
  const numbers = Array.from({ length: 16 }, (_, i) => i + 1);
  const drawn = circuit(
    [
      `P1 fixed-pump, R1 relief-valve, T1 tank, F1 pilot-valve:pilot-4/2-pilot, CF cylinder, ${numbers.map((i) => `V${i} directional-valve:valve-4/3-shut, C${i} cylinder`).join(', ')}`,
      `P1.P R1.P F1.P ${numbers.map((i) => `V${i}.P`).join(' ')}`,
      `T1.T P1.S R1.T F1.T ${numbers.map((i) => `V${i}.T`).join(' ')}`,
      ...numbers.map((i) => `V${i}.A C${i}.A`),
      'V1.B C1.B F1.X',
      ...numbers.slice(1).map((i) => `V${i}.B C${i}.B`),
      'F1.A CF.A',
      'F1.B CF.B',
    ].join(' | '),
  );
  const follower = foldOf(drawn, RUNNING, { of: 'actuator', index: 0 }, unlimited);
  if (!follower.ok) throw new Error(follower.problems.map(({ what }) => what).join(' '));
  expect(follower.value.items[0]?.label).toBe('CF');
  expect(follower.value.listed).toBe(false);
  expect(follower.value.followers).toEqual(['F1']);
  const sum = follower.value.rows.reduce((n, { count }) => n + count, 0n) + follower.value.otherwise.count;
  expect(sum).toBe(3n ** 16n);
  // Where the follower stands is for the pressures to confirm, as in a table without them.
  const asked = [...follower.value.rows.map(({ outcome }) => outcome[0]), follower.value.otherwise.outcome[0]];
  expect(asked).toContain('rests on pressure');
  expect(pathsOnly(['F1'])).toContain('F1 stands where those put it');
});
