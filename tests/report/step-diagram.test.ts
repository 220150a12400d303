import { expect, test } from 'vitest';
import { headerOf, niceCeiling, niceTicks, wrapped } from '../../src/drawing/diagram-text.ts';
import { stepDiagram } from '../../src/drawing/step-diagram.ts';
import type { Primitive } from '../../src/base/primitives.ts';
import { stepChart, stepDiagramSvg } from '../../src/report/step-diagram.ts';
import { sampleTrace } from './trace-sample.ts';

const TRACE = sampleTrace(
  ['A', 'B', 'M', 'IDLE'],
  ['Y1', 'Y2'],
  [
    { name: 'clamp', to: { 0: 1 }, coils: [0], takes: 1 },
    { name: 'nothing', to: {}, coils: [1], takes: 0 },
    { name: 'press', to: { 1: 0.5, 2: 1 }, coils: [0, 1], takes: 3 },
    { name: 'back', to: { 0: 0, 1: 0 }, coils: [], takes: 2 },
  ],
  [2],
);
const OPTIONS = { units: 'metric', lines: ['supply', 'not there'] } as const;

test('a chart has what moves, the pressures that were asked for, and every coil', () => {
  const chart = stepChart('press', TRACE, OPTIONS);
  expect(chart.actuators.map(({ label, stroke }) => [label, stroke])).toEqual([
    ['A', '400 mm'],
    ['B', '400 mm'],
    ['M', undefined],
  ]);
  expect(chart.pressures.map(({ label }) => label)).toEqual(['supply']);
  expect(chart.pressureTop.label).toBe('150 bar');
  expect(chart.coils.map(({ spans }) => spans.map(({ step }) => step))).toEqual([
    [0, 0, 2, 2],
    [1, 2, 2],
  ]);
  expect(stepChart('press', TRACE, { ...OPTIONS, units: 'us' }).actuators[0]?.stroke).toBe('15.7 in');
});

const traces = (primitives: readonly Primitive[]): (readonly { x: number; y: number }[])[] =>
  primitives.flatMap((p) => (p.type === 'polyline' && p.pen === 'trace' ? [p.points] : []));

test('the curve of an actuator goes from boundary to boundary: steps of one width, or true to time', () => {
  const chart = stepChart('press', TRACE, OPTIONS);
  for (const kind of ['step', 'time'] as const) {
    const { primitives, bounds } = stepDiagram(chart, kind);
    const at = [
      ...new Set(
        primitives.flatMap((p) => (p.type === 'polyline' && p.pen === 'boundary' ? [p.points[0]?.x ?? 0] : [])),
      ),
    ];
    const [first = 0, last = 0] = [at[0], at.at(-1)];
    const shares = at.map((x) => +((x - first) / (last - first)).toFixed(6));
    // 1 s, 0 s, 3 s and 2 s of 6 s.
    expect(shares).toEqual(
      kind === 'step' ? [0, 0.25, 0.5, 0.75, 1] : [0, +(1 / 6).toFixed(6), +(4 / 6).toFixed(6), 1],
    );
    const curve = traces(primitives)[0] ?? [];
    expect(curve[0]?.x).toBeCloseTo(first);
    expect(curve.at(-1)?.x).toBeCloseTo(last);
    // Out is up: A is highest where its first step ends.
    expect(Math.min(...curve.map(({ y }) => y))).toBeCloseTo(
      curve.find(({ x }) => Math.abs(x - (at[1] ?? 0)) < 1e-6)?.y ?? NaN,
    );
    for (const p of primitives) {
      const points = p.type === 'polyline' ? p.points : p.type === 'text' ? [p.at] : [];
      for (const { x, y } of points) {
        expect(x).toBeGreaterThanOrEqual(bounds.x);
        expect(x).toBeLessThanOrEqual(bounds.x + bounds.width);
        expect(y).toBeGreaterThanOrEqual(bounds.y);
        expect(y).toBeLessThanOrEqual(bounds.y + bounds.height);
      }
    }
  }
});

