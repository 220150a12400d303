import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { networkOf, tabulate } from '../../src/analysis/analyse.ts';
import { bleedPlan, powerLoss } from '../../src/analysis/bleed.ts';
import { unlimited } from '../../src/base/budget.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { randomMachine } from '../engine/sequence/random-machine.ts';
import { circuit } from '../notation.ts';
import { Asked } from '../table-of.ts';

const folder = fileURLToPath(new URL('../../examples/', import.meta.url));
const EXAMPLES = readdirSync(folder).filter((name) => name.endsWith('.spool.json'));

function open(name: string): Circuit {
  const opened = openCircuit(readFileSync(`${folder}${name}`, 'utf8'));
  if (!opened.ok) throw new Error(`${name} does not open`);
  return opened.value;
}

/** Every line that the table with pumps stopped calls trapped for a known reason holds pressure at the start of the plan. */
function agrees(drawn: Circuit, row: number): number {
  const net = networkOf(drawn);
  // Only pressures tell where a dependent valve stands.
  const pressureRows = net.dependents.length > 0 ? 1000 : 0;
  const table = new StateTable(tabulate(drawn, { pumps: 'stopped' }, unlimited, { pressureRows }));
  const { start } = bleedPlan(drawn, {}, row);
  const trapped = table.data.lines.flatMap((_, line) =>
    table.trapped(line, row).some((reason) => reason !== 'heat') ? [line] : [],
  );
  expect(start.map(({ line }) => line)).toEqual(expect.arrayContaining(trapped));
  // A store that is let down itself stops holding lock checks open: the table shows it before, the plan after.
  if (net.accumulators.length > 0 && net.paths.some(({ pilot }) => pilot >= 0)) return trapped.length;
  const running = new StateTable(tabulate(drawn, { pumps: 'running' }, unlimited, { pressureRows: 0 }));
  // The other way round: what the plan adds is joined to something, and open to tank nowhere.
  for (const { line, reasons } of start) {
    expect(['vented', 'flows to tank']).not.toContain(table.line(line, row));
    // The table looks for trapped pressure in lines that are cut off; one that passes oil to another actuator, or that
    // an unloaded pump reaches over a check, can keep its pressure too.
    const passes = table.line(line, row) !== 'cut off' || running.line(line, row) !== 'cut off';
    if (trapped.includes(line) || passes) continue;
    expect(reasons.map(({ kind }) => kind)).toEqual(['joined']);
  }
  return trapped.length;
}

describe('plans and the table with the pumps stopped name the same lines', () => {
  test.each(EXAMPLES)('%s, every row', (name) => {
    const drawn = open(name);
    const rows = networkOf(drawn).inputs.reduce((n, input) => n * input.positions.length, 1);
    for (let row = 0; row < rows; row += rows > 100 ? 7 : 1) agrees(drawn, row);
  });

  test('random machines', () => {
    let trapped = 0;
    fc.assert(
      fc.property(randomMachine(), fc.nat(), (drawn, pick) => {
        const rows = networkOf(drawn).inputs.reduce((n, input) => n * input.positions.length, 1);
        trapped += agrees(drawn, pick % rows);
      }),
      { numRuns: 150, seed: 20261201 },
    );
    expect(trapped).toBeGreaterThan(150);
  });
});

describe('loss of the control voltage', () => {
  const lift = (form: string): Circuit =>
    circuit(
      `P1 fixed-pump, R1 relief-valve, V1 directional-valve:${form}, C1 cylinder{bore=63 mm;rod=45 mm;load=20 kN;loadSense=pushes in}, T1 tank | P: P1.P R1.P V1.P | A: V1.A C1.A | B: V1.B C1.B | T: V1.T R1.T T1.T P1.S`,
    );
  const row = (c: Circuit, state: string): number => new Asked(c, { pumps: 'running' }, { pressureRows: 0 }).row(state);

  test('a closed centre holds the load: A stays under pressure (practice)', () => {
    const c = lift('valve-4/3-shut-coils');
    const answer = powerLoss(c, {}, row(c, 'V1=a'));
    expect(answer.returned).toEqual([{ part: 'V1', label: 'V1', from: 'a', to: '0' }]);
    expect(answer.actuators[0]).toMatchObject({
      label: 'C1',
      before: 'extends',
      running: { comes: 'holds' },
      stopped: { comes: 'holds' },
    });
    expect(answer.underPressure.stopped.map(({ name }) => name)).toContain('A');
    expect(answer.underPressure.running.map(({ name }) => name)).toEqual(expect.arrayContaining(['P', 'A']));
    expect(answer.cautions.map(({ kind }) => kind)).not.toContain('drop');
  });

  test('a float centre drops it (practice)', () => {
    const c = lift('valve-4/3-float-coils');
    const answer = powerLoss(c, {}, row(c, 'V1=a'));
    expect(answer.actuators[0]).toMatchObject({
      before: 'extends',
      running: { verdict: 'moved in by load', comes: 'drops' },
      stopped: { verdict: 'moved in by load', comes: 'drops' },
    });
    expect(answer.cautions.map(({ kind }) => kind)).toContain('drop');
    expect(answer.underPressure.stopped).toEqual([]);
  });

  test('a lever stays, and goes on while the pump runs', () => {
    const c = lift('valve-4/3-float');
    const answer = powerLoss(c, {}, row(c, 'V1=a'));
    expect([answer.after, answer.returned]).toEqual([answer.before, []]);
    expect(answer.actuators[0]?.running).toEqual({ verdict: 'extends', comes: 'goes on' });
  });

  test('a valve with two coils and detents keeps its last position (check case Q6; practice)', () => {
    const c = lift('valve-4/2-two-coils');
    const answer = powerLoss(c, {}, row(c, 'V1=a'));
    expect(answer.returned).toEqual([]);
    expect(answer.actuators[0]?.running.comes).toBe('goes on');
  });
});

test('a load that comes down through a motor is told, though its line is not open to tank by itself', () => {
  const c = circuit(
    'P1 fixed-pump{tightWhenStopped=true}, R1 relief-valve, T1 tank, S1 shut-off-valve, C1 single-acting-cylinder:single-acting-cylinder-load, M1 motor, CV1 check-valve' +
      ' | P: P1.P R1.P CV1.A | A: CV1.B C1.A S1.A | X: S1.B M1.A | T: M1.B M1.L R1.T T1.T P1.S',
  );
  const plan = bleedPlan(c, {}, 1);
  expect(plan.start.map(({ name }) => name)).toContain('A');
  expect(bleedPlan(c, {}, 0).stopping.map(({ kind }) => kind)).toEqual(['drop']);
});

test('a normally open valve on the accumulator discharges it when the voltage goes (check case Q7; published practice)', () => {
  const c = circuit(
    'P1 fixed-pump{tightWhenStopped=true}, R1 relief-valve, T1 tank, ACC1 accumulator, DV1 directional-valve:valve-2/2-open-coil | P: P1.P R1.P ACC1.A DV1.P | T: DV1.A R1.T T1.T P1.S',
  );
  const shut = new Asked(c).table.data.inputs[0];
  const energised = shut?.coils[0]?.position ?? -1;
  const answer = powerLoss(c, {}, energised);
  expect(answer.cautions).toEqual([expect.objectContaining({ kind: 'discharge', text: 'ACC1 discharges.' })]);
  expect(answer.underPressure.stopped).toEqual([]);
});
