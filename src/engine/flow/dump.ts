import { bad, good } from '../../base/result.ts';
import type { Result } from '../../base/result.ts';
import { contradictions } from './problem.ts';
import type { Branch, BranchKind, Coupler, FlowProblem, Load, Pilot, Pump } from './problem.ts';
import type { FlowSolver } from './solver.ts';

const FORMAT = 'flow-problem';
const KINDS: readonly BranchKind[] = [
  'path',
  'check',
  'throttle',
  'flow control',
  'relief',
  'compensator',
  'accumulator',
  'leakage',
  'cylinder',
  'motor',
  'pressure valve',
];

/** A problem as JSON for a bug report. Numbers keep every bit; infinite bounds are written as words. */
export function dumpProblem(problem: FlowProblem): string {
  const words = (_: string, value: unknown): unknown =>
    typeof value === 'number' && !Number.isFinite(value)
      ? Number.isNaN(value)
        ? 'NaN'
        : value > 0
          ? '+inf'
          : '-inf'
      : value;
  return JSON.stringify({ format: FORMAT, version: 1, ...problem }, words, 1);
}

/** The problem of the state that a solver stands in: what is switched off there is off. */
export function problemNow({ system }: FlowSolver): FlowProblem {
  const { problem, on, pumpFlow } = system;
  return {
    ...problem,
    pumps: problem.pumps.map((pump, i) => ({ ...pump, flow: pumpFlow[i] ?? pump.flow })),
    branches: problem.branches.map((branch, j) => ({ ...branch, on: on[j] === 1 })),
  };
}

/** The reverse of `dumpProblem`; says what is wrong with a text that is no such problem. */
export function loadProblem(text: string): Result<FlowProblem> {
  let raw: unknown;
  try {
    raw = JSON.parse(text);
  } catch {
    return bad({ where: 'text', what: 'is not JSON.', remedy: 'Use a file written by the problem dump.' });
  }
  try {
    const top = record(raw, 'text');
    if (top['format'] !== FORMAT) throw new Wrong('format', `must be "${FORMAT}".`);
    const problem: FlowProblem = {
      lines: list(top['lines'], 'lines').map((name, i) => asText(name, `lines[${i}]`)),
      pumps: list(top['pumps'], 'pumps').map(readPump),
      branches: list(top['branches'], 'branches').map(readBranch),
      ...(top['couplers'] !== undefined && { couplers: list(top['couplers'], 'couplers').map(readCoupler) }),
      leak: number(top['leak'], 'leak'),
    };
    return good(
      problem,
      contradictions(problem).map((c) => ({
        where: c.where,
        what: c.what,
        remedy: 'Mend the data: nothing satisfies them.',
      })),
    );
  } catch (error) {
    if (error instanceof Wrong)
      return bad({ where: error.where, what: error.message, remedy: 'Use a file written by the problem dump.' });
    throw error;
  }
}

class Wrong extends Error {
  readonly where: string;
  constructor(where: string, what: string) {
    super(what);
    this.where = where;
  }
}

type Fields = Readonly<Record<string, unknown>>;

function record(value: unknown, where: string): Fields {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) throw new Wrong(where, 'must be an object.');
  return value as Fields;
}

function list(value: unknown, where: string): readonly unknown[] {
  if (!Array.isArray(value)) throw new Wrong(where, 'must be a list.');
  return value as readonly unknown[];
}

function number(value: unknown, where: string): number {
  if (value === '+inf') return Infinity;
  if (value === '-inf') return -Infinity;
  if (value === 'NaN') return NaN;
  if (typeof value !== 'number') throw new Wrong(where, 'must be a number.');
  return value;
}

function asText(value: unknown, where: string): string {
  if (typeof value !== 'string') throw new Wrong(where, 'must be text.');
  return value;
}

function readPump(value: unknown, i: number): Pump {
  const where = `pumps[${i}]`;
  const o = record(value, where);
  const pump = {
    id: asText(o['id'], `${where}.id`),
    line: number(o['line'], `${where}.line`),
    flow: number(o['flow'], `${where}.flow`),
  };
  return o['compensator'] === undefined
    ? pump
    : { ...pump, compensator: number(o['compensator'], `${where}.compensator`) };
}

function readBranch(value: unknown, i: number): Branch {
  const where = `branches[${i}]`;
  const o = record(value, where);
  const kind = KINDS.find((k) => k === o['kind']);
  if (!kind) throw new Wrong(`${where}.kind`, `must be one of ${KINDS.join(', ')}.`);
  const num = (key: string): number => number(o[key], `${where}.${key}`);
  return {
    id: asText(o['id'], `${where}.id`),
    kind,
    a: num('a'),
    b: num('b'),
    ca: num('ca'),
    cb: num('cb'),
    forward: num('forward'),
    backward: num('backward'),
    r: num('r'),
    k: num('k'),
    lo: num('lo'),
    hi: num('hi'),
    on: o['on'] !== false,
    ...(o['pilot'] === undefined ? {} : { pilot: readPilot(o['pilot'], `${where}.pilot`) }),
    ...(o['load'] === undefined ? {} : { load: readLoad(o['load'], `${where}.load`) }),
  };
}

function readCoupler(value: unknown, i: number): Coupler {
  const where = `couplers[${i}]`;
  const o = record(value, where);
  const numbers = (key: 'lines' | 'factors'): number[] =>
    list(o[key], `${where}.${key}`).map((entry, k) => number(entry, `${where}.${key}[${k}]`));
  return {
    id: asText(o['id'], `${where}.id`),
    lines: numbers('lines'),
    factors: numbers('factors'),
    r: number(o['r'], `${where}.r`),
  };
}

function readPilot(value: unknown, where: string): Pilot {
  const o = record(value, where);
  const signals = list(o['signals'], `${where}.signals`).map((s, i) => {
    const signal = record(s, `${where}.signals[${i}]`);
    return {
      line: number(signal['line'], `${where}.signals[${i}].line`),
      factor: number(signal['factor'], `${where}.signals[${i}].factor`),
    };
  });
  return {
    signals,
    setting: number(o['setting'], `${where}.setting`),
    gradient: number(o['gradient'], `${where}.gradient`),
  };
}

function readLoad(value: unknown, where: string): Load {
  const o = record(value, where);
  const load: Record<string, number> = {};
  for (const key of ['pressing', 'resisting', 'friction', 'spring'] as const)
    if (o[key] !== undefined) load[key] = number(o[key], `${where}.${key}`);
  return load;
}
