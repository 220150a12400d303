import type { Budget } from '../base/budget.ts';
import { Cancelled, part } from '../base/budget.ts';
import { bad, good } from '../base/result.ts';
import type { Problem, Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import { TooManyNodes } from '../engine/paths/diagrams/diagrams.ts';
import { settledPathSets } from '../engine/paths/diagrams/settled-paths.ts';
import { checkRule, checkRuleByPaths } from '../engine/table/rules/answer.ts';
import type { RuleAnswer } from '../engine/table/rules/answer.ts';
import { figuresIn } from '../engine/table/rules/condition.ts';
import type { Rule } from '../engine/table/rules/condition.ts';
import { namesOfNetwork } from '../engine/table/rules/names.ts';
import { parseRule } from '../engine/table/rules/parse.ts';
import { NeedsTable } from '../engine/table/rules/sources.ts';
import type { TableData } from '../engine/table/table-data.ts';
import { MOST_ROWS, networkOf, pathConditions, tabulate } from './analyse.ts';
import { figuresFor, tooManyToSolve } from './ask.ts';
import type { Check, CheckedRule } from './check-results.ts';
import { followersOf } from './outcomes.ts';
import type { Conditions } from './results.ts';

/** A rule as it was typed. */
export interface GivenRule {
  readonly id?: string;
  readonly text: string;
  /** Where it stands, for messages: `rules[2]`, `--rule 1`. */
  readonly where: string;
}

/** The rules of a circuit document. */
export const rulesOf = (circuit: Circuit): GivenRule[] =>
  (circuit.rules ?? []).map(({ id, text }, i) => ({ id, text, where: `rules[${i}]` }));

/** What is wrong with a rule's text, without checking it; empty if it can be read. */
export function ruleProblems(circuit: Circuit, text: string): readonly Problem[] {
  const read = parseRule(text, namesOfNetwork(networkOf(circuit)));
  return read.ok ? [] : read.problems;
}

/**
 * Checks every rule against every combination. Rules that cannot be read, or not be decided for a panel
 * of this size, are problems; then nothing is checked. `table`: the table of these conditions, if it is there already.
 * Throws `Cancelled` when the budget says so.
 */
export function checkRules(
  circuit: Circuit,
  conditions: Conditions,
  given: readonly GivenRule[],
  budget: Budget,
  table?: TableData,
): Result<Check> {
  const net = networkOf(circuit, conditions);
  const names = namesOfNetwork(net);
  const problems: Problem[] = [];
  const read: { readonly given: GivenRule; readonly rule: Rule }[] = [];
  for (const one of given) {
    const parsed = parseRule(one.text, names);
    if (parsed.ok) read.push({ given: one, rule: parsed.value });
    else problems.push(...parsed.problems.map((p) => ({ ...p, where: `${one.where}, ${p.where}` })));
  }
  if (problems.length > 0) return bad(...problems);

  const listed = names.inputs.reduce((n, input) => n * input.positions.length, 1) <= MOST_ROWS;
  let answerTo: (rule: Rule) => RuleAnswer;
  if (listed) {
    const count = names.inputs.reduce((n, input) => n * input.positions.length, 1);
    const unsolved = tooManyToSolve(
      count,
      read.flatMap(({ rule }) => figuresIn(rule.breaks)),
    );
    if (unsolved) return bad(unsolved);
    const data = table ?? tabulate(circuit, conditions, part(budget, 0, 0.6));
    const figure = figuresFor(
      circuit,
      conditions,
      data,
      read.flatMap(({ rule }) => figuresIn(rule.breaks)),
      part(budget, table ? 0 : 0.6, 0.9),
    );
    if (!figure.ok) return figure;
    answerTo = (rule) => checkRule(data, rule, figure.value);
  } else {
    const where = pathConditions(net, conditions);
    const heartbeat = (): void => {
      if (budget.cancelled()) throw new Cancelled();
    };
    try {
      const paths = settledPathSets(net, where, { heartbeat });
      answerTo = (rule) => checkRuleByPaths(net, where, paths, rule);
    } catch (error) {
      if (error instanceof TooManyNodes)
        return bad({ where: 'circuit', what: 'The sets of combinations are too large.', remedy: error.message });
      throw error;
    }
  }
  const rules: CheckedRule[] = [];
  const answering = part(budget, listed ? 0.9 : 0, 1);
  for (const { given: one, rule } of read) {
    if (budget.cancelled()) throw new Cancelled();
    answering.progress(rules.length / read.length);
    try {
      rules.push({ ...(one.id !== undefined && { id: one.id }), text: one.text, answer: answerTo(rule) });
    } catch (error) {
      if (!(error instanceof NeedsTable || error instanceof TooManyNodes)) throw error;
      problems.push({
        where: one.where,
        what:
          error instanceof NeedsTable
            ? `${error.message}.`
            : 'The combinations that it asks for are too entangled to be held as sets.',
        remedy: `Check a part of the circuit by itself, with at most ${MOST_ROWS.toLocaleString('en')} combinations.`,
      });
    }
  }
  const inputs = names.inputs.map(({ label, positions }) => ({ label, positions }));
  return problems.length > 0 ? bad(...problems) : good({ rules, inputs, listed, ...(listed ? {} : followersOf(net)) });
}
