/** What a long computation may spend, and how it says how far it is. Engines take it as an argument. */
export interface Budget {
  /** True once the caller has given up; engines look at it between blocks of work. */
  readonly cancelled: () => boolean;
  /** Called with a share from 0 to 1. */
  readonly progress: (share: number) => void;
}

export class Cancelled extends Error {
  constructor() {
    super('The work was cancelled.');
    this.name = 'Cancelled';
  }
}

export const unlimited: Budget = { cancelled: () => false, progress: () => {} };

/** The budget of a stretch of the work. */
export const part = (budget: Budget, from: number, to: number): Budget => ({
  cancelled: budget.cancelled,
  progress: (share) => budget.progress(from + share * (to - from)),
});
