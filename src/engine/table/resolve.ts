import { standsAt } from '../../network/dependents.ts';
import type { NetActuator, Network } from '../../network/network.ts';
import { compileFlow, setState } from '../flow/compile.ts';
import type { FlowModel } from '../flow/compile.ts';
import { describe } from '../flow/result.ts';
import type { FlowResult, Solved } from '../flow/result.ts';
import { TieFinder } from '../flow/ties.ts';
import type { SettledBlock } from '../paths/block.ts';
import { settingOf } from '../paths/dependents.ts';
import type { DependentPlanes } from '../paths/edges.ts';
import { REST_REASONS } from '../paths/motion-bits.ts';
import type { PathConditions } from '../paths/reach.ts';
import { motionWords } from './actuator-outcomes.ts';
import type { ActuatorOutcome } from './actuator-outcomes.ts';
import { strides } from './strides.ts';
import type { ActuatorVerdict, PumpVerdict } from './words.ts';

/** Flow that counts as motion, and as void: 0.01 and 5e-4 L/min in m³/s. */
const MOTION = 0.01e-3 / 60;
const VOID = 5e-7 / 60;
/** Pa; a chamber below it is not pressed on but sucked full. */
const PRESSED = 1e4;
const RIVALS = REST_REASONS.indexOf('rivals');
const PRESSURE_VALVE = REST_REASONS.indexOf('pressure valve');
/** An unloaded pump stands below this share of its setting. */
const UNLOADED = 0.1;

/** What the pressures say about one row. */
export interface PressureAnswer {
  readonly result: FlowResult;
  /** Which of these actuators' speeds rest on the losses; empty unless two do. Costs several solves; to be asked before the next row. */
  readonly swings: (rivals: readonly number[]) => readonly number[];
  /** Per actuator: it moves, or the losses could make it. */
  readonly wavers: (actuator: number) => boolean;
  /** m³/s that pass each line of the problem on the way to or from something that moves; relief flow is none of it. */
  readonly through: Float64Array;
  /** Through-put of every branch of the problem: m³/s, m/s or rad/s; 0 where it is off. */
  readonly flows: Float64Array;
}

/** Steady pressures of single rows; each solve starts from the last one. */
export class PressureSolver {
  readonly net: Network;
  readonly model: FlowModel;
  /** Where the dependent valves stand, row by row; needed where the circuit has some. */
  settings: DependentPlanes | undefined;
  readonly #strides: readonly number[];
  #warm: Float64Array | undefined;
  #solves = 0;
  readonly #ties: TieFinder;

  constructor(net: Network, conditions: PathConditions, settings?: DependentPlanes) {
    this.net = net;
    this.settings = settings;
    this.model = compileFlow(net, conditions);
    this.#ties = new TieFinder(this.model.solver);
    this.#strides = strides(net.inputs.map((input) => input.positions.length));
  }

