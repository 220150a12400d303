import fc from 'fast-check';
import { expect, test } from 'vitest';
import { setBends } from '../../src/circuit/bends.ts';
import { moveLabel, moveParts, renamePart, turnParts } from '../../src/circuit/build.ts';
import { all, applyEdit } from '../../src/circuit/edit.ts';
import type { Edit } from '../../src/circuit/edit.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { laidScene, movesOf, sketchRoutes } from '../../src/drawing/moving.ts';
import type { Moves } from '../../src/drawing/moving.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { buildScene } from '../../src/drawing/scene.ts';
import type { SceneState } from '../../src/drawing/scene.ts';
import { circuit, joins, part, unplacedRig } from './samples.ts';

const STATE: SceneState = { lines: new Map(), parts: new Map() };
const REST: Circuit = placeMissing(unplacedRig());
const ROUTES = routeAll(REST);

/** A drawing put together from what stands, what goes along and what is laid anew, as a drag shows it. */
function shown(rest: Circuit, now: Circuit, moves: Moves) {
  const routes = sketchRoutes(rest, ROUTES, now, moves);
  const laid = laidScene(rest, now, routes, moves, STATE);
  const before = buildScene(rest, ROUTES, STATE);
  return { routes, laid, before };
}

test('a drag draws the lines of moved parts as a drawing from the start would, and nothing else', () => {
  const ids = REST.parts.map(({ id }) => id);
  const chosen = fc.uniqueArray(fc.constantFrom(...ids), { minLength: 1, maxLength: ids.length });
  const by = fc.tuple(fc.integer({ min: -30, max: 30 }), fc.integer({ min: -30, max: 30 }));
  fc.assert(
    fc.property(chosen, by, (parts, [dx, dy]) => {
      fc.pre(dx !== 0 || dy !== 0);
      const now = applyEdit(REST, moveParts(REST, parts, dx, dy));
      const moves = movesOf(REST, now) as Moves;
      expect(moves.by).toEqual({ x: dx, y: dy });
      expect([...moves.parts].sort()).toEqual([...parts].sort());
      const { routes, laid, before } = shown(REST, now, moves);
      const whole = buildScene(now, routes, STATE);
      const drawn = new Map(laid.lines.map((line) => [line.connection, line]));
      for (const line of whole.lines) {
        const was = before.lines.find(({ connection }) => connection === line.connection);
        if (moves.laid.has(line.line)) expect(drawn.get(line.connection)).toEqual(line);
        else if (!moves.carried.has(line.line)) expect(was).toEqual(line);
        else expect(line.points).toEqual(was?.points.map((p) => ({ x: p.x + dx, y: p.y + dy })));
      }
      expect(drawn.size).toBe(whole.lines.filter(({ line }) => moves.laid.has(line)).length);
      const dots = whole.dots.filter(({ line }) => moves.laid.has(line)).map(({ at }) => `${at.x} ${at.y}`);
      expect(laid.dots.map(({ at }) => `${at.x} ${at.y}`).sort()).toEqual(dots.sort());
      const still = whole.dots.filter(({ line }) => !moves.laid.has(line) && !moves.carried.has(line));
      for (const dot of still) expect(before.dots).toContainEqual(dot);
    }),
    { numRuns: 60 },
  );
});

test('only what moved alike counts as a move', () => {
  const [a, b] = REST.parts.map(({ id }) => id) as [string, string];
  const after = (...edits: Edit[]): Moves | undefined => movesOf(REST, applyEdit(REST, all(edits)));
  expect(after(moveParts(REST, [a, b], 2, 3))?.parts.size).toBe(2);
  expect(after(moveParts(REST, [a], 2, 3), moveParts(REST, [b], 2, 4))).toBeUndefined();
  expect(after(turnParts(REST, [a], 90))).toBeUndefined();
  expect(after(renamePart(REST, a, 'OTHER'))?.by).toEqual({ x: 0, y: 0 });
  const fewer = { ...REST, connections: REST.connections.slice(1) };
  expect(movesOf(REST, fewer)).toBeUndefined();
});

test('a text goes along with parts, and a stretch in the hand has its line drawn anew', () => {
  const labelled: Circuit = { ...REST, labels: [{ id: 'L1', at: { x: 1, y: 1 }, text: 'press' }] };
  const moved = movesOf(labelled, applyEdit(labelled, moveLabel('L1', { x: 4, y: 0 })));
  expect(moved?.by).toEqual({ x: 3, y: -1 });
  expect([...(moved?.labels ?? [])]).toEqual(['L1']);
  const [connection] = REST.connections as [Circuit['connections'][number]];
  const bent = movesOf(REST, applyEdit(REST, setBends(REST, connection.id, [{ x: 3, y: 3 }])));
  expect(bent?.parts.size).toBe(0);
  expect(bent?.laid.size).toBe(1);
  expect(bent?.carried.size).toBe(0);
});

test('a block with a moved part is drawn round it', () => {
  const two = circuit(
    [
      part('F1', 'filter', { x: 0, y: 0 }),
      part('F2', 'filter', { x: 0, y: 20 }),
      part('F3', 'filter', { x: 20, y: 0 }),
    ],
    joins('F1.B F2.A'),
  );
  const rest: Circuit = {
    ...two,
    groups: [
      { id: 'g1', name: 'Block', parts: ['F1', 'F2'] },
      { id: 'g2', name: 'Other', parts: ['F3'] },
    ],
  };
  const now = applyEdit(rest, moveParts(rest, ['F2'], 0, 10));
  const moves = movesOf(rest, now) as Moves;
  const laid = laidScene(rest, now, sketchRoutes(rest, routeAll(rest), now, moves), moves, STATE);
  expect(laid.blocks.map(({ id }) => id)).toEqual(['g1']);
  expect(laid.blocks[0]).toEqual(buildScene(now, routeAll(now), STATE).blocks[0]);
});
