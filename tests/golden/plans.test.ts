import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { checkPlan } from '../../src/analysis/plan.ts';
import type { PlanReport } from '../../src/analysis/plan-results.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { writePlanJson, writePlanText } from '../../src/report/plan.ts';

const FOLDER = new URL('../../examples/', import.meta.url);
const ENDING = '.spool.json';

function open(name: string): Circuit {
  const opened = openCircuit(readFileSync(new URL(name + ENDING, FOLDER), 'utf8'));
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems));
  return opened.value;
}

const reportsOf = (circuit: Circuit): PlanReport[] => (circuit.plans ?? []).map(({ id }) => checkPlan(circuit, id));
const names = readdirSync(FOLDER)
  .filter((file) => file.endsWith(ENDING))
  .map((file) => file.slice(0, -ENDING.length));
const planned = names.filter((name) => (open(name).plans ?? []).length > 0);

/** Every example with plans has their answer beside it; `vitest -u` writes it anew. */
describe.each(planned)('%s', (name) => {
  const circuit = open(name);
  const reports = reportsOf(circuit);
  const source = { version: '-', circuit: circuit.name, units: 'metric', reports } as const;

  test('its plans', async () => {
    await expect([...writePlanText(source)].join('')).toMatchFileSnapshot(new URL(`${name}.plan.txt`, FOLDER).pathname);
  });

  test('the JSON has the same plans, steps and samples', () => {
    const out = JSON.parse(writePlanJson(source)) as { plans: { good: boolean; steps: { step: number }[] }[] };
    expect(out.plans.map(({ good }) => good)).toEqual(reports.map(({ good }) => good));
    expect(out.plans.map(({ steps }) => steps.map(({ step }) => step))).toEqual(
      reports.map(({ steps }) => steps.map((_, i) => i + 1)),
    );
  });
});

/** Worked out on paper from bores, strokes and flows (law: t = A·s/Q), not from the program. */
describe('worked by hand', () => {
  const of = (name: string, plan = 0): PlanReport => reportsOf(open(name))[plan] as PlanReport;
  const took = ({ steps }: PlanReport): number[] => steps.map(({ start, end }) => Number((end - start).toFixed(3)));

  test('peg drill: 19.635 cm² · 120 mm, then 12.566 cm² · 150 mm at 20 L/min, and back on the rod sides', () => {
    // Out: 0.7069 + 0.5655 s. Back: 6.409 cm² · 150 mm in 0.2884 s, 9.456 cm² · 120 mm in 0.3404 s.
    expect(took(of('peg-drill'))).toEqual([1.272, 0.629, 2]);
    expect(of('peg-drill').good).toBe(true);
  });

  test('crate pusher: two coils against each other stop the first plan in step 3; its twin checks out', () => {
    const wrong = of('crate-pusher', 0);
    expect(wrong.good).toBe(false);
    expect(wrong.steps.map(({ outcome }) => outcome)).toEqual(['done', 'done', 'never ended', 'not played']);
    expect(wrong.steps[2]?.problems.map(({ kind }) => kind)).toContain('both coils on');
    const right = of('crate-pusher', 1);
    expect(right.good).toBe(true);
    // LIFT: 31.17 cm² · 300 mm at 25 L/min = 2.244 s. PUSH: 12.566 cm² · 500 mm = 1.508 s, back on 8.765 cm² 1.052 s.
    expect(took(right).slice(0, 3)).toEqual([2.244, 1.508, 1.052]);
  });

  test('kiln door: with the 2/2 valve the store is empty after a loss of voltage, without it the store keeps its pressure', () => {
    const left = (name: string): string[][] =>
      of(name)
        .powerLoss.filter(({ lost, at }) => lost === 'coils off, pumps stopped' && at === 'step end')
        .map(({ underPressure }) => [...underPressure]);
    for (const lines of left('kiln-door')) expect(lines).not.toContain('store');
    for (const lines of left('kiln-door-kept')) expect(lines).toContain('store');
  });
});
