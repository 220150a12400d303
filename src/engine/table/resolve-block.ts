import type { Budget } from '../../base/budget.ts';
import { Cancelled } from '../../base/budget.ts';
import type { SettledBlock } from '../paths/block.ts';
import type { ActuatorOutcome } from './actuator-outcomes.ts';
import { actuatorByPressure, creeps, equalRivals, givesWay, movesOverValve, pumpByPressure } from './resolve.ts';
import type { PressureAnswer, PressureSolver } from './resolve.ts';
import { reflectedRank, strides } from './strides.ts';
import { ACTUATOR_NOTES, ACTUATOR_VERDICTS, PUMP_VERDICTS } from './words.ts';

const RESTS = ACTUATOR_VERDICTS.indexOf('rests on pressure');
const PUMP_RESTS = PUMP_VERDICTS.indexOf('rests on pressure');
const PUMP_WORKS = PUMP_VERDICTS.indexOf('working');
const HELD = ACTUATOR_VERDICTS.indexOf('held');
const FLOATS = ACTUATOR_VERDICTS.indexOf('floats');
const ONE_WAY = ACTUATOR_VERDICTS.indexOf('held one way');
const CREEPS_OUT = ACTUATOR_NOTES.indexOf('creeps outward on back pressure');
const LEAKS = ACTUATOR_NOTES.indexOf('creeps through its own leakage');
const CREEPS_IN = ACTUATOR_NOTES.indexOf('creeps inward on back pressure');
const VOID = ACTUATOR_NOTES.indexOf('void forms');

/** How many rows the pressure layer may still solve, shared by all blocks of a table. */
export interface Allowance {
  rows: number;
  /** It reaches for every row, so that those which open paths decide get their voids, stalls and relief flows too. */
  readonly every: boolean;
  /** Bits of the block that are asked for; absent = all. */
  readonly only?: Uint32Array;
}

export interface Resolved {
  /** States whose verdicts rest on entered or assumed values. */
  readonly valued: Uint32Array;
  /** The same for each actuator and each pump. */
  readonly actuators: readonly Uint32Array[];
  readonly pumps: readonly Uint32Array[];
  /** Per line: states in which oil passes it over a valve that pressures open, so that it is neither blocked nor trapped. */
  readonly flowing: ReadonlyMap<number, Uint32Array>;
}

/**
 * Puts the pressure layer's verdict, in place, where open paths leave it to the pressures, and where
 * they say that something moves. What the pressures do not decide either, or the allowance does not
 * reach, stays `rests on pressure`.
 */
export function resolveBlock(
  block: SettledBlock,
  actuators: readonly ActuatorOutcome[],
  pumps: readonly (readonly Uint32Array[])[],
  solver: PressureSolver,
  allowance: Allowance,
  budget: Budget,
): Resolved {
  const { width, motion } = block;
  const valued = new Uint32Array(width);
  const byActuator = actuators.map(() => new Uint32Array(width));
  const byPump = pumps.map(() => new Uint32Array(width));
  const flowing = new Map<number, Uint32Array>();
  const rows = rowsToSolve(block, actuators, pumps, solver, allowance);
  rows.forEach((bit, done) => {
    if ((done & 31) === 0) {
      if (budget.cancelled()) throw new Cancelled();
      budget.progress(done / rows.length);
    }
    const w = bit >>> 5;
    const low = 1 << (bit & 31);
    const answer = solver.solve(block.at * 32 + bit);
    if (answer.result.status !== 'solved') return;
    const bits = { block, bit };
    const rivals = equalRivals(solver, bits, answer);
    let changed = 0;
    const note = (plane: Uint32Array | undefined, at: number): void => {
      if (plane) plane[w] = (plane[w] as number) | at;
      changed |= at;
    };
    actuators.forEach((outcome, i) => {
      note(byActuator[i], (outcome.verdicts[RESTS]?.[w] as number) & low);
      const moves = ((motion.out[i]?.[w] as number) | (motion.in[i]?.[w] as number)) & low;
      if ((moves | ((outcome.verdicts[RESTS]?.[w] as number) & low)) === 0) {
        const yields =
          ((outcome.verdicts[HELD]?.[w] as number) & low) === 0 ? undefined : givesWay(i, solver, bits, answer);
        if (yields) {
          changed |= settle(outcome.verdicts, ACTUATOR_VERDICTS.indexOf(yields.verdict), w, low);
          const voids = outcome.notes[VOID] as Uint32Array;
          if (yields.void) voids[w] = (voids[w] as number) | low;
          return;
        }
        const free = ((outcome.verdicts[FLOATS]?.[w] as number) | (outcome.verdicts[ONE_WAY]?.[w] as number)) & low;
        const way = free === 0 && !leaks(solver, i) ? undefined : creeps(i, answer);
        if (way === undefined) return;
        const creeping = outcome.notes[free === 0 ? LEAKS : way === 'out' ? CREEPS_OUT : CREEPS_IN] as Uint32Array;
        creeping[w] = (creeping[w] as number) | low;
        note(byActuator[i], low);
        return;
      }
      const found = actuatorByPressure(i, solver, bits, answer, outcome.unfed, rivals);
      if (!found) return;
      note(byActuator[i], settle(outcome.verdicts, ACTUATOR_VERDICTS.indexOf(found.verdict), w, low));
      const voids = outcome.notes[VOID] as Uint32Array;
      if (found.void) voids[w] = (voids[w] as number) | low;
    });
    pumps.forEach((planes, i) => {
      note(byPump[i], (planes[PUMP_RESTS]?.[w] as number) & low);
      if ((((planes[PUMP_RESTS]?.[w] as number) | (planes[PUMP_WORKS]?.[w] as number)) & low) === 0) return;
      const found = pumpByPressure(i, solver, bits, answer);
      if (found) note(byPump[i], settle(planes, PUMP_VERDICTS.indexOf(found), w, low));
    });
    if (movesOverValve(bits, answer)) noteFlows(solver, answer, flowing, width, w, low);
    valued[w] = (valued[w] as number) | changed;
  });
  return { valued, actuators: byActuator, pumps: byPump, flowing };
}

