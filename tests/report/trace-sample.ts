import type { PlanTrace, TraceSample } from '../../src/analysis/plan-results.ts';

export interface SampleStep {
  readonly name: string;
  /** Actuator → where it goes, as a share of its stroke; of a motor, 1, 0 or -1. */
  readonly to: Readonly<Record<number, number>>;
  readonly coils: readonly number[];
  /** s. */
  readonly takes: number;
}

/** A trace with two samples for each step: as it begins, and half-way on with another pressure. Invented numbers. */
export function sampleTrace(
  labels: readonly string[],
  coilNames: readonly string[],
  steps: readonly SampleStep[],
  motors: readonly number[] = [],
): PlanTrace {
  const stroke = 0.4;
  const samples: TraceSample[] = [];
  const traced: PlanTrace['steps'][number][] = [];
  let time = 0;
  let at = labels.map(() => 0);
  steps.forEach(({ name, to, coils, takes }, step) => {
    const goal = at.map((here, i) => (to[i] === undefined || motors.includes(i) ? here : stroke * to[i]));
    traced.push({ id: `s${step + 1}`, name, start: time, end: time + takes, first: samples.length });
    const speeds = at.map((here, i) =>
      motors.includes(i) ? 10 * (to[i] ?? 0) : takes > 0 ? ((goal[i] as number) - here) / takes : 0,
    );
    for (const share of takes > 0 ? [0, 0.5] : [0]) {
      samples.push({
        time: time + share * takes,
        step,
        events: [],
        strokes: at.map((here, i) => here + share * ((goal[i] as number) - here)),
        speeds,
        pressures: [40e5 + 1e7 * share + step * 5e5, step % 3 === 2 ? 120e5 : 10e5],
        positions: [],
        coils: coilNames.map((_, i) => coils.includes(i)),
        running: [true],
        stored: [],
        switches: [],
        powerIn: 0,
        powerLost: 0,
      });
    }
    time += takes;
    at = goal;
  });
  const last = samples.at(-1) as TraceSample;
  samples.push({ ...last, time, strokes: at, speeds: at.map(() => 0) });
  return {
    actuators: labels.map((label, i) => ({
      part: label,
      label,
      rotary: motors.includes(i),
      ...(!motors.includes(i) && { stroke }),
    })),
    valves: [],
    coils: coilNames.map((name) => ({ part: 'V', label: 'V', name })),
    pumps: [],
    accumulators: [],
    switches: [],
    lines: ['supply', 'CLAMP.A'],
    steps: traced,
    samples,
  };
}
