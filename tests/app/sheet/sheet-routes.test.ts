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
  connections: [0, 1, 2].map((i) => ({
    id: `c${i}`,
    from: { part: `P${i}`, port: 'S' },
    to: { part: `T${i}`, port: 'T' },
  })),
};
const plain = (routes: ReadonlyMap<string, unknown>): unknown => Object.fromEntries(routes);

test('an edit undone brings the same drawing back', () => {
  const routes = new SheetRoutes();
  const before = routes.of(CIRCUIT);
  const move = moveParts(CIRCUIT, ['T0'], 17, -3);
  const moved = applyEdit(CIRCUIT, move);
  expect(plain(routes.of(moved))).toEqual(plain(routeAll(moved)));
  expect(plain(routes.of(applyEdit(moved, invertEdit(CIRCUIT, move))))).toEqual(plain(before));
});

test('a name moves no line', () => {
  const routes = new SheetRoutes();
  const before = routes.of(CIRCUIT);
  expect(routes.of(applyEdit(CIRCUIT, renamePart(CIRCUIT, 'P1', 'MAIN')))).toBe(before);
});
