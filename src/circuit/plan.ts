/** A step plan: what is commanded step by step, what should move, and what ends each step. As in the file; nothing is computed. */
export interface StepPlan {
  readonly id: string;
  readonly name: string;
  /** Where actuators stand before the first step, by part id: `in`, `out`, or a distance from in (`"120 mm"`); absent = `in`. */
  readonly start?: Readonly<Record<string, string>>;
  /** Where valves without a rest stand before the first step: part id → position name; absent = the first position. */
  readonly standing?: Readonly<Record<string, string>>;
  /** Id of the load case that it is played under; absent = the loads of the parts. */
  readonly loadCase?: string;
  readonly steps: readonly PlanStep[];
  readonly extra?: Readonly<Record<string, unknown>>;
}

export interface PlanStep {
  /** Unique within its plan. */
  readonly id: string;
  readonly name?: string;
  /** Coils on during the step, `V1.a` (part id, coil name); all others are off. */
  readonly coils?: readonly string[];
  /**
   * Valves held in a position by hand during the step: part id → position name. One that is not named goes
   * to its rest, or stays where it was left if it has none.
   */
  readonly levers?: Readonly<Record<string, string>>;
  /** Pumps that stand still during the step, part ids. */
  readonly stopped?: readonly string[];
  /**
   * Motions in trade notation, labels of actuators with + (out) or - (in), one after another: `CLAMP+ DRILL+`;
   * in parentheses in any order: `(CLAMP- DRILL-)`. Absent = nothing is to move.
   */
  readonly expect?: string;
  readonly ends: StepEnd;
  /** Time that the step may take at most (`"20 s"`); absent = what the checker allows every step. */
  readonly within?: string;
  readonly extra?: Readonly<Record<string, unknown>>;
}

export type StepEnd = (
  | /** Every expected motion has come to its end stop; if none is expected, nothing moves any more and no accumulator fills or empties. */
    { readonly by: 'motion' }
    /** A sensor on an actuator (part id): `in`, `out`, or a distance from in. */
  | { readonly by: 'sensor'; readonly actuator: string; readonly at: string }
  /** A pressure switch (part id) goes over its setting, or back under it. */
  | { readonly by: 'pressure'; readonly switch: string; readonly turns: 'on' | 'off' }
  | { readonly by: 'time'; readonly after: string }
) & { readonly extra?: Readonly<Record<string, unknown>> };
