import { expect, test } from 'vitest';
import { isOpened } from '../../../src/app/sheet/opened.ts';
import type { Shown } from '../../../src/app/sheet/opened.ts';
import { moveParts, placePart } from '../../../src/circuit/build.ts';
import { applyEdit } from '../../../src/circuit/edit.ts';
import type { Circuit } from '../../../src/circuit/model.ts';

const at = { x: 0, y: 0 };
const EMPTY: Circuit = { name: 'one', parts: [], connections: [] };
const TWO: Circuit = { ...EMPTY, parts: [{ id: 'P1', kind: 'fixed-pump', at }, { id: 'T1', kind: 'tank', at }] };
const shown = (circuit: Circuit, more: Partial<Shown> = {}): Shown => ({ circuit, file: 'one', fresh: false, ...more });

test('the first circuit, another file, and what the browser kept are shown whole', () => {
  expect(isOpened(undefined, shown(EMPTY))).toBe(true);
  expect(isOpened(shown(TWO), shown({ ...TWO, parts: TWO.parts.map((part) => ({ ...part })) }, { fresh: true }))).toBe(true);
  expect(isOpened(shown(EMPTY, { fresh: true }), shown(TWO))).toBe(true);
  expect(isOpened(shown(TWO), shown(EMPTY, { fresh: true }))).toBe(true);
});

test('edits are not: a first part, all parts moved, the last one deleted', () => {
  const first = applyEdit(EMPTY, placePart(EMPTY, 'P', { kind: 'fixed-pump', at }));
  expect(isOpened(shown(EMPTY, { fresh: true }), shown(first))).toBe(false);
  expect(isOpened(shown(TWO), shown(applyEdit(TWO, moveParts(TWO, ['P1', 'T1'], 1, 0))))).toBe(false);
  expect(isOpened(shown(first), shown(EMPTY))).toBe(false);
});
