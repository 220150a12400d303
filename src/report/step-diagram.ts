import type { PlanTrace } from '../analysis/results.ts';
import { coilNames } from '../base/coil-names.ts';
import type { UnitSystem } from '../base/units.ts';
import { defaultUnit, formatNumber, formatQuantity, fromUnit, toUnit } from '../base/units.ts';
import { niceCeiling } from '../drawing/diagram-text.ts';
import type { ChartActuator, ChartSpan, DiagramKind, StepChart } from '../drawing/step-diagram.ts';
import { stepDiagram } from '../drawing/step-diagram.ts';
import type { SvgOptions } from './svg.ts';
import { drawingToSvg } from './svg.ts';

export interface StepDiagramOptions {
  readonly kind: DiagramKind;
  readonly units: UnitSystem;
  readonly theme: SvgOptions['theme'];
  readonly standalone: boolean;
  /** Names of the lines whose pressures are drawn, in this order; names that there are not are left out. */
  readonly lines: readonly string[];
}

/** A plan as it was played, as a displacement-step or displacement-time diagram in SVG. */
export function stepDiagramSvg(title: string, trace: PlanTrace, options: StepDiagramOptions): string {
  const chart = stepChart(title, trace, options);
  const time = chart.steps.at(-1)?.end ?? 0;
  return drawingToSvg(stepDiagram(chart, options.kind), {
    theme: options.theme,
    standalone: options.standalone,
    description: `${chart.steps.length} steps in ${formatNumber(time, 3)} s; ${chart.actuators.map(({ label }) => label).join(', ')}.`,
  });
}

/** What the diagram shows of a trace: actuators that move at any time, or all if none does; all coils. */
export function stepChart(
  title: string,
  trace: PlanTrace,
  { units, lines }: Pick<StepDiagramOptions, 'units' | 'lines'>,
): StepChart {
  const spans = spansOf(trace);
  const actuators = trace.actuators.map(({ label, rotary, stroke }, i): ChartActuator => {
    const isMotor = rotary || stroke === undefined || stroke <= 0;
    const travel = Math.max(...trace.samples.map(({ strokes }) => Math.abs(strokes[i] ?? 0)), 1e-9);
    return {
      label,
      rotary,
      ...(!isMotor && { stroke: formatQuantity(stroke, 'length', units, { digits: 3 }) }),
      spans: spans.map((span) => {
        const way = Math.sign(span.sample.speeds[i] ?? 0);
        if (rotary) return { ...span.place, start: way, end: way };
        const whole = isMotor ? travel : stroke;
        return {
          ...span.place,
          start: (span.sample.strokes[i] ?? 0) / whole,
          end: (span.next.strokes[i] ?? 0) / whole,
        };
      }),
    };
  });
  const moving = actuators.filter(({ spans: s, rotary }) =>
    s.some(({ start, end }) => (rotary ? start !== 0 : start !== end)),
  );
  const pressures = lines.flatMap((name) => {
    const line = trace.lines.indexOf(name);
    if (line < 0) return [];
    return [
      {
        label: name,
        spans: spans.map(({ place, sample }) => {
          const value = sample.pressures[line] ?? NaN;
          return { ...place, start: value, end: value };
        }),
      },
    ];
  });
  const most = Math.max(
    0,
    ...pressures.flatMap(({ spans: s }) => s.map(({ start }) => (Number.isFinite(start) ? start : 0))),
  );
  const unit = defaultUnit('pressure', units);
  const top = fromUnit(niceCeiling(toUnit(Math.max(most, 1e5), 'pressure', unit)), 'pressure', unit);
  return {
    title,
    steps: trace.steps.map(({ name, start, end }) => ({ name, start, end })),
    actuators: moving.length > 0 ? moving : actuators,
    pressures,
    pressureTop: { value: top, label: formatQuantity(top, 'pressure', units, { digits: 3 }) },
    coils: coilNames(trace.coils).map((label, i) => ({
      label,
      spans: spans.flatMap(({ place, sample }) => (sample.coils[i] === true ? [{ ...place, start: 1, end: 1 }] : [])),
    })),
  };
}

type Sample = PlanTrace['samples'][number];

/** From each sample to the next one of its step; the step's last runs to where the next step begins. */
function spansOf({ steps, samples }: PlanTrace): {
  readonly place: Pick<ChartSpan, 'step' | 'from' | 'to'>;
  readonly sample: Sample;
  readonly next: Sample;
}[] {
  return steps.flatMap(({ first, end }, step) => {
    const after = steps[step + 1]?.first ?? samples.length;
    return samples.slice(first, after).map((sample, k) => {
      const next = samples[first + k + 1] ?? sample;
      const to = first + k + 1 < after ? next.time : Math.max(sample.time, end);
      return { place: { step, from: sample.time, to }, sample, next };
    });
  });
}
