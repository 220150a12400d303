import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../src/analysis/analyse.ts';
import { ties } from '../../../src/engine/flow/ties.ts';
import { PressureSolver } from '../../../src/engine/table/resolve.ts';
import { randomCircuit } from '../../random-circuit.ts';

/** Pa; a chamber below it is not pressed on. */
const PRESSED = 1e4;

/** The quick search looks only at actuators on the verge of moving; the full one makes every trial and asks all. */
test('rivals that losses alone part are the same by the quick search and by the full one', { timeout: 120_000 }, () => {
  let rows = 0;
  let rivals = 0;
  const wrong: string[] = [];
  fc.assert(
    fc.property(randomCircuit(2, 9), (circuit) => {
      const net = networkOf(circuit);
      if (net.actuators.length < 2 || net.dependents.length > 0) return;
      const places = net.actuators.map(() => 'between' as const);
      const solver = new PressureSolver(net, { pumpsRunning: true, places });
      const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
      for (let row = 0; row < Math.min(count, 81); row++) {
        const answer = solver.solve(row);
        const { result } = answer;
        if (result.status !== 'solved') continue;
        rows += 1;
        const driven = net.actuators.flatMap(({ a, b }, i) => {
          const { speed } = result.actuators[i] ?? { speed: 0 };
          const [pa, pb] = [solver.pressure(result, a), solver.pressure(result, b)];
          return (speed > 0 ? pa : speed < 0 ? pb : Math.max(pa, pb)) > PRESSED ? [i] : [];
        });
        const warm = Float64Array.from(solver.model.solver.solve().pressures);
        const quick = answer.swings(driven.filter((i) => answer.wavers(i)));
        const full = ties(solver.model.solver, warm);
        const all = driven.filter((i) => full.includes(solver.model.actuators[i] ?? -1));
        const expected = all.length < 2 ? [] : all;
        rivals += expected.length;
        if (quick.join() !== expected.join())
          wrong.push(`${circuit.name} row ${row}: ${quick.join()} / ${expected.join()}`);
      }
    }),
    { seed: 11, numRuns: 600 },
  );
  expect(wrong).toEqual([]);
  expect(rows).toBeGreaterThan(1000);
  expect(rivals).toBeGreaterThan(10);
});