/** Bits of the block whose rows the pressures are asked about, as many as the allowance lets, so that neighbours follow each other. */
function rowsToSolve(
  { at, width, all, hunts }: SettledBlock,
  actuators: readonly ActuatorOutcome[],
  pumps: readonly (readonly Uint32Array[])[],
  solver: PressureSolver,
  allowance: Allowance,
): number[] {
  const bits: number[] = [];
  for (let w = 0; w < width; w++) {
    let rests = 0;
    for (const outcome of actuators) rests |= outcome.verdicts[RESTS]?.[w] as number;
    for (const planes of pumps) rests |= planes[PUMP_RESTS]?.[w] as number;
    const asked = allowance.only === undefined ? -1 : (allowance.only[w] as number);
    let open = (allowance.every ? (all[w] as number) : rests) & ~(hunts[w] as number) & asked;
    while (open !== 0 && allowance.rows > 0) {
      const low = open & -open;
      open ^= low;
      allowance.rows -= 1;
      bits.push(w * 32 + (31 - Math.clz32(low)));
    }
  }
  const radices = solver.net.inputs.map(({ positions }) => positions.length);
  const weights = strides(radices);
  const ranks = new Map(bits.map((bit) => [bit, reflectedRank(at * 32 + bit, radices, weights)]));
  return bits.sort((a, b) => (ranks.get(a) as number) - (ranks.get(b) as number));
}

function noteFlows(
  solver: PressureSolver,
  answer: PressureAnswer,
  flowing: Map<number, Uint32Array>,
  width: number,
  w: number,
  bit: number,
): void {
  for (let line = 0; line < solver.net.shown; line++) {
    if (!solver.flows(answer, line)) continue;
    const plane = flowing.get(line) ?? new Uint32Array(width);
    plane[w] = (plane[w] as number) | bit;
    flowing.set(line, plane);
  }
}

/** A motor through which oil slips while its lines are blocked. */
const leaks = (solver: PressureSolver, actuator: number): boolean => {
  const { leakage, drain } = solver.net.actuators[actuator] ?? { leakage: 0 };
  return leakage > 0 || (drain?.leakage ?? 0) > 0;
};

/** Gives the state this verdict and no other; returns its bit if that is news. */
export function settle(planes: readonly Uint32Array[], verdict: number, w: number, bit: number): number {
  const now = planes[verdict] as Uint32Array;
  if (((now[w] as number) & bit) !== 0) return 0;
  for (const plane of planes) plane[w] = (plane[w] as number) & ~bit;
  now[w] = (now[w] as number) | bit;
  return bit;
}
