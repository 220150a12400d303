import type { Budget } from '../base/budget.ts';
import { unlimited } from '../base/budget.ts';
import { coilNames } from '../base/coil-names.ts';
import { formatQuantity } from '../base/units.ts';
import type { Circuit } from '../circuit/model.ts';
import type { PlanStep, StepPlan } from '../circuit/plan.ts';
import { dependentLabel } from '../network/dependents.ts';
import type { NetActuator, NetInput, Network } from '../network/network.ts';
import { allCoils } from '../engine/sequence/play/commands.ts';
import type { PlayStep } from '../engine/sequence/play/commands.ts';
import { machineAt } from '../engine/sequence/play/machine.ts';
import type { Machine } from '../engine/sequence/play/machine.ts';
import { playPlan } from '../engine/sequence/play/play-plan.ts';
import type { PlayedPlan, PlayedStep } from '../engine/sequence/play/play-plan.ts';
import { networkOf } from './analyse.ts';
import { powerLosses } from './plan-loss.ts';
import { readPlan, STEP_LIMIT } from './plan-reading.ts';
import type { PlanProblem, PlanReport, PlanTrace, StepReport, TracedPart } from './plan-results.ts';
import { problemsOf } from './plan-verdicts.ts';
import type { Conditions } from './results.ts';

export interface PlanOptions {
  /** Also lose the power in every step. Default true. */
  readonly powerLoss?: boolean;
}

/**
 * Plays a step plan through the circuit, event by event, and says of each step what it did against what it was asked.
 * `conditions.loadCase` goes before the plan's own. Throws `Cancelled`, and a plain Error where there is no such plan.
 */
export function checkPlan(
  circuit: Circuit,
  planId: string,
  conditions: Pick<Conditions, 'loadCase'> = {},
  budget: Budget = unlimited,
  { powerLoss = true }: PlanOptions = {},
): PlanReport {
  const plan = circuit.plans?.find(({ id }) => id === planId);
  if (!plan) throw new Error(`This circuit has no step plan ${planId}.`);
  const wanted = conditions.loadCase ?? plan.loadCase;
  const known = wanted === undefined || (circuit.loadCases ?? []).some(({ id }) => id === wanted);
  const loadCase = known ? wanted : undefined;
  const net = networkOf(circuit, loadCase === undefined ? {} : { loadCase });
  const read = readPlan(net, plan);
  const problems = [...read.problems];
  if (!known) {
    problems.push({
      ...whole('plan', 'fault'),
      where: 'load case',
      what: `There is no load case "${wanted}".`,
      remedy: 'Name one of the circuit, or leave it out for the loads of the parts.',
    });
  }
  const start = machineAt(net, read.start);
  const steps = problems.length > 0 ? [] : read.steps.map((step, index) => ({ index, step }));
  const { played, player } = playPlan(net, start, steps, budget);
  const reports = plan.steps.map((step, i) =>
    stepReport(net, step, i, read.steps[i], played, i === plan.steps.length - 1),
  );
  problems.push(...(problems.length > 0 ? [] : closing(net, start, played, plan)));
  const faulty = [...problems, ...reports.flatMap((step) => step.problems)].some(({ level }) => level === 'fault');
  const sum = (of: (step: StepReport) => number): number => reports.reduce((total, step) => total + of(step), 0);
  return {
    plan: plan.id,
    name: plan.name,
    ...(loadCase !== undefined && { loadCase }),
    good: !faulty,
    problems,
    steps: reports,
    trace: traceOf(net, plan, played),
    time: sum((step) => step.end - step.start),
    energyIn: sum((step) => step.energyIn),
    energyLost: sum((step) => step.energyLost),
    volume: sum((step) => step.volume),
    powerLoss: powerLoss ? powerLosses(net, played, read.steps, player, budget) : [],
    assumptions: assumptionsOf(net),
  };
}

const whole = (kind: PlanProblem['kind'], level: PlanProblem['level']) => ({ kind, level, parts: [], lines: [] });

function stepReport(
  net: Network,
  given: PlanStep,
  index: number,
  step: PlayStep | undefined,
  { steps }: PlayedPlan,
  last: boolean,
): StepReport {
  const played = steps.find((one) => one.index === index);
  const head = {
    id: given.id,
    name: given.name ?? `${index + 1}`,
    commands: commandsOf(net, given),
    expect: given.expect ?? '',
    endsBy: sayEnd(net, given),
  };
  const at = played?.stop ?? steps.at(-1)?.stop ?? 0;
  if (!played || !step) {
    const nothing = { motions: [], energyIn: 0, energyLost: 0, volume: 0, problems: [] };
    return { ...head, outcome: 'not played', start: at, end: at, ...nothing };
  }
  const { energyIn, energyLost, volume } = played.ledger;
  return {
    ...head,
    outcome: played.end.as === 'done' ? 'done' : 'never ended',
    start: played.start,
    end: played.stop,
    motions: motionsOf(net, played, step),
    energyIn,
    energyLost,
    volume,
    problems: problemsOf(net, played, step, last),
  };
}

