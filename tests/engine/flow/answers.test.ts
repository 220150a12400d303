import { expect, test } from 'vitest';
import { FlowBuilder } from '../../../src/engine/flow/builder.ts';
import { TANK } from '../../../src/engine/flow/problem.ts';
import { solveFlow } from '../../../src/engine/flow/result.ts';
import { FlowSolver } from '../../../src/engine/flow/solver.ts';
import { ties } from '../../../src/engine/flow/ties.ts';
import { randomCircuit } from './random-circuit.ts';
import { BAR, CM2, DAN, LPM, cylinder, open, rig } from './rig.ts';

test('a dead-headed fixed pump is named with its line, and no pressure is given', () => {
  const b = new FlowBuilder();
  const p = b.line('P');
  const end = b.line('plugged');
  b.pumpFixed('P1', p, 40 * LPM);
  b.openPath('feed', p, end, open);
  const result = solveFlow(b.build());
  if (result.status !== 'unbounded') throw new Error(result.status);
  expect(result.cause).toBe('dead-headed pump');
  expect(result.names).toEqual(['P']);
  expect(result.words).toContain('P1 pumps into line P');
  expect('lines' in result).toBe(false);
});

test('a pump against a cylinder at its stop, without relief, is dead-headed too', () => {
  const b = new FlowBuilder();
  const p = b.line('P');
  const rod = b.line('rod');
  b.pumpFixed('P1', p, 10 * LPM);
  b.openPath('back', rod, TANK, open);
  b.cylinder('C', p, rod, { areaA: 20 * CM2, areaB: 10 * CM2, at: 'out' });
  expect(solveFlow(b.build()).status).toBe('unbounded');
});

test('free fall names the actuator', () => {
  const { b, p } = rig();
  b.openPath('bypass', p, TANK, open);
  const cap = b.line('cap');
  b.check('anti-void', TANK, cap, 0, open);
  b.cylinder('C', cap, TANK, { areaA: 20 * CM2, areaB: 0, load: { pressing: -500 * DAN } });
  const result = solveFlow(b.build());
  if (result.status !== 'unbounded') throw new Error(result.status);
  expect(result.cause).toBe('free fall');
  expect(result.names).toEqual(['C']);
});

test('contradicting data are infeasible, in words', () => {
  const { b, p } = rig();
  const law = b.build();
  const wrong = { ...law, branches: law.branches.map((branch) => ({ ...branch, lo: 2, hi: 1 })) };
  const result = solveFlow(wrong);
  if (result.status !== 'infeasible') throw new Error(result.status);
  expect(result.words).toContain('relief');
  expect(p).toBe(0);
});

test('out of iterations or cancelled is "not converged", with the evidence', () => {
  const problem = randomCircuit(7, { lines: 20, cylinders: 4 });
  const short = solveFlow(problem, { iterations: 2 });
  expect(short.status).toBe('not converged');
  const stopped = solveFlow(problem, { cancelled: () => true });
  if (stopped.status !== 'not converged') throw new Error(stopped.status);
  expect(stopped.cancelled).toBe(true);
  expect(stopped.certificate.balance).toBeGreaterThan(1e-8);
});

function rivals(loads: readonly [number, number], losses = open): { undetermined: string[] } {
  const { b, p } = rig();
  loads.forEach((load, i) => {
    const cap = b.line(`cap ${i}`);
    const rod = b.line(`rod ${i}`);
    b.openPath(`feed ${i}`, p, cap, losses);
    b.openPath(`back ${i}`, rod, TANK, losses);
    b.cylinder(`C${i}`, cap, rod, cylinder({ resisting: load * DAN }));
  });
  const solver = new FlowSolver(b.build());
  const base = solver.solve();
  expect(base.status).toBe('solved');
  return { undetermined: ties(solver, base.pressures).map((j) => solver.system.problem.branches[j]?.id ?? '') };
}

// F15 (law): equal loads leave the split open; F14: unequal loads do not.
test('equal rivals are undetermined, unequal ones are not', () => {
  expect(rivals([800, 800]).undetermined).toEqual(['C0', 'C1']);
  expect(rivals([800, 1200]).undetermined).toEqual([]);
  expect(rivals([800, 810]).undetermined).toEqual([]);
});

test('cylinders in series are no rivals, and looking for ties changes nothing', () => {
  const { b, p } = rig();
  const mid = b.line('mid');
  const out = b.line('out');
  b.openPath('back', out, TANK, open);
  b.cylinder('one', p, mid, cylinder({ resisting: 300 * DAN }));
  b.cylinder('two', mid, out, cylinder({ resisting: 300 * DAN }));
  const solver = new FlowSolver(b.build());
  const before = [...solver.solve().pressures];
  expect(ties(solver, before)).toEqual([]);
  expect([...solver.solve().pressures]).toEqual(before);
  expect(before[p] as number).toBeLessThan(100 * BAR);
});
