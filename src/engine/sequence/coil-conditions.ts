import { MOST_VARIABLES, minimise } from './minimise.ts';
import type { Term } from './minimise.ts';
import type { LogicPlan, LogicStep, Signal } from './step-logic.ts';
import { signalsOf, signalStates } from './step-logic.ts';

/** A condition as a tree; numbers are those of `CoilConditions.signals` and of the plan's steps. */
export type Expression =
  | { readonly type: 'all' | 'any'; readonly of: readonly Expression[] }
  | { readonly type: 'not'; readonly of: Expression }
  | { readonly type: 'signal'; readonly signal: number }
  /** The memory of a step is set. */
  | { readonly type: 'step'; readonly step: number }
  /** The time of a step has run out. */
  | { readonly type: 'timer'; readonly step: number };

export const ALWAYS: Expression = { type: 'all', of: [] };
export const NEVER: Expression = { type: 'any', of: [] };

export interface CoilCondition {
  readonly coil: number;
  /** Steps in which it is on. */
  readonly on: readonly number[];
  /** By the memory of the steps; works for every plan. */
  readonly bySteps: Expression;
  /** By signals alone, while the cycle runs; absent = they cannot tell its steps apart. */
  readonly bySignals?: SignalCondition;
  /** Pairs of steps, on and off, that look alike to the signals. */
  readonly clashes: readonly { readonly on: number; readonly off: number }[];
}

export interface SignalCondition {
  readonly expression: Expression;
  /** Known to be the fewest terms, then the fewest contacts. */
  readonly least: boolean;
}

/** Two steps with different coils in which all signals can be the same. */
export interface StepClash {
  readonly steps: readonly [number, number];
  /** Signals that are on in such a state. */
  readonly signals: readonly number[];
  /** Coils that differ. */
  readonly coils: readonly number[];
}

export interface CoilConditions {
  readonly signals: readonly Signal[];
  readonly coils: readonly CoilCondition[];
  /** What ends each step, its memory being set. */
  readonly ends: readonly Expression[];
  readonly clashes: readonly StepClash[];
  /** False: actuators end where the next cycle does not start, as far as the motions show it. */
  readonly closed: boolean;
  /** False: there are too many signals for conditions by signals alone. */
  readonly compared: boolean;
}

/**
 * When each coil has to be on. By signals alone it is the shortest condition that is true in every state of the
 * signals that can come about in a step with the coil on, and false in every one of a step with it off; states that
 * never come about are free. Where one state belongs to both, only the memory of the steps tells.
 */
export function coilConditions(plan: LogicPlan): CoilConditions {
  const signals = signalsOf(plan);
  const ends = plan.steps.map((step, i) => endOf(step, i, signals));
  const states = signalStates(plan, MOST_VARIABLES);
  const owners = new Map<number, number[]>();
  states?.steps.forEach((found, step) => {
    for (const state of found) owners.set(state, [...(owners.get(state) ?? []), step]);
  });
  return {
    signals,
    ends,
    coils: plan.coils.map((_, coil) => conditionOf(plan, coil, states && owners)),
    clashes: clashesOf(plan, owners, signals.length),
    closed: states?.closed ?? true,
    compared: states !== undefined,
  };
}

function conditionOf(
  { steps }: LogicPlan,
  coil: number,
  owners: ReadonlyMap<number, readonly number[]> | undefined,
): CoilCondition {
  const isOn = (step: number): boolean => steps[step]?.coils.includes(coil) === true;
  const on = steps.flatMap((_, i) => (isOn(i) ? [i] : []));
  const bySteps = oneOf(on.map((step): Expression => ({ type: 'step', step })));
  if (!owners) return { coil, on, bySteps, clashes: [] };
  const [ones, zeros]: [number[], number[]] = [[], []];
  const clashes = new Map<string, { on: number; off: number }>();
  for (const [state, of] of owners) {
    const [active, idle] = [of.filter(isOn), of.filter((step) => !isOn(step))];
    if (active.length > 0) ones.push(state);
    else zeros.push(state);
    for (const a of active) for (const b of idle) clashes.set(`${a} ${b}`, { on: a, off: b });
  }
  const list = [...clashes.values()].toSorted((a, b) => a.on - b.on || a.off - b.off);
  if (list.length > 0) return { coil, on, bySteps, clashes: list };
  const { terms, least } = minimise(ones, zeros);
  return { coil, on, bySteps, clashes: [], bySignals: { expression: oneOf(terms.map(product)), least } };
}

