/**
 * The law of every branch: drive `u` (Pa for a path, N for a cylinder, N·m for a motor) against
 * through-put `x` (m³/s, m/s, rad/s):
 *
 *   x > 0:  u = forward  + r·x + k·x²        with x ≤ hi (beyond it any larger drive)
 *   x < 0:  u = backward + r·x − k·x²        with x ≥ lo (beyond it any smaller drive)
 *   x = 0:  backward ≤ u ≤ forward
 *
 * It is monotone when backward ≤ forward, r > 0 and k ≥ 0. A cylinder is one such branch: load and
 * friction make its two directions start at different drives, which is the same as two one-sided
 * branches but costs one evaluation.
 */
export interface Law {
  readonly forward: number;
  readonly backward: number;
  readonly r: number;
  readonly k: number;
  readonly lo: number;
  readonly hi: number;
}

const LITRE_PER_MINUTE = 1e-3 / 60;
const BAR = 1e5;

/**
 * Small constants of the near-ideal laws. Each is small enough not to show in four digits of any
 * sensible circuit and large enough that rounding of a 1000 bar pressure stays below the residual asked for.
 */
export const NEAR_IDEAL = {
  /** m³/s per Pa to tank from every line: picks the least pressure of a cut-off line (1e-7 L/min per bar). */
  leak: (1e-7 * LITRE_PER_MINUTE) / BAR,
  /** Pa per m³/s: how far a line dips below tank pressure while void forms (1 mbar at 100 L/min). */
  void: 100 / (100 * LITRE_PER_MINUTE),
  /** Laminar share of a path's rated drop: without it the drop would have no slope at rest. */
  laminarShare: 1e-4,
  /** Pa per m³/s: no path is flatter at rest, or rounding would show in its flow (10 Pa at 60 L/min). */
  leastSlope: 1e4,
  /** Rated drop of a path for which none is given: 0.01 bar at 100 L/min. */
  pathDrop: 0.01 * BAR,
  pathFlow: 100 * LITRE_PER_MINUTE,
  /** Relief override where none is given, Pa per m³/s: 0.01 bar at 60 L/min. */
  override: (0.01 * BAR) / (60 * LITRE_PER_MINUTE),
  /** Share of its setting over which a compensated pump goes from full flow to none. */
  compensatorBand: 1e-4,
  /** Pressure loss in the seals of a cylinder per speed, Pa per m/s. */
  cylinderDrag: 100,
  /** The same for a motor, Pa per rad/s. */
  motorDrag: 1,
  /** Pa that bring the ball of a shuttle valve over, and Pa per m³/s that keep it away: 120 L/min pass where both inlets are alike. */
  ball: 0.2 * BAR,
  ballGradient: (0.1 * BAR) / (60 * LITRE_PER_MINUTE),
  /** Pilot-sensed valves where no override is given, Pa per m³/s: 2 bar at 60 L/min. */
  pilotGradient: (2 * BAR) / (60 * LITRE_PER_MINUTE),
} as const;

/** Orders of magnitude past which an answer is no steady state of a real circuit. */
export const SANE = {
  /** Pa: nothing hydraulic stands above 10 000 bar. */
  pressure: 1e9,
  /** m/s of a cylinder. */
  speed: 100,
  /** rad/s of a motor. */
  rotation: 1e5,
} as const;

/** Through-put at drive `u`. */
export function throughput(law: Law, u: number): number {
  const { forward, backward, r, k, lo, hi } = law;
  if (u > forward) {
    const t = u - forward;
    return Math.min(hi, Math.max(lo, (2 * t) / (r + Math.sqrt(r * r + 4 * k * t))));
  }
  if (u < backward) {
    const t = backward - u;
    return Math.max(lo, Math.min(hi, (-2 * t) / (r + Math.sqrt(r * r + 4 * k * t))));
  }
  return Math.min(hi, Math.max(lo, 0));
}
