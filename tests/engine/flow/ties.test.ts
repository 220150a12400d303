import { expect, test } from 'vitest';
import { TANK } from '../../../src/engine/flow/problem.ts';
import { describe as tell } from '../../../src/engine/flow/result.ts';
import { FlowSolver } from '../../../src/engine/flow/solver.ts';
import { TieFinder, ties } from '../../../src/engine/flow/ties.ts';
import { BAR, CM2, DAN, LPM, cylinder, open, rig } from './rig.ts';

/** Two rivals of these loads (daN); a load that comes down through a hose, at some 33 m/s if that is open; and one that rests. */
function circuit(
  loads: readonly [number, number],
  hose = 400 * LPM,
): { solver: FlowSolver; branch: (id: string) => number } {
  const { b, p } = rig();
  loads.forEach((load, i) => {
    const cap = b.line(`cap ${i}`);
    const rod = b.line(`rod ${i}`);
    b.openPath(`feed ${i}`, p, cap, open);
    b.openPath(`back ${i}`, rod, TANK, open);
    b.cylinder(`C${i}`, cap, rod, cylinder({ resisting: load * DAN }));
  });
  const high = b.line('high');
  b.openPath('down', high, TANK, { flow: hose, drop: 1 * BAR });
  b.cylinder('falls', high, TANK, { areaA: 20 * CM2, areaB: 0, load: { pressing: 2000 * DAN } });
  const held = b.line('held');
  b.relief('R2', held, TANK, 150 * BAR);
  b.cylinder('stands', held, TANK, { areaA: 20 * CM2, areaB: 0, load: { resisting: 6000 * DAN } });
  const solver = new FlowSolver(b.build());
  return { solver, branch: (id) => solver.system.problem.branches.findIndex((each) => each.id === id) };
}

test('a trial whose smaller losses leave no steady state is made again with milder ones', () => {
  const { solver, branch } = circuit([800, 800]);
  const solution = solver.solve();
  expect(solution.status).toBe('solved');
  const start = solution.pressures.slice();
  // A hundredth of its loss would let the falling load pass 100 m/s: no steady state of a real circuit.
  const { law } = solver.system;
  const kept = law.slice();
  law[8 * branch('down') + 5] = (law[8 * branch('down') + 5] as number) / 100;
  expect(solver.solve().status).toBe('unbounded');
  law.set(kept);
  const found = ties(solver, start);
  expect(found).toContain(branch('C0'));
  expect(found).toContain(branch('C1'));
  // Where too few trials had a steady state, all would be named.
  expect(found).not.toContain(branch('stands'));
  expect([...law]).toEqual([...kept]);
});

test('asked of rivals alone it gives the same with fewer trials', () => {
  for (const [loads, expected] of [
    [
      [800, 800],
      ['C0', 'C1'],
    ],
    [[800, 1200], []],
    [[800, 810], []],
  ] as const) {
    const { solver, branch } = circuit(loads, 1 * LPM);
    const solution = solver.solve();
    const pressures = solution.pressures.slice();
    const flows = solution.throughputs.slice();
    const rivals = [branch('C0'), branch('C1')];
    const finder = new TieFinder(solver);
    expect(finder.find(pressures, { rivals, flows })).toEqual(expected.map(branch));
    expect(finder.find(pressures, { rivals: [branch('C0')], flows })).toEqual([]);
    const wavers = finder.wavers(pressures, flows);
    expect(wavers(branch('falls'))).toBe(true);
    expect(wavers(branch('stands'))).toBe(false);
  }
});

test('figures that do not balance are not given out as solved', () => {
  const { solver } = circuit([800, 1200]);
  const solution = solver.solve();
  expect(tell(solver, solution).status).toBe('solved');
  (solution.pressures as Float64Array)[0] = (solution.pressures[0] as number) + 1 * BAR;
  const spoilt = tell(solver, solution);
  if (spoilt.status !== 'not converged') throw new Error(spoilt.status);
  expect(spoilt.certificate.residual).toBeGreaterThan(1e-8);
});
