import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { FlowBuilder } from '../../../src/engine/flow/builder.ts';
import { FlowSolver } from '../../../src/engine/flow/solver.ts';
import { TANK } from '../../../src/engine/flow/problem.ts';
import { findNgspice } from '../../tools/ngspice.mjs';
import { netlist, readVolts } from './netlist.ts';
import { BAR, LPM, randomCircuit } from './random-circuit.ts';

test('a pump, a relief valve and a path to tank as a netlist', () => {
  const b = new FlowBuilder();
  const p = b.line('P');
  b.pumpFixed('pump', p, 40 * LPM);
  b.relief('relief', p, TANK, 100 * BAR, BAR / (6 * LPM));
  b.openPath('shut', p, TANK, {}, false);
  const text = netlist(b.build());
  expect(text).toContain('Ipump0 0 l0 DC 4.000000000000e+1');
  expect(text).toMatch(/^Ba0 l0 0 I=\(6\.0+e\+4\)\*\(max\(.*-\(1\.0+e\+7\),0\)\/1\.0+e\+9-\(0\)\)$/m);
  expect(text).not.toContain('Ba1');
});

test('what the simulator prints is read line by line, and a failed run as no answer', () => {
  expect(readVolts('v(l0) = 1.066667e+02\nv(l1) = -1.0e-03\n', 2)).toEqual([106.6667, -0.001]);
  expect(readVolts('v(l0) = 1.066667e+02\n', 2)).toBeUndefined();
});

const program = findNgspice();

/** Of the first 160 circuits those whose operating point ngspice 39 finds within a second; it gives the others up. */
const SEEDS = [
  0, 7, 8, 9, 17, 19, 23, 32, 33, 40, 43, 48, 50, 56, 64, 65, 68, 72, 75, 76, 86, 96, 104, 106, 120, 121, 128, 130, 131,
  145, 153, 157,
];

// Another version may give up more of them; where it finds the operating point, it must be the same.
if (program !== undefined) {
  test('random pilot-free circuits agree with ngspice within 0.05 bar or 0.5 %', () => {
    const work = mkdtempSync(join(tmpdir(), 'spooltable-ngspice-'));
    let compared = 0;
    try {
      for (const seed of SEEDS) {
        const problem = randomCircuit(7000 + seed, { lines: 3 + (seed % 8), cylinders: 1 + (seed % 2) });
        const solver = new FlowSolver(problem);
        const own = solver.solve();
        const file = join(work, `${seed}.cir`);
        writeFileSync(file, netlist(problem));
        const { stdout } = spawnSync(program, ['-b', file], { encoding: 'utf8', timeout: 5000, cwd: work });
        const volts = readVolts(stdout ?? '', problem.lines.length);
        if (own.status !== 'solved' || !volts) continue;
        compared++;
        volts.forEach((theirs, i) => {
          const ours = (own.pressures[i] as number) / BAR;
          const off = Math.abs(theirs - ours);
          expect(off, `circuit ${seed}, line ${i}: ${ours} against ${theirs} bar`).toBeLessThanOrEqual(
            Math.max(0.05, 0.005 * Math.abs(ours)),
          );
        });
      }
    } finally {
      rmSync(work, { recursive: true, force: true });
    }
    expect(compared).toBeGreaterThanOrEqual(20);
  }, 200_000);
}
