import { expect } from 'vitest';
import { FlowBuilder } from '../../../src/engine/flow/builder.ts';
import type { CylinderData } from '../../../src/engine/flow/builder.ts';
import { TANK } from '../../../src/engine/flow/problem.ts';
import type { FlowProblem } from '../../../src/engine/flow/problem.ts';
import { solveFlow } from '../../../src/engine/flow/result.ts';
import type { ActuatorState, BranchState, LineState, PumpState, Solved } from '../../../src/engine/flow/result.ts';

export const BAR = 1e5;
export const LPM = 1e-3 / 60;
export const CM2 = 1e-4;
export const DAN = 10;

/** Units of the American examples. */
export const PSI = 6894.757;
export const GPM = 3.785411784e-3 / 60;
export const INCH = 0.0254;
export const LBF = 4.4482216;
export const HP = 745.69987;

export const circle = (diameter: number): number => (Math.PI / 4) * diameter * diameter;

/** The four digits that are printed. */
export function near(value: number, expected: number, digits = 4): void {
  const room = Math.abs(expected) * 0.6 * 10 ** (1 - digits) + 1e-12;
  expect(Math.abs(value - expected), `${value} against ${expected}`).toBeLessThanOrEqual(room);
}

export interface Seen {
  readonly all: Solved;
  readonly line: (name: string) => LineState;
  /** bar */
  readonly bar: (name: string) => number;
  readonly actuator: (id: string) => ActuatorState;
  readonly branch: (id: string) => BranchState;
  /** L/min through a branch. */
  readonly lpm: (id: string) => number;
  readonly pump: (id: string) => PumpState;
}

/** Solves, insists on a sound certificate, and gives the parts by name. */
export function solve(problem: FlowProblem): Seen {
  const all = solveFlow(problem);
  if (all.status !== 'solved') throw new Error(`${all.status}: ${all.words}`);
  expect(all.certificate.residual).toBeLessThan(1e-8);
  expect(all.certificate.balance).toBeLessThan(1e-8);
  expect(all.certificate.power).toBeLessThan(1e-7);
  const find = <T>(list: readonly T[], test: (item: T) => boolean, what: string): T => {
    const found = list.find(test);
    if (!found) throw new Error(`No ${what}`);
    return found;
  };
  const line = (name: string): LineState => find(all.lines, (l) => l.name === name, name);
  const branch = (id: string): BranchState => find(all.branches, (b) => b.id === id, id);
  return {
    all,
    line,
    bar: (name) => line(name).pressure / BAR,
    actuator: (id) => find(all.actuators, (a) => a.id === id, id),
    branch,
    lpm: (id) => branch(id).flow / LPM,
    pump: (id) => find(all.pumps, (p) => p.id === id, id),
  };
}

/** Open path of the hand-checked rig: Δp = q²/320 bar + 10⁻⁴ bar per L/min, q in L/min. */
export const open = { flow: LPM, drop: BAR / 320, laminar: (1e-4 * BAR) / LPM };

/** Pump of `flow` L/min, relief p = 100 + q/6 bar on line P. */
export function rig(flow = 40): { b: FlowBuilder; p: number } {
  const b = new FlowBuilder();
  const p = b.line('P');
  b.pumpFixed('pump', p, flow * LPM);
  b.relief('relief', p, TANK, 100 * BAR, BAR / 6 / LPM);
  return { b, p };
}

export const cylinder = (load: CylinderData['load'] = {}): CylinderData => ({ areaA: 20 * CM2, areaB: 10 * CM2, load });
