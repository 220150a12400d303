import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { applyEdit } from '../../src/circuit/edit.ts';
import { moveToSheet } from '../../src/circuit/edit-sheets.ts';
import type { Circuit, Part } from '../../src/circuit/model.ts';
import { sheetOf } from '../../src/circuit/sheets.ts';
import { faceOf, referencesOf, sheetIds, withZones } from '../../src/drawing/faces.ts';
import type { ZoneOf } from '../../src/drawing/faces.ts';
import { overlaps, portOf } from '../../src/drawing/geometry.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { isReference } from '../../src/drawing/reference-symbol.ts';
import { placeReferences } from '../../src/drawing/references.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { buildScene } from '../../src/drawing/scene.ts';
import { partReach } from '../../src/drawing/shapes.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { joins, unplacedRig } from './samples.ts';

const zoneOf: ZoneOf = (sheet, { x, y }) => `${sheet}@${x},${y}`;
const noZone: ZoneOf = () => '';

function press(): Circuit {
  const opened = openCircuit(readFileSync(new URL('../../examples/tile-press.spool.json', import.meta.url), 'utf8'));
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems));
  return opened.value;
}

const flagText = (part: Part | undefined, what: 'name' | 'target'): string => String(part?.settings?.[what]);

test('a circuit of one sheet is its own face', () => {
  const rig = placeMissing(unplacedRig());
  expect(faceOf(rig, 's1', referencesOf(rig), zoneOf)).toBe(rig);
});

test('each end of a line between two sheets has a reference that names the line and where the other one stands', () => {
  const circuit = press();
  const references = referencesOf(circuit);
  expect([...references.values()].map(({ connection, end, sheet, name }) => [connection, end, sheet, name])).toEqual([
    ['c6', 'from', 's1', 'P'],
    ['c6', 'to', 's2', 'P'],
    ['c11', 'from', 's2', 'T'],
    ['c11', 'to', 's1', 'T'],
    ['c13', 'from', 's2', 'L'],
    ['c13', 'to', 's1', 'L'],
  ]);
  for (const id of sheetIds(circuit)) {
    const face = faceOf(circuit, id, references, zoneOf);
    const flags = face.parts.filter(isReference);
    expect(flags).toHaveLength(3);
    for (const flag of flags) {
      const own = references.get(flag.id);
      const other = references.get(own?.other ?? '');
      expect(references.get(other?.other ?? '')).toBe(own);
      expect(flagText(flag, 'target')).toBe(
        `${other?.sheet === 's1' ? 1 : 2}/${zoneOf(other?.sheet ?? '', other?.at ?? { x: 0, y: 0 })}`,
      );
    }
  }
});

test('without zones a reference names the sheet alone', () => {
  const circuit = press();
  const face = faceOf(circuit, 's1', referencesOf(circuit), noZone);
  expect(face.parts.filter(isReference).map((flag) => flagText(flag, 'target'))).toEqual(['2', '2', '2']);
  expect(face.name).toBe('Tile press, two sheets, sheet 1, Power unit');
});

/** Nothing ends in mid-air: every line of a face runs from a port to a port or a reference. */
function expectSound(circuit: Circuit): void {
  const references = referencesOf(circuit);
  const drawn = new Map<string, number>();
  for (const id of sheetIds(circuit)) {
    const face = faceOf(circuit, id, references, noZone);
    const parts = new Map(face.parts.map((part) => [part.id, part]));
    const routes = routeAll(face);
    for (const connection of face.connections) {
      const route = routes.get(connection.id) ?? [];
      const [from, to] = [parts.get(connection.from.part), parts.get(connection.to.part)];
      expect(route[0]).toEqual(from && portOf(from, connection.from).at);
      expect(route.at(-1)).toEqual(to && portOf(to, connection.to).at);
      drawn.set(connection.id, (drawn.get(connection.id) ?? 0) + 1);
    }
    const flags = face.parts.filter(isReference);
    for (const flag of flags) {
      const box = partReach(flag);
      for (const part of face.parts) {
        if (part !== flag && overlaps(box, partReach(part))) throw new Error(`${flag.id} covers ${part.id}`);
      }
    }
  }
  const sheet = new Map(circuit.parts.map((part) => [part.id, sheetOf(circuit, part)]));
  for (const { id, from, to } of circuit.connections)
    expect(drawn.get(id)).toBe(sheet.get(from.part) === sheet.get(to.part) ? 1 : 2);
}

