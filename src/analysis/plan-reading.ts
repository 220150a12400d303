import { parseQuantity } from '../base/units.ts';
import type { Problem } from '../base/result.ts';
import type { PlanStep, StepEnd, StepPlan } from '../circuit/plan.ts';
import { parseMotions } from '../engine/sequence/notation.ts';
import type { PlayEnd, PlayStep, Wanted } from '../engine/sequence/play/commands.ts';
import type { MachineStart } from '../engine/sequence/play/machine.ts';
import type { Network } from '../network/network.ts';
import type { PlanProblem } from './plan-results.ts';

/** A plan in numbers of the network, or what keeps it from being played. */
export interface ReadPlan {
  readonly start: MachineStart;
  readonly steps: readonly PlayStep[];
  readonly problems: readonly PlanProblem[];
}

/** s that a step is given unless it says otherwise. */
export const STEP_LIMIT = 120;

type Say = (where: string, what: string, remedy: string) => void;

/** Looks up parts, positions, coils and motions. What is not found is a problem, and left out. */
export function readPlan(net: Network, plan: StepPlan): ReadPlan {
  const problems: PlanProblem[] = [];
  const say =
    (step?: number): Say =>
    (where, what, remedy) =>
      void problems.push({
        kind: 'plan',
        level: 'fault',
        where: step === undefined ? where : `step ${step + 1}, ${where}`,
        what,
        remedy,
        ...(step !== undefined && { step }),
        parts: [],
        lines: [],
      });
  const names = new PlanNames(net);
  if (plan.steps.length === 0) say()('steps', 'The plan has no steps.', 'Add a step.');
  return {
    start: {
      strokes: startStrokes(names, plan, say()),
      positions: startPositions(names, plan, say()),
      running: net.pumps.map((pump) => !pump.atRest),
    },
    steps: plan.steps.map((step, i) => readStep(names, step, say(i))),
    problems,
  };
}

/** Finds what a plan names, in the network. */
class PlanNames {
  readonly net: Network;

  constructor(net: Network) {
    this.net = net;
  }

  id(part: number): string {
    return this.net.parts[part]?.id ?? '';
  }

  label(part: number): string {
    return this.net.parts[part]?.label ?? '';
  }

  /** Index in a list of the network of the member with this part id; -1 and a problem where there is none. */
  find(list: readonly { readonly part: number }[], noun: string, id: string, where: string, say: Say): number {
    const found = list.findIndex(({ part }) => this.id(part) === id);
    if (found >= 0) return found;
    const known = list.map(({ part }) => this.id(part)).join(', ');
    const other = this.net.parts.find((part) => part.id === id);
    say(
      where,
      other ? `${other.label} is no ${noun}.` : `There is no part "${id}".`,
      known === '' ? `The circuit has no ${noun}; draw one or leave it out.` : `Use one of ${known}.`,
    );
    return -1;
  }

  position(input: number, name: string, where: string, say: Say): number {
    const { positions = [], part = -1 } = this.net.inputs[input] ?? {};
    const found = positions.indexOf(name);
    if (found < 0) say(where, `${this.label(part)} has no position "${name}".`, `Use one of ${positions.join(', ')}.`);
    return found;
  }

  travel(actuator: number, text: string, where: string, say: Say): 'in' | 'out' | number | undefined {
    const { stroke, part = -1 } = this.net.actuators[actuator] ?? {};
    if (stroke === undefined) {
      say(where, `${this.label(part)} is a motor and has no stops.`, 'Name a cylinder.');
      return undefined;
    }
    if (text === 'in' || text === 'out') return text;
    const length = this.quantity(text, 'length', where, say);
    if (length === undefined) return undefined;
    if (length >= 0 && length <= stroke) return length === 0 ? 'in' : length === stroke ? 'out' : length;
    say(where, `${text} lies outside the stroke of ${this.label(part)}.`, `Stay within ${1000 * stroke} mm.`);
    return undefined;
  }

  quantity(text: string, quantity: 'length' | 'time', where: string, say: Say): number | undefined {
    const read = parseQuantity(text, quantity, where);
    if (read.ok && read.value >= 0) return read.value;
    const [problem] = read.ok ? [] : (read.problems as readonly Problem[]);
    say(where, problem?.what ?? `"${text}" is below 0.`, problem?.remedy ?? 'Use 0 or more.');
    return undefined;
  }
}

