import fc from 'fast-check';
import { expect, test } from 'vitest';
import { setBends } from '../../src/circuit/bends.ts';
import { connect, moveParts, removeParts, turnParts } from '../../src/circuit/build.ts';
import { applyEdit } from '../../src/circuit/edit.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { layAll } from '../../src/drawing/laying.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { placedPorts } from '../../src/drawing/shapes.ts';
import { sheetOf } from '../bench/sheet-circuits.ts';
import { unplacedRig } from './samples.ts';

const SHEETS: readonly Circuit[] = [placeMissing(unplacedRig()), sheetOf(30)];
const plain = (routes: ReadonlyMap<string, unknown>): unknown => [...routes];

/** One edit by numbers that any circuit can take; the circuit itself where it cannot be done. */
function edited(circuit: Circuit, what: number, pick: number, dx: number, dy: number): Circuit {
  const part = circuit.parts[pick % circuit.parts.length];
  const connection = circuit.connections[pick % circuit.connections.length];
  if (!part || !connection) return circuit;
  try {
    if (what === 0) return applyEdit(circuit, turnParts(circuit, [part.id], 90));
    if (what === 1) return applyEdit(circuit, removeParts(circuit, [part.id]));
    if (what === 2) return applyEdit(circuit, setBends(circuit, connection.id, [{ x: dx, y: dy }]));
    if (what === 3) {
      const other = circuit.parts[(pick * 7 + 3) % circuit.parts.length];
      const [from, to] = [placedPorts(part)[0]?.ref, other && placedPorts(other).at(-1)?.ref];
      return from && to ? applyEdit(circuit, connect(circuit, from, to)) : circuit;
    }
    if (what === 4) return { ...circuit, connections: circuit.connections.filter((each) => each !== connection) };
    const more = [part.id, circuit.parts[(pick + 1) % circuit.parts.length]?.id ?? part.id];
    return applyEdit(circuit, moveParts(circuit, what === 5 ? more : [part.id], dx, dy));
  } catch {
    return circuit;
  }
}

test('after any row of edits, lines laid one edit at a time are those laid all at once', () => {
  const step = fc.tuple(fc.nat(9), fc.nat(200), fc.integer({ min: -25, max: 25 }), fc.integer({ min: -25, max: 25 }));
  fc.assert(
    fc.property(fc.constantFrom(...SHEETS), fc.array(step, { minLength: 1, maxLength: 6 }), (start, steps) => {
      let circuit = start;
      let laid = layAll(circuit);
      for (const [what, pick, dx, dy] of steps) {
        circuit = edited(circuit, what, pick, dx, dy);
        laid = layAll(circuit, laid);
        expect(plain(laid.routes)).toEqual(plain(routeAll(circuit)));
      }
    }),
    { numRuns: 60 },
  );
});

test('a move searches few lines of a large sheet, and leaves the others the very same', () => {
  const circuit = sheetOf(60);
  const before = layAll(circuit);
  const moved = applyEdit(circuit, moveParts(circuit, ['G3'], 2, -1));
  const after = layAll(moved, before);
  const kept = circuit.connections.filter(({ id }) => after.routes.get(id) === before.routes.get(id));
  expect(kept.length).toBeGreaterThan(circuit.connections.length * 0.7);
  expect(kept.length).toBeLessThan(circuit.connections.length);
});