const oneOf = (of: readonly Expression[]): Expression =>
  of.length === 1 ? (of[0] as Expression) : { type: 'any', of };

/** Closed contacts first. */
function product({ mask, value }: Term): Expression {
  const contacts = (bits: number): Expression[] =>
    Array.from({ length: MOST_VARIABLES }, (_, signal): Expression => ({ type: 'signal', signal })).filter(
      (_, signal) => ((bits >>> signal) & 1) === 1,
    );
  const of = [
    ...contacts(value),
    ...contacts(mask & ~value).map((contact): Expression => ({ type: 'not', of: contact })),
  ];
  return of.length === 1 ? (of[0] as Expression) : { type: 'all', of };
}

function endOf({ end, motions }: LogicStep, step: number, signals: readonly Signal[]): Expression {
  const sensor = (actuator: number, at: unknown): Expression => ({
    type: 'signal',
    signal: signals.findIndex((s) => s.type === 'sensor' && s.actuator === actuator && s.at === at),
  });
  switch (end.by) {
    case 'motion': {
      const of = motions.map(({ actuator, way }) => sensor(actuator, way === '+' ? 'out' : 'in'));
      return of.length === 1 ? (of[0] as Expression) : { type: 'all', of };
    }
    case 'sensor':
      return sensor(end.actuator, end.at);
    case 'pressure': {
      const at = signals.findIndex((s) => s.type === 'switch' && s.switch === end.switch);
      return end.turns === 'on' ? { type: 'signal', signal: at } : { type: 'not', of: { type: 'signal', signal: at } };
    }
    case 'time':
      return { type: 'timer', step };
  }
}

function clashesOf(
  { steps }: LogicPlan,
  owners: ReadonlyMap<number, readonly number[]>,
  signalCount: number,
): StepClash[] {
  const found = new Map<string, StepClash>();
  for (const [state, of] of owners) {
    for (const [i, a] of of.entries()) {
      for (const b of of.slice(i + 1)) {
        const [x, y] = [steps[a]?.coils ?? [], steps[b]?.coils ?? []];
        const coils = [...x.filter((c) => !y.includes(c)), ...y.filter((c) => !x.includes(c))];
        if (coils.length === 0 || found.has(`${a} ${b}`)) continue;
        const signals = Array.from({ length: signalCount }, (_, s) => s).filter((s) => ((state >>> s) & 1) === 1);
        found.set(`${a} ${b}`, { steps: [a, b], signals, coils: coils.toSorted((p, q) => p - q) });
      }
    }
  }
  return [...found.values()].toSorted((p, q) => p.steps[0] - q.steps[0] || p.steps[1] - q.steps[1]);
}

/** What an expression is worth. `signals`: which are on; `step`: the one whose memory is set; `timer`: its time is out. */
export function holds(
  expression: Expression,
  now: { readonly signals: ReadonlySet<number>; readonly step: number; readonly timer: boolean },
): boolean {
  switch (expression.type) {
    case 'all':
      return expression.of.every((part) => holds(part, now));
    case 'any':
      return expression.of.some((part) => holds(part, now));
    case 'not':
      return !holds(expression.of, now);
    case 'signal':
      return now.signals.has(expression.signal);
    case 'step':
      return now.step === expression.step;
    case 'timer':
      return now.step === expression.step && now.timer;
  }
}
