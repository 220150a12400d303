import type { Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { Diagrams, NONE } from '../../paths/diagrams/diagrams.ts';
import type { SettledPaths } from '../../paths/diagrams/settled-paths.ts';
import { planeToDiagram } from '../../paths/diagrams/plane.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { coverOf } from '../fold/cover.ts';
import { anyPosition } from '../fold/cube.ts';
import type { Cube } from '../fold/cube.ts';
import type { Plane, TableData } from '../table-data.ts';
import type { Rule } from './condition.ts';
import { evaluate } from './evaluate.ts';
import type { RuleSource } from './evaluate.ts';
import type { Names } from './names.ts';
import { coilNamesByInput, namesOfNetwork, namesOfTable, sayName } from './names.ts';
import { openPathSource, tableSource } from './sources.ts';

export const RULE_OUTCOMES = ['holds', 'broken', 'not decided'] as const;
export type RuleOutcome = (typeof RULE_OUTCOMES)[number];

/** Combinations in which a rule is broken, or in which it is not decided. */
export interface RuleCases {
  readonly count: bigint;
  /** Few cubes that are these combinations exactly, as conditions of the rules' own language; joined by "or". */
  readonly terms: readonly string[];
  /** The same in coils, where every valve in it has coils and a rest position. */
  readonly coilTerms?: readonly string[];
  /** Known to be the fewest terms. */
  readonly least: boolean;
  /** Position of each input in one of these combinations, as many at rest as its first cube allows. */
  readonly example: readonly number[];
}

export interface RuleAnswer {
  readonly text: string;
  /** Broken somewhere for sure; or else not decided somewhere, because a verdict there is left open; or else it holds. */
  readonly outcome: RuleOutcome;
  /** All combinations. */
  readonly combinations: bigint;
  readonly broken?: RuleCases;
  readonly undecided?: RuleCases;
}

/** Checks a rule against every row of a table. `figure` answers for pressures and speeds, see `figurePlanes`. */
export function checkRule(data: TableData, rule: Rule, figure?: RuleSource<Plane>['figure']): RuleAnswer {
  const { sure, maybe } = evaluate(tableSource(data, figure), rule.breaks);
  const sets = new Diagrams(data.inputs.map((input) => input.positions.length));
  return answer(sets, namesOfTable(data), rule, planeToDiagram(sets, sure), planeToDiagram(sets, maybe));
}

/** Checks a rule against every combination of a panel of any size. Throws `NeedsTable` where open paths do not say enough. */
export function checkRuleByPaths(
  net: Network,
  conditions: PathConditions,
  paths: SettledPaths,
  rule: Rule,
): RuleAnswer {
  const { sure, maybe } = evaluate(openPathSource(net, conditions, paths), rule.breaks);
  return answer(paths.sets, namesOfNetwork(net), rule, sure, maybe);
}

function answer(sets: Diagrams, names: Names, rule: Rule, sure: Diagram, maybe: Diagram): RuleAnswer {
  const open = sets.minus(maybe, sure);
  return {
    text: rule.text,
    outcome: sure !== NONE ? 'broken' : open !== NONE ? 'not decided' : 'holds',
    combinations: sets.total,
    ...(sure !== NONE && { broken: casesOf(sets, names, sure) }),
    ...(open !== NONE && { undecided: casesOf(sets, names, open) }),
  };
}

export function casesOf(sets: Diagrams, names: Names, set: Diagram): RuleCases {
  const { cubes, least } = coverOf(sets, set);
  const named = coilNamesByInput(names);
  const coilTerms = cubes.map((cube) => sayCoils(cube, names, named));
  const rest = names.inputs.map((input) => input.rest ?? 0);
  return {
    count: sets.count(set),
    terms: cubes.map((cube) => sayCube(cube, names)),
    ...(coilTerms.every((term) => term !== undefined) && { coilTerms }),
    least,
    example: sets.example(set, rest) ?? rest,
  };
}

/** Every combination: a condition that always holds. */
export const IN_ALL = 'in every combination';

/** `V1 at a/0 and V2 at b`. */
function sayCube(cube: Cube, { inputs }: Names): string {
  const parts = inputs.flatMap(({ label, positions }, i) => {
    const mask = cube[i] as number;
    if (mask === anyPosition(positions.length)) return [];
    const named = positions
      .filter((_, p) => ((mask >>> p) & 1) === 1)
      .map((name) => (name.length === 1 ? name : sayName(name)));
    return [`${sayName(label)} at ${named.join('/')}`];
  });
  return parts.length === 0 ? IN_ALL : parts.join(' and ');
}

/** `Y1 on and Y4 off`: only for valves whose coils determine the position. */
function sayCoils(cube: Cube, { inputs }: Names, named: readonly (readonly string[])[]): string | undefined {
  const parts: string[] = [];
  for (const [i, { positions, rest, coils }] of inputs.entries()) {
    const mask = cube[i] as number;
    if (mask === anyPosition(positions.length)) continue;
    if (rest === undefined || coils.length !== positions.length - 1) return undefined;
    const called = coils.map(({ position }, c) => ({ position, name: sayName(named[i]?.[c] ?? '') }));
    const isIn = ({ position }: { readonly position: number }): boolean => ((mask >>> position) & 1) === 1;
    if (((mask >>> rest) & 1) === 1) {
      parts.push(...called.filter((coil) => !isIn(coil)).map(({ name }) => `${name} off`));
    } else {
      const on = called.filter(isIn).map(({ name }) => `${name} on`);
      parts.push(on.length === 1 ? (on[0] as string) : `(${on.join(' or ')})`);
    }
  }
  return parts.length === 0 ? undefined : parts.join(' and ');
}
