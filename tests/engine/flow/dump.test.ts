import { expect, test } from 'vitest';
import { dumpRow, networkOf } from '../../../src/analysis/analyse.ts';
import { dumpProblem, loadProblem, problemNow } from '../../../src/engine/flow/dump.ts';
import { FlowSolver } from '../../../src/engine/flow/solver.ts';
import { PressureSolver } from '../../../src/engine/table/resolve.ts';
import { circuit } from '../../notation.ts';
import { randomCircuit } from './random-circuit.ts';

test('a dumped problem loads as it was, infinite bounds and pilots included', () => {
  for (let seed = 0; seed < 50; seed++) {
    const problem = randomCircuit(seed, { lines: 8, cylinders: 2, piloted: 3 });
    const back = loadProblem(dumpProblem(problem));
    expect(back.ok && back.value).toEqual(problem);
  }
});

test('a text that is no problem is refused with the place of the fault', () => {
  const where = (text: string): string | undefined => {
    const result = loadProblem(text);
    return result.ok ? undefined : result.problems[0]?.where;
  };
  expect(where('{')).toBe('text');
  expect(where('{"format":"flow-problem","lines":[1]}')).toBe('lines[0]');
  const good = dumpProblem(randomCircuit(1, { lines: 4, cylinders: 1 }));
  expect(where(good.replace('"kind": "path"', '"kind": "hose"'))).toMatch(/^branches\[\d+\]\.kind$/);
});

test('the row of a drawn circuit with a gear divider is dumped as it stands, and read back solves to the same bits', () => {
  const drawn = circuit(
    'P1 fixed-pump{flow=40 L/min}, R1 relief-valve{setting=180 bar}, T1 tank, V1 directional-valve:valve-4/3-shut, D1 flow-divider:flow-divider-gear, C1 cylinder{load=8 kN;loadSense=resisting}, C2 cylinder{load=14 kN;loadSense=resisting} | P1.P R1.P V1.P | R1.T V1.T T1.T | V1.A D1.P | D1.A C1.A | D1.B C2.A | C1.B C2.B V1.B',
  );
  const net = networkOf(drawn);
  const solver = new PressureSolver(net, { pumpsRunning: true, places: ['between', 'between'] });
  for (let row = 0; row < 3; row++) {
    solver.solve(row);
    const { pressures, status } = new FlowSolver(problemNow(solver.model.solver)).solve();
    const back = loadProblem(dumpRow(drawn, { pumps: 'running' }, row));
    if (!back.ok) throw new Error(back.problems[0]?.what);
    expect(back.value.couplers).toHaveLength(1);
    const again = new FlowSolver(back.value).solve();
    expect([again.status, ...again.pressures]).toEqual([status, ...pressures]);
    // One pass of its own, so that the row is not that of another.
    expect(back.value.branches.some(({ id, on }) => id === 'V1 P–A' && on)).toBe(row === 0);
  }
});
