import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { pressureSpots } from '../../../src/app/sheet/pressure-spots.ts';
import { lineNumbers } from '../../../src/drawing/lines.ts';
import { overlaps } from '../../../src/drawing/geometry.ts';
import { placeMissing } from '../../../src/drawing/place.ts';
import { routeAll } from '../../../src/drawing/routing.ts';
import { buildScene } from '../../../src/drawing/scene.ts';
import { partReach } from '../../../src/drawing/shapes.ts';
import { openCircuit } from '../../../src/parts/open.ts';

const FOLDER = new URL('../../../examples/', import.meta.url);
const files = readdirSync(FOLDER).filter((name) => name.endsWith('.spool.json'));

test.each(files)('%s: pressures stand beside their lines, clear of parts and names', (file) => {
  const opened = openCircuit(readFileSync(new URL(file, FOLDER), 'utf8'));
  if (!opened.ok) throw new Error(file);
  const circuit = placeMissing(opened.value);
  const routes = routeAll(circuit);
  const { labelRooms } = buildScene(circuit, routes, { parts: new Map() });
  const numbers = lineNumbers(circuit);
  const lines = [...new Set(numbers.values())].map((line) => ({
    connections: circuit.connections.flatMap(({ id }) => (numbers.get(id) === line ? [id] : [])),
  }));
  const spots = pressureSpots(circuit, routes, labelRooms, lines);
  // Most lines have room; those that have none go without.
  expect(spots.size).toBeGreaterThan(lines.length / 2);
  const bodies = circuit.parts.filter(({ kind }) => kind !== 'junction').map(partReach);
  for (const { at, align } of spots.values()) {
    const width = 6.6;
    const x = align === 'start' ? at.x : align === 'end' ? at.x - width : at.x - width / 2;
    const box = { x, y: at.y - 1.2, width, height: 1.5 };
    expect(labelRooms.filter((room) => overlaps(room, box))).toEqual([]);
    expect(bodies.filter((body) => overlaps(body, box))).toEqual([]);
  }
});
