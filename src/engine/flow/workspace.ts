import { newPoint } from './assemble.ts';
import type { FlowSystem, Point } from './assemble.ts';

/** Numbers of one piece in `ray`: excess of the drive over the corner, its change per step, r, k, bound. */
export const PIECE = 5;

/** Arrays that one solver needs; made once, so that the iteration allocates nothing. */
export interface Workspace {
  now: Point;
  next: Point;
  readonly step: Float64Array;
  readonly simplified: Float64Array;
  /** For the line search: the pieces of laws that the step meets, and the slope that all others give together. */
  readonly ray: Float64Array;
  readonly along: { pieces: number; constant: number; linear: number; rise: number };
  readonly counts: { iterations: number; evaluations: number; rays: number };
}

export const newWorkspace = (system: FlowSystem): Workspace => ({
  now: newPoint(system),
  next: newPoint(system),
  step: new Float64Array(system.n + 1),
  simplified: new Float64Array(system.n + 1),
  ray: new Float64Array(PIECE * (2 * system.m + system.n)),
  along: { pieces: 0, constant: 0, linear: 0, rise: 0 },
  counts: { iterations: 0, evaluations: 0, rays: 0 },
});

/** What an iteration may spend. */
export interface Limits {
  readonly cancelled: () => boolean;
  readonly iterations: number;
}

export type Outcome = 'converged' | 'runs away' | 'stuck' | 'cancelled';
