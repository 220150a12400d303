import type { Box, Point } from '../base/points.ts';
import type { Pen, Primitive } from '../base/primitives.ts';
import { fitted, headerOf, niceTicks, wrapped } from './diagram-text.ts';

/** What a step diagram shows. Times in s from the start; a span belongs to one step, with its values at both ends. */
export interface StepChart {
  readonly title: string;
  readonly steps: readonly { readonly name: string; readonly start: number; readonly end: number }[];
  readonly actuators: readonly ChartActuator[];
  readonly pressures: readonly { readonly label: string; readonly spans: readonly ChartSpan[] }[];
  /** In the unit of the pressure spans: upper end of every pressure row, with its unit. */
  readonly pressureTop: { readonly value: number; readonly label: string };
  /** Spans in which a coil is on. */
  readonly coils: readonly { readonly label: string; readonly spans: readonly ChartSpan[] }[];
}

export interface ChartActuator {
  readonly label: string;
  /** 0 = in, 1 = out; of a motor −1 B→A, 0 at rest, 1 A→B. */
  readonly spans: readonly ChartSpan[];
  readonly rotary: boolean;
  /** `300 mm`; absent = not known, or a motor. */
  readonly stroke?: string;
}

export interface ChartSpan {
  readonly step: number;
  readonly from: number;
  readonly to: number;
  readonly start: number;
  readonly end: number;
}

/** Equal width for each step, or true to time. */
export type DiagramKind = 'step' | 'time';

/** Lists of primitives with their bounds, in modules: what `drawingToSvg` writes. */
export interface Diagram {
  readonly title: string;
  readonly bounds: Box;
  readonly primitives: readonly Primitive[];
}

/** A diagram of a plan, and where its curves stand. */
export interface StepDiagram extends Diagram {
  readonly plot: Box;
}

/** Where a moment of a step stands in the plot, in modules. */
export function momentX({ steps }: StepChart, kind: DiagramKind, plot: Box, step: number, time: number): number {
  if (kind === 'time') {
    const total = steps.at(-1)?.end ?? 0;
    return plot.x + (total > 0 ? (time / total) * plot.width : 0);
  }
  const { start = 0, end = 0 } = steps[step] ?? {};
  const share = end > start ? Math.min(1, Math.max(0, (time - start) / (end - start))) : 0;
  return plot.x + ((step + share) * plot.width) / Math.max(1, steps.length);
}

/** The step and time at a place of the plot; what lies beside it is its nearest edge. */
export function momentAtX(
  { steps }: StepChart,
  kind: DiagramKind,
  plot: Box,
  x: number,
): { readonly step: number; readonly time: number } {
  const share = Math.min(1, Math.max(0, plot.width > 0 ? (x - plot.x) / plot.width : 0));
  if (kind === 'time') {
    const time = share * (steps.at(-1)?.end ?? 0);
    return {
      step: Math.max(
        0,
        steps.findLastIndex(({ start }) => start <= time),
      ),
      time,
    };
  }
  const step = Math.max(0, Math.min(steps.length - 1, Math.floor(share * steps.length)));
  const { start = 0, end = 0 } = steps[step] ?? {};
  return { step, time: start + (share * steps.length - step) * (end - start) };
}

const TEXT = 1.5;
const SMALL = 1.2;
const [MOST_LABEL, LEAST_STEP, MOST_STEP, TIME_WIDTH, SCALE_ROOM] = [24, 7, 13, 88, 7];
const ROW = { actuator: 5.5, pressure: 4.5, coil: 2 } as const;
const GAP = 1.8;
/** Most of the width that all steps together may take before each gets the least. */
const STEPS_WIDTH = 96;

/**
 * A displacement-step diagram (every step as wide as the next) or a displacement-time diagram: a row for each
 * actuator, thin lines from the motion that ends a step to the one it starts, pressures below, and bars while coils
 * are on.
 */
export function stepDiagram(chart: StepChart, kind: DiagramKind): StepDiagram {
  return new Layout(chart, kind).draw();
}

class Layout {
  readonly #chart: StepChart;
  readonly #kind: DiagramKind;
  readonly #out: Primitive[] = [];
  readonly #left: number;
  readonly #width: number;
  readonly #total: number;

  constructor(chart: StepChart, kind: DiagramKind) {
    this.#chart = chart;
    this.#kind = kind;
    const labels = [...chart.actuators, ...chart.pressures, ...chart.coils].map(({ label }) => label);
    this.#left = Math.min(MOST_LABEL, Math.max(8, ...labels.map((label) => fitted(label, TEXT).width))) + SCALE_ROOM;
    this.#total = chart.steps.at(-1)?.end ?? 0;
    const count = Math.max(1, chart.steps.length);
    this.#width = kind === 'time' ? TIME_WIDTH : count * Math.min(MOST_STEP, Math.max(LEAST_STEP, STEPS_WIDTH / count));
  }

