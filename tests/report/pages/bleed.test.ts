import { expect, test } from 'vitest';
import type { BleedAnswer } from '../../../src/analysis/results.ts';
import type { Primitive } from '../../../src/base/primitives.ts';
import type { Circuit } from '../../../src/circuit/model.ts';
import { bleedPages, bleedPaper, BLEED_WARNINGS, ISOLATION_STEPS } from '../../../src/report/pages/bleed.ts';

const circuit: Circuit = { name: 'Rig', title: { machine: 'Gate', number: 'HY-9' }, parts: [], connections: [] };
const line = (name: string, measure: readonly string[] = []) => ({ line: 0, name, measure });
const step = { part: 'v1', label: 'V1', from: 'hold', to: 'lower', row: 2, vents: [line('LIFT.A', ['M1'])], held: [] };
const caution = { kind: 'drop', text: 'LIFT comes down.', lines: [], parts: [] } as const;
const answer: BleedAnswer = {
  row: 4,
  positions: [1],
  start: [{ ...line('LIFT.A', ['M1']), reasons: [{ kind: 'load', text: 'Pressed on by the load.' }] }],
  stopping: [],
  steps: [{ ...step, cautions: [caution], springsTo: 'hold' }],
  left: [{ ...line('ACC.A'), never: true, remedy: 'Usually a bleed valve is added.' }],
  proven: true,
};

const words = (from: BleedAnswer): { said: string; ticks: number } => {
  const primitives = bleedPages({
    circuit,
    conditions: { pumps: 'running' },
    answer: from,
    state: { V1: 'hold' },
  }).flatMap((page): readonly Primitive[] => page.primitives);
  const said = primitives.flatMap((p) => (p.type === 'text' ? [p.text] : [])).join(' ');
  // Boxes to tick are square.
  const ticks = primitives.filter((p) => p.type === 'box' && p.width === p.height).length;
  return { said, ticks };
};

/** 29 CFR 1910.147(d) names: preparation, shutdown, isolation, lock or tag, stored energy, verification. */
test('the order of isolation has its six steps in order', () => {
  const order = [/know/i, /shut down/i, /isolate/i, /lock/i, /relieve or restrain/i, /verify/i];
  expect(ISOLATION_STEPS).toHaveLength(order.length);
  order.forEach((step, i) => expect(ISOLATION_STEPS[i]).toMatch(step));
});

test('the sheet defers, warns, has lines to fill in, a box for each thing to do, and says what stays under pressure', () => {
  const { said, ticks } = words(answer);
  expect(said).toContain('The documents of the machine, the local codes and qualified people decide');
  for (const warning of ['7 bar', 'surgical emergency', 'Cracking a fitting', 'accumulator', 'not an isolating device'])
    expect(said).toContain(warning);
  for (const field of ['Machine, serial number', 'Date and time', 'Name', 'Signature', 'Read before', 'Verified by'])
    expect(said).toContain(field);
  expect(said).toContain('Move V1 from hold to lower. Keep it there to the end of the list');
  expect(said.indexOf('LIFT comes down.')).toBeLessThan(said.indexOf('Move V1'));
  expect(said).toContain('No lever position opens these to tank');
  expect(said).toContain('ACC.A (measure: no gauge or test point is drawn on it). Usually a bleed valve is added.');
  // Six steps of isolation, one move, one wait, one line that stays.
  expect(ticks).toBe(9);
  expect(BLEED_WARNINGS).toHaveLength(3);
});

test('where nothing holds pressure it says so and still asks to verify', () => {
  const { said } = words({ ...answer, start: [], steps: [], left: [] });
  expect(said).toContain('No drawn line holds pressure once the pumps have stopped');
  expect(said).toContain('Verify at every line');
});

test('a search that was cut short is said, and the paper follows that of the drawing', () => {
  expect(words({ ...answer, proven: false }).said).toContain('The search was cut short');
  expect([bleedPaper(circuit), bleedPaper({ ...circuit, paper: 'Tabloid landscape' })]).toEqual([
    'A4 portrait',
    'Letter portrait',
  ]);
});
