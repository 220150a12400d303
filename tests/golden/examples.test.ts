import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import type { Conditions } from '../../src/analysis/results.ts';
import { writeCircuit } from '../../src/circuit/file.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { openCircuit } from '../../src/parts/open.ts';
import { writeCsv } from '../../src/report/csv.ts';
import { makeReport } from '../../src/report/rows.ts';
import { Asked } from '../table-of.ts';

const FOLDER = new URL('../../examples/', import.meta.url);
const ENDING = '.spool.json';
const names = readdirSync(FOLDER)
  .filter((file) => file.endsWith(ENDING))
  .map((file) => file.slice(0, -ENDING.length));
const read = (file: string): string => readFileSync(new URL(file, FOLDER), 'utf8');

function open(name: string): Circuit {
  const result = openCircuit(read(name + ENDING));
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  expect(result.warnings).toEqual([]);
  return result.value;
}

/** Every example has its table beside it, with the pumps running and stopped; `vitest -u` writes it anew. */
describe.each(names)('%s', (name) => {
  const circuit = open(name);

  test('its file is written back as it stands', () => {
    expect(writeCircuit(circuit)).toBe(read(name + ENDING));
  });

  test.each(['running', 'stopped'] as const)('its table with the pumps %s', async (pumps) => {
    const conditions: Conditions = { pumps };
    const { table } = new Asked(circuit, conditions);
    const report = makeReport({ version: '-', circuit, conditions, table, findings: [] });
    await expect([...writeCsv(report)].join('')).toMatchFileSnapshot(new URL(`${name}.${pumps}.csv`, FOLDER).pathname);
  });
});

test('no expected table stands without its circuit, and there are enough examples', () => {
  const tables = readdirSync(FOLDER).filter((file) => file.endsWith('.csv'));
  for (const file of tables)
    expect(existsSync(new URL(file.replace(/\.(running|stopped)\.csv$/, ENDING), FOLDER)), file).toBe(true);
  expect(tables.length).toBe(2 * names.length);
  expect(names.length).toBeGreaterThanOrEqual(7);
});

