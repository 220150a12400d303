import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf, tabulate } from '../../../../src/analysis/analyse.ts';
import { unlimited } from '../../../../src/base/budget.ts';
import type { Circuit } from '../../../../src/circuit/model.ts';
import { openPathSets } from '../../../../src/engine/paths/diagrams/open-paths.ts';
import { checkRule, checkRuleByPaths, IN_ALL } from '../../../../src/engine/table/rules/answer.ts';
import type { RuleAnswer, RuleCases } from '../../../../src/engine/table/rules/answer.ts';
import { namesOfNetwork, namesOfTable } from '../../../../src/engine/table/rules/names.ts';
import type { Names } from '../../../../src/engine/table/rules/names.ts';
import { parseCondition, parseRule } from '../../../../src/engine/table/rules/parse.ts';
import { NeedsTable } from '../../../../src/engine/table/rules/sources.ts';
import type { Condition } from '../../../../src/engine/table/rules/condition.ts';
import { StateTable } from '../../../../src/engine/table/state-table.ts';
import { family } from '../../../bench/circuits.ts';
import { circuit } from '../../../notation.ts';
import { randomCircuit } from '../../../random-circuit.ts';

function need<T>(read: { ok: true; value: T } | { ok: false; problems: readonly { what: string }[] }): T {
  if (!read.ok) throw new Error(read.problems.map((p) => p.what).join(' '));
  return read.value;
}

/** Row by row, from the words of the table. */
function holds(table: StateTable, row: number, c: Condition): boolean | undefined {
  const among = (word: string, wanted: readonly string[]): boolean | undefined =>
    wanted.includes(word) ? true : word === 'rests on pressure' || word === 'undetermined' ? undefined : false;
  switch (c.type) {
    case 'every':
    case 'any': {
      const parts = c.of.map((part) => holds(table, row, part));
      const decisive = c.type === 'any';
      return parts.includes(decisive) ? decisive : parts.includes(undefined) ? undefined : !decisive;
    }
    case 'not': {
      const inner = holds(table, row, c.of);
      return inner === undefined ? undefined : !inner;
    }
    case 'position':
      return ((c.positions >> table.position(c.input, row)) & 1) === 1;
    case 'actuator':
      return among(table.actuator(c.actuator, row), c.verdicts);
    case 'pump':
      return among(table.pump(c.pump, row), c.verdicts);
    case 'line':
      return among(table.line(c.line, row), c.classes);
    case 'blocked':
      return c.kinds.some((kind) => kind === table.blocked(c.line, row));
    case 'trapped':
      return c.reasons.some((reason) => table.trapped(c.line, row).includes(reason));
  }
}

/** The terms of an answer, read back and evaluated row by row, are exactly the rows that brute force finds. */
function sameRows(table: StateTable, names: Names, cases: RuleCases | undefined, rows: readonly number[]): void {
  expect(cases?.count ?? 0n).toBe(BigInt(rows.length));
  if (!cases) return;
  expect(rows).toContain(table.rowOf(cases.example));
  for (const terms of [cases.terms, cases.coilTerms ?? []]) {
    const conditions = terms.filter((term) => term !== IN_ALL).map((term) => need(parseCondition(term, names)));
    if (conditions.length === 0) continue;
    const found = Array.from({ length: table.count }, (_, row) => row).filter((row) =>
      conditions.some((c) => holds(table, row, c)),
    );
    expect(found).toEqual(rows);
  }
}

const SAYINGS: Record<string, readonly string[]> = {
  actuators: ['moves', 'extends', 'is held', 'stands still', 'moves in', 'is not held one way'],
  pumps: ['is unloaded', 'works', 'is dead-headed', 'over relief'],
  lines: ['is fed', 'is cut off', 'flows to tank', 'is trapped', 'is trapped by heat', 'is blocked'],
};

