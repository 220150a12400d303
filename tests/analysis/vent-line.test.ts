import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { networkOf, tabulate } from '../../src/analysis/analyse.ts';
import type { Conditions, VentAnswer } from '../../src/analysis/results.ts';
import { ventLine } from '../../src/analysis/vent-line.ts';
import { unlimited } from '../../src/base/budget.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { compileEdges } from '../../src/engine/paths/edges.ts';
import { RowPathsCache } from '../../src/engine/sequence/row-paths.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import { randomMachine } from '../engine/sequence/random-machine.ts';
import { circuit } from '../notation.ts';

function vent(c: Circuit, line: string, positions: readonly number[], conditions: Conditions): VentAnswer {
  const at = networkOf(c).lines.findIndex(({ name }) => name === line);
  const found = ventLine(c, conditions, at, positions);
  if (!found.ok) throw new Error(found.problems[0]?.what);
  return found.value;
}

const LIFT = circuit(
  'P1 fixed-pump, R1 relief-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder{load=20 kN;loadSense=pushes in}, T1 tank | P: P1.P R1.P V1.P | A: V1.A C1.A | B: V1.B C1.B | T: V1.T R1.T T1.T P1.S',
);

describe('which lever moves open a line to tank', () => {
  test('one move, with what comes down by it (practice)', () => {
    const answer = vent(LIFT, 'A', [1], { pumps: 'stopped' });
    expect(answer).toMatchObject({ outcome: 'moves', flows: false, slow: false, others: [] });
    expect(answer.steps.map(({ label, to }) => `${label} ${to}`)).toEqual(['V1 b']);
    expect(answer.steps[0]?.effects.map(({ kind }) => kind)).toContain('drops');
  });

  test('now, and never', () => {
    expect(vent(LIFT, 'A', [2], { pumps: 'stopped' }).outcome).toBe('now');
    expect(vent(LIFT, 'P', [1], { pumps: 'running' }).outcome).toBe('never');
    // A stopped pump lets its outlet down through its own leakage.
    expect(vent(LIFT, 'P', [1], { pumps: 'stopped' })).toMatchObject({ outcome: 'now', slow: true });
  });

  test('two moves one behind the other, on a panel too large to list', () => {
    const spare = Array.from({ length: 30 }, (_, i) => i + 3);
    const c = circuit(
      `P1 fixed-pump, R1 relief-valve, T1 tank, V1 shut-off-valve, V2 shut-off-valve, K1 check-valve, ${spare.map((i) => `V${i} directional-valve:valve-4/3-shut, C${i} cylinder`).join(', ')}` +
        ` | P: P1.P R1.P K1.A ${spare.map((i) => `V${i}.P`).join(' ')} | L: K1.B V1.A | M: V1.B V2.A | T: V2.B R1.T P1.S T1.T ${spare.map((i) => `V${i}.T`).join(' ')}` +
        ` | ${spare.map((i) => `A${i}: V${i}.A C${i}.A | B${i}: V${i}.B C${i}.B`).join(' | ')}`,
    );
    const net = networkOf(c);
    const shut = net.inputs.map(({ positions }) => (positions.includes('shut') ? positions.indexOf('shut') : 1));
    const answer = vent(c, 'L', shut, { pumps: 'stopped' });
    expect(answer.outcome).toBe('moves');
    expect(answer.steps.map(({ label }) => label).sort()).toEqual(['V1', 'V2']);
  });
});

/** Fewest levers to a row in which the line is open to tank freely or no longer fed, by going through all rows. */
function bruteForce(c: Circuit, conditions: Conditions, line: number, from: readonly number[]): number {
  const net = networkOf(c, conditions);
  const table = new StateTable(tabulate(c, conditions, unlimited, { pressureRows: 0 }));
  const free = { ...net, paths: net.paths.filter(({ throttled }) => !throttled) };
  const paths = new RowPathsCache(free, compileEdges(free), true);
  let least = Infinity;
  for (let row = 0; row < table.count; row++) {
    const open = table.line(line, row) === 'vented' || paths.at(row).firm[line] === 1;
    if (!open) continue;
    const moves = table.positionsOf(row).filter((position, i) => position !== from[i]).length;
    least = Math.min(least, moves);
  }
  return least;
}

test('as short as any row of the table allows, on random machines', () => {
  let moved = 0;
  fc.assert(
    fc.property(randomMachine(), fc.nat(), fc.nat(), fc.boolean(), (c, pick, which, running) => {
      const net = networkOf(c);
      // Ways over lock checks are not in the reference.
      fc.pre(net.dependents.length === 0 && net.paths.every(({ pilot }) => pilot < 0) && net.shown > 0);
      const conditions: Conditions = { pumps: running ? 'running' : 'stopped' };
      const from = net.inputs.map(({ positions }, i) => (pick + 7 * i) % positions.length);
      const line = which % net.shown;
      const least = bruteForce(c, conditions, line, from);
      const found = ventLine(c, conditions, line, from);
      if (!found.ok) throw new Error('too entangled');
      const { outcome, flows, steps } = found.value;
      if (least === Infinity) expect(flows || outcome === 'never').toBe(true);
      else {
        expect(flows).toBe(false);
        expect(steps).toHaveLength(least);
        moved += least;
      }
    }),
    { numRuns: 120, seed: 20261203 },
  );
  expect(moved).toBeGreaterThan(20);
});
