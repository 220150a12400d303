/** Why a sample was taken: what happens at that moment. Numbers are indices of the network. */
export type TraceEvent =
  /** A step begins: its commands are given. */
  | { readonly kind: 'step'; readonly step: number }
  /** A step's end condition is met. */
  | { readonly kind: 'step end'; readonly step: number }
  /** An actuator begins to move, changes its speed or comes to rest between its stops. */
  | { readonly kind: 'speed'; readonly actuator: number }
  | { readonly kind: 'stop'; readonly actuator: number; readonly at: 'in' | 'out' }
  /** The travel that a sensor of the plan or a roller stands at. */
  | { readonly kind: 'travel'; readonly actuator: number }
  /** A dependent valve takes another position. */
  | { readonly kind: 'valve'; readonly dependent: number; readonly position: number }
  | { readonly kind: 'switch'; readonly switch: number; readonly on: boolean }
  | { readonly kind: 'accumulator'; readonly accumulator: number; readonly is: 'empty' | 'full' }
  /** A force or gas pressure that changes with the travel is taken anew; nothing else happens. */
  | { readonly kind: 'stage' };

/** A moment of a plan. Speeds, pressures and positions hold from here to the next sample; strokes run straight to it. */
export interface TraceSample {
  /** s from the start of the plan. */
  readonly time: number;
  /** Index of the step that runs. */
  readonly step: number;
  readonly events: readonly TraceEvent[];
  /** Per actuator, m from the inner stop; a motor: rad since the start. */
  readonly strokes: readonly number[];
  /** m/s or rad/s, outwards positive. */
  readonly speeds: readonly number[];
  /** Pa per shown line; empty where there is no steady state. */
  readonly pressures: readonly number[];
  /** Position of every input, then of every dependent valve. */
  readonly positions: readonly number[];
  /** Per coil of the trace's list: on. */
  readonly coils: readonly boolean[];
  /** Per pump: running. */
  readonly running: readonly boolean[];
  /** Per accumulator: m³ of oil in it. */
  readonly stored: readonly number[];
  /** Per pressure switch: on. */
  readonly switches: readonly boolean[];
  /** W that the pumps give, and that turn into heat. */
  readonly powerIn: number;
  readonly powerLost: number;
}
