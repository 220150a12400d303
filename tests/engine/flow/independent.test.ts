import loadHighs from 'highs';
import { expect, test } from 'vitest';
import { NEAR_IDEAL, throughput } from '../../../src/engine/flow/laws.ts';
import type { FlowProblem } from '../../../src/engine/flow/problem.ts';
import { FlowSolver } from '../../../src/engine/flow/solver.ts';
import { contentProgram } from './quadratic.ts';
import { randomCircuit } from './random-circuit.ts';
import { BAR, LPM } from './rig.ts';

const COUNT = 500;
/** The QP solver's own smoothing term, off: it is larger than the differences looked for. */
const exact = { output_flag: false, qp_regularization_value: 0 };

test(`${COUNT} linearised circuits agree with a general QP solver`, async () => {
  const highs = await loadHighs();
  let compared = 0;
  for (let seed = 0; seed < COUNT; seed++) {
    const problem = randomCircuit(seed, { lines: 3 + (seed % 18), cylinders: 1 + (seed % 4), linear: true });
    const solver = new FlowSolver(problem);
    const { status, throughputs } = solver.solve();
    expect(status).toBe('solved');
    const other = highs.solve(contentProgram(problem), exact);
    if (other.Status !== 'Optimal') continue;
    compared++;
    const value = (name: string): number => {
      const column = other.Columns[name];
      return column && 'Primal' in column ? Number(column.Primal) : 0;
    };
    problem.branches.forEach((b, j) => {
      if (!b.on) return;
      const area = Math.max(Math.abs(b.ca), Math.abs(b.cb));
      const ours = ((throughputs[j] as number) * area) / LPM;
      const theirs = value(`f${j}`) - value(`b${j}`);
      expect(Math.abs(ours - theirs), `circuit ${seed}, ${b.id}: ${ours} against ${theirs} L/min`).toBeLessThan(
        0.01 + 1e-4 * Math.abs(ours),
      );
    });
  }
  expect(compared).toBeGreaterThanOrEqual(COUNT);
}, 30_000);

/** Net flow out of a line, by the laws alone. */
function outflow(problem: FlowProblem, p: readonly number[], line: number): number {
  let sum = (p[line] as number) * problem.leak + Math.min(0, p[line] as number) / NEAR_IDEAL.void;
  for (const pump of problem.pumps) if (pump.line === line) sum -= pump.flow;
  for (const b of problem.branches) {
    if (!b.on || (b.a !== line && b.b !== line)) continue;
    const u = b.ca * (b.a < 0 ? 0 : (p[b.a] as number)) + b.cb * (b.b < 0 ? 0 : (p[b.b] as number));
    const x = throughput(b, u);
    sum += (b.a === line ? b.ca * x : 0) + (b.b === line ? b.cb * x : 0);
  }
  return sum;
}

test('turbulent losses: no line can better its balance by moving its own pressure', () => {
  // Bisection on each line's own balance, which is monotone in its pressure, must come back to where the solver put it.
  for (let seed = 0; seed < 60; seed++) {
    const problem = randomCircuit(5000 + seed, { lines: 6 + (seed % 10), cylinders: 1 + (seed % 3) });
    const p = [...new FlowSolver(problem).solve().pressures].slice(0, problem.lines.length);
    for (let line = 0; line < p.length; line++) {
      const at = p[line] as number;
      let low = at - 100 * BAR,
        high = at + 100 * BAR;
      for (let i = 0; i < 60; i++) {
        p[line] = 0.5 * (low + high);
        if (outflow(problem, p, line) > 0) high = p[line] as number;
        else low = p[line] as number;
      }
      p[line] = at;
      expect(Math.abs(0.5 * (low + high) - at)).toBeLessThan(10);
    }
  }
});
