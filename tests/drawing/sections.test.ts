import { expect, test } from 'vitest';
import { applyEdit, invertEdit } from '../../src/circuit/edit.ts';
import { paste } from '../../src/circuit/build.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { appendSection } from '../../src/drawing/add-section.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { overlaps } from '../../src/drawing/geometry.ts';
import { partReach, placedPorts } from '../../src/drawing/shapes.ts';
import { SUB_CIRCUITS } from '../../src/drawing/sub-circuits.ts';
import { kindOf } from '../../src/parts/catalogue.ts';
import { namingSettings } from '../../src/parts/naming.ts';

const said = (circuit: Circuit): string[] =>
  circuit.connections
    .map(({ from, to }) => [`${from.part}.${from.port}`, `${to.part}.${to.port}`].sort().join(' '))
    .sort();
const made = (id: string): Circuit => (SUB_CIRCUITS.find((each) => each.id === id) as (typeof SUB_CIRCUITS)[0]).make();
const EMPTY: Circuit = { name: 'bank', parts: [], connections: [] };

test.each(SUB_CIRCUITS.map((each) => [each.id, each] as const))(
  '%s: ports exist, parts stand clear, lines run round them',
  (_, each) => {
    const circuit = each.make();
    for (const { from, to } of circuit.connections) {
      for (const ref of [from, to]) {
        const part = circuit.parts.find(({ id }) => id === ref.part);
        expect(part && placedPorts(part).map((port) => port.ref.port)).toContain(ref.port);
      }
    }
    circuit.parts.forEach((a, i) =>
      circuit.parts.slice(i + 1).forEach((b) => expect(overlaps(partReach(a), partReach(b))).toBe(false)),
    );
    for (const part of circuit.parts) {
      const known = new Set(kindOf(part.kind)?.settings.map(({ id }) => id));
      for (const key of Object.keys(part.settings ?? {})) expect(known.has(key)).toBe(true);
    }
    expect([...routeAll(circuit).values()].every((points) => points.length >= 2)).toBe(true);
    expect(applyEdit(EMPTY, paste(EMPTY, circuit, 50, 50, namingSettings).edit).parts).toHaveLength(
      circuit.parts.length,
    );
  },
);

test('a section beside another stands on the same pump and tank lines', () => {
  const bank: Circuit = {
    ...made('lever-section'),
    parts: [
      ...made('lever-section').parts,
      { id: 'PU', kind: 'fixed-pump', at: { x: -20, y: 30 } },
      { id: 'TA', kind: 'tank', at: { x: 5, y: 30 } },
    ],
    connections: [
      ...made('lever-section').connections,
      { id: 'p', from: { part: 'PU', port: 'P' }, to: { part: 'V1', port: 'P' } },
      { id: 't', from: { part: 'V1', port: 'T' }, to: { part: 'TA', port: 'T' } },
    ],
  };
  const added = appendSection(bank, 'V1');
  const after = applyEdit(bank, added.edit);
  expect(said(after)).toEqual([...said(bank), 'CYL2.A V2.A', 'CYL2.B V2.B', 'V1.P V2.P', 'V1.T V2.T'].sort());
  const [one, two] = [after.parts.find(({ id }) => id === 'V1'), after.parts.find(({ id }) => id === 'V2')];
  expect(two?.at?.y).toBe(one?.at?.y);
  expect(two && one && overlaps(partReach(one), partReach(two))).toBe(false);
  expect(applyEdit(after, invertEdit(bank, added.edit))).toEqual(bank);
});

test('a carry-over section comes in between: C2 of the first to its C1, and what came after goes on from it', () => {
  const first = made('bank-section');
  const bank: Circuit = {
    ...first,
    parts: [...first.parts, { id: 'TA', kind: 'tank', at: { x: 5, y: 30 } }],
    connections: [...first.connections, { id: 't', from: { part: 'V1', port: 'C2' }, to: { part: 'TA', port: 'T' } }],
  };
  const after = applyEdit(bank, appendSection(bank, 'V1').edit);
  expect(said(after)).toEqual(
    ['CYL1.A V1.A', 'CYL1.B V1.B', 'CYL2.A V2.A', 'CYL2.B V2.B', 'TA.T V2.C2', 'V1.C2 V2.C1'].sort(),
  );
});

test('in a series bank the new valve takes its oil from the tank port of the one before', () => {
  const section = made('lever-section');
  const second = paste(section, section, 40, 0, namingSettings);
  const two = applyEdit(section, second.edit);
  const bank: Circuit = {
    ...two,
    parts: [...two.parts, { id: 'TA', kind: 'tank', at: { x: 45, y: 30 } }],
    connections: [
      ...two.connections,
      { id: 's', from: { part: 'V1', port: 'T' }, to: { part: 'V2', port: 'P' } },
      { id: 't', from: { part: 'V2', port: 'T' }, to: { part: 'TA', port: 'T' } },
    ],
  };
  const after = said(applyEdit(bank, appendSection(bank, 'V2').edit));
  expect(after).toContain('TA.T V3.T');
  expect(after).toContain('V2.T V3.P');
  expect(after).not.toContain('TA.T V2.T');
});

test('the lock goes along with its section, and only a valve begins one', () => {
  const bank = made('lock-section');
  const after = applyEdit(bank, appendSection(bank, 'V1').edit);
  expect(after.parts.map(({ kind }) => kind).sort()).toEqual(
    [...bank.parts, ...bank.parts].map(({ kind }) => kind).sort(),
  );
  expect(() => appendSection(bank, 'CYL1')).toThrow('directional valve');
});