test('a bar stands where a coil is on, also in a step without time', () => {
  const bars = (kind: 'step' | 'time'): number[][] =>
    stepDiagram(stepChart('press', TRACE, OPTIONS), kind).primitives.flatMap((p) =>
      p.type === 'box' ? [[+p.x.toFixed(3), +p.width.toFixed(3)]] : [],
    );
  const step = bars('step');
  const width = step[0]?.[1] ?? 0;
  expect(step.map(([, w]) => (w ?? 0) / width)).toEqual([1, 1, 2]);
  // True to time, the step without any leaves no gap in the bar of Y1.
  expect(bars('time')).toHaveLength(2);
});

test('in print all is black, white or grey; the dark theme is another picture of the same lines', () => {
  const svg = (theme: 'print' | 'light' | 'dark'): string =>
    stepDiagramSvg('press <1>', TRACE, { ...OPTIONS, kind: 'step', theme, standalone: true });
  const colours = [...new Set(svg('print').match(/#[0-9A-Fa-f]{6}\b/g))];
  for (const colour of colours) expect(colour).toMatch(/^#(..)\1\1$/);
  expect(svg('print')).toContain('press &lt;1&gt;');
  const bare = (text: string): string => text.replace(/#[0-9A-Fa-f]{6}\b/g, '');
  expect(bare(svg('dark'))).toBe(bare(svg('light')));
});

test('a row without a steady pressure has a gap, and a plan without motion still has its rows', () => {
  const holed = {
    ...TRACE,
    samples: TRACE.samples.map((sample) => (sample.step === 2 ? { ...sample, pressures: [] } : sample)),
  };
  const curves = traces(stepDiagram(stepChart('press', holed, OPTIONS), 'time').primitives);
  expect(curves.length).toBe(traces(stepDiagram(stepChart('press', TRACE, OPTIONS), 'time').primitives).length + 1);
  const still = sampleTrace(['A'], [], [{ name: '1', to: {}, coils: [], takes: 1 }]);
  expect(stepChart('still', still, OPTIONS).actuators).toHaveLength(1);
  expect(stepDiagram(stepChart('none', sampleTrace([], [], []), OPTIONS), 'step').bounds.width).toBeGreaterThan(0);
});

test('names that do not fit become numbers with a list; numbers that would touch take another row', () => {
  const narrow = [
    { name: 'a very long name of a step', from: 0, to: 4 },
    { name: 'b', from: 4, to: 4 },
    { name: 'c', from: 4, to: 4 },
  ];
  const { labels, rows, legend } = headerOf(narrow, 1.2);
  expect(labels.map(({ text, row }) => [text, row])).toEqual([
    ['1', 0],
    ['2', 0],
    ['3', 1],
  ]);
  expect(rows).toBe(2);
  expect(legend.flat().map(({ text }) => text)).toEqual(['1 a very long name of a step', '2 b', '3 c']);
  expect(headerOf([{ name: 'go', from: 0, to: 9 }], 1.2)).toMatchObject({ labels: [{ text: '1 go' }], legend: [] });
});

test('long labels break at blanks and are cut in the middle, so that their end stays', () => {
  expect(wrapped('Upper left clamping cylinder', 1.5, 14, 3)).toEqual(['Upper left clamping', 'cylinder']);
  const [only = ''] = wrapped('Infeed station valve block.a', 1.5, 14, 1);
  expect(only).toMatch(/^Infee.*….*\.a$/);
});

test('round numbers', () => {
  expect(niceTicks(15, 10)).toEqual([0, 2, 4, 6, 8, 10, 12, 14]);
  expect(niceTicks(0, 10)).toEqual([0]);
  expect([0, 1, 95, 151, 210, 1900].map(niceCeiling)).toEqual([1, 1, 100, 200, 250, 2000]);
});
