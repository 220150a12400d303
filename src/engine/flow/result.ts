import { isGood } from './certificate.ts';
import type { Certificate } from './certificate.ts';
import { NEAR_IDEAL, SANE } from './laws.ts';
import type { Branch, BranchKind, Contradiction, FlowProblem } from './problem.ts';
import { TANK } from './problem.ts';
import { FlowSolver } from './solver.ts';
import type { Solution, SolveOptions } from './solver.ts';

/** The steady state in the names of the circuit, SI. Numbers are given only where there is a steady state. */
export type FlowResult =
  | Solved
  /** The data contradict each other; no steady state can meet them all. */
  | { readonly status: 'infeasible'; readonly contradictions: readonly Contradiction[]; readonly words: string }
  /** A pressure or a speed would rise without limit. */
  | {
      readonly status: 'unbounded';
      readonly cause: UnboundedCause;
      readonly names: readonly string[];
      readonly words: string;
    }
  /** A steady state may exist, but was not found within the budget. */
  | {
      readonly status: 'not converged';
      readonly cancelled: boolean;
      readonly certificate: Certificate;
      readonly words: string;
    };

export type UnboundedCause = 'dead-headed pump' | 'locked loads' | 'free fall';

export interface Solved {
  readonly status: 'solved';
  readonly lines: readonly LineState[];
  readonly branches: readonly BranchState[];
  readonly actuators: readonly ActuatorState[];
  readonly pumps: readonly PumpState[];
  readonly power: PowerBalance;
  readonly certificate: Certificate;
}

export interface LineState {
  readonly name: string;
  /** Pa */
  readonly pressure: number;
  /** m³/s of void that forms in it. */
  readonly voidFlow: number;
}

/** A path, valve, throttle, relief or accumulator. */
export interface BranchState {
  readonly id: string;
  readonly kind: BranchKind;
  /** m³/s */
  readonly flow: number;
  /** Pa across it. */
  readonly drop: number;
  /** W turned into heat. */
  readonly lost: number;
}

export interface ActuatorState {
  readonly id: string;
  /** m/s (rad/s), extending or A→B positive. */
  readonly speed: number;
  /** m³/s into the A side and out of the B side, both positive while it extends. */
  readonly flowIn: number;
  readonly flowOut: number;
  /** N (N·m) that the oil exerts outwards. */
  readonly force: number;
  /** N taken by an end stop; positive at the outer one. 0 away from stops. */
  readonly stopForce: number;
  /** W given to the load (negative: taken from it), to the spring, and turned into heat by friction. */
  readonly useful: number;
  readonly sprung: number;
  readonly lost: number;
}

export interface PumpState {
  readonly id: string;
  readonly pressure: number;
  /** m³/s that it really delivers. */
  readonly delivered: number;
  readonly power: number;
}

/** W. `pumps + loads + stores = useful + lost` up to the certificate. */
export interface PowerBalance {
  readonly pumps: number;
  /** Given by loads that drive. */
  readonly loads: number;
  /** Given by springs and accumulators (negative while they are charged). */
  readonly stores: number;
  readonly useful: number;
  readonly lost: number;
}

/** One problem, cold or warm. For many states of one circuit keep a `FlowSolver` and use `describe`. */
export function solveFlow(problem: FlowProblem, options: SolveOptions = {}): FlowResult {
  const solver = new FlowSolver(problem);
  return describe(solver, solver.solve(options));
}

export function describe(solver: FlowSolver, solution: Solution): FlowResult {
  const { problem, contradictions } = solver.system;
  switch (solution.status) {
    case 'infeasible':
      return {
        status: 'infeasible',
        contradictions,
        words: contradictions.map((c) => `${c.where}: ${c.what}`).join(' '),
      };
    case 'unbounded':
      return unbounded(solver, solution);
    case 'not converged':
      return notConverged(solution, solver.certificate());
    case 'solved': {
      // No figure goes out without its evidence.
      const certificate = solver.certificate();
      return isGood(certificate) ? solved(solver, solution, problem, certificate) : notConverged(solution, certificate);
    }
  }
}

function notConverged({ cancelled }: Solution, certificate: Certificate): FlowResult {
  const why = cancelled ? 'The calculation was stopped before' : 'The calculation ended before';
  return { status: 'not converged', cancelled, certificate, words: `${why} a steady state was found.` };
}

function unbounded(solver: FlowSolver, { pressures, throughputs }: Solution): FlowResult {
  const { problem, n, on, pumpFlow } = solver.system;
  let highest = 0;
  for (let i = 0; i < n; i++) highest = Math.max(highest, Math.abs(pressures[i] as number));
  if (highest >= SANE.pressure) {
    const high = (line: number): boolean => (pressures[line] as number) >= 0.1 * highest;
    const pumps = problem.pumps.filter((pump, i) => (pumpFlow[i] as number) > 0 && high(pump.line));
    if (pumps.length > 0) {
      const names = pumps.map((pump) => problem.lines[pump.line] as string);
      const say = pumps.map((pump, i) => `${pump.id} pumps into line ${names[i] ?? ''}`).join(', ');
      return {
        status: 'unbounded',
        cause: 'dead-headed pump',
        names,
        words: `${say}, which has no way out: its pressure would rise until something bursts.`,
      };
    }
    const names = problem.lines.filter((_, i) => high(i));
    return {
      status: 'unbounded',
      cause: 'locked loads',
      names,
      words: `Loads lock against each other over ${names.join(', ')}: no pressure there holds them.`,
    };
  }
  const names = problem.branches
    .filter(
      (b, j) =>
        on[j] === 1 &&
        isActuator(b) &&
        Math.abs(throughputs[j] as number) >= (b.kind === 'motor' ? SANE.rotation : SANE.speed),
    )
    .map((b) => b.id);
  return {
    status: 'unbounded',
    cause: 'free fall',
    names,
    words: `Nothing slows ${names.join(', ')} down: the load runs away with it.`,
  };
}

