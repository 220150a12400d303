import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf, tabulate } from '../../../src/analysis/analyse.ts';
import { unlimited } from '../../../src/base/budget.ts';
import { PressureSolver } from '../../../src/engine/table/resolve.ts';
import { rowNumbers } from '../../../src/engine/table/row-numbers.ts';
import { StateTable } from '../../../src/engine/table/state-table.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { randomCircuit } from '../../random-circuit.ts';

/** A circuit in few words, for the message. */
const sketch = (circuit: Circuit): string =>
  [
    circuit.parts
      .map(
        (part) =>
          `${part.id} ${part.kind}${part.settings ? JSON.stringify(part.settings) : ''}${part.valve ? part.valve.positions.map((p) => `[${p.paths.join(' ')}]`).join('') : ''}`,
      )
      .join(', '),
    circuit.connections.map(({ from, to }) => `${from.part}.${from.port}-${to.part}.${to.port}`).join(' '),
  ].join(' | ');

/** m³/s that count as motion: 0.01 L/min. */
const MOTION = 0.01e-3 / 60;

/**
 * What open paths decide by themselves, the pressures must bear out: what is driven goes the way it is
 * driven (or stands, where friction beats the setting), what is held stands, and a dead-headed pump has no
 * steady state. One that floats may creep outwards on the back pressure of a tank line (p·Ar, law).
 */
test('open paths and pressures never contradict each other on 5,000 random circuits', { timeout: 240_000 }, () => {
  let circuits = 0;
  let states = 0;
  const wrong: string[] = [];
  fc.assert(
    fc.property(randomCircuit(2, 9), fc.constantFrom('running' as const, 'stopped' as const), (circuit, pumps) => {
      circuits += 1;
      const net = networkOf(circuit);
      const paths = new StateTable(tabulate(circuit, { pumps }, unlimited, { pressureRows: 0 }));
      const places = net.actuators.map(() => 'between' as const);
      const solver = new PressureSolver(net, { pumpsRunning: pumps === 'running', places });
      for (let row = 0; row < paths.count; row++) {
        const numbers = rowNumbers(solver, row);
        if (numbers.status !== 'solved') continue;
        states += 1;
        numbers.actuators.forEach(({ flow, speed }, i) => {
          const verdict = paths.actuator(i, row);
          const goes = flow <= MOTION ? 'stands' : speed > 0 ? 'out' : 'in';
          const allowed: Record<string, string[]> = {
            extends: ['out', 'stands'],
            'turns A→B': ['out', 'stands'],
            retracts: ['in', 'stands'],
            'turns B→A': ['in', 'stands'],
            held: ['stands'],
            'moved in by load': ['in', 'stands'],
            'moved in by spring': ['in', 'stands'],
            'moved out by load': ['out', 'stands'],
          };
          // Held up to the force at which a relief valve lets go; the table says so from the pressures.
          if (verdict === 'held' && numbers.reliefs.some((relief) => relief.flow > MOTION)) return;
          if (!(allowed[verdict]?.includes(goes) ?? true)) {
            wrong.push(
              `${verdict} but ${goes} (${flow * 60000}): ${paths.data.actuators[i]?.label} row ${row + 1} ${pumps} ${sketch(circuit)}`,
            );
          }
        });
        paths.data.pumps.forEach((_, i) => {
          if (paths.pump(i, row) === 'dead-headed')
            wrong.push(`dead-headed but solved: row ${row + 1} ${pumps} ${sketch(circuit)}`);
        });
      }
    }),
    { numRuns: 5000, seed: 42 },
  );
  expect(wrong.slice(0, 8)).toEqual([]);
  expect(circuits).toBe(5000);
  expect(states).toBeGreaterThan(5000);
});
