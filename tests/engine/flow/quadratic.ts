import { NEAR_IDEAL } from '../../../src/engine/flow/laws.ts';
import type { FlowProblem } from '../../../src/engine/flow/problem.ts';
import { BAR, LPM } from './rig.ts';

/**
 * The same steady state as a convex program in the flows, for a general QP solver: least content
 * Σ ∫ drive dx subject to the balance of every line (Millar 1951: the dual of the co-content). Only for
 * straight-line losses. In bar and L/min; a cylinder counts by the flow of its larger side.
 */
export function contentProgram(problem: FlowProblem): string {
  const linear: string[] = [];
  const squares: string[] = [];
  const bounds: string[] = [];
  const rows: string[][] = problem.lines.map(() => []);
  const add = (
    name: string,
    cost: number,
    square: number,
    least: number,
    most: number,
    ends: readonly (readonly [number, number])[],
  ): void => {
    linear.push(`${signed(cost)} ${name}`);
    squares.push(`${signed(square)} ${name} ^2`);
    bounds.push(least === -Infinity ? ` ${name} free` : ` ${least} <= ${name} <= ${most === Infinity ? '1e30' : most}`);
    for (const [line, factor] of ends) if (line >= 0 && factor !== 0) rows[line]?.push(`${signed(factor)} ${name}`);
  };
  problem.branches.forEach((b, j) => {
    if (!b.on) return;
    const area = Math.max(Math.abs(b.ca), Math.abs(b.cb));
    const force = BAR * area;
    const r = (b.r * LPM) / (BAR * area * area);
    const end = (sign: number): [number, number][] => [
      [b.a, (sign * b.ca) / area],
      [b.b, (sign * b.cb) / area],
    ];
    if (b.hi > 0) add(`f${j}`, b.forward / force, r, 0, (b.hi * area) / LPM, end(1));
    if (b.lo < 0) add(`b${j}`, -b.backward / force, r, 0, (-b.lo * area) / LPM, end(-1));
  });
  problem.lines.forEach((_, i) => {
    add(`q${i}`, 0, LPM / BAR / problem.leak, -Infinity, Infinity, [[i, 1]]);
    add(`v${i}`, 0, (NEAR_IDEAL.void * LPM) / BAR, 0, Infinity, [[i, -1]]);
  });
  const pumped = problem.lines.map((_, i) =>
    problem.pumps.reduce((sum, pump) => sum + (pump.line === i ? pump.flow / LPM : 0), 0),
  );
  return [
    'Minimize',
    ` obj: ${linear.join('\n ')}`,
    ` + [ ${squares.join('\n ')} ] / 2`,
    'Subject To',
    ...rows.map((terms, i) => ` line${i}: ${terms.join('\n ')} = ${pumped[i] ?? 0}`),
    'Bounds',
    ...bounds,
    'End',
  ].join('\n');
}

const signed = (value: number): string => (value < 0 ? `- ${-value}` : `+ ${value}`);