  draw(): StepDiagram {
    const { title, steps, actuators, pressures, coils } = this.#chart;
    this.#text({ x: 0, y: 0 }, title, 1.9, 'start', 600);
    let y = 2.2;
    const header = headerOf(
      steps.map(({ name, start, end }, i) => ({ name, from: this.#x(i, start), to: this.#end(i, end) })),
      SMALL,
    );
    for (const { at, text, row } of header.labels)
      this.#text({ x: at, y: y + 1.2 + row * 1.6 }, text, SMALL, 'middle', 500);
    y += header.rows * 1.6 + 0.6;
    const top = y;
    const rows = actuators.map((actuator) => {
      const at = y + 0.8;
      this.#actuator(actuator, at);
      y += ROW.actuator + GAP;
      return at;
    });
    for (const pressure of pressures) {
      this.#pressure(pressure.label, pressure.spans, y + 0.8);
      y += ROW.pressure + GAP;
    }
    for (const coil of coils) {
      this.#coil(coil.label, coil.spans, y);
      y += ROW.coil;
    }
    const plot = { x: this.#left, y: top, width: this.#width, height: y + 0.3 - top };
    this.#boundaries(top, y + 0.3);
    this.#signals(rows);
    y = this.#axis(y + 0.3);
    for (const line of header.legend) {
      y += 1.7;
      for (const { text, at } of line) this.#text({ x: at, y }, text, SMALL, 'start', 400);
    }
    return {
      title,
      bounds: { x: 0, y: -1.9, width: this.#left + this.#width + 3, height: y + 3 },
      primitives: this.#out,
      plot,
    };
  }

  /** Where a moment of a step stands. */
  #x(step: number, time: number): number {
    return momentX(this.#chart, this.#kind, { x: this.#left, y: 0, width: this.#width, height: 0 }, step, time);
  }

  /** Where a span of a step ends; a step without any time still has its width in a step diagram. */
  #end(step: number, time: number): number {
    const { start = 0, end = 0 } = this.#chart.steps[step] ?? {};
    return this.#kind === 'step' && end <= start ? this.#x(step + 1, end) : this.#x(step, time);
  }

  #line(points: readonly Point[], pen: Pen): void {
    this.#out.push({ type: 'polyline', points, pen });
  }

  #across(y: number, pen: Pen): void {
    this.#line(
      [
        { x: this.#left, y },
        { x: this.#left + this.#width, y },
      ],
      pen,
    );
  }

  #text(at: Point, text: string, size: number, align: 'start' | 'middle' | 'end', weight: 400 | 500 | 600): void {
    if (text !== '') this.#out.push({ type: 'text', at, text, size, align, weight, tone: 'ink' });
  }

  #label(text: string, middle: number, lines: number): void {
    const broken = wrapped(text, TEXT, Math.min(MOST_LABEL, this.#left - SCALE_ROOM), lines);
    broken.forEach((line, i) =>
      this.#text({ x: 0, y: middle + 0.5 + (i - (broken.length - 1) / 2) * 1.7 }, line, TEXT, 'start', 600),
    );
  }

  /** Thin lines at the given shares of a row from its lower edge, each with its word at the left. */
  #scale(y: number, height: number, marks: readonly { readonly share: number; readonly word: string }[]): void {
    for (const { share, word } of marks) {
      const at = y + height * (1 - share);
      this.#across(at, 'hair');
      this.#text({ x: this.#left - 0.6, y: at + 0.4 }, word, SMALL, 'end', 400);
    }
  }

  #curve(spans: readonly ChartSpan[], place: (value: number) => number): void {
    let points: Point[] = [];
    const end = (): void => {
      if (points.length > 1) this.#line(points, 'trace');
      points = [];
    };
    for (const span of spans) {
      if (!Number.isFinite(span.start) || !Number.isFinite(span.end)) {
        end();
        continue;
      }
      for (const point of [
        { x: this.#x(span.step, span.from), y: place(span.start) },
        { x: this.#end(span.step, span.to), y: place(span.end) },
      ]) {
        const last = points.at(-1);
        if (!last || last.x !== point.x || last.y !== point.y) points.push(point);
      }
    }
    end();
  }

  #actuator({ label, spans, rotary, stroke }: ChartActuator, y: number): void {
    this.#label(label, y + ROW.actuator / 2, 3);
    const marks = rotary
      ? [
          { share: 1, word: 'A→B' },
          { share: 0.5, word: 'rest' },
          { share: 0, word: 'B→A' },
        ]
      : [
          { share: 1, word: stroke ?? 'out' },
          { share: 0, word: stroke === undefined ? 'in' : '0' },
        ];
    this.#scale(y, ROW.actuator, marks);
    this.#curve(spans, (value) => y + ROW.actuator * (rotary ? (1 - value) / 2 : 1 - value));
  }

  #pressure(label: string, spans: readonly ChartSpan[], y: number): void {
    const { value: most, label: word } = this.#chart.pressureTop;
    this.#label(label, y + ROW.pressure / 2, 2);
    this.#scale(y, ROW.pressure, [
      { share: 1, word },
      { share: 0, word: '0' },
    ]);
    this.#curve(spans, (value) => y + ROW.pressure * (1 - Math.min(1, Math.max(0, most > 0 ? value / most : 0))));
  }

  #coil(label: string, spans: readonly ChartSpan[], y: number): void {
    const middle = y + ROW.coil / 2;
    this.#label(label, middle, 1);
    this.#across(middle, 'hair');
    let [from, to] = [NaN, NaN];
    const bar = (): void => {
      if (to >= from)
        this.#out.push({
          type: 'box',
          x: from,
          y: middle - 0.45,
          width: Math.max(0.2, to - from),
          height: 0.9,
          pen: 'unseen',
          fill: 'ink',
        });
    };
    for (const span of spans) {
      const [a, b] = [this.#x(span.step, span.from), this.#end(span.step, span.to)];
      if (Math.abs(a - to) < 1e-9) {
        to = b;
        continue;
      }
      bar();
      [from, to] = [a, b];
    }
    bar();
  }

  #boundaries(top: number, bottom: number): void {
    const { steps } = this.#chart;
    const at = [...steps.map(({ start }, i) => this.#x(i, start)), this.#left + this.#width];
    const dashed = [...new Set(at)].map((x): Primitive => ({
      type: 'polyline',
      points: [
        { x, y: top },
        { x, y: bottom },
      ],
      pen: 'boundary',
    }));
    // Under the curves, so that they stay whole.
    this.#out.unshift(...dashed);
  }

  /** From the motions that end a step to those that begin the next, with a dot where the signal comes from. */
  #signals(rows: readonly number[]): void {
    const { steps, actuators } = this.#chart;
    const spansOf = (actuator: number, step: number): ChartSpan[] =>
      (actuators[actuator]?.spans ?? []).filter((span) => span.step === step);
    const moves = (span: ChartSpan | undefined): boolean => span !== undefined && span.start !== span.end;
    const height = (actuator: number, value: number): number =>
      (rows[actuator] ?? 0) + ROW.actuator * (actuators[actuator]?.rotary === true ? (1 - value) / 2 : 1 - value);
    for (let step = 0; step + 1 < steps.length; step++) {
      const x = this.#x(step + 1, steps[step + 1]?.start ?? 0);
      const ends = rows.flatMap((_, i) => {
        const last = spansOf(i, step).findLast((span) => span.to > span.from);
        return last && moves(last) ? [{ x, y: height(i, last.end) }] : [];
      });
      const starts = rows.flatMap((_, i) => {
        const first = spansOf(i, step + 1).find((span) => span.to > span.from);
        const turned = actuators[i]?.rotary === true && first && first.start !== spansOf(i, step).at(-1)?.start;
        return first && (moves(first) || turned === true) ? [{ x, y: height(i, first.start) }] : [];
      });
      for (const from of ends) {
        for (const to of starts) if (Math.abs(to.y - from.y) > 0.5) this.#signal(from, to);
      }
    }
  }

  #signal(from: Point, to: Point): void {
    const down = Math.sign(to.y - from.y);
    this.#line([from, to], 'fine');
    this.#out.push({ type: 'circle', centre: from, radius: 0.35, pen: 'unseen', fill: 'ink' });
    const head = [to, { x: to.x - 0.35, y: to.y - down }, { x: to.x + 0.35, y: to.y - down }];
    this.#out.push({ type: 'polyline', points: head, pen: 'unseen', closed: true, fill: 'ink' });
  }

  /** Times below: round ones, or those of the step boundaries as far as there is room. */
  #axis(y: number): number {
    const { steps } = this.#chart;
    const ticks =
      this.#kind === 'time'
        ? niceTicks(this.#total, 10).map((time) => ({ x: this.#x(0, time), time }))
        : [
            ...steps.map(({ start }, i) => ({ x: this.#x(i, start), time: start })),
            { x: this.#left + this.#width, time: this.#total },
          ];
    let free = -Infinity;
    for (const { x, time } of ticks) {
      this.#line(
        [
          { x, y },
          { x, y: y + 0.6 },
        ],
        'fine',
      );
      const text = `${+time.toPrecision(3)}`;
      const { width } = fitted(text, SMALL);
      if (x - width / 2 < free) continue;
      this.#text({ x, y: y + 2 }, text, SMALL, 'middle', 400);
      free = x + width / 2 + 0.5;
    }
    this.#across(y, 'fine');
    this.#text({ x: 0, y: y + 2 }, 'Time in s', SMALL, 'start', 400);
    return y + 2.6;
  }
}
