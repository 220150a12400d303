import { newPoint } from './assemble.ts';
import type { FlowSystem, Point } from './assemble.ts';

/** Arrays that one solver needs; made once, so that the iteration allocates nothing. */
export interface Workspace {
  now: Point;
  next: Point;
  readonly step: Float64Array;
  readonly simplified: Float64Array;
  /** For the line search: drive and its change along the step of each active branch, then three sums. */
  readonly ray: Float64Array;
  readonly counts: { iterations: number; evaluations: number; rays: number };
}

export const newWorkspace = (system: FlowSystem): Workspace => ({
  now: newPoint(system),
  next: newPoint(system),
  step: new Float64Array(system.n + 1),
  simplified: new Float64Array(system.n + 1),
  ray: new Float64Array(2 * system.m + 3),
  counts: { iterations: 0, evaluations: 0, rays: 0 },
});

/** What an iteration may spend. */
export interface Limits {
  readonly cancelled: () => boolean;
  readonly iterations: number;
}

export type Outcome = 'converged' | 'runs away' | 'stuck' | 'cancelled';
