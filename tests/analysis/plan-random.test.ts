import fc from 'fast-check';
import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { networkOf } from '../../src/analysis/analyse.ts';
import { checkPlan } from '../../src/analysis/plan.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import type { PlanStep } from '../../src/circuit/plan.ts';
import { openCircuit } from '../../src/parts/open.ts';

const FOLDER = new URL('../../examples/', import.meta.url);
const names = readdirSync(FOLDER).filter((file) => file.endsWith('.spool.json'));

function open(file: string): Circuit {
  const opened = openCircuit(readFileSync(new URL(file, FOLDER), 'utf8'));
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems));
  return opened.value;
}

/** Any levers, for any time, from any start: whatever a machine is told, its answer must be sound. */
describe.each(names)('%s', (file) => {
  const circuit = open(file);
  const net = networkOf(circuit);
  const id = (part: number): string => net.parts[part]?.id ?? '';

  const steps = fc.array(
    fc.record({
      moves: fc.array(fc.nat(), { minLength: net.inputs.length, maxLength: net.inputs.length }),
      stop: fc.boolean(),
      after: fc.constantFrom('200 ms', '1 s', '5 s'),
    }),
    { minLength: 1, maxLength: 3 },
  );
  const starts = fc.array(fc.constantFrom('in', 'out', '30 mm'), {
    minLength: net.actuators.length,
    maxLength: net.actuators.length,
  });

  test('random levers keep strokes within stops, time and energy rising, and play the same twice', () => {
    fc.assert(
      fc.property(steps, starts, (given, start) => {
        const plan = {
          id: 'p',
          name: 'Any',
          start: Object.fromEntries(
            net.actuators.flatMap(({ part, stroke }, i) =>
              stroke === undefined ? [] : [[id(part), start[i] ?? 'in']],
            ),
          ),
          steps: given.map(({ moves, stop, after }, i): PlanStep => ({
            id: `s${i}`,
            levers: Object.fromEntries(
              net.inputs.map(({ part, positions }, n) => [
                id(part),
                positions[(moves[n] ?? 0) % positions.length] ?? '',
              ]),
            ),
            ...(stop && { stopped: net.pumps.map(({ part }) => id(part)) }),
            ends: { by: 'time', after },
          })),
        };
        const play = () => checkPlan({ ...circuit, plans: [plan] }, 'p', {}, undefined, { powerLoss: false });
        const report = play();
        let time = 0;
        for (const sample of report.trace.samples) {
          expect(sample.time).toBeGreaterThanOrEqual(time);
          time = sample.time;
          net.actuators.forEach(({ stroke }, i) => {
            expect(Number.isFinite(sample.strokes[i])).toBe(true);
            if (stroke === undefined) return;
            expect(sample.strokes[i]).toBeGreaterThanOrEqual(0);
            expect(sample.strokes[i]).toBeLessThanOrEqual(stroke);
          });
        }
        for (const step of report.steps) {
          expect(step.energyIn).toBeGreaterThanOrEqual(-1e-6);
          expect(step.energyLost).toBeGreaterThanOrEqual(-1e-6 * Math.max(1, step.energyIn));
          if (step.outcome === 'done') expect(step.end - step.start).toBeLessThan(5 + 1e-9);
        }
        expect(play().trace).toEqual(report.trace);
      }),
      { numRuns: 6 },
    );
  });
});
