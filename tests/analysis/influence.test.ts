import fc from 'fast-check';
import { expect, test } from 'vitest';
import { tabulate } from '../../src/analysis/analyse.ts';
import type { Influence } from '../../src/analysis/fold-results.ts';
import { influence } from '../../src/analysis/influence.ts';
import { unlimited } from '../../src/base/budget.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import { family } from '../bench/circuits.ts';
import { circuit } from '../notation.ts';
import { randomCircuit } from '../random-circuit.ts';

const RUNNING = { pumps: 'running' } as const;

function ask(drawn: Circuit, data?: ReturnType<typeof tabulate>): Influence {
  const found = influence(drawn, RUNNING, unlimited, data);
  if (!found.ok) throw new Error(found.problems.map(({ what }) => what).join(' '));
  return found.value;
}

/** All that a row says of one outcome. */
function word(table: StateTable, { of, index }: { readonly of: string; readonly index: number }, row: number): string {
  switch (of) {
    case 'actuator':
      return table.actuator(index, row);
    case 'pump':
      return table.pump(index, row);
    case 'line':
      return table.line(index, row);
    case 'blocked':
      return table.blocked(index, row) ?? '';
    default:
      return table.trapped(index, row).join(' ');
  }
}

test('an input is marked if and only if changing it alone changes the outcome in some row; alike positions change nothing', () => {
  let marked = 0;
  let alike = 0;
  fc.assert(
    fc.property(randomCircuit(4), (drawn) => {
      const data = tabulate(drawn, RUNNING, unlimited, { pressureRows: 100 });
      const table = new StateTable(data);
      const found = ask(drawn, data);
      const differs = (
        row: number,
        input: number,
        from: number,
        to: number,
        each: (typeof found.rows)[number],
      ): boolean => {
        const at = table.positionsOf(row);
        if (at[input] !== from) return false;
        at[input] = to;
        return word(table, each, row) !== word(table, each, table.rowOf(at));
      };
      const rows = Array.from({ length: table.count }, (_, row) => row);
      const told = data.inputs.map((input) => input.positions.map(() => input.positions.map(() => false)));
      for (const each of found.rows) {
        const matters = data.inputs.flatMap((input, i) => {
          let any = false;
          input.positions.forEach((_, p) =>
            input.positions.forEach((_other, q) => {
              if (p >= q || !rows.some((row) => differs(row, i, p, q, each))) return;
              any = true;
              const pairs = told[i]?.[p];
              if (pairs) pairs[q] = true;
            }),
          );
          return any ? [i] : [];
        });
        expect(each.inputs, `${each.of} ${each.label}`).toEqual(matters);
        marked += matters.length;
      }
      data.inputs.forEach((input, i) => {
        const groupOf = (p: number): number => found.alike[i]?.findIndex((group) => group.includes(p)) ?? -1;
        input.positions.forEach((_, p) =>
          input.positions.forEach((_other, q) => {
            if (p < q) expect(groupOf(p) !== groupOf(q)).toBe(told[i]?.[p]?.[q]);
          }),
        );
        alike += found.alike[i]?.some((group) => group.length > 1) ? 1 : 0;
      });
    }),
    { numRuns: 60, seed: 8 },
  );
  expect(marked).toBeGreaterThan(40);
  expect(alike).toBeGreaterThan(5);
});

test('parts are independent: what the others do changes nothing in them, and their counts multiply to all', () => {
  let several = 0;
  fc.assert(
    fc.property(randomCircuit(4), (drawn) => {
      const found = ask(drawn);
      expect(found.parts.reduce((n, part) => n * part.combinations, 1n)).toBe(found.combinations);
      expect(found.parts.flatMap(({ inputs }) => inputs).sort()).toEqual(found.inputs.map((_, i) => i));
      for (const row of found.rows) {
        const list = row.of === 'actuator' ? 'actuators' : row.of === 'pump' ? 'pumps' : 'lines';
        const own = found.parts.find((part) => part[list].includes(row.index));
        for (const input of row.inputs) expect(own?.inputs).toContain(input);
      }
      several += found.parts.filter(({ inputs }) => inputs.length > 0).length > 1 ? 1 : 0;
    }),
    { numRuns: 60, seed: 5 },
  );
  expect(several).toBeGreaterThan(5);
});

const HALF = (n: number): string =>
  `P${n} fixed-pump, R${n} relief-valve, T${n} tank, V${n} directional-valve:valve-4/3-shut, C${n} cylinder`;
const LINES = (n: number): string =>
  `P${n}.P R${n}.P V${n}.P | V${n}.T R${n}.T T${n}.T P${n}.S | V${n}.A C${n}.A | V${n}.B C${n}.B`;

test('two rigs that share nothing but the tank: 3 × 3', () => {
  const found = ask(circuit(`${HALF(1)}, ${HALF(2)} | ${LINES(1)} | ${LINES(2)}`));
  expect(found.combinations).toBe(9n);
  expect(
    found.parts.map(({ inputs, actuators, pumps, combinations }) => ({ inputs, actuators, pumps, combinations })),
  ).toEqual([
    { inputs: [0], actuators: [0], pumps: [0], combinations: 3n },
    { inputs: [1], actuators: [1], pumps: [1], combinations: 3n },
  ]);
});

test('valves on one pump are one circuit, even where open paths keep their cylinders apart', () => {
  const found = ask(family('BANK', 16));
  expect(found).toMatchObject({ listed: false, combinations: 3n ** 16n });
  expect(found.parts).toHaveLength(1);
  expect(found.rows.find(({ of, index }) => of === 'line' && index >= 0 && found.rows.length > 0)).toBeDefined();
});

test('a lever without anything behind it changes nothing in any position', () => {
  const found = ask(circuit(`${HALF(1)}, V2 directional-valve:valve-4/3-shut | ${LINES(1)}`));
  expect(found.alike[1]).toEqual([[0, 1, 2]]);
  expect(found.alike[0]).toEqual([[0], [1], [2]]);
  expect(found.rows.every(({ inputs }) => !inputs.includes(1))).toBe(true);
});
