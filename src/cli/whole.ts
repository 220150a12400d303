import { MOST_ROWS, networkOf, tabulate } from '../analysis/analyse.ts';
import { askTable } from '../analysis/ask.ts';
import { foldByLabel, foldFrom } from '../analysis/fold.ts';
import { influenceFrom } from '../analysis/influence.ts';
import { outcomesOf } from '../analysis/outcomes.ts';
import type { Outcomes } from '../analysis/outcomes.ts';
import type { Conditions, FoldAnswer, FoldBy } from '../analysis/results.ts';
import { unlimited } from '../base/budget.ts';
import type { Circuit } from '../circuit/model.ts';
import type { Network } from '../network/network.ts';
import { namesOfNetwork } from '../engine/table/rules/names.ts';
import {
  writeAskJson,
  writeAskText,
  writeFoldJson,
  writeFoldText,
  writeInfluenceJson,
  writeInfluenceText,
} from '../report/fold.ts';
import type { WholeSource } from '../report/fold.ts';
import type { Command } from './arguments.ts';
import type { Written } from './bleed.ts';
import { conditionsOf } from './conditions.ts';
import { EXIT, Failure, sayProblems } from './failure.ts';

/** Rows that the pressure layer may solve, as for a table. */
const PRESSURE_ROWS = 600_000;

type Named<N> = Extract<Command, { name: N }>;

/** Folds by the labels given, or by every actuator and pump and by actuators that share valves. */
export function fold({ file, format, by, ...rest }: Named<'fold'>, circuit: Circuit, version: string): Written {
  const conditions = conditionsOf({ file, ...rest }, circuit);
  const outcomes = setsOf(file, circuit, conditions);
  const folds: FoldAnswer[] = [];
  const refused: string[] = [];
  const add = (one: FoldBy): FoldAnswer | undefined => {
    const found = foldFrom(outcomes, one, unlimited);
    if (found.ok) folds.push(found.value);
    else refused.push(found.problems.map(({ what, remedy }) => `${what} ${remedy}`).join(' '));
    return found.ok ? found.value : undefined;
  };
  if (by.length > 0) for (const label of by) add(byLabel(file, outcomes.net, label));
  else {
    const { actuators, pumps } = outcomes.net;
    actuators.forEach((_, index) => add({ of: 'actuator', index }));
    pumps.forEach((_, index) => add({ of: 'pump', index }));
    folds[0]?.groups.forEach((_, index) => add({ of: 'group', index }));
  }
  const source = sourceOf(circuit, conditions, version);
  return {
    pieces: format === 'json' ? [writeFoldJson(source, folds, refused)] : writeFoldText(source, folds, refused),
    exit: EXIT.done,
  };
}

function byLabel(file: string, net: Network, label: string): FoldBy {
  const names = namesOfNetwork(net);
  const found = foldByLabel(names, label);
  if (found) return found;
  const known = [...names.actuators, ...names.pumps].map((each) => each.label);
  throw new Failure(
    `${file}: --by: There is no actuator, pump or line "${label}". Use the name of a line, or one of ${known.join(', ')}.`,
  );
}

/** Which lever can change what. */
export function influence({ file, format, ...rest }: Named<'influence'>, circuit: Circuit, version: string): Written {
  const conditions = conditionsOf({ file, ...rest }, circuit);
  const found = influenceFrom(setsOf(file, circuit, conditions), unlimited);
  if (!found.ok) throw new Failure(sayProblems(file, found.problems));
  const source = sourceOf(circuit, conditions, version);
  return {
    pieces: format === 'json' ? [writeInfluenceJson(source, found.value)] : writeInfluenceText(source, found.value),
    exit: EXIT.done,
  };
}

/** The rows in which something holds. Exit code 1 when it surely holds in none. */
export function ask(
  { file, format, question, limit, ...rest }: Named<'ask'>,
  circuit: Circuit,
  version: string,
): Written {
  const conditions = conditionsOf({ file, ...rest }, circuit);
  const found = askTable(circuit, conditions, question, unlimited);
  if (!found.ok)
    throw new Failure(
      sayProblems(
        file,
        found.problems.map((problem) => ({ ...problem, where: `question, ${problem.where}` })),
      ),
    );
  const source = sourceOf(circuit, conditions, version);
  return {
    pieces: format === 'json' ? [writeAskJson(source, found.value, limit)] : writeAskText(source, found.value, limit),
    exit: found.value.matches > 0n ? EXIT.done : EXIT.checkFailed,
  };
}

const sourceOf = (circuit: Circuit, conditions: Conditions, version: string): WholeSource => ({
  version,
  circuit: circuit.name,
  conditions,
  loadCases: circuit.loadCases ?? [],
});

/** Outcomes as sets of combinations. Throws a `Failure` where there are none. */
export function setsOf(file: string, circuit: Circuit, conditions: Conditions): Outcomes {
  const count = networkOf(circuit).inputs.reduce((n, input) => n * input.positions.length, 1);
  const options = { pressureRows: PRESSURE_ROWS };
  const table = count <= MOST_ROWS ? tabulate(circuit, conditions, unlimited, options) : undefined;
  const found = outcomesOf(circuit, conditions, unlimited, table);
  if (!found.ok) throw new Failure(sayProblems(file, found.problems));
  return found.value;
}
