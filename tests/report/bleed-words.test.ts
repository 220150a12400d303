import { expect, test } from 'vitest';
import { leftGroups, sayHeld, sayKeep, sayMove, sayVents } from '../../src/report/bleed-words.ts';

const line = (name: string, measure: readonly string[] = []) => ({ line: 0, name, measure });
const move = { part: 'v1', label: 'V1', from: 'hold', to: 'lower', row: 2, cautions: [], vents: [], held: [] };

test('a move says how long the lever is kept against its spring', () => {
  expect(sayMove(move)).toBe('Move V1 from hold to lower.');
  expect(sayKeep(move)).toBeUndefined();
  expect(sayKeep({ ...move, springsTo: 'hold' })).toBe(
    'Keep it there to the end of the list: let go, it returns to hold.',
  );
  // Steps are counted from 1 on show.
  expect(sayKeep({ ...move, springsTo: 'hold', keptUntil: 2 })).toContain('until step 3');
});

test('what comes down is said with the place to measure it, and what stays with its names', () => {
  expect(sayVents(move)).toBeUndefined();
  expect(sayVents({ ...move, vents: [line('A', ['M1', 'M2']), line('B')] })).toBe(
    'Wait until down: A (measure at M1, M2); B (no gauge or test point is drawn on it)',
  );
  expect([sayHeld([]), sayHeld([line('A'), line('B')])]).toEqual([
    'Still under pressure: none',
    'Still under pressure: A, B',
  ]);
});

test('lines that nothing opens stand apart from those that only the list leaves', () => {
  const never = { ...line('A'), never: true, remedy: 'r' };
  const other = { ...line('B'), never: false, remedy: 'r' };
  expect(leftGroups([])).toEqual([]);
  expect(leftGroups([other, never]).map(({ lines }) => lines)).toEqual([[never], [other]]);
  expect(leftGroups([never])[0]?.head).toContain('No lever position');
});
