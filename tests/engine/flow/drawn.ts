import { expect } from 'vitest';
import { networkOf } from '../../../src/analysis/analyse.ts';
import { PressureSolver } from '../../../src/engine/table/resolve.ts';
import type { ActuatorState, PumpState } from '../../../src/engine/flow/result.ts';
import { circuit } from '../../notation.ts';
import { BAR, LPM, circle } from './rig.ts';

/** Pieces of notation: no loss worth a digit, pump with relief, cylinder without friction, directional valve. */
export const NONE = 'ratedDrop=0.001 bar';
export const pump = (flow: number, relief: number): string =>
  `P1 fixed-pump{flow=${flow} L/min}, R1 relief-valve{setting=${relief} bar;fullFlowRise=0 bar}, T1 tank`;
export const SUPPLY = 'P1.S T1.T R1.T';
export const cyl = (id: string, bore: number, rod: number, load = 0, sense = 'resisting'): string =>
  `${id} cylinder{bore=${bore} mm;rod=${rod} mm;friction=0 kN${load > 0 ? `;load=${load} kN;loadSense=${sense}` : ''}}`;
export const valve = (form: string): string => `V1 directional-valve:${form}{${NONE}}`;

export const A63 = circle(0.063);
export const a63 = A63 - circle(0.045);

export type Place = 'between' | 'in' | 'out';

/** The steady state of one drawn circuit, by its names. */
export interface Drawn {
  /** bar in a line that the notation names. */
  readonly bar: (line: string) => number;
  /** L/min of void that forms in it. */
  readonly voids: (line: string) => number;
  readonly actuator: (label: string) => ActuatorState;
  readonly pump: (label: string) => PumpState;
  /** L/min over a relief valve. */
  readonly relief: (label: string) => number;
  /** L/min through a way, called `S1 P–A`. */
  readonly flow: (id: string) => number;
}

/** Compiles a circuit in notation and solves it with its first input at `position`; insists on a sound certificate. */
export function drawn(
  notation: string,
  position = '',
  places: Readonly<Record<string, Place>> = {},
  pumpsRunning = true,
): Drawn {
  const net = networkOf(circuit(notation));
  const label = (part: number): string => net.parts[part]?.label ?? '';
  const solver = new PressureSolver(net, {
    pumpsRunning,
    places: net.actuators.map((actuator) => places[label(actuator.part)] ?? 'between'),
  });
  const row = position === '' ? 0 : (net.inputs[0]?.positions.indexOf(position) ?? -1);
  if (row < 0 || net.inputs.length > 1) throw new Error(`No single input with a position ${position}`);
  const { result } = solver.solve(row);
  if (result.status !== 'solved') throw new Error(`${result.status}: ${result.words}`);
  // Paths that lose 0.001 bar are so steep that rounding of a pressure of 200 bar shows as 4e-7 of the flow.
  expect(result.certificate.residual).toBeLessThan(1e-6);
  expect(result.certificate.balance).toBeLessThan(1e-8);
  expect(result.certificate.power).toBeLessThan(1e-7);
  const line = (name: string): number => {
    const found = net.lines.findIndex((each) => each.name === name);
    if (found < 0) throw new Error(`No line ${name}`);
    return found;
  };
  const find = <T extends { readonly id: string }>(list: readonly T[], id: string): T => {
    const found = list.filter((each) => each.id === id);
    if (found.length !== 1) throw new Error(`${found.length} of ${id}: ${list.map((each) => each.id).join(', ')}`);
    return found[0] as T;
  };
  return {
    bar: (name) => solver.pressure(result, line(name)) / BAR,
    voids: (name) => solver.voidFlow(result, line(name)) / LPM,
    actuator: (id) => find(result.actuators, id),
    pump: (id) => find(result.pumps, id),
    relief: (id) => find(result.branches, id).flow / LPM,
    flow: (id) => find(result.branches, id).flow / LPM,
  };
}
