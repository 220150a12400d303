import { describe, expect, test } from 'vitest';
import type { Circuit } from '../../src/circuit/model.ts';
import { circuit } from '../notation.ts';
import { Asked } from '../table-of.ts';

const rules = (c: Circuit): string[] => new Asked(c).findings().map((finding) => finding.rule);
const find = (c: Circuit, rule: string) => new Asked(c).findings().find((finding) => finding.rule === rule);

const SUPPLY = 'P1 fixed-pump, R1 relief-valve, T1 tank';
const rig = (valve: string, more = '', lines = 'V1.A C1.A | V1.B C1.B', cylinder = 'cylinder'): Circuit =>
  circuit(
    `${SUPPLY}, V1 directional-valve:${valve}, C1 ${cylinder}${more} | P1.P R1.P V1.P | V1.T R1.T T1.T P1.S | ${lines}`,
  );

/** Each rule on a circuit that has the fault and on its neighbour that has not (common practice unless said). */
describe('findings', () => {
  test('a pump that can be dead-headed is a danger, with the rows that show it', () => {
    const faulty = circuit(
      'P1 fixed-pump, T1 tank, V1 directional-valve:valve-4/3-shut, C1 cylinder | P1.P V1.P | V1.T T1.T P1.S | V1.A C1.A | V1.B C1.B',
    );
    const finding = find(faulty, 'dead-headed-pump');
    expect([finding?.level, finding?.rows, finding?.rowCount]).toEqual(['danger', [1], 1]);
    expect(rules(rig('valve-4/3-shut'))).not.toContain('dead-headed-pump');
  });

  test('a relief valve that a shut-off can cut off', () => {
    const c = circuit(
      'P1 fixed-pump, R1 relief-valve, T1 tank, S1 shut-off-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder | P1.P V1.P S1.A | S1.B R1.P | V1.T R1.T T1.T P1.S | V1.A C1.A | V1.B C1.B',
    );
    expect(find(c, 'dead-headed-pump')?.rowCount).toBe(1);
  });

  test('full flow over the relief valve at rest', () => {
    expect(rules(rig('valve-4/3-shut'))).toContain('over-relief-at-rest');
    expect(rules(rig('valve-4/3-bypass'))).not.toContain('over-relief-at-rest');
  });

  test('a lock check whose pilots are not vented at rest', () => {
    const locked = (valve: string): Circuit =>
      rig(valve, ', L1 double-lock-check', 'V1.A L1.V1 | V1.B L1.V2 | L1.C1 C1.A | L1.C2 C1.B');
    expect(find(locked('valve-4/3-shut'), 'lock-check-not-vented')?.parts).toEqual(['L1']);
    expect(rules(locked('valve-4/3-float'))).not.toContain('lock-check-not-vented');
  });

  test('bypass centres in parallel, but not in series or alone (published trade article)', () => {
    const two = (lines: string): Circuit =>
      circuit(
        `${SUPPLY}, V1 directional-valve:valve-4/3-bypass, V2 directional-valve:valve-4/3-bypass, C1 cylinder, C2 cylinder | V1.A C1.A | V1.B C1.B | V2.A C2.A | V2.B C2.B | ${lines}`,
      );
    expect(find(two('P1.P R1.P V1.P V2.P | V1.T V2.T R1.T T1.T P1.S'), 'idle-valve-unloads')?.rowCount).toBe(4);
    expect(rules(two('P1.P R1.P V1.P | V1.T V2.P | V2.T R1.T T1.T P1.S'))).not.toContain('idle-valve-unloads');
    expect(rules(rig('valve-4/3-bypass'))).not.toContain('idle-valve-unloads');
  });

  test('two coils of one tag, but not two letters (a tag stands for one coil on electrical drawings: common practice)', () => {
    const two = (names: readonly string[]): Circuit => {
      const c = circuit(
        `${SUPPLY}, V1 directional-valve:valve-2/2-shut-coil, V2 directional-valve:valve-2/2-shut-coil, C1 cylinder | P1.P R1.P V1.P V2.P | V1.A C1.A | V2.A C1.B | R1.T T1.T P1.S`,
      );
      const parts = c.parts.map((part) => {
        const name = names[['V1', 'V2'].indexOf(part.id)];
        const coils = part.valve?.coils?.map((coil) => ({ ...coil, name: name ?? coil.name }));
        return part.valve && coils ? { ...part, valve: { ...part.valve, coils } } : part;
      });
      return { ...c, parts };
    };
    expect(find(two(['Y1', 'Y1']), 'coil-tag-twice')?.parts).toEqual(['V1', 'V2']);
    expect(rules(two(['Y1', 'Y2']))).not.toContain('coil-tag-twice');
    expect(rules(two(['a', 'a']))).not.toContain('coil-tag-twice');
  });

  test('an actuator that nothing moves, or that goes one way only', () => {
    expect(find(rig('valve-4/3-shut', '', 'V1.A C1.A'), 'actuator-reach')?.title).toBe('Nothing moves C1');
    // A 3/2 valve on the cap side, the rod side open to tank: out under pressure, back by nothing.
    const oneWay = circuit(
      `${SUPPLY}, V1 directional-valve:valve-2/2-shut-coil, C1 cylinder | P1.P R1.P V1.P | V1.A C1.A | C1.B R1.T T1.T P1.S`,
    );
    expect(find(oneWay, 'actuator-reach')?.title).toBe('C1 can extend but not retract');
    expect(rules(rig('valve-4/3-shut'))).not.toContain('actuator-reach');
  });

  test('a line that no lever position vents', () => {
    const trapped = rig('valve-4/3-shut', ', CV check-valve', 'V1.A CV.A | CV.B C1.A | V1.B C1.B');
    expect(find(trapped, 'unventable-line')?.title).toBe('No lever position vents C1.A');
    expect(rules(rig('valve-4/3-shut'))).not.toContain('unventable-line');
  });

  test('a port left open, once and with what it means', () => {
    const open = new Asked(rig('valve-4/3-shut', '', 'V1.A C1.A'))
      .findings()
      .filter((finding) => finding.rule === 'open-port');
    expect(open.map((finding) => finding.title)).toEqual(['C1.B is left open', 'V1.B is left open']);
    expect(open[0]?.what).toContain('plugged');
    expect(rules(rig('valve-4/3-shut'))).not.toContain('open-port');
  });

  test('a position that changes nothing', () => {
    const same = circuit(
      `${SUPPLY}, S1 shut-off-valve, V1 directional-valve:valve-4/3-shut, C1 cylinder, G1 gauge | P1.P R1.P V1.P S1.A S1.B | G1.M V1.T R1.T T1.T P1.S | V1.A C1.A | V1.B C1.B`,
    );
    expect(find(same, 'position-changes-nothing')?.parts).toEqual(['S1']);
    expect(rules(rig('valve-4/3-shut'))).not.toContain('position-changes-nothing');
  });

  test('an accumulator that nothing discharges (ISO 4413, paraphrased)', () => {
    const store = (more: string, lines: string): Circuit =>
      circuit(
        `${SUPPLY}, V1 directional-valve:valve-4/3-shut, C1 cylinder, CV check-valve, A1 accumulator${more} | P1.P R1.P CV.A | CV.B V1.P A1.A${lines} | V1.A C1.A | V1.B C1.B`,
      );
    expect(find(store('', ' | V1.T R1.T T1.T P1.S'), 'undischarged-accumulator')?.level).toBe('danger');
    expect(rules(store(', S1 shut-off-valve', ' S1.A | S1.B V1.T R1.T T1.T P1.S'))).not.toContain(
      'undischarged-accumulator',
    );
  });

  test('a load with nothing to hold it at rest', () => {
    const lines = 'V1.A C1.A | V1.B C1.B';
    expect(find(rig('valve-4/3-float', '', lines, 'cylinder:cylinder-lifting'), 'load-not-held')?.level).toBe('danger');
    expect(rules(rig('valve-4/3-bypass', '', lines, 'cylinder:cylinder-lifting'))).not.toContain('load-not-held');
  });
});
