import { expect, test } from 'vitest';
import type { Point } from '../../src/base/points.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { portPlace } from '../../src/drawing/geometry.ts';
import { SUB_CIRCUITS } from '../../src/drawing/sub-circuits.ts';
import { turnedCircuit } from '../../src/drawing/turned-circuit.ts';

const all: Circuit[] = SUB_CIRCUITS.map(({ make }) => {
  const made = make();
  const [first, ...rest] = made.connections;
  return {
    ...made,
    connections: first ? [{ ...first, bends: [{ x: 3, y: -5 }] }, ...rest] : rest,
    labels: [{ id: 't1', at: { x: 7, y: 2 }, text: 'Deck' }],
  };
});
const ends = (circuit: Circuit): Point[] =>
  circuit.connections.flatMap(({ from, to }) =>
    [from, to].map((ref) => portPlace(circuit, ref)?.at ?? { x: NaN, y: 0 }),
  );

/** Rotation of the plane by 90° clockwise with y downwards: (x, y) → (−y, x). */
test('ports, bends and texts go to where the origin turns them, and four turns or two flips change nothing', () => {
  expect(all.length).toBeGreaterThan(3);
  for (const circuit of all) {
    const turned = turnedCircuit(circuit, 90);
    expect(ends(turned)).toEqual(ends(circuit).map(({ x, y }) => ({ x: 0 - y, y: x })));
    expect(turned.connections[0]?.bends).toEqual([{ x: 5, y: 3 }]);
    expect(turned.labels?.[0]?.at).toEqual({ x: -2, y: 7 });
    const flipped = turnedCircuit(circuit, 'flip');
    expect(ends(flipped)).toEqual(ends(circuit).map(({ x, y }) => ({ x: 0 - x, y })));
    expect(turnedCircuit(flipped, 'flip')).toEqual(circuit);
    expect(turnedCircuit(turnedCircuit(turned, 90), 180)).toEqual(circuit);
    expect(turnedCircuit(turned, 270)).toEqual(circuit);
  }
});
