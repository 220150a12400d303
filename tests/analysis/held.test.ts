import fc from 'fast-check';
import { expect, test } from 'vitest';
import { explainRow, networkOf, tabulate } from '../../src/analysis/analyse.ts';
import { tabulateHeld } from '../../src/analysis/held.ts';
import type { Conditions } from '../../src/analysis/results.ts';
import { unlimited } from '../../src/base/budget.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import { family } from '../bench/circuits.ts';
import { randomCircuit } from '../random-circuit.ts';

/** Part ids of the inputs, in order. */
const inputsOf = (drawn: Circuit): string[] => {
  const net = networkOf(drawn);
  return net.inputs.map(({ part }) => net.parts[part]?.id ?? '');
};

/** The table with these inputs held against the rows of the whole table that have them there. */
function compare(
  drawn: Circuit,
  whole: StateTable,
  conditions: Conditions,
  held: Readonly<Record<string, number>>,
): number {
  const part = new StateTable(tabulateHeld(drawn, { ...conditions, held }, unlimited));
  const ids = inputsOf(drawn);
  for (let row = 0; row < part.count; row++) {
    const at = part.positionsOf(row).map((position, i) => held[ids[i] ?? ''] ?? position);
    const same = whole.rowOf(at);
    const what = `row ${same + 1}`;
    whole.data.actuators.forEach((_, i) => {
      expect(part.actuator(i, row), what).toBe(whole.actuator(i, same));
      expect(part.actuatorNotes(i, row), what).toEqual(whole.actuatorNotes(i, same));
    });
    whole.data.pumps.forEach((_, i) => expect(part.pump(i, row), what).toBe(whole.pump(i, same)));
    whole.data.lines.forEach((_, i) => {
      expect(part.line(i, row), what).toBe(whole.line(i, same));
      expect(part.blocked(i, row), what).toBe(whole.blocked(i, same));
      expect(part.trapped(i, row), `${what}, trapped in line ${i}`).toEqual(whole.trapped(i, same));
    });
  }
  return part.count;
}

test(
  'a table with levers held says what the whole table says in those rows, on 60 random circuits',
  { timeout: 60_000 },
  () => {
    let rows = 0;
    let trapped = 0;
    fc.assert(
      fc.property(
        randomCircuit(4, 12),
        fc.boolean(),
        fc.array(fc.nat(5), { minLength: 4, maxLength: 4 }),
        (drawn, running, picks) => {
          const conditions: Conditions = { pumps: running ? 'running' : 'stopped' };
          const whole = new StateTable(tabulate(drawn, conditions, unlimited));
          const net = networkOf(drawn);
          const held: Record<string, number> = {};
          net.inputs.forEach(({ part, positions }, i) => {
            const pick = picks[i] ?? 0;
            // About half of them are held.
            if (pick < positions.length) held[net.parts[part]?.id ?? ''] = pick;
          });
          rows += compare(drawn, whole, conditions, held);
          whole.data.lines.forEach((_, line) => {
            for (let row = 0; row < whole.count; row++)
              if (whole.trapped(line, row).includes('left behind')) trapped += 1;
          });
        },
      ),
      { numRuns: 60, seed: 20261205 },
    );
    expect(rows).toBeGreaterThan(100);
    expect(trapped).toBeGreaterThan(8);
  },
);

test('one row of 40 valves: 3⁴⁰ combinations, all levers held', () => {
  const drawn = family('SERIES', 40);
  const held = Object.fromEntries(inputsOf(drawn).map((id, i) => [id, i === 17 ? 0 : 1]));
  const part = new StateTable(tabulateHeld(drawn, { pumps: 'running', held }, unlimited));
  expect(part.count).toBe(1);
  expect(part.actuator(17, 0)).toBe('extends');
  expect(part.data.actuators.filter((_, i) => part.actuator(i, 0) === 'extends')).toHaveLength(1);
  expect(part.data.inputs[17]?.positions).toHaveLength(1);
});

test('reasons name the position of a held lever, and the move of one that left pressure behind', () => {
  const drawn = family('BANK', 20);
  const ids = inputsOf(drawn);
  const conditions: Conditions = { pumps: 'running', held: Object.fromEntries(ids.map((id) => [id, 1])) };
  const said = explainRow(drawn, conditions, 0);
  expect(said.positions).toEqual(ids.map(() => 1));
  const left = said.trapped.flatMap(({ reasons }) => reasons.filter(({ kind }) => kind === 'left behind'));
  expect(left.length).toBe(40);
  expect(left[0]?.text).toMatch(/V1 from a to 0/);
});