/** Worked out on paper from what each lever is for, not from the program. */
describe('worked by hand', () => {
  const rows = (
    name: string,
    pumps: Conditions['pumps'] = 'running',
  ): { t: Asked; states: Record<string, string>[] } => {
    const t = new Asked(open(name), { pumps });
    const { inputs } = t.table.data;
    const states = Array.from({ length: t.table.count }, (_, row) =>
      Object.fromEntries(
        t.table.positionsOf(row).map((p, i) => [inputs[i]?.label ?? '', inputs[i]?.positions[p] ?? '']),
      ),
    );
    return { t, states };
  };
  const say = (state: Record<string, string>): string =>
    Object.entries(state)
      .map(([k, v]) => `${k}=${v}`)
      .join(', ');

  test('log deck: the clamp has its own pump; lift and feed share the other one in series', () => {
    const { t, states } = rows('log-deck');
    expect(states.length).toBe(18);
    for (const s of states) {
      const at = say(s);
      expect(t.actuator('CLAMP', at)).toBe({ shut: 'extends', hold: 'held', open: 'retracts' }[s.V1 ?? '']);
      expect(t.actuator('LIFT', at)).toBe({ raise: 'extends', hold: 'held', lower: 'retracts' }[s.V2 ?? '']);
      // Whatever the lift does, its oil comes on to V3.
      expect(t.actuator('FEED', at)).toBe(s.V3 === 'run' ? 'turns A→B' : 'held');
      expect(t.pump(at, 'PUMP1')).toBe(s.V1 === 'hold' ? 'over relief' : 'working');
      expect(t.pump(at, 'PUMP2')).toBe(s.V2 === 'hold' && s.V3 === 'stop' ? 'unloaded' : 'working');
      expect(t.line('carry', at)).toBe(
        s.V2 === 'hold'
          ? s.V3 === 'stop'
            ? 'flows to tank'
            : 'fed'
          : s.V3 === 'stop'
            ? 'vented'
            : 'carries displaced oil',
      );
    }
  });

  test('three sections: of those shifted, the one that needs the least pressure goes first', () => {
    // MAST lifts 30 kN on 50.3 cm²: 60 bar. TILT needs 15 bar out, 22 in; SLEW 300 N·m at 160 cm³: 118 bar.
    const { t, states } = rows('stacker-bank');
    expect(states.length).toBe(27);
    for (const s of states) {
      const at = say(s);
      const tilt = s.V2 !== 'hold';
      const slew = s.V3 !== 'stop';
      // Nothing holds the mast's load back in its section: with a lighter one shifted too, it sinks.
      const mast = { hold: 'held', raise: tilt ? 'moved in by load' : 'extends', lower: 'retracts' }[s.V1 ?? ''];
      expect(t.actuator('MAST', at), at).toBe(mast);
      expect(t.actuator('TILT', at), at).toBe(
        !tilt ? 'held' : s.V1 === 'lower' ? 'stalled' : s.V2 === 'out' ? 'extends' : 'retracts',
      );
      expect(t.actuator('SLEW', at), at).toBe(
        !slew ? 'held' : s.V1 !== 'hold' || tilt ? 'stalled' : s.V3 === 'left' ? 'turns A→B' : 'turns B→A',
      );
      expect(t.pump(at), at).toBe(s.V1 === 'hold' && !tilt && !slew ? 'unloaded' : 'working');
      // Lowered by its load, the mast runs ahead of the pump.
      if (s.V1 === 'lower') expect(t.notes('MAST', at)).toContain('void forms');
    }
  });

  test('infeed in series: backwards, the two loads add up to more than the relief valve allows', () => {
    // STOP down: 20 kN / 21 cm² = 95 bar on the cap side of KICK, so back needs (2 kN + 95 bar · 12.6 cm²) / 6.4 cm² = 217 bar, and the relief opens at 160.
    const { t } = rows('infeed-series');
    expect([
      t.actuator('KICK', 'V1=back, V2=down'),
      t.actuator('STOP', 'V1=back, V2=down'),
      t.pump('V1=back, V2=down'),
    ]).toEqual(['stalled', 'stalled', 'over relief']);
    expect([t.actuator('KICK', 'V1=kick, V2=up'), t.actuator('STOP', 'V1=kick, V2=up')]).toEqual([
      'extends',
      'extends',
    ]);
  });

  test('net winch: the drum turns freely at rest unless the shut-off is shut', () => {
    const { t, states } = rows('net-winch');
    for (const s of states) {
      const at = say(s);
      const open = s.BRAKE === 'open';
      const expected = {
        haul: open ? 'turns A→B' : 'held',
        free: open ? 'floats' : 'held',
        'pay out': open ? 'turns B→A' : 'held',
      }[s.V1 ?? ''];
      expect(t.actuator('DRUM', at), at).toBe(expected);
      expect(t.pump(at), at).toBe(s.V1 === 'free' ? 'unloaded' : open ? 'working' : 'over relief');
    }
  });

  test('panel clamp: locked at rest, pilots drained, pump destroked', () => {
    const { t } = rows('panel-clamp');
    expect([t.actuator('CLAMP', 'V1=rest'), t.pump('V1=rest')]).toEqual(['held', 'destroked']);
    expect(t.trapped('clamp side', 'V1=rest')).toContain('left behind');
    expect(t.line('V1.A', 'V1=rest')).toBe('vented');
    expect(t.table.data.notPermitted).toBe(1);
  });

  test('grain tipper with the pump stopped: the check keeps the load up until the lowering button is pressed', () => {
    const { t } = rows('grain-tipper', 'stopped');
    // Pulled out, it could draw oil from the tank through the open lift valve and the check.
    expect(t.actuator('BODY', 'LIFT=rest, LOWER=rest')).toBe('held one way');
    expect(t.notes('BODY', 'LIFT=rest, LOWER=rest')).toEqual(['free outward']);
    expect(t.trapped('lift', 'LIFT=rest, LOWER=rest')).toContain('load');
    expect(t.actuator('BODY', 'LIFT=rest, LOWER=lower')).toBe('moved in by load');
    expect(t.actuator('BODY', 'LIFT=lift, LOWER=rest')).toBe('held');
  });
});
