import { sayProblem } from '../base/result.ts';
import type { Problem } from '../base/result.ts';

/** What the shell is told. */
export const EXIT = { done: 0, checkFailed: 1, badInput: 2, ownFault: 70 } as const;

/** Ends the command with one line on the error stream and exit code 2. */
export class Failure extends Error {
  override readonly name = 'Failure';
}

/** `rig.spool.json: parts[3].kind: … (and 2 more)` */
export function sayProblems(file: string, problems: readonly Problem[]): string {
  const [first] = problems;
  const more = problems.length > 1 ? ` (and ${problems.length - 1} more)` : '';
  return `${file}: ${first ? sayProblem(first) : 'something is wrong with it.'}${more}`;
}

export const messageOf = (error: unknown): string => (error instanceof Error ? error.message : String(error));

export function codeOf(error: unknown): string | undefined {
  return error instanceof Error && 'code' in error && typeof error.code === 'string' ? error.code : undefined;
}
