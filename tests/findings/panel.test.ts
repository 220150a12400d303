import fc from 'fast-check';
import { expect, test } from 'vitest';
import { findings, networkOf, tabulate } from '../../src/analysis/analyse.ts';
import { panelFindings } from '../../src/analysis/panel-findings.ts';
import { unlimited } from '../../src/base/budget.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import { family } from '../bench/circuits.ts';
import { circuit } from '../notation.ts';
import { randomCircuit } from '../random-circuit.ts';

/** Faults that sets and tables both look for. */
const SHARED = [
  'dead-headed-pump',
  'load-not-held',
  'over-relief-at-rest',
  'actuator-reach',
  'unventable-line',
  'open-port',
  'position-changes-nothing',
];

test('sets find the faults that the table of open paths shows, on 100 random circuits', { timeout: 60_000 }, () => {
  const met = new Map<string, number>();
  fc.assert(
    fc.property(randomCircuit(3, 12), (drawn) => {
      if (networkOf(drawn).dependents.length > 0) return;
      const table = new StateTable(tabulate(drawn, { pumps: 'running' }, unlimited, { pressureRows: 0 }));
      const say = (list: readonly { rule: string; title: string }[]): string[] =>
        list
          .filter(({ rule }) => SHARED.includes(rule))
          .map(({ rule, title }) => `${rule}: ${title}`)
          .sort();
      const rows = say(findings(drawn, table));
      for (const one of rows) met.set(one.split(':')[0] ?? '', (met.get(one.split(':')[0] ?? '') ?? 0) + 1);
      expect(say(panelFindings(drawn, { pumps: 'running' }))).toEqual(rows);
    }),
    { numRuns: 100, seed: 20261206 },
  );
  expect([...met.keys()].sort()).toEqual([...SHARED].filter((rule) => rule !== 'over-relief-at-rest').sort());
});

test('a bank of 20 shut centres without a relief valve: in all combinations but those that drive something', () => {
  const valves = Array.from({ length: 20 }, (_, i) => i + 1);
  const drawn = circuit(
    `P1 fixed-pump, T1 tank, ${valves.map((i) => `V${i} directional-valve:valve-4/3-shut, C${i} cylinder`).join(', ')} | ` +
      `P1.P ${valves.map((i) => `V${i}.P`).join(' ')} | ${valves.map((i) => `V${i}.T`).join(' ')} T1.T P1.S | ` +
      valves.map((i) => `V${i}.A C${i}.A | V${i}.B C${i}.B`).join(' | '),
  );
  const [first] = panelFindings(drawn, { pumps: 'running' });
  // Only with every valve at its centre is there nothing that the pump drives.
  expect(first).toMatchObject({ rule: 'dead-headed-pump', level: 'danger', example: valves.map(() => 1) });
  expect(first?.what).toMatch(/^In 1 of 3,486,784,401 combinations \(all levers at rest among them\)/);
});

test('40 valves: nothing is wrong in series, and shut centres leave the pump on its relief valve at rest', () => {
  const rules = (name: 'SERIES' | 'BANK'): string[] =>
    // Their throttle is connected to nothing.
    panelFindings(family(name, 40), { pumps: 'running' }).flatMap(({ rule }) => (rule === 'open-port' ? [] : [rule]));
  expect(rules('SERIES')).toEqual([]);
  expect(rules('BANK')).toEqual(['over-relief-at-rest']);
});
