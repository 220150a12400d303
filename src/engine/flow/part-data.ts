import { NEAR_IDEAL } from './laws.ts';
import type { Load } from './problem.ts';

/**
 * Loss of a path: `flow` m³/s at `drop` Pa, turbulent (Δp ∝ q²); `laminar` Pa per m³/s adds to it.
 * Either may be left out; with neither it is nearly lossless.
 */
export interface Loss {
  readonly flow?: number;
  readonly drop?: number;
  readonly laminar?: number;
}

export interface CylinderData {
  /** m²; `areaB` 0 for a single-acting cylinder whose other side breathes (`b` = TANK). */
  readonly areaA: number;
  readonly areaB: number;
  readonly load?: Load;
  /** Where it stands; absent = between its stops. */
  readonly at?: 'in' | 'out';
  /** Viscous drag, N per m/s. */
  readonly drag?: number;
  /** Loss in each of its ports and hoses; without it nothing slows down two loads that work against each other. */
  readonly ports?: Loss;
}

export interface MotorData {
  /** m³/rad */
  readonly displacement: number;
  readonly load?: Load;
  /** m³/s per Pa from A to B. */
  readonly leakage?: number;
  /** m³/s per Pa from each port to the case drain. */
  readonly drainLeakage?: number;
  /** Line of the case drain; tank when absent. */
  readonly drain?: number;
  /** Viscous drag, N·m per rad/s. */
  readonly drag?: number;
}

/** Pressure-opened valves: `setting` Pa, `gradient` Pa per m³/s of opening, `reference` = line whose pressure is subtracted. */
export interface ValveData {
  readonly setting: number;
  readonly gradient?: number;
  readonly reference?: number;
  readonly loss?: Loss;
}

/** r and k of a turbulent loss; the small laminar share gives it a slope at rest. */
export function lossOf(loss: Loss = {}): { r: number; k: number } {
  if (loss.flow === undefined || loss.drop === undefined) {
    const r = loss.laminar ?? NEAR_IDEAL.pathDrop / NEAR_IDEAL.pathFlow;
    return { r, k: 0 };
  }
  return {
    r: loss.laminar ?? Math.max(NEAR_IDEAL.leastSlope, (NEAR_IDEAL.laminarShare * loss.drop) / loss.flow),
    k: loss.drop / (loss.flow * loss.flow),
  };
}
