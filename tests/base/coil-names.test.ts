import { expect, test } from 'vitest';
import { coilNames } from '../../src/base/coil-names.ts';

const named = (...coils: string[]): string[] =>
  coilNames(
    coils.map((coil) => ({ label: coil.slice(0, coil.indexOf('.')), name: coil.slice(coil.indexOf('.') + 1) })),
  );

test('a letter is said with its valve, even if no other valve has it; a tag stands by itself', () => {
  expect(named('V1.a', 'V1.b', 'V2.a')).toEqual(['V1.a', 'V1.b', 'V2.a']);
  expect(named('LIFT.a')).toEqual(['LIFT.a']);
  expect(named('V1.Y1', 'V1.Y2', 'V2.a')).toEqual(['Y1', 'Y2', 'V2.a']);
});

test('a tag that several coils have is said with the valve', () => {
  expect(named('V1.Y1', 'V2.Y1', 'V2.Y2')).toEqual(['V1.Y1', 'V2.Y1', 'Y2']);
});
