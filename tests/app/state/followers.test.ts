import { expect, test } from 'vitest';
import { followersOf } from '../../../src/app/state/followers.ts';
import { circuit } from '../../notation.ts';

test('valves that follow say what moves them, by the shown name of the actuator', () => {
  const drawn = circuit(
    'V1 two-stage-valve, C1 cylinder, V2 roller-valve{actuator=C1}, V3 roller-valve, V4 directional-valve | V1.A C1.A',
  );
  const parts = drawn.parts.map((part) => (part.id === 'C1' ? { ...part, label: 'PUSH' } : part));
  expect(followersOf({ ...drawn, parts }).map(({ part, label, by }) => [part, label, by])).toEqual([
    ['V1', 'V1 main spool', 'by pilot'],
    ['V2', 'V2', 'by roller of PUSH'],
    ['V3', 'V3', 'by roller'],
  ]);
});