/** A random rule about the names of a circuit. */
function ruleFor(names: Names, pick: (most: number) => number): string {
  const one = <T>(list: readonly T[]): T => list[pick(list.length)] as T;
  const statement = (depth: number): string => {
    const kind = pick(depth > 2 ? 4 : 7);
    if (kind === 0 && names.inputs.length > 0) {
      const input = one(names.inputs);
      return `"${input.label}" at "${one(input.positions)}"${pick(2) === 0 ? '' : `/"${one(input.positions)}"`}`;
    }
    if (kind === 1 && names.actuators.length > 0)
      return `"${one(names.actuators).label}" ${one(SAYINGS['actuators'] ?? [])}`;
    if (kind === 2) return `"${one(names.pumps).label}" ${one(SAYINGS['pumps'] ?? [])}`;
    if (kind === 4) return `(${statement(depth + 1)} and ${statement(depth + 1)})`;
    if (kind === 5) return `(${statement(depth + 1)} or ${statement(depth + 1)})`;
    if (kind === 6) return `not ${statement(depth + 1)}`;
    return names.lines.length > 0 ? `line "${one(names.lines).name}" ${one(SAYINGS['lines'] ?? [])}` : 'any pump works';
  };
  const [a, b] = [statement(0), statement(0)];
  return one([
    `never ${a}`,
    `never ${a} while ${b}`,
    `always ${a} when ${b}`,
    `${a} only if ${b}`,
    `always ${a} unless ${b}`,
  ]);
}

test('answers agree with brute force over the rows, and their terms can be read back', () => {
  let broken = 0;
  let undecided = 0;
  fc.assert(
    fc.property(
      randomCircuit(4),
      fc.boolean(),
      fc.array(fc.nat(), { minLength: 40, maxLength: 40 }),
      (drawn, running, picks) => {
        const table = new StateTable(
          tabulate(drawn, { pumps: running ? 'running' : 'stopped' }, unlimited, { pressureRows: 0 }),
        );
        const names = namesOfTable(table.data);
        let next = 0;
        const text = ruleFor(names, (most) => (picks[next++ % picks.length] ?? 0) % most);
        const rule = need(parseRule(text, names));
        const answer = checkRule(table.data, rule);
        const rows = Array.from({ length: table.count }, (_, row) => row);
        const found = rows.map((row) => holds(table, row, rule.breaks));
        sameRows(
          table,
          names,
          answer.broken,
          rows.filter((row) => found[row] === true),
        );
        sameRows(
          table,
          names,
          answer.undecided,
          rows.filter((row) => found[row] === undefined),
        );
        expect(answer.outcome).toBe(
          found.includes(true) ? 'broken' : found.includes(undefined) ? 'not decided' : 'holds',
        );
        broken += answer.outcome === 'broken' ? 1 : 0;
        undecided += answer.outcome === 'not decided' ? 1 : 0;
      },
    ),
    { numRuns: 400, seed: 21 },
  );
  expect(broken).toBeGreaterThan(50);
  expect(undecided).toBeGreaterThan(5);
});

const PRESS =
  'PUMP fixed-pump, T1 tank, R1 relief-valve, V1 directional-valve:valve-4/3-shut, V2 directional-valve:valve-4/3-shut, CLAMP cylinder, DRILL cylinder' +
  ' | supply: PUMP.P R1.P V1.P V2.P | R1.T T1.T V1.T V2.T PUMP.S | V1.A CLAMP.A | V1.B CLAMP.B | V2.A DRILL.A | V2.B DRILL.B';

const ask = (drawn: Circuit, text: string, pressureRows = 1000): RuleAnswer => {
  const data = tabulate(drawn, { pumps: 'running' }, unlimited, { pressureRows });
  return checkRule(data, need(parseRule(text, namesOfTable(data))));
};

test('two cylinders on one pump: what breaks a rule is the interlock', () => {
  // Closed centres in parallel; practice: a valve moves its own cylinder alone while the other rests.
  expect(ask(circuit(PRESS), 'DRILL moves only if V2 at a/b').outcome).toBe('holds');
  const rule = ask(circuit(PRESS), 'never V1 at b while V2 at a');
  expect(rule).toMatchObject({
    outcome: 'broken',
    combinations: 9n,
    broken: { count: 1n, terms: ['V1 at b and V2 at a'], least: true, example: [2, 0] },
  });
  // The pump has nowhere to go at rest but the relief valve.
  const rests = ask(circuit(PRESS), 'always PUMP unloaded when every lever rests');
  expect(rests.broken).toMatchObject({ count: 1n, terms: ['V1 at 0 and V2 at 0'] });
  expect(ask(circuit(PRESS), 'never CLAMP moves and DRILL moves while V1 rests').outcome).toBe('holds');
});

