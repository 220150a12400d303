import type { Problem } from '../../base/result.ts';
import type { Circuit } from '../../circuit/model.ts';

export interface Unreadable {
  /** Rule id → what is wrong with it; `where` is the place in its text. */
  readonly found: ReadonlyMap<string, Problem>;
  /** Problems that are about no single rule. */
  readonly others: readonly Problem[];
  /** The circuit less these rules. */
  readonly rest: Circuit;
}

/** Sorts the problems of a check (`rules[2], column 7`) by the rules they are about. */
export function unreadable(circuit: Circuit, problems: readonly Problem[]): Unreadable {
  const found = new Map<string, Problem>();
  const others: Problem[] = [];
  for (const problem of problems) {
    const [, index, where = ''] = /^rules\[(\d+)\](?:, )?(.*)$/.exec(problem.where) ?? [];
    const rule = index === undefined ? undefined : circuit.rules?.[Number(index)];
    if (!rule) others.push(problem);
    else if (!found.has(rule.id)) found.set(rule.id, { ...problem, where });
  }
  return { found, others, rest: { ...circuit, rules: (circuit.rules ?? []).filter(({ id }) => !found.has(id)) } };
}