  /** Position of a commanded input in a row. */
  commanded(row: number, input: number): number {
    return Math.floor(row / (this.#strides[input] as number)) % (this.net.inputs[input]?.positions.length ?? 1);
  }

  /** 0-based row. `setting`: other positions of the dependent valves. */
  solve(row: number, setting: readonly number[] = settingOf(this.net, this.settings, row)): PressureAnswer {
    const { model, net } = this;
    setState(
      model,
      standsAt(net, (input) => this.commanded(row, input), setting),
    );
    const solution = model.solver.solve(this.#warm ? { warm: this.#warm } : {});
    const result = describe(model.solver, solution);
    const flows = solution.throughputs.slice();
    const through = this.#throughflow(flows);
    const warm = result.status === 'solved' ? Float64Array.from(solution.pressures) : undefined;
    this.#warm = warm;
    const solve = ++this.#solves;
    let wavers: ((branch: number) => boolean) | undefined;
    const inTime = (): void => {
      if (this.#solves !== solve) throw new Error('Asked after another row was solved.');
    };
    const branchOf = (actuator: number): number => model.actuators[actuator] as number;
    return {
      result,
      through,
      flows,
      wavers: (actuator) => {
        if (warm === undefined) return false;
        if (wavers === undefined) inTime();
        wavers ??= this.#ties.wavers(warm, flows);
        return wavers(branchOf(actuator));
      },
      swings: (rivals) => {
        inTime();
        if (warm === undefined || rivals.length < 2) return [];
        const found = this.#ties.find(warm, { rivals: rivals.map(branchOf), flows });
        return found.length < 2 ? [] : rivals.filter((i) => found.includes(branchOf(i)));
      },
    };
  }

  /** True if oil on its way to or from a moving actuator passes this line. */
  flows({ through }: PressureAnswer, line: number): boolean {
    const at = line < 0 ? -1 : (this.model.lineOf[line] as number);
    return at >= 0 && (through[at] as number) > MOTION;
  }

  #throughflow(throughputs: Float64Array): Float64Array {
    const { problem } = this.model;
    const through = new Float64Array(problem.lines.length);
    problem.branches.forEach((branch, j) => {
      if (branch.kind === 'relief' || branch.kind === 'compensator' || branch.kind === 'leakage') return;
      const x = Math.abs(throughputs[j] as number);
      if (x === 0) return;
      if (branch.a >= 0) through[branch.a] = Math.max(through[branch.a] as number, Math.abs(branch.ca) * x);
      if (branch.b >= 0) through[branch.b] = Math.max(through[branch.b] as number, Math.abs(branch.cb) * x);
    });
    return through;
  }

  /** Gauge pressure of a line of the network, Pa. */
  pressure(solved: Solved, line: number): number {
    const at = line < 0 ? -1 : (this.model.lineOf[line] as number);
    return at < 0 ? 0 : (solved.lines[at]?.pressure ?? 0);
  }

  /** m³/s of void that forms in a line. */
  voidFlow(solved: Solved, line: number): number {
    const at = line < 0 ? -1 : (this.model.lineOf[line] as number);
    return at < 0 ? 0 : (solved.lines[at]?.voidFlow ?? 0);
  }

  /** m³/s into an accumulator of the network; negative while it gives. */
  storeFlow({ flows }: PressureAnswer, store: number): number {
    return flows[this.model.stores[store] as number] ?? 0;
  }

  /** m³/s over a relief valve of the network. */
  reliefFlow({ flows }: PressureAnswer, relief: number): number {
    const { reliefs, vents } = this.model;
    return Math.max(0, flows[reliefs[relief] as number] ?? 0) + Math.max(0, flows[vents[relief] as number] ?? 0);
  }
}

/** One state of a block: reads its bits. */
export interface BlockBits {
  readonly block: SettledBlock;
  /** Bit index within the block. */
  readonly bit: number;
}

const on = ({ bit }: BlockBits, plane: Uint32Array | undefined): boolean =>
  (((plane?.[bit >>> 5] ?? 0) >>> (bit & 31)) & 1) === 1;

/**
 * A chamber with a free way from the tank fills by suction; the solver, which knows no pressure under that of the
 * tank, lets a void make up for the small loss on that way.
 */
function voidForms(solver: PressureSolver, { block, bit }: BlockBits, result: Solved, line: number): boolean {
  if (solver.voidFlow(result, line) <= VOID) return false;
  const at = line * block.width + (bit >>> 5);
  const freely = (block.reach.freeToTank[at] as number) & (block.reach.plainFills[at] as number);
  return ((freely >>> (bit & 31)) & 1) === 0;
}

/**
 * The verdict that pressures give an actuator which open paths left to them; undefined = they do not decide it either.
 * `rivals`: the row's `equalRivals`.
 */
export function actuatorByPressure(
  index: number,
  solver: PressureSolver,
  bits: BlockBits,
  { result }: PressureAnswer,
  unfed: ActuatorOutcome['unfed'],
  rivals: readonly number[],
): { verdict: ActuatorVerdict; void: boolean } | undefined {
  const actuator = solver.net.actuators[index];
  if (!actuator || result.status !== 'solved') return undefined;
  const state = result.actuators[index];
  if (!state) return undefined;
  if (rivals.includes(index)) return { verdict: 'undetermined', void: false };
  const { motion } = bits.block;
  const words = motionWords(actuator);
  const flow = Math.max(Math.abs(state.flowIn), Math.abs(state.flowOut));
  const goesOut = on(bits, motion.out[index]);
  const goesIn = on(bits, motion.in[index]);
  const { valves, width } = { valves: bits.block.reach.valves, width: bits.block.width };
  const overValve = (line: number): boolean =>
    valves !== undefined && line >= 0 && on(bits, valves.pressed.subarray(line * width, (line + 1) * width));
  const fedPlain = on(bits, motion.fedA[index]) || on(bits, motion.fedB[index]);
  if (flow <= MOTION) {
    if (goesOut || goesIn) return { verdict: 'stalled', void: false };
    const pressed = Math.max(solver.pressure(result, actuator.a), solver.pressure(result, actuator.b)) > PRESSED;
    const free = on(bits, unfed.floats) ? 'floats' : on(bits, unfed.oneWay) ? 'held one way' : 'held';
    return { verdict: fedPlain || pressed ? 'held' : free, void: false };
  }
  const displaced = on(bits, motion.displaced[index]);
  if (state.speed > 0) {
    const fed =
      on(bits, motion.fedA[index]) ||
      (displaced && goesOut) ||
      (overValve(actuator.a) && solver.pressure(result, actuator.a) > PRESSED);
    return { verdict: fed ? words.out : words.pushedOut, void: voidForms(solver, bits, result, actuator.a) };
  }
  const fed =
    on(bits, motion.fedB[index]) ||
    (displaced && goesIn) ||
    (overValve(actuator.b) && solver.pressure(result, actuator.b) > PRESSED);
  return { verdict: fed ? words.in : words.pushedIn, void: voidForms(solver, bits, result, actuator.b) };
}

/**
 * Actuators between which losses alone share one flow out: at least two that a pump drives the way it
 * feeds them, or that stand, and whose speeds rest on the losses. One that its load drives is no rival:
 * it runs as fast as the losses let it, and that is an answer.
 */
export function equalRivals(
  solver: PressureSolver,
  bits: BlockBits,
  { result, swings, wavers }: PressureAnswer,
): readonly number[] {
  if (result.status !== 'solved') return [];
  const { motion } = bits.block;
  const driven: number[] = [];
  for (let i = 0; i < solver.net.actuators.length; i++) {
    const actuator = solver.net.actuators[i] as NetActuator;
    if (!on(bits, motion.rests[i]?.[RIVALS]) || !wavers(i)) continue;
    const speed = result.actuators[i]?.speed ?? 0;
    const out = on(bits, motion.out[i]);
    if ((out ? speed >= 0 : speed <= 0) && solver.pressure(result, out ? actuator.a : actuator.b) > PRESSED)
      driven.push(i);
  }
  // What swings costs several solves, and one alone has no rival.
  return driven.length < 2 ? [] : swings(driven);
}

/** An actuator that open paths leave free, and that the back pressure of a flow to tank moves all the same (p·Ar, law). */
export function creeps(index: number, { result }: PressureAnswer): 'out' | 'in' | undefined {
  const state = result.status === 'solved' ? result.actuators[index] : undefined;
  if (!state || Math.max(Math.abs(state.flowIn), Math.abs(state.flowOut)) <= MOTION) return undefined;
  return state.speed > 0 ? 'out' : 'in';
}

/**
 * An actuator that open paths hold, whose load or spring is stronger than a relief valve allows: it gives way over
 * that valve. undefined if it does not.
 */
export function givesWay(
  index: number,
  solver: PressureSolver,
  bits: BlockBits,
  answer: PressureAnswer,
): { readonly verdict: ActuatorVerdict; readonly void: boolean; readonly reliefs: readonly number[] } | undefined {
  const actuator = solver.net.actuators[index];
  const way = creeps(index, answer);
  const { result } = answer;
  if (!actuator || way === undefined || result.status !== 'solved') return undefined;
  const pushed = actuator.push.way === way || actuator.push.way === 'both';
  const reliefs = solver.net.reliefs.flatMap((_, i) => (solver.reliefFlow(answer, i) > MOTION ? [i] : []));
  if (!pushed || reliefs.length === 0) return undefined;
  const words = motionWords(actuator);
  const grows = way === 'out' ? actuator.a : actuator.b;
  return {
    verdict: way === 'out' ? words.pushedOut : words.pushedIn,
    void: voidForms(solver, bits, result, grows),
    reliefs,
  };
}

/** True if something moves over a valve that pressures open, which open paths do not know of. */
export function movesOverValve(bits: BlockBits, { result }: PressureAnswer): boolean {
  if (result.status !== 'solved') return false;
  const { motion } = bits.block;
  return result.actuators.some(
    ({ flowIn, flowOut }, i) =>
      Math.max(Math.abs(flowIn), Math.abs(flowOut)) > MOTION &&
      !on(bits, motion.out[i]) &&
      !on(bits, motion.in[i]) &&
      on(bits, motion.rests[i]?.[PRESSURE_VALVE]),
  );
}

/** The same for a pump. */
export function pumpByPressure(
  index: number,
  solver: PressureSolver,
  bits: BlockBits,
  answer: PressureAnswer,
): PumpVerdict | undefined {
  const { net } = solver;
  const { result } = answer;
  const pump = net.pumps[index];
  if (!pump || result.status !== 'solved') return undefined;
  const state = result.pumps[index];
  if (!state) return undefined;
  const { reach, width } = bits.block;
  const pressed = reach.pressed[index] as Uint32Array;
  const offered = (line: number): boolean => line >= 0 && on(bits, pressed.subarray(line * width, (line + 1) * width));
  const valves = reach.valves?.pressed;
  const overValve = (line: number): boolean =>
    valves !== undefined && line >= 0 && on(bits, valves.subarray(line * width, (line + 1) * width));
  const drives = net.actuators.some((actuator, i) => {
    const speed = result.actuators[i]?.speed ?? 0;
    const flow = Math.max(Math.abs(result.actuators[i]?.flowIn ?? 0), Math.abs(result.actuators[i]?.flowOut ?? 0));
    if (flow <= MOTION) return false;
    const grows = speed > 0 ? actuator.a : actuator.b;
    // A pump that stands lower than the chamber is shut off from it by a check.
    if (state.pressure + PRESSED < solver.pressure(result, grows)) return false;
    return offered(grows) || (overValve(grows) && solver.pressure(result, grows) > PRESSED);
  });
  const charges = net.accumulators.some((store, i) => offered(store.line) && solver.storeFlow(answer, i) > MOTION);
  const mine = net.reliefs.flatMap((relief, i) => (relief.from === pump.outlet || offered(relief.from) ? [i] : []));
  const spilled = mine.reduce((sum, i) => sum + solver.reliefFlow(answer, i), 0);
  if (
    pump.compensated &&
    !drives &&
    !charges &&
    state.delivered < 0.02 * pump.flow &&
    state.pressure > 0.5 * pump.setting
  )
    return 'destroked';
  if (drives || charges) return spilled > MOTION ? 'working, part over relief' : 'working';
  const setting = Math.max(pump.setting, ...mine.map((i) => net.reliefs[i]?.setting ?? 0), 0);
  // A vented relief valve lets all of it out too, but at a pressure that counts as none.
  if (setting > 0 && state.pressure < UNLOADED * setting) return 'unloaded';
  return spilled > MOTION ? 'over relief' : undefined;
}
