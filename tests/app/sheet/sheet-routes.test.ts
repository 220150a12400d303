import { expect, test } from 'vitest';
import { SheetRoutes } from '../../../src/app/sheet/sheet-routes.ts';
import { moveParts, renamePart } from '../../../src/circuit/build.ts';
import { applyEdit, invertEdit } from '../../../src/circuit/edit.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { routeAll } from '../../../src/drawing/routing.ts';

const CIRCUIT: Circuit = {
  name: 'three pumps',
  parts: [0, 1, 2].flatMap((i) => [
    { id: `P${i}`, kind: 'fixed-pump', at: { x: 20 * i, y: 0 } },
    { id: `T${i}`, kind: 'tank', at: { x: 20 * i + 6, y: 14 } },
  ]),
  connections: [0, 1, 2].map((i) => ({ id: `c${i}`, from: { part: `P${i}`, port: 'S' }, to: { part: `T${i}`, port: 'T' } })),
};
const plain = (routes: ReadonlyMap<string, unknown>): unknown => Object.fromEntries(routes);

test('during a drag only the moved lines are laid, and they end at the moved port', () => {
  const routes = new SheetRoutes();
  const before = routes.of(CIRCUIT, false);
  const dragged = applyEdit(CIRCUIT, moveParts(CIRCUIT, ['T1'], 3, 5));
  const during = routes.of(dragged, true);
  expect(during.get('c0')).toBe(before.get('c0'));
  expect(during.get('c2')).toBe(before.get('c2'));
  expect(during.get('c1')?.at(-1)).toEqual({ x: 29, y: 18 });
});

test('a drag given up and an edit undone bring the same drawing back', () => {
  const routes = new SheetRoutes();
  const before = routes.of(CIRCUIT, false);
  const move = moveParts(CIRCUIT, ['T0'], 17, -3);
  const moved = applyEdit(CIRCUIT, move);
  routes.of(moved, true);
  expect(routes.of(CIRCUIT, false)).toBe(before);
  expect(plain(routes.of(moved, false))).toEqual(plain(routeAll(moved)));
  expect(plain(routes.of(applyEdit(moved, invertEdit(CIRCUIT, move)), false))).toEqual(plain(before));
});

test('a name moves no line', () => {
  const routes = new SheetRoutes();
  const before = routes.of(CIRCUIT, false);
  expect(routes.of(applyEdit(CIRCUIT, renamePart(CIRCUIT, 'P1', 'MAIN')), false)).toBe(before);
});