function startStrokes(names: PlanNames, plan: StepPlan, say: Say): number[] {
  const { net } = names;
  const strokes = net.actuators.map(() => 0);
  for (const [id, text] of Object.entries(plan.start ?? {})) {
    const where = `start of ${id}`;
    const actuator = names.find(net.actuators, 'actuator', id, where, say);
    const at = actuator < 0 ? undefined : names.travel(actuator, text, where, say);
    if (at !== undefined)
      strokes[actuator] = typeof at === 'number' ? at : at === 'in' ? 0 : (net.actuators[actuator]?.stroke ?? 0);
  }
  return strokes;
}

function startPositions(names: PlanNames, plan: StepPlan, say: Say): number[] {
  const positions = names.net.inputs.map(({ rest }) => rest ?? 0);
  for (const [id, name] of Object.entries(plan.standing ?? {})) {
    const where = `standing of ${id}`;
    const input = names.find(names.net.inputs, 'valve that is commanded', id, where, say);
    const position = input < 0 ? -1 : names.position(input, name, where, say);
    if (position >= 0) positions[input] = position;
  }
  return positions;
}

function readStep(names: PlanNames, step: PlanStep, say: Say): PlayStep {
  const { net } = names;
  const coils = (step.coils ?? []).flatMap((text) => {
    const dot = text.indexOf('.');
    const input = names.find(net.inputs, 'valve that is commanded', text.slice(0, dot), `coil ${text}`, say);
    if (input < 0) return [];
    const list = net.inputs[input]?.coils ?? [];
    const coil = list.findIndex(({ name }) => name === text.slice(dot + 1));
    if (coil >= 0) return [{ input, coil }];
    const label = names.label(net.inputs[input]?.part ?? -1);
    say(
      `coil ${text}`,
      `${label} has no coil "${text.slice(dot + 1)}".`,
      list.length === 0
        ? 'Command it by hand, under levers.'
        : `Use one of ${list.map(({ name }) => name).join(', ')}.`,
    );
    return [];
  });
  const levers = new Map<number, number>();
  for (const [id, name] of Object.entries(step.levers ?? {})) {
    const input = names.find(net.inputs, 'valve that is commanded', id, `lever ${id}`, say);
    const position = input < 0 ? -1 : names.position(input, name, `lever ${id}`, say);
    if (position >= 0) levers.set(input, position);
  }
  const stopped = new Set(
    (step.stopped ?? []).map((id) => names.find(net.pumps, 'pump', id, `stopped pump ${id}`, say)),
  );
  const expect = readMotions(names, step.expect ?? '', say);
  return {
    coils,
    levers,
    running: net.pumps.map((pump, i) => !pump.atRest && !stopped.has(i)),
    expect,
    ends: readEnd(names, step.ends, expect, say),
    limit:
      (step.within === undefined ? undefined : names.quantity(step.within, 'time', 'time limit', say)) ?? STEP_LIMIT,
  };
}

function readMotions({ net }: PlanNames, text: string, say: Say): readonly (readonly Wanted[])[] {
  if (text.trim() === '') return [];
  const noted = net.actuators.map(({ part, rotary }) => ({ label: net.parts[part]?.label ?? '', rotary }));
  const read = parseMotions(text, noted);
  if (read.ok) return read.value;
  for (const { where, what, remedy } of read.problems) say(`motions, ${where}`, what, remedy);
  return [];
}

function readEnd(names: PlanNames, end: StepEnd, expect: readonly (readonly Wanted[])[], say: Say): PlayEnd {
  const { net } = names;
  switch (end.by) {
    case 'motion': {
      const motor = expect.flat().find(({ actuator, way }) => way !== '0' && net.actuators[actuator]?.rotary);
      const part = net.actuators[motor?.actuator ?? -1]?.part ?? -1;
      if (motor)
        say(
          'end',
          `${names.label(part)} is a motor and comes to no stop.`,
          'End the step by time, sensor or pressure.',
        );
      return { by: 'motion' };
    }
    case 'sensor': {
      const actuator = names.find(net.actuators, 'actuator', end.actuator, 'sensor', say);
      const at = actuator < 0 ? undefined : names.travel(actuator, end.at, 'sensor', say);
      return at === undefined ? { by: 'motion' } : { by: 'sensor', actuator, at };
    }
    case 'pressure': {
      const found = names.find(net.switches, 'pressure switch', end.switch, 'pressure switch', say);
      return found < 0 ? { by: 'motion' } : { by: 'pressure', switch: found, on: end.turns === 'on' };
    }
    case 'time': {
      const after = names.quantity(end.after, 'time', 'time', say);
      return { by: 'time', after: after ?? 0 };
    }
  }
}
