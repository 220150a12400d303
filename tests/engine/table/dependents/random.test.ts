import fc from 'fast-check';
import { expect, test } from 'vitest';
import { unlimited } from '../../../../src/base/budget.ts';
import { explainRow, networkOf, pathConditions, tabulate } from '../../../../src/analysis/analyse.ts';
import { PressureSolver } from '../../../../src/engine/table/resolve.ts';
import { StateTable } from '../../../../src/engine/table/state-table.ts';
import type { NetDependent, Network } from '../../../../src/network/network.ts';
import { pilotedCircuits } from './random-piloted.ts';

const settingsOf = (net: Network): number => net.dependents.reduce((n, valve) => n * valve.positions.length, 1);

/** Every setting in mixed radix. */
function* everySetting(net: Network): Generator<number[]> {
  const count = settingsOf(net);
  for (let n = 0; n < count; n++) {
    const setting: number[] = [];
    let rest = n;
    for (const valve of net.dependents) {
      setting.push(rest % valve.positions.length);
      rest = Math.floor(rest / valve.positions.length);
    }
    yield setting;
  }
}

/** Written anew from the description of a dependent valve: where pressures put it. */
function goesTo(valve: NetDependent, now: number, commanded: readonly number[], at: (line: number) => number): number {
  for (const shift of valve.shifts) {
    if (shift.by === 'roller') continue;
    if (shift.input >= 0 && (shift.stages & (1 << (commanded[shift.input] as number))) === 0) continue;
    let sum = 0;
    for (const { line, factor } of shift.signals) sum += factor * at(line);
    if (sum > shift.setting * (1 - 1e-6) - 1) return shift.position;
  }
  return valve.rest ?? now;
}

test('the setting of every row agrees with its own pressures or the row hunts, and trying every setting finds the same others', () => {
  const seen = { rows: 0, hunts: 0, history: 0, shifted: 0, judged: 0 };
  fc.assert(
    fc.property(pilotedCircuits, fc.constantFrom('running' as const, 'stopped' as const), (circuit, pumps) => {
      const net = networkOf(circuit);
      const table = new StateTable(tabulate(circuit, { pumps }, unlimited, { pressureRows: 2000 }));
      const solver = new PressureSolver(net, pathConditions(net, { pumps }));
      for (let row = 0; row < table.count; row++) {
        seen.rows += 1;
        const commanded = table.positionsOf(row);
        const agreeing: number[][] = [];
        let solved = true;
        for (const setting of everySetting(net)) {
          const { result } = solver.solve(row, setting);
          solved &&= result.status === 'solved';
          if (result.status !== 'solved') continue;
          const at = (line: number): number => solver.pressure(result, line);
          if (net.dependents.every((valve, d) => goesTo(valve, setting[d] as number, commanded, at) === setting[d]))
            agreeing.push(setting);
        }
        // Where some setting has no steady pressures, open paths decide it.
        if (!solved) continue;
        seen.judged += 1;
        const chosen = net.dependents.map((_, d) => table.dependent(d, row));
        expect(table.hunts(row), `hunts in row ${row}`).toBe(agreeing.length === 0);
        if (agreeing.length === 0) {
          seen.hunts += 1;
          continue;
        }
        expect(agreeing).toContainEqual(chosen);
        const others = agreeing.filter((setting) => setting.join() !== chosen.join());
        net.dependents.forEach((_, d) =>
          expect(table.dependentOthers(d, row)).toEqual([...new Set(others.map((setting) => setting[d]))].sort()),
        );
        if (others.length > 0) seen.history += 1;
        if (net.dependents.some((valve, d) => valve.rest !== undefined && chosen[d] !== valve.rest)) seen.shifted += 1;
      }
    }),
    { numRuns: 80, seed: 20260 },
  );
  // The circuits must really try it.
  expect(seen.judged).toBeGreaterThan(0.9 * seen.rows);
  expect(seen.hunts).toBeGreaterThan(3);
  expect(seen.history).toBeGreaterThan(20);
  expect(seen.shifted).toBeGreaterThan(20);
});

test('the words of a row say what the table says, dependent valves included', () => {
  fc.assert(
    fc.property(
      pilotedCircuits,
      fc.nat(),
      fc.constantFrom('running' as const, 'stopped' as const),
      (circuit, pick, pumps) => {
        const table = new StateTable(tabulate(circuit, { pumps }, unlimited, { pressureRows: 2000 }));
        const row = pick % table.count;
        const said = explainRow(circuit, { pumps }, row);
        expect(said.dependents.map(({ position }) => position)).toEqual(
          table.data.dependents.map((_, d) => table.dependent(d, row)),
        );
        expect(said.dependents.map(({ hunts }) => hunts)).toEqual(table.data.dependents.map(() => table.hunts(row)));
        expect(said.actuators.map(({ verdict }) => verdict)).toEqual(
          table.data.actuators.map((_, i) => table.actuator(i, row)),
        );
        expect(said.pumps.map(({ verdict }) => verdict)).toEqual(table.data.pumps.map((_, i) => table.pump(i, row)));
        expect(said.trapped.map(({ line, reasons }) => [line, reasons.map(({ kind }) => kind)])).toEqual(
          table.data.lines.flatMap((_, line) => {
            const reasons = table.trapped(line, row);
            return reasons.length > 0 ? [[line, reasons]] : [];
          }),
        );
      },
    ),
    { numRuns: 50, seed: 77 },
  );
});

test('open paths alone leave to the pressures whatever these could decide otherwise', () => {
  fc.assert(
    fc.property(pilotedCircuits, (circuit) => {
      const plain = new StateTable(tabulate(circuit, { pumps: 'running' }, unlimited, { pressureRows: 0 }));
      for (let row = 0; row < plain.count; row++) {
        expect(plain.hunts(row)).toBe(false);
        expect(plain.history(row)).toBe(false);
        plain.data.dependents.forEach((valve, d) => {
          if (plain.dependent(d, row) !== (valve.rest ?? 0)) expect(plain.dependentRests(d, row)).toBe(true);
        });
      }
    }),
    { numRuns: 50, seed: 5 },
  );
});
