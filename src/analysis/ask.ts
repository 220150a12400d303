import { countBits } from '../base/bits.ts';
import { part } from '../base/budget.ts';
import type { Budget } from '../base/budget.ts';
import { bad, good } from '../base/result.ts';
import type { Problem, Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import { NONE } from '../engine/paths/diagrams/diagrams.ts';
import { settledPathSets } from '../engine/paths/diagrams/settled-paths.ts';
import { casesOf } from '../engine/table/rules/answer.ts';
import { figuresIn } from '../engine/table/rules/condition.ts';
import type { FigureCondition } from '../engine/table/rules/condition.ts';
import { continuations } from '../engine/table/rules/continue.ts';
import type { Next } from '../engine/table/rules/continue.ts';
import { evaluate } from '../engine/table/rules/evaluate.ts';
import type { RuleSource } from '../engine/table/rules/evaluate.ts';
import { figurePlanes } from '../engine/table/rules/figures.ts';
import { namesOfNetwork } from '../engine/table/rules/names.ts';
import { parseCondition } from '../engine/table/rules/parse.ts';
import { NeedsTable, openPathSource, tableSource } from '../engine/table/rules/sources.ts';
import { PressureSolver } from '../engine/table/resolve.ts';
import type { Plane, TableData } from '../engine/table/table-data.ts';
import { MOST_ROWS, MOST_SOLVED, networkOf, pathConditions, tabulate } from './analyse.ts';
import type { AskAnswer } from './ask-results.ts';
import { entangled, followersOf } from './outcomes.ts';
import type { Conditions } from './results.ts';

/**
 * In which combinations a condition of the rules' language holds. `table`: the table of these conditions, if it is
 * there already. Throws `Cancelled` when the budget says so.
 */
export function askTable(
  circuit: Circuit,
  conditions: Conditions,
  text: string,
  budget: Budget,
  table?: TableData,
): Result<AskAnswer> {
  const net = networkOf(circuit, conditions);
  const names = namesOfNetwork(net);
  const read = parseCondition(text, names);
  if (!read.ok) return read;
  const condition = read.value;
  const inputs = names.inputs.map(({ label, positions }) => ({ label, positions }));
  const count = net.inputs.reduce((n, input) => n * BigInt(input.positions.length), 1n);
  if (count <= BigInt(MOST_ROWS)) {
    const unsolved = tooManyToSolve(Number(count), figuresIn(condition));
    if (unsolved) return bad(unsolved);
    const data = table ?? tabulate(circuit, conditions, part(budget, 0, 0.7));
    const figure = figuresFor(circuit, conditions, data, figuresIn(condition), part(budget, table ? 0 : 0.7, 1));
    if (!figure.ok) return figure;
    const { sure, maybe } = evaluate(tableSource(data, figure.value), condition);
    const open = maybe.map((word, i) => word & ~(sure[i] as number));
    return good({
      text,
      inputs,
      combinations: count,
      matches: BigInt(countBits(sure)),
      undecided: BigInt(countBits(open)),
      rows: { matches: sure, undecided: open },
    });
  }
  try {
    const found = entangled((): AskAnswer => {
      const where = pathConditions(net, conditions);
      const paths = settledPathSets(net, where);
      const { sets } = paths;
      const { sure, maybe } = evaluate(openPathSource(net, where, paths), condition);
      const open = sets.minus(maybe, sure);
      return {
        text,
        inputs,
        combinations: sets.total,
        matches: sets.count(sure),
        undecided: sets.count(open),
        ...(sure !== NONE && { cases: casesOf(sets, names, sure) }),
        ...followersOf(net),
      };
    });
    return found;
  } catch (error) {
    if (!(error instanceof NeedsTable)) throw error;
    return bad(tooLarge(error, 'question'));
  }
}

/** What a panel too large to list cannot be asked. */
export const tooLarge = (error: NeedsTable, where: string): Problem => ({
  where,
  what: `${error.message}.`,
  remedy: `Ask about a part of the circuit by itself, with at most ${MOST_ROWS.toLocaleString('en')} combinations.`,
});

/** Why pressures and speeds cannot be asked for, if they are. */
export function tooManyToSolve(count: number, wanted: readonly FigureCondition[]): Problem | undefined {
  if (wanted.length === 0 || count <= MOST_SOLVED) return undefined;
  return {
    where: 'circuit',
    what: `Pressures and speeds are solved row by row, for up to ${MOST_SOLVED.toLocaleString('en')} combinations; this circuit has ${count.toLocaleString('en')}.`,
    remedy: 'Ask without pressures and speeds, or about a part of the circuit by itself.',
  };
}

/** Solves the rows for conditions on pressures and speeds; undefined where there are none. */
export function figuresFor(
  circuit: Circuit,
  conditions: Conditions,
  data: TableData,
  wanted: readonly FigureCondition[],
  budget: Budget,
): Result<RuleSource<Plane>['figure'] | undefined> {
  if (wanted.length === 0) return good(undefined);
  const unsolved = tooManyToSolve(data.count, wanted);
  if (unsolved) return bad(unsolved);
  const net = networkOf(circuit, conditions);
  return good(
    figurePlanes(new PressureSolver(net, pathConditions(net, conditions), data.dependentPlanes), data, wanted, budget),
  );
}

/** How a rule or question may go on where its text ends. */
export const continueText = (circuit: Circuit, text: string, as: 'rule' | 'condition'): Next[] =>
  continuations(text, namesOfNetwork(networkOf(circuit)), as);
