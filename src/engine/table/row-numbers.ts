import type { FlowResult } from '../flow/result.ts';
import type { PressureSolver } from './resolve.ts';

/** SI numbers of one row, by the order of the table's lines, actuators and pumps. */
export interface RowNumbers {
  readonly row: number;
  readonly status: FlowResult['status'];
  /** Why there are no numbers; absent when solved. */
  readonly words?: string;
  /** Pa per shown line. */
  readonly lines: readonly number[];
  /** Speed m/s (rad/s), outwards (A→B) positive; flow m³/s into or out of the larger side; force N (N·m) that the oil exerts outwards. */
  readonly actuators: readonly { readonly speed: number; readonly flow: number; readonly force: number }[];
  /** Pa at the outlet, m³/s delivered and over pressure valves, W. */
  readonly pumps: readonly { readonly pressure: number; readonly delivered: number; readonly power: number }[];
  /** Per relief valve of the circuit: its label and m³/s over it. */
  readonly reliefs: readonly { readonly label: string; readonly flow: number }[];
  /** W */
  readonly power: { readonly pumps: number; readonly loads: number; readonly useful: number; readonly lost: number };
}

export function rowNumbers(solver: PressureSolver, row: number, answer = solver.solve(row, false)): RowNumbers {
  const { result } = answer;
  if (result.status !== 'solved') {
    return {
      row,
      status: result.status,
      words: result.words,
      lines: [],
      actuators: [],
      pumps: [],
      reliefs: [],
      power: { pumps: 0, loads: 0, useful: 0, lost: 0 },
    };
  }
  const { net } = solver;
  const { pumps, loads, useful, lost } = result.power;
  return {
    row,
    status: 'solved',
    lines: Array.from({ length: net.shown }, (_, line) => solver.pressure(result, line)),
    actuators: result.actuators.map(({ speed, flowIn, flowOut, force }) => ({
      speed,
      flow: Math.max(Math.abs(flowIn), Math.abs(flowOut)),
      force,
    })),
    pumps: result.pumps.map(({ pressure, delivered, power }) => ({ pressure, delivered, power })),
    reliefs: net.reliefs.map((relief, i) => ({
      label: net.parts[relief.part]?.label ?? '',
      flow: solver.reliefFlow(result, i),
    })),
    power: { pumps, loads, useful, lost },
  };
}
