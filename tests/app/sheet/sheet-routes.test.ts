import { expect, test } from 'vitest';
import { SheetRoutes } from '../../../src/app/sheet/sheet-routes.ts';
import { moveParts, renamePart } from '../../../src/circuit/build.ts';
import { applyEdit, invertEdit } from '../../../src/circuit/edit.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { routeAll } from '../../../src/drawing/routing.ts';
import { sheetOf } from '../../bench/sheet-circuits.ts';

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

test('a long search goes on after its frame, with all lines shown meanwhile, and ends at the routes of the whole', () => {
  const circuit = sheetOf(60);
  let time = 0;
  const steps: (() => void)[] = [];
  let done = 0;
  const routes = new SheetRoutes({ run: (step) => steps.push(step), now: () => (time += 5), done: () => done++ });
  const first = routes.of(circuit);
  expect(first.size).toBe(circuit.connections.length);
  expect(plain(first)).not.toEqual(plain(routeAll(circuit)));
  for (const { id } of circuit.connections) expect(first.get(id)?.length).toBeGreaterThan(1);
  let frames = 0;
  for (let step = steps.shift(); step; step = steps.shift()) {
    expect(done).toBe(0);
    step();
    frames++;
  }
  expect(frames).toBeGreaterThan(3);
  expect(done).toBe(1);
  expect(plain(routes.of(circuit))).toEqual(plain(routeAll(circuit)));
});

test('an edit in the middle of a search starts from what was laid last, and printing waits for none', () => {
  const circuit = sheetOf(60);
  const moved = applyEdit(circuit, moveParts(circuit, ['V2'], 3, 2));
  let time = 0;
  const steps: (() => void)[] = [];
  const routes = new SheetRoutes({ run: (step) => steps.push(step), now: () => (time += 5), done: () => {} });
  routes.of(circuit);
  routes.of(moved);
  // The step of the first search has nothing left to do.
  steps.shift()?.();
  expect(plain(routes.finished(moved))).toEqual(plain(routeAll(moved)));
});
