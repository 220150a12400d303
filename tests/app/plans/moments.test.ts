import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { checkPlan } from '../../../src/analysis/plan.ts';
import { diagramLines } from '../../../src/app/plans/diagram-lines.ts';
import { eventWords, planVerdict, stepVerdict } from '../../../src/app/plans/plan-words.ts';
import { momentOf } from '../../../src/app/state/moment.ts';
import { momentAtX, momentX } from '../../../src/drawing/step-diagram.ts';
import { stepChart } from '../../../src/report/step-diagram.ts';
import { openCircuit } from '../../../src/parts/open.ts';

const read = openCircuit(readFileSync(new URL('../../../examples/crate-pusher.spool.json', import.meta.url), 'utf8'));
if (!read.ok) throw new Error('crate pusher');
const right = checkPlan(read.value, 'right', {}, undefined, { powerLoss: false });
const wrong = checkPlan(read.value, 'wrong', {}, undefined, { powerLoss: false });
const { trace } = right;
const first = (step: number): number => trace.steps[step]?.first ?? -1;

describe('a moment of the plan', () => {
  test('where step 2 begins LIFT stands out and PUSH in, on its way', () => {
    const moment = momentOf(trace, first(1), trace.steps[1]?.start ?? 0);
    expect(moment?.strokes.get('LIFT')).toBeCloseTo(1, 9);
    expect(moment?.strokes.get('PUSH')).toBe(0);
    expect(moment?.speeds.get('PUSH')).toBeGreaterThan(0);
    // PUSH moves, so it is not at a stop for the table either.
    expect(moment?.conditions).toEqual({ pumps: 'running', places: { LIFT: 'out' } });
    expect(moment?.positions.get('V2')?.name).toBe('push');
    expect(moment?.levers.get('V1')).toBe(1);
  });

  test('between two samples strokes run straight', () => {
    const { start = 0, end = 0 } = trace.steps[1] ?? {};
    const half = momentOf(trace, first(1), (start + end) / 2);
    // One speed from stop to stop, so half the time is half the way.
    expect(half?.strokes.get('PUSH')).toBeCloseTo(0.5, 6);
  });

  test('there is none beyond the trace', () => {
    expect(momentOf(trace, trace.samples.length, 0)).toBeUndefined();
  });
});

test('places in the diagram and moments lead to each other', () => {
  const chart = stepChart('x', trace, { units: 'metric', lines: [] });
  const plot = { x: 12, y: 3, width: 80, height: 20 };
  for (const kind of ['step', 'time'] as const) {
    for (const [step, { start, end }] of trace.steps.entries()) {
      const time = start + (end - start) * 0.3;
      const back = momentAtX(chart, kind, plot, momentX(chart, kind, plot, step, time));
      expect(back.step).toBe(step);
      expect(back.time).toBeCloseTo(time, 9);
    }
    expect(momentAtX(chart, kind, plot, -50).time).toBe(0);
    expect(momentAtX(chart, kind, plot, 500).time).toBeCloseTo(trace.steps.at(-1)?.end ?? 0, 9);
  }
});

test('verdicts and events in words', () => {
  expect(planVerdict(right)).toBe('does what it says');
  expect(planVerdict(wrong)).toBe('does not do what it says: 3 faults');
  expect(wrong.steps.map((step) => stepVerdict(step).word)).toEqual([
    'as asked',
    'as asked',
    'never ends',
    'not played',
  ]);
  expect(eventWords(trace, first(1))).toContain('step 2 push off begins with V2.a on');
  const stop = trace.samples.findIndex(({ events }) => events.some(({ kind }) => kind === 'stop'));
  expect(eventWords(trace, stop)).toContain('LIFT all the way out');
});

test('a diagram shows the lines with the highest pressures', () => {
  const shown = diagramLines(trace);
  expect(shown.length).toBeGreaterThan(0);
  expect(shown.length).toBeLessThanOrEqual(3);
  const most = (name: string): number =>
    Math.max(...trace.samples.map(({ pressures }) => pressures[trace.lines.indexOf(name)] ?? 0));
  const least = Math.min(...shown.map(most));
  for (const name of trace.lines) if (!shown.includes(name)) expect(most(name)).toBeLessThanOrEqual(least);
});
