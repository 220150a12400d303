import { expect, test } from 'vitest';
import { dumpProblem, loadProblem } from '../../../src/engine/flow/dump.ts';
import { randomCircuit } from './random-circuit.ts';

test('a dumped problem loads as it was, infinite bounds and pilots included', () => {
  for (let seed = 0; seed < 50; seed++) {
    const problem = randomCircuit(seed, { lines: 8, cylinders: 2, piloted: 3 });
    const back = loadProblem(dumpProblem(problem));
    expect(back.ok && back.value).toEqual(problem);
  }
});

test('a text that is no problem is refused with the place of the fault', () => {
  const where = (text: string): string | undefined => {
    const result = loadProblem(text);
    return result.ok ? undefined : result.problems[0]?.where;
  };
  expect(where('{')).toBe('text');
  expect(where('{"format":"flow-problem","lines":[1]}')).toBe('lines[0]');
  const good = dumpProblem(randomCircuit(1, { lines: 4, cylinders: 1 }));
  expect(where(good.replace('"kind": "path"', '"kind": "hose"'))).toMatch(/^branches\[\d+\]\.kind$/);
});
