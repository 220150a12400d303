import fc from 'fast-check';
import { expect, test } from 'vitest';
import { networkOf } from '../../../../src/analysis/analyse.ts';
import { unlimited } from '../../../../src/base/budget.ts';
import type { Circuit } from '../../../../src/circuit/model.ts';
import type { Diagram } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { NONE } from '../../../../src/engine/paths/diagrams/diagrams.ts';
import { openPathSets } from '../../../../src/engine/paths/diagrams/open-paths.ts';
import { planeToDiagram } from '../../../../src/engine/paths/diagrams/plane.ts';
import { settledPathSets } from '../../../../src/engine/paths/diagrams/settled-paths.ts';
import { PanelSets } from '../../../../src/engine/table/sets/panel-sets.ts';
import type { Plane } from '../../../../src/engine/table/table-data.ts';
import { tabulate } from '../../../../src/engine/table/tabulate.ts';
import { CATALOGUE } from '../../../../src/parts/catalogue.ts';
import { circuit } from '../../../notation.ts';
import { randomCircuit } from '../../../random-circuit.ts';
import { pilotedCircuits } from '../dependents/random-piloted.ts';

type Place = 'between' | 'in' | 'out';

interface Seen {
  /** Valves that stand in more than one position, sets of touched outcomes, and all sets with a row. */
  follow: number;
  open: number;
  some: number;
}

/** The table by open paths, row by row, against the sets: where the valves stand, and all that comes of it. */
function compare(drawn: Circuit, pumpsRunning: boolean, place: Place, seen: Seen): void {
  const net = networkOf(drawn);
  if (net.dependents.length === 0) return;
  const conditions = { pumpsRunning, places: net.actuators.map(() => place) };
  const rows = tabulate(net, conditions, unlimited, { pressureRows: 0 });
  const paths = settledPathSets(net, conditions, { order: net.inputs.map((_, i) => i) });
  const panel = new PanelSets(net, conditions, paths);
  const same = (planes: readonly (Plane | undefined)[] | undefined, sets: readonly Diagram[], what: string): void =>
    sets.forEach((set, i) => {
      if (set !== NONE) seen.some += 1;
      expect(set, `${what}, ${i}`).toBe(planeToDiagram(paths.sets, planes?.[i]));
    });
  net.dependents.forEach((_, d) => {
    const stands = paths.settled?.positions[d] ?? [];
    if (stands.filter((set) => set !== NONE).length > 1) seen.follow += 1;
    same(rows.dependentPlanes[d], stands, `where valve ${d} stands`);
  });
  seen.open += paths.settled?.open.filter((set) => set !== NONE).length ?? 0;
  same(rows.dependentRests, paths.settled?.open ?? [], 'where it may stand elsewhere');
  net.actuators.forEach((_, i) => {
    same(rows.actuatorPlanes[i], panel.actuator(i).verdicts, `actuator ${i}`);
    same(rows.actuatorNotes[i], panel.actuator(i).notes, `notes of actuator ${i}`);
  });
  net.pumps.forEach((_, i) => same(rows.pumpPlanes[i], panel.pump(i), `pump ${i}`));
  for (let line = 0; line < net.shown; line++) {
    same(rows.linePlanes[line], panel.lines.classes[line] ?? [], `line ${line}`);
    same(rows.blockedPlanes[line], panel.lines.blocked[line] ?? [], `blocked line ${line}`);
    same(rows.trapPlanes[line], panel.traps[line] ?? [], `trapped in line ${line}`);
  }
}

test('valves that follow pilots, by sets as by rows, on random circuits near a supply', { timeout: 60_000 }, () => {
  const seen: Seen = { follow: 0, open: 0, some: 0 };
  fc.assert(
    fc.property(
      pilotedCircuits,
      fc.boolean(),
      fc.constantFrom<Place>('between', 'in', 'out'),
      (drawn, running, place) => compare(drawn, running, place, seen),
    ),
    { numRuns: 120, seed: 20261201 },
  );
  expect(seen.follow).toBeGreaterThan(12);
  expect(seen.open).toBeGreaterThan(100);
  expect(seen.some).toBeGreaterThan(1_500);
});

test('the same on circuits joined anywhere, of every kind of part', { timeout: 60_000 }, () => {
  const seen: Seen = { follow: 0, open: 0, some: 0 };
  const plenty = ['pilot-valve', 'directional-valve', 'cylinder', 'two-stage-valve', 'lock-check', 'roller-valve'];
  fc.assert(
    fc.property(
      randomCircuit(3, 12, CATALOGUE, plenty),
      fc.boolean(),
      fc.constantFrom<Place>('between', 'in', 'out'),
      (drawn, running, place) => {
        // Two-stage valves are inputs and followers at once, and few of them make many settings.
        if (networkOf(drawn).dependents.length <= 4) compare(drawn, running, place, seen);
      },
    ),
    { numRuns: 100, seed: 20261202 },
  );
  expect(seen.follow).toBeGreaterThan(1);
  expect(seen.some).toBeGreaterThan(500);
});

test('open paths are not sought while nobody says where a valve stands', () => {
  const net = networkOf(
    circuit(
      'P1 fixed-pump, T1 tank, V1 directional-valve:valve-4/3-shut, V2 pilot-valve, C1 cylinder | P1.P V1.P V2.P | V1.A V2.X C1.A | V1.T V2.T T1.T P1.S',
    ),
  );
  expect(net.dependents.length).toBe(1);
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  expect(() => openPathSets(net, conditions)).toThrow('nobody says');
  expect(settledPathSets(net, conditions).settled?.positions.length).toBe(1);
});
