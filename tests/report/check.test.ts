import { expect, test } from 'vitest';
import type { Check, RuleCases } from '../../src/analysis/results.ts';
import { RULES_CAUTION, writeCheckJson, writeCheckText } from '../../src/report/check.ts';

const cases = (more: Partial<RuleCases> = {}): RuleCases => ({
  count: 2n,
  terms: ['V1 at a', 'V2 at b'],
  least: true,
  example: [0, 1],
  ...more,
});

function source(check: Partial<Check>, circuit = 'Press') {
  const inputs = [
    { label: 'V1', positions: ['a', '0'] },
    { label: 'V2', positions: ['a', '0', 'b'] },
  ];
  return {
    version: '1.2.3',
    circuit,
    conditions: { pumps: 'running' as const },
    check: { rules: [], inputs, listed: true, ...check },
  };
}

test('the text of an answer', () => {
  const rules = [
    {
      text: 'never V1 at a',
      answer: {
        text: '',
        outcome: 'broken' as const,
        combinations: 6n,
        broken: cases({ coilTerms: ['Y1 on'] }),
        undecided: cases({ count: 1n, terms: ['V2 at 0'] }),
      },
    },
    { text: 'never C1 moves', answer: { text: '', outcome: 'holds' as const, combinations: 6n } },
  ];
  expect([...writeCheckText(source({ rules }))].join('')).toBe(`Press
2 rules checked, pumps running

1. never V1 at a
   Broken in 2 of 6 combinations:
     V1 at a
     or V2 at b
   For example row 2: V1 a, V2 0
   Interlock, in coils: never Y1 on
   Not decided in 1 of 6 combinations, where what it speaks of rests on pressure or is undetermined:
     V2 at 0
   For example row 2: V1 a, V2 0

2. never C1 moves
   Holds in all 6 combinations.

1 hold, 1 broken, 0 not decided.
${RULES_CAUTION}
`);
});

test('many terms are cut in the text and whole in JSON; large counts keep every digit', () => {
  const terms = Array.from({ length: 33 }, (_, i) => `V${i} at a`);
  const rules = [
    {
      id: 'r1',
      text: 'x',
      answer: {
        text: 'x',
        outcome: 'broken' as const,
        combinations: 3n ** 40n,
        broken: cases({ count: 3n ** 39n, terms, least: false }),
      },
    },
  ];
  const large = source({ rules, listed: false });
  const text = [...writeCheckText(large)].join('');
  expect(text).toContain('     or V19 at a\n     or 13 more terms, which JSON lists\n');
  expect(text).toContain('Broken in 4,052,555,153,018,976,267 of 12,157,665,459,056,928,801 combinations');
  expect(text).toContain('For example V1 a, V2 0');
  const report = JSON.parse(writeCheckJson(large));
  expect(report.rules[0]).toMatchObject({
    id: 'r1',
    combinations: '12157665459056928801',
    broken: { count: '4052555153018976267', fewestTerms: false },
  });
  expect(report.rules[0].broken.terms).toHaveLength(33);
  expect(report.rules[0].broken.example).toEqual({ state: { V1: 'a', V2: '0' } });
});

test('control characters of a name reach no terminal', () => {
  const text = [...writeCheckText(source({}, 'Press\u001b[2J'))].join('');
  expect(text).not.toContain('\u001b');
});