test('verdicts that open paths leave to pressures leave a rule undecided', () => {
  const open = ask(circuit(PRESS), 'CLAMP moves whenever V1 at a', 0);
  // With both valves off centre the two are rivals for one pump.
  expect(open.outcome).toBe('not decided');
  expect(open.undecided).toMatchObject({ count: 2n, terms: ['V1 at a and V2 at a/b'] });
});

test('coils: the interlock in the words of the panel', () => {
  const data = tabulate(circuit(PRESS), { pumps: 'running' }, unlimited, { pressureRows: 0 });
  const coils = (first: number) => [
    { name: `Y${first}`, position: 0 },
    { name: `Y${first + 1}`, position: 2 },
  ];
  const driven = {
    ...data,
    inputs: data.inputs.map((input, i) => ({ ...input, by: 'coil' as const, coils: coils(2 * i + 1) })),
  };
  const terms = (text: string): readonly string[] | undefined =>
    checkRule(driven, need(parseRule(text, namesOfTable(driven)))).broken?.coilTerms;
  expect(terms('never Y1 on while V2 at a/0')).toEqual(['Y1 on and Y4 off']);
  expect(terms('never V1 at a/b while V2 rests')).toEqual(['(Y1 on or Y2 on) and Y3 off and Y4 off']);
});

test('panels too large to list: exact counts, in agreement with the table where there is one', () => {
  const texts = [
    'never C1 extends while C3 retracts',
    'C2 moves only if V2 at a/b',
    'never line V1.B carries displaced oil',
    'always P1 unloaded when every lever rests',
    'never line V3.T is fed',
    'always line V2.A is cut off when V2 rests',
    'never line V1.P is fed unless V1 at a or V3 at b',
  ];
  let compared = 0;
  for (const name of ['BANK', 'SERIES', 'SIXWAY', 'MIX'] as const) {
    const net = networkOf(family(name, 5));
    const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
    const names = namesOfNetwork(net);
    const data = tabulate(family(name, 5), { pumps: 'running' }, unlimited, { pressureRows: 0 });
    expect(namesOfTable(data).lines.map((line) => line.name)).toEqual(names.lines.map((line) => line.name));
    for (const text of texts) {
      const read = parseRule(text, names);
      // Not every family has a line of that name.
      if (!read.ok) continue;
      compared += 1;
      const small = checkRule(data, read.value);
      const large = checkRuleByPaths(net, conditions, openPathSets(net, conditions), read.value);
      // What open paths are sure of is so; what they rule out is not.
      expect(large.combinations).toBe(small.combinations);
      expect((large.broken?.count ?? 0n) <= (small.broken?.count ?? 0n)).toBe(true);
      expect((large.broken?.count ?? 0n) + (large.undecided?.count ?? 0n) >= (small.broken?.count ?? 0n)).toBe(true);
    }
  }
  expect(compared).toBeGreaterThan(20);
  const net = networkOf(family('SIXWAY', 40));
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  const paths = openPathSets(net, conditions);
  const check = (text: string): RuleAnswer =>
    checkRuleByPaths(net, conditions, paths, need(parseRule(text, namesOfNetwork(net))));
  expect(check('always P1 unloaded when every lever rests')).toMatchObject({
    outcome: 'holds',
    combinations: 3n ** 40n,
  });
  // Any lever off its centre shuts the way to tank: all combinations but one.
  const loaded = check('always P1 unloaded');
  expect((loaded.broken?.count ?? 0n) + (loaded.undecided?.count ?? 0n)).toBe(3n ** 40n - 1n);
  expect(loaded.broken?.terms).toHaveLength(40);
  // Carry-over sections, open paths: a cylinder can move only with its own lever off centre.
  expect(check('C1 moves only if V1 at a/b').outcome).toBe('holds');
  expect(() => check('never pressure at P1 over 100 bar')).toThrow(NeedsTable);
});
