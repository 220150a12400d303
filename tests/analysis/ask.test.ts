import fc from 'fast-check';
import { expect, test } from 'vitest';
import { numbersOf, tabulate } from '../../src/analysis/analyse.ts';
import { askTable } from '../../src/analysis/ask.ts';
import type { AskAnswer } from '../../src/analysis/ask-results.ts';
import { checkRules } from '../../src/analysis/check.ts';
import { has } from '../../src/base/bits.ts';
import { unlimited } from '../../src/base/budget.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import { family } from '../bench/circuits.ts';
import { circuit } from '../notation.ts';
import { randomCircuit } from '../random-circuit.ts';

const RUNNING = { pumps: 'running' } as const;

function ask(drawn: Circuit, text: string): AskAnswer {
  const found = askTable(drawn, RUNNING, text, unlimited);
  if (!found.ok) throw new Error(found.problems.map(({ what, remedy }) => `${what} ${remedy}`).join(' '));
  return found.value;
}

const rowsIn = (plane: Uint32Array | undefined, count: number): number[] =>
  Array.from({ length: count }, (_, row) => row).filter((row) => plane !== undefined && has(plane, row));

test('a question finds just the rows that say so, and those that leave it open apart', () => {
  let matched = 0;
  fc.assert(
    fc.property(randomCircuit(3), (drawn) => {
      const table = new StateTable(tabulate(drawn, RUNNING, unlimited));
      const [actuator] = table.data.actuators;
      if (!actuator) return;
      const found = ask(drawn, `"${actuator.label}" moves and not "PUMP" unloaded`);
      const moves = (row: number): boolean | undefined => {
        const word = table.actuator(0, row);
        if (word === 'undetermined' || word === 'rests on pressure') return undefined;
        return /extends|retracts|turns|moved|driven/.test(word);
      };
      const loaded = (row: number): boolean | undefined => {
        const word = table.pump(0, row);
        return word === 'rests on pressure' ? undefined : word !== 'unloaded';
      };
      const all = Array.from({ length: table.count }, (_, row) => row);
      const sure = all.filter((row) => moves(row) === true && loaded(row) === true);
      const open = all.filter((row) => !sure.includes(row) && moves(row) !== false && loaded(row) !== false);
      expect(rowsIn(found.rows?.matches, table.count)).toEqual(sure);
      expect(rowsIn(found.rows?.undecided, table.count)).toEqual(open);
      expect([found.matches, found.undecided]).toEqual([BigInt(sure.length), BigInt(open.length)]);
      matched += sure.length;
    }),
    { numRuns: 160, seed: 3 },
  );
  expect(matched).toBeGreaterThan(5);
});

const PRESS =
  'P1 fixed-pump{flow=20 L/min}, T1 tank, R1 relief-valve{setting=180 bar}, V1 directional-valve:valve-4/3-shut, V2 directional-valve:valve-4/3-shut,' +
  ' C1 cylinder{bore=63 mm;rod=36 mm;load=40 kN;loadSense=pushes in;friction=0 kN}, C2 cylinder{bore=63 mm;rod=36 mm}' +
  ' | supply: P1.P R1.P V1.P V2.P | R1.T T1.T V1.T V2.T P1.S | V1.A C1.A | V1.B C1.B | V2.A C2.A | V2.B C2.B';

test('pressures: the load of the cylinder over its area, in either system of units', () => {
  const drawn = circuit(PRESS);
  // p = F/A (handbook): 40 kN on 63 mm are 128.3 bar or 1,861 psi; C1 held with its load on the cap side.
  const held = 'C1 held and V2 rests and pressure at C1.A';
  expect(ask(drawn, `${held} over 128 bar`).matches).toBe(1n);
  expect(ask(drawn, `${held} at least 128.5 bar`).matches).toBe(0n);
  expect(ask(drawn, `${held} over 1860 psi and pressure at C1.A at most 1862 psi`).matches).toBe(1n);
  expect(ask(drawn, `${held} under 100 bar`).matches).toBe(0n);
});

test('speeds: the flow of the pump over the area, in either system of units', () => {
  const drawn = circuit(PRESS);
  // v = Q/A (handbook): 20 L/min on the 31.17 cm² of 63 mm are 106.9 mm/s or 4.21 in/s outwards.
  expect(ask(drawn, 'C2 extends and V1 rests and C2 faster than 106 mm/s').matches).toBe(1n);
  expect(ask(drawn, 'C2 extends faster than 4.2 in/s and V1 rests').matches).toBe(1n);
  expect(ask(drawn, 'C2 extends faster than 107.5 mm/s and V1 rests').matches).toBe(0n);
  expect(ask(drawn, 'V1 rests and V2 rests and C2 slower than 1 mm/s').matches).toBe(1n);
});

test('what breaks a rule on figures is exactly what brute force finds, and its interlock forbids exactly that', () => {
  const drawn = circuit(PRESS);
  const table = new StateTable(tabulate(drawn, RUNNING, unlimited));
  const rows = Array.from({ length: table.count }, (_, row) => row);
  const pressed = numbersOf(drawn, RUNNING, rows).flatMap(({ row, status, pumps }) =>
    status === 'solved' && (pumps[0]?.pressure ?? 0) > 100e5 ? [row] : [],
  );
  expect(pressed.length).toBeGreaterThan(0);
  expect(pressed.length).toBeLessThan(table.count);
  const checked = checkRules(drawn, RUNNING, [{ text: 'never pressure at P1 over 100 bar', where: 'here' }], unlimited);
  if (!checked.ok) throw new Error('not checked');
  const broken = checked.value.rules[0]?.answer.broken;
  expect(broken?.count).toBe(BigInt(pressed.length));
  const interlock = (broken?.terms ?? []).map((term) => `(${term})`).join(' or ');
  expect(rowsIn(ask(drawn, interlock).rows?.matches, table.count)).toEqual(pressed);
});

test('what was left in a sealed line is not decided', () => {
  const found = ask(circuit(PRESS), 'V1 rests and V2 rests and pressure at C2.A over 50 bar');
  expect([found.matches, found.undecided]).toEqual([0n, 1n]);
});

test('panels too large to list: counts and few words, and a plain refusal where pressures would have to be solved', () => {
  const bank = family('BANK', 20);
  const moves = ask(bank, 'V3 at a and V4 rests');
  expect(moves).toMatchObject({ combinations: 3n ** 20n, matches: 3n ** 18n, undecided: 0n });
  expect(moves.rows).toBeUndefined();
  expect(moves.cases?.terms).toEqual(['V3 at a and V4 at 0']);
  const refused = askTable(bank, RUNNING, 'pressure at P1 over 100 bar', unlimited);
  expect(refused.ok ? '' : refused.problems[0]?.what).toMatch(/pressure is decided row by row/);
  const many = askTable(family('BANK', 11), RUNNING, 'C1 faster than 1 mm/s', unlimited);
  expect(many.ok ? '' : many.problems[0]?.what).toMatch(/up to 60,000 combinations; this circuit has 177,147/);
});