function motionsOf(net: Network, { ledger }: PlayedStep, step: PlayStep): StepReport['motions'] {
  const wanted = step.expect.flat();
  return ledger.motions.map(({ actuator, way, start, end, from, to, atStop, work }) => ({
    ...traced(net, net.actuators[actuator]),
    rotary: net.actuators[actuator]?.rotary ?? false,
    way,
    asked: wanted.some((one) => one.actuator === actuator && one.way === way),
    start,
    end,
    from,
    to,
    atStop,
    by: work > 0 ? 'pump' : 'load',
  }));
}

/** A plan that is to run again must end where it began. */
function closing(net: Network, start: Machine, { steps }: PlayedPlan, plan: StepPlan): PlanProblem[] {
  const last = steps.at(-1);
  if (!last || steps.length < plan.steps.length || last.end.as !== 'done') return [];
  const off = net.actuators.flatMap((actuator, i) =>
    actuator.stroke !== undefined && Math.abs((last.after.strokes[i] ?? 0) - (start.strokes[i] ?? 0)) > 1e-6
      ? [actuator]
      : [],
  );
  if (off.length === 0) return [];
  return [
    {
      ...whole('not closed', 'note'),
      where: 'the plan as a whole',
      what: `${off.map((actuator) => traced(net, actuator).label).join(', ')} ${off.length > 1 ? 'do' : 'does'} not end where the plan began, so it cannot simply run again.`,
      remedy: 'Add the way back if the plan is to be a cycle.',
      parts: off.map((actuator) => traced(net, actuator).part),
    },
  ];
}

const traced = (net: Network, entry: { readonly part: number } | undefined): TracedPart => {
  const part = net.parts[entry?.part ?? -1];
  return { part: part?.id ?? '', label: part?.label ?? '' };
};

function traceOf(net: Network, plan: StepPlan, { steps, samples }: PlayedPlan): PlanTrace {
  const stroke = ({ stroke: way }: NetActuator) => (way === undefined ? {} : { stroke: way });
  return {
    actuators: net.actuators.map((actuator) => ({
      ...traced(net, actuator),
      rotary: actuator.rotary,
      ...stroke(actuator),
    })),
    valves: [
      ...net.inputs.map((input) => ({ ...traced(net, input), positions: input.positions })),
      ...net.dependents.map((valve, i) => ({
        part: traced(net, valve).part,
        label: dependentLabel(net, i),
        positions: valve.positions,
      })),
    ],
    coils: allCoils(net).map(({ input, coil }) => ({
      ...traced(net, net.inputs[input]),
      name: net.inputs[input]?.coils[coil]?.name ?? '',
    })),
    pumps: net.pumps.map((pump) => traced(net, pump)),
    accumulators: net.accumulators.map((store) => traced(net, store)),
    switches: net.switches.map((one) => traced(net, one)),
    lines: net.lines.slice(0, net.shown).map(({ name }) => name),
    steps: steps.map(({ index, start, stop, first }) => ({
      id: plan.steps[index]?.id ?? '',
      name: plan.steps[index]?.name ?? `${index + 1}`,
      start,
      end: stop,
      first,
    })),
    samples,
  };
}

const labelOf = (net: Network, id: string): string => net.parts.find((part) => part.id === id)?.label ?? id;

function commandsOf(net: Network, { coils = [], levers = {}, stopped = [] }: PlanStep): string[] {
  const all = allCoils(net).map(({ input, coil }) => {
    const { part, coils: own } = net.inputs[input] as NetInput;
    const { id = '', label = '' } = net.parts[part] ?? {};
    return { id, label, name: own[coil]?.name ?? '' };
  });
  const names = coilNames(all);
  const sayCoil = (text: string): string => {
    const [id, name] = [text.slice(0, text.indexOf('.')), text.slice(text.indexOf('.') + 1)];
    return names[all.findIndex((coil) => coil.id === id && coil.name === name)] ?? `${labelOf(net, id)}.${name}`;
  };
  return [
    ...coils.map(sayCoil),
    ...Object.entries(levers).map(([id, position]) => `${labelOf(net, id)} ${position}`),
    ...stopped.map((id) => `${labelOf(net, id)} stopped`),
  ];
}

function sayEnd(net: Network, { ends }: PlanStep): string {
  switch (ends.by) {
    case 'motion':
      return 'end stop';
    case 'sensor':
      return `sensor ${labelOf(net, ends.actuator)} ${ends.at}`;
    case 'pressure':
      return `${labelOf(net, ends.switch)} ${ends.turns}`;
    case 'time':
      return ends.after;
  }
}

function assumptionsOf(net: Network): string[] {
  const said = [
    'Between two events everything moves at the steady speed; masses, the springiness of oil and the switching times of valves are left out.',
    `A step is given ${formatQuantity(STEP_LIMIT, 'time', 'metric')} unless it says otherwise.`,
  ];
  if (net.accumulators.length > 0)
    said.push(
      'Gas of accumulators follows the isothermal law, from its pre-charge to a quarter of its volume; a discharge within seconds is steeper.',
    );
  if (net.actuators.some(({ forces }) => forces.spring !== 0))
    said.push(
      'Return springs are taken a quarter weaker at one end of the stroke and a quarter stronger at the other.',
    );
  return said;
}
