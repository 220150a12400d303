import type { Conditions, PlanTrace } from '../../worker/client.ts';

/** A moment of a step plan as it was played: what the sheet shows in place of what the row says. SI. */
export interface Moment {
  /** s from the start of the plan. */
  readonly time: number;
  /** Part id → 0 in, 1 out; motors are left out. */
  readonly strokes: ReadonlyMap<string, number>;
  /** Part id → m/s or rad/s, outwards positive. */
  readonly speeds: ReadonlyMap<string, number>;
  /** Name of a line → Pa. */
  readonly pressures: ReadonlyMap<string, number>;
  /** Part id → where its valve, or its main spool, stands. */
  readonly positions: ReadonlyMap<string, { readonly index: number; readonly name: string }>;
  /** Part id → position of its lever or coils. */
  readonly levers: ReadonlyMap<string, number>;
  readonly conditions: Conditions;
}

/** Share of a stroke that counts as nothing: so near a stop it is at the stop. */
export const AT_STOP = 1e-6;

/** What stood at a time within this sample and the next; undefined = there is no such sample. */
export function momentOf(trace: PlanTrace, index: number, time: number, loadCase?: string): Moment | undefined {
  const sample = trace.samples[index];
  if (!sample) return undefined;
  const next = trace.samples[index + 1];
  const span = next ? next.time - sample.time : 0;
  const share = next && span > 0 ? Math.min(1, Math.max(0, (time - sample.time) / span)) : 0;
  const strokes = new Map<string, number>();
  const places: Record<string, 'in' | 'out'> = {};
  trace.actuators.forEach(({ part, stroke, rotary }, i) => {
    if (rotary || stroke === undefined || stroke <= 0) return;
    const from = sample.strokes[i] ?? 0;
    const at = (from + share * ((next?.strokes[i] ?? from) - from)) / stroke;
    strokes.set(part, at);
    const speed = sample.speeds[i] ?? 0;
    if (at < AT_STOP && speed <= 0) places[part] = 'in';
    else if (at > 1 - AT_STOP && speed >= 0) places[part] = 'out';
  });
  return {
    time,
    strokes,
    speeds: new Map(trace.actuators.map(({ part }, i) => [part, sample.speeds[i] ?? 0])),
    pressures: new Map(
      trace.lines.flatMap((name, i) => {
        const pressure = sample.pressures[i];
        return pressure === undefined ? [] : [[name, pressure] as const];
      }),
    ),
    positions: new Map(
      trace.valves.map(({ part, positions }, i) => {
        const at = sample.positions[i] ?? 0;
        return [part, { index: at, name: positions[at] ?? '' }];
      }),
    ),
    // Of a two-stage valve the pilot stage comes first in the list, and the main spool after it.
    levers: new Map(trace.valves.map(({ part }, i) => [part, sample.positions[i] ?? 0] as const).reverse()),
    conditions: {
      pumps: sample.running.length === 0 || sample.running.some(Boolean) ? 'running' : 'stopped',
      places,
      ...(loadCase !== undefined && { loadCase }),
    },
  };
}
