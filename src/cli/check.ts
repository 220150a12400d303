import { checkRules, rulesOf } from '../analysis/check.ts';
import type { GivenRule } from '../analysis/check.ts';
import { unlimited } from '../base/budget.ts';
import type { Circuit } from '../circuit/model.ts';
import { writeCheckJson, writeCheckText } from '../report/check.ts';
import type { Command } from './arguments.ts';
import { conditionsOf } from './conditions.ts';
import { EXIT, Failure, sayProblems } from './failure.ts';

type Check = Extract<Command, { name: 'check' }>;

/** Checks the rules of the circuit, then those of the command line. Exit code 1 unless all hold. */
export function check(
  { file, format, pumps, load, rules }: Check,
  circuit: Circuit,
  version: string,
): { readonly pieces: Iterable<string>; readonly exit: number } {
  const given: GivenRule[] = [
    ...rulesOf(circuit),
    ...rules.map((text, i) => ({ text, where: rules.length > 1 ? `--rule ${i + 1}` : '--rule' })),
  ];
  if (given.length === 0) {
    throw new Failure(
      `${file}: The circuit has no rules, and none is given. Add --rule "never C1 moves while C2 moves", with names of the sheet.`,
    );
  }
  const conditions = conditionsOf({ file, pumps, load }, circuit);
  const checked = checkRules(circuit, conditions, given, unlimited);
  if (!checked.ok) throw new Failure(sayProblems(file, checked.problems));
  const source = {
    version,
    circuit: circuit.name,
    conditions,
    loadCases: circuit.loadCases ?? [],
    check: checked.value,
  };
  const allHold = checked.value.rules.every(({ answer }) => answer.outcome === 'holds');
  return {
    pieces: format === 'json' ? [writeCheckJson(source)] : writeCheckText(source),
    exit: allHold ? EXIT.done : EXIT.checkFailed,
  };
}