const isActuator = (b: Branch): boolean => b.kind === 'cylinder' || b.kind === 'motor';

/** Tables need neither branches nor powers of most rows: these are worked out when they are read. */
function solved(solver: FlowSolver, solution: Solution, problem: FlowProblem, certificate: Certificate): Solved {
  const on = solver.system.on.slice();
  const { pumpFlow } = solver.system;
  const pressures = solution.pressures.slice();
  const throughputs = solution.throughputs.slice();
  const at = (line: number): number => (line === TANK ? 0 : (pressures[line] as number));
  const lines = problem.lines.map((name, i): LineState => {
    const pressure = at(i);
    return { name, pressure: Math.max(0, pressure), voidFlow: Math.max(0, -pressure) / NEAR_IDEAL.void };
  });
  const actuators: ActuatorState[] = [];
  for (let j = 0; j < problem.branches.length; j++) {
    const b = problem.branches[j] as Branch;
    if (on[j] === 1 && isActuator(b))
      actuators.push(actuatorState(b, throughputs[j] as number, b.ca * at(b.a) + b.cb * at(b.b)));
  }
  const pumps = problem.pumps.map((pump, i): PumpState => {
    const back =
      pump.compensator !== undefined && on[pump.compensator] === 1 ? (throughputs[pump.compensator] as number) : 0;
    const delivered = (pumpFlow[i] as number) - back;
    return { id: pump.id, pressure: at(pump.line), delivered, power: at(pump.line) * delivered };
  });
  let branches: readonly BranchState[] | undefined;
  let power: PowerBalance | undefined;
  return {
    status: 'solved',
    lines,
    get branches() {
      return (branches ??= branchStates(problem, on, at, throughputs));
    },
    actuators,
    pumps,
    get power() {
      return (power ??= powerBalance(problem, at, throughputs, this.branches, actuators, pumps));
    },
    certificate,
  };
}

function branchStates(
  problem: FlowProblem,
  on: Uint8Array,
  at: (line: number) => number,
  throughputs: Float64Array,
): BranchState[] {
  return problem.branches.flatMap((b, j): BranchState[] => {
    if (on[j] !== 1 || b.kind === 'compensator' || isActuator(b)) return [];
    const flow = throughputs[j] as number;
    const drop = b.ca * at(b.a) + b.cb * at(b.b);
    const lost = b.kind === 'accumulator' ? (drop - b.forward) * flow : drop * flow;
    return [{ id: b.id, kind: b.kind, flow, drop, lost }];
  });
}

function powerBalance(
  problem: FlowProblem,
  at: (line: number) => number,
  throughputs: Float64Array,
  branches: readonly BranchState[],
  actuators: readonly ActuatorState[],
  pumps: readonly PumpState[],
): PowerBalance {
  const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
  const charged = problem.branches.map((b, j) =>
    b.kind === 'accumulator' ? b.forward * (throughputs[j] as number) : 0,
  );
  const coupled = (problem.couplers ?? []).map(({ lines, factors, r }) => {
    const drive = sum(lines.map((line, i) => (factors[i] as number) * at(line)));
    return (drive * drive) / r;
  });
  const leaked = problem.lines.map((_, i) => {
    const pressure = at(i);
    return pressure * pressure * problem.leak + (pressure < 0 ? (pressure * pressure) / NEAR_IDEAL.void : 0);
  });
  return {
    pumps: sum(pumps.map((pump) => pump.power)),
    loads: sum(actuators.map(({ useful }) => Math.max(0, -useful))),
    stores: -sum(actuators.map(({ sprung }) => sprung)) - sum(charged),
    useful: sum(actuators.map(({ useful }) => Math.max(0, useful))),
    lost: sum([...branches, ...actuators].map(({ lost }) => lost)) + sum(coupled) + sum(leaked),
  };
}

function actuatorState(b: Branch, x: number, drive: number): ActuatorState {
  const { pressing = 0, resisting = 0, spring = 0 } = b.load ?? {};
  const stopped = (b.hi === 0 && drive > b.forward) || (b.lo === 0 && drive < b.backward);
  const useful = pressing * x + resisting * Math.abs(x);
  const sprung = spring * x;
  return {
    id: b.id,
    speed: x,
    flowIn: b.ca * x,
    flowOut: -b.cb * x,
    force: drive,
    stopForce: stopped ? drive - (b.hi === 0 ? b.forward : b.backward) : 0,
    useful,
    sprung,
    lost: drive * x - useful - sprung,
  };
}