test('lines end at ports and references, and references cover nothing', () => {
  expectSound(press());
});

test('however the parts of a rig are spread over three sheets, all lines are whole and no flag covers anything', () => {
  const rig: Circuit = {
    ...placeMissing(unplacedRig()),
    sheets: [
      { id: 's1', name: 'One' },
      { id: 's2', name: 'Two' },
      { id: 's3', name: 'Three' },
    ],
  };
  fc.assert(
    fc.property(fc.array(fc.nat(2), { minLength: rig.parts.length, maxLength: rig.parts.length }), (spread) => {
      let circuit = rig;
      for (const n of [1, 2]) {
        const parts = rig.parts.filter((_, i) => spread[i] === n).map(({ id }) => id);
        circuit = applyEdit(circuit, moveToSheet(circuit, { parts }, `s${n + 1}`));
      }
      expectSound(circuit);
    }),
    { numRuns: 12 },
  );
});

test('several lines between sheets at one port have a reference each', () => {
  const circuit = placeMissing({
    name: 'Fan',
    sheets: [
      { id: 's1', name: 'One' },
      { id: 's2', name: 'Two' },
    ],
    parts: [
      { id: 'PU', kind: 'fixed-pump' },
      { id: 'T0', kind: 'tank' },
      ...[1, 2, 3].map((n): Part => ({ id: `G${n}`, kind: 'gauge', sheet: 's2' })),
    ],
    connections: joins('PU.S T0.T', 'PU.P G1.M', 'PU.P G2.M', 'PU.P G3.M'),
  });
  expectSound(circuit);
  const references = [...referencesOf(circuit).values()];
  expect(references).toHaveLength(6);
  expect(new Set(references.map(({ name }) => name))).toEqual(new Set(['PU.P']));
});

test('parts without a place find one on their own sheet', () => {
  const circuit = placeMissing({
    name: 'Bare',
    sheets: [
      { id: 's1', name: 'One' },
      { id: 's2', name: 'Two' },
    ],
    parts: [
      { id: 'PU', kind: 'fixed-pump', at: { x: 40, y: 40 } },
      { id: 'T0', kind: 'tank' },
      { id: 'C1', kind: 'cylinder', sheet: 's2' },
    ],
    connections: joins('PU.S T0.T', 'PU.P C1.A'),
  });
  expect(circuit.parts.every(({ at }) => at !== undefined)).toBe(true);
  // A sheet of its own begins at the origin, however far the other sheet's parts are.
  expect(Math.abs(circuit.parts[2]?.at?.x ?? 99)).toBeLessThan(20);
});

test('references go along with a part that is dragged, and lists of lines stay the same objects', () => {
  const circuit = press();
  const references = referencesOf(circuit);
  const moved = {
    ...circuit,
    parts: circuit.parts.map((part) =>
      part.id === 'V1' && part.at ? { ...part, at: { x: part.at.x + 5, y: part.at.y - 2 } } : part,
    ),
  };
  const after = placeReferences(moved, () => 'P', references);
  const [before, now] = [references.get('c6:to'), after.get('c6:to')];
  expect(now?.at).toEqual({ x: (before?.at.x ?? 0) + 5, y: (before?.at.y ?? 0) - 2 });
  expect(after.get('c11:from')?.at).toEqual(references.get('c11:from')?.at);
  expect(faceOf(moved, 's2', after, noZone).connections).toBe(faceOf(circuit, 's2', references, noZone).connections);
});

test('other zones change the words of a reference and nothing that has a size', () => {
  const circuit = press();
  const references = referencesOf(circuit);
  const face = faceOf(circuit, 's1', references, noZone);
  const scene = buildScene(face, routeAll(face));
  const zoned = withZones(scene, circuit, references, () => 'H12');
  const words = (drawn: typeof scene): string[] =>
    drawn.parts
      .filter(isReference)
      .flatMap((part) => part.primitives.flatMap((p) => (p.type === 'text' ? p.text : [])));
  expect(words(scene)).toEqual(['P', '2', 'T', '2', 'L', '2']);
  expect(words(zoned)).toEqual(['P', '2/H12', 'T', '2/H12', 'L', '2/H12']);
  expect(zoned.bounds).toEqual(scene.bounds);
});
