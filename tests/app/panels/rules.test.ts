import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { ruleExamples } from '../../../src/app/panels/rule-examples.ts';
import { addRule, changeRule, removeRule } from '../../../src/app/panels/rule-edits.ts';
import { unreadable } from '../../../src/app/state/unreadable.ts';
import { ruleProblems } from '../../../src/analysis/check.ts';
import { applyEdit, invertEdit } from '../../../src/circuit/edit.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { openCircuit } from '../../../src/parts/open.ts';

const folder = new URL('../../../examples/', import.meta.url);
const circuits = readdirSync(folder)
  .filter((name) => name.endsWith('.spool.json'))
  .map((name): [string, Circuit] => {
    const read = openCircuit(readFileSync(new URL(name, folder), 'utf8'));
    if (!read.ok) throw new Error(name);
    return [name, read.value];
  });

test.each(circuits)('the rules that the panel offers for %s can be read', (_, circuit) => {
  const offered = ruleExamples(circuit);
  expect(offered.length).toBeGreaterThan(0);
  for (const text of offered) expect([text, ruleProblems(circuit, text)]).toEqual([text, []]);
});

test('names that read like words of a rule are quoted; nothing is offered that stands already', () => {
  const circuit: Circuit = {
    name: 'x',
    parts: [
      { id: 'C1', kind: 'cylinder', label: 'line 2' },
      { id: 'C2', kind: 'cylinder', label: 'REST' },
    ],
    connections: [],
  };
  const offered = ruleExamples(circuit);
  expect(offered).toEqual(['never "line 2" moves in while "REST" moves']);
  expect(ruleProblems(circuit, offered[0] ?? '')).toEqual([]);
  expect(ruleExamples(applyEdit(circuit, addRule(circuit, offered[0] ?? '')))).toEqual([]);
  expect(ruleExamples({ name: 'empty', parts: [], connections: [] })).toEqual([]);
});

test('rules are added, changed and removed, and all of it can be taken back', () => {
  const bare: Circuit = { name: 'x', parts: [], connections: [] };
  const one = applyEdit(bare, addRule(bare, 'never A'));
  const two = applyEdit(one, addRule(one, 'never B'));
  expect(two.rules).toEqual([
    { id: 'r1', text: 'never A' },
    { id: 'r2', text: 'never B' },
  ]);
  expect(applyEdit(two, changeRule(two, 'r1', 'always A')).rules?.[0]).toEqual({ id: 'r1', text: 'always A' });
  for (const edit of [changeRule(two, 'r2', 'always B'), removeRule(two, 'r1'), addRule(two, 'never C')])
    expect(applyEdit(applyEdit(two, edit), invertEdit(two, edit))).toEqual(two);
  expect(applyEdit(one, removeRule(one, 'r1'))).toEqual(bare);
});

test('problems are sorted by the rules that they are about, and the others can still be asked for', () => {
  const circuit: Circuit = {
    name: 'x',
    parts: [],
    connections: [],
    rules: [
      { id: 'a', text: 'never A' },
      { id: 'b', text: 'nonsense' },
    ],
  };
  const bad = { what: 'What.', remedy: 'Remedy.' };
  const { found, others, rest } = unreadable(circuit, [
    { ...bad, where: 'rules[1], column 3' },
    { ...bad, where: 'circuit' },
  ]);
  expect([...found]).toEqual([['b', { ...bad, where: 'column 3' }]]);
  expect(others).toEqual([{ ...bad, where: 'circuit' }]);
  expect(rest.rules?.map(({ id }) => id)).toEqual(['a']);
});
