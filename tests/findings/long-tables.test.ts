import { describe, expect, test } from 'vitest';
import { networkOf } from '../../src/analysis/analyse.ts';
import { unlimited } from '../../src/base/budget.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { StateTable } from '../../src/engine/table/state-table.ts';
import { tabulate } from '../../src/engine/table/tabulate.ts';
import { LINE_CLASSES } from '../../src/engine/table/words.ts';
import { findFaults } from '../../src/findings/index.ts';
import type { Finding } from '../../src/findings/finding.ts';
import { telling } from '../../src/findings/pressures.ts';
import { circuit } from '../notation.ts';

/** 3⁸ rows; the last valve joins nothing, and C8 alone stands above its rating (34 kN on 50 mm are 173 bar). */
const PANEL = ((): Circuit => {
  const numbers = Array.from({ length: 8 }, (_, i) => i + 1);
  const parts = numbers.map(
    (i) =>
      `V${i} directional-valve:valve-4/3-shut, C${i} cylinder${i === 8 ? '{load=34 kN;loadSense=resisting;rating=160 bar}' : ''}`,
  );
  const chambers = numbers.map((i) => `V${i}.A C${i}.A | V${i}.B C${i}.B`).join(' | ');
  const all = (port: string): string => numbers.map((i) => `V${i}.${port}`).join(' ');
  return circuit(
    `P1 fixed-pump, R1 relief-valve{setting=200 bar}, T1 tank, V9 directional-valve:valve-4/3-shut, ${parts.join(', ')} | ${chambers} | P1.P R1.P ${all('P')} | P1.S R1.T T1.T ${all('T')}`,
  );
})();

function tableOf(c: Circuit, pressureRows = 0): { table: StateTable; findings: Finding[] } {
  const net = networkOf(c);
  const conditions = { pumpsRunning: true, places: net.actuators.map(() => 'between' as const) };
  const table = new StateTable(tabulate(net, conditions, unlimited, { pressureRows }));
  return { table, findings: findFaults({ net, table }) };
}

describe('a table too long to solve every row of it', () => {
  const { table, findings } = tableOf(PANEL);

  test('is looked at in rows that show every verdict and line class, each lever by itself, and others, none of them twice', () => {
    const rows = telling(table, 160);
    expect(rows).toHaveLength(160);
    expect(new Set(rows).size).toBe(160);
    expect(Math.max(...rows)).toBeLessThan(table.count);
    const rest = table.positionsOf(table.restRow());
    const moved = rows.map((row) => table.positionsOf(row).filter((at, i) => at !== rest[i]).length);
    expect(moved.filter((levers) => levers === 0)).toHaveLength(1);
    expect(moved.filter((levers) => levers === 1)).toHaveLength(18);
    expect(moved.filter((levers) => levers > 2).length).toBeGreaterThan(10);
    table.data.actuators.forEach((_, i) => {
      const shown = new Set(rows.map((row) => table.actuator(i, row)));
      expect(new Set(table.actuatorCounts(i).map(({ verdict }) => verdict))).toEqual(shown);
    });
    table.data.lines.forEach((_, i) => {
      const shown = new Set<string>(rows.map((row) => table.line(i, row)));
      const ever = LINE_CLASSES.filter((_, k) => table.data.linePlanes[i]?.[k]?.some((word) => word !== 0));
      expect(new Set<string>(ever)).toEqual(shown);
    });
  });

  test('says of a rating how many rows were looked at', () => {
    const found = findings.find(({ rule, parts }) => rule === 'over-rating' && parts.includes('C8'));
    expect(found?.what).toMatch(/; 160 of 19,683 rows were looked at, others may stand higher\)/);
    expect(found?.rowCount).toBeLessThanOrEqual(160);
  });

  test('still has every position that changes nothing, and none that changes something', () => {
    const idle = findings.filter(({ rule }) => rule === 'position-changes-nothing');
    expect(idle.map(({ parts }) => parts)).toEqual([['V9']]);
  });
});

test('a two-stage valve on coils does not control how a load comes down; a hand on its pilot stage does (practice)', () => {
  const lift = (form: string, pressureRows = 3): string[] =>
    tableOf(
      circuit(
        `P1 fixed-pump, R1 relief-valve, P2 fixed-pump, R2 relief-valve, T1 tank, V1 two-stage-valve:${form}{pilotSupply=external;pilotDrain=external}, C1 cylinder{load=20 kN;loadSense=pushes in} | P1.P R1.P V1.P | P2.P R2.P V1.X | V1.A C1.A | V1.B C1.B | P1.S P2.S R1.T R2.T T1.T V1.T V1.Y`,
      ),
      pressureRows,
    ).findings.map(({ rule }) => rule);
  expect(lift('two-stage-4/3-shut-coils')).toContain('lowering-not-controlled');
  // Where only open paths say where it stands, nothing is claimed.
  expect(lift('two-stage-4/3-shut-coils', 0)).not.toContain('lowering-not-controlled');
  expect(lift('two-stage-4/3-shut-lever')).not.toContain('lowering-not-controlled');
});
