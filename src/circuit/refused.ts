import type { Problem } from '../base/result.ts';

/** An edit that does not fit the circuit; `problem` is fit to be shown. */
export class RefusedEdit extends Error {
  readonly problem: Problem;

  constructor(where: string, what: string, remedy: string) {
    super(`${where}: ${what} ${remedy}`);
    this.name = 'RefusedEdit';
    this.problem = { where, what, remedy };
  }
}
