import type { Check, CheckedRule, Conditions, RuleCases } from '../analysis/results.ts';
import type { LoadCase } from '../circuit/model.ts';
import { sayConditions } from './conditions.ts';
import { REPORT_VERSION } from './json.ts';
import { pathsOnly } from './paths-only.ts';
import { plain } from './width.ts';

/** What the report of a check is made from. */
export interface CheckSource {
  /** Of this program. */
  readonly version: string;
  readonly circuit: string;
  readonly conditions: Conditions;
  readonly loadCases?: readonly LoadCase[];
  readonly check: Check;
}

/** Terms of one answer that the text lists; JSON has them all. */
export const MOST_TERMS = 20;

/** Wherever rules are answered. */
export const RULES_CAUTION =
  'Caution: the answers hold for steady states of the circuit as drawn, not while valves shift and not for what leaks or fails. ' +
  'Which interlocks a machine needs is for its risk assessment, its documents, the local codes and qualified people to say.';

/** Every rule with its answer, a line at a time; every line ends with a line feed. */
export function* writeCheckText(source: CheckSource): Generator<string> {
  for (const line of lines(source)) yield `${plain(line).trimEnd()}\n`;
}

function* lines({ circuit, conditions, loadCases, check }: CheckSource): Generator<string> {
  const { rules } = check;
  yield circuit;
  yield `${counted(BigInt(rules.length), 'rule')} checked, ${sayConditions(conditions, loadCases)}${check.listed ? '' : pathsOnly(check.followers)}`;
  for (const [i, { text, answer }] of rules.entries()) {
    yield '';
    yield `${i + 1}. ${text}`;
    const all = answer.combinations;
    if (answer.outcome === 'holds') yield `   ${sayHolds(all)}.`;
    if (answer.broken) {
      yield `   ${sayBroken(answer.broken, all)}:`;
      yield* caseLines(answer.broken, check);
      if (answer.broken.coilTerms) yield* termLines('   Interlock, in coils: never', answer.broken.coilTerms);
    }
    if (answer.undecided) {
      yield `   ${sayUndecided(answer.undecided, all)}:`;
      yield* caseLines(answer.undecided, check);
    }
  }
  yield '';
  yield summary(rules);
  yield RULES_CAUTION;
}

function* caseLines(cases: RuleCases, check: Check): Generator<string> {
  yield* termLines('    ', cases.terms);
  const row = rowOf(cases, check);
  const state = sayExample(cases, check);
  if (state !== '') yield `   For example ${row === undefined ? '' : `row ${row}: `}${state}`;
}

function* termLines(lead: string, terms: readonly string[]): Generator<string> {
  const shown = terms.slice(0, MOST_TERMS);
  for (const [i, term] of shown.entries()) yield i === 0 ? `${lead} ${term}` : `     or ${term}`;
  if (terms.length > shown.length) yield `     or ${terms.length - shown.length} more terms, which JSON lists`;
}

function summary(rules: readonly CheckedRule[]): string {
  const count = (outcome: string): number => rules.filter(({ answer }) => answer.outcome === outcome).length;
  return `${count('holds')} hold, ${count('broken')} broken, ${count('not decided')} not decided.`;
}

export const sayHolds = (all: bigint): string =>
  `Holds in ${all === 1n ? 'the only combination' : `all ${amount(all)} combinations`}`;
export const sayBroken = ({ count }: RuleCases, all: bigint): string =>
  `Broken in ${amount(count)} of ${counted(all, 'combination')}`;
export const sayUndecided = ({ count }: RuleCases, all: bigint): string =>
  `Not decided in ${amount(count)} of ${counted(all, 'combination')}, where what it speaks of rests on pressure or is undetermined`;

/** `V1 shut, V2 raise`. */
export const sayExample = ({ example }: RuleCases, { inputs }: Check): string =>
  inputs.map(({ label, positions }, i) => `${label} ${positions[example[i] ?? 0] ?? ''}`).join(', ');

const amount = (n: bigint): string => n.toLocaleString('en');
const counted = (n: bigint, what: string): string => `${amount(n)} ${what}${n === 1n ? '' : 's'}`;

/** 1-based, as in the table; undefined where rows have no numbers. */
export function rowOf({ example }: RuleCases, { inputs, listed }: Check): number | undefined {
  return listed
    ? 1 + inputs.reduce((row, { positions }, i) => row * positions.length + (example[i] ?? 0), 0)
    : undefined;
}

/** The same as one JSON object. Counts past 2⁵³ are strings of digits, since JSON readers would round them. */
export function writeCheckJson({ version, circuit, conditions, check }: CheckSource): string {
  const number = (n: bigint): number | string => (n <= BigInt(Number.MAX_SAFE_INTEGER) ? Number(n) : n.toString());
  const cases = (found: RuleCases | undefined): object | undefined =>
    found && {
      count: number(found.count),
      terms: found.terms,
      ...(found.coilTerms && { coilTerms: found.coilTerms }),
      fewestTerms: found.least,
      example: {
        ...(check.listed && { row: rowOf(found, check) }),
        state: Object.fromEntries(
          check.inputs.map(({ label, positions }, i) => [label, positions[found.example[i] ?? 0] ?? '']),
        ),
      },
    };
  const report = {
    spooltable: { version, report: REPORT_VERSION },
    circuit,
    conditions,
    listed: check.listed,
    rules: check.rules.map(({ id, text, answer }) => ({
      ...(id !== undefined && { id }),
      text,
      outcome: answer.outcome,
      combinations: number(answer.combinations),
      broken: cases(answer.broken),
      undecided: cases(answer.undecided),
    })),
  };
  return `${JSON.stringify(report, null, 2)}\n`;
}
