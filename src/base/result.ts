/** One thing wrong with an input: where it stands, what is wrong, what to do about it. */
export interface Problem {
  /** Path in the file or part and port, e.g. `parts[3].settings.flow` or `V1.A`. */
  readonly where: string;
  readonly what: string;
  readonly remedy: string;
}

export type Result<T> =
  | { readonly ok: true; readonly value: T; readonly warnings: readonly Problem[] }
  | { readonly ok: false; readonly problems: readonly Problem[] };

export const good = <T>(value: T, warnings: readonly Problem[] = []): Result<T> => ({ ok: true, value, warnings });
export const bad = (...problems: Problem[]): Result<never> => ({ ok: false, problems });

/** `parts[3].kind: unknown kind "pmup". Use one of …` */
export const sayProblem = (p: Problem): string => `${p.where}: ${p.what} ${p.remedy}`;
