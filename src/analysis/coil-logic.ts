import type { Budget } from '../base/budget.ts';
import { unlimited } from '../base/budget.ts';
import { bad, good } from '../base/result.ts';
import type { Problem, Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import type { StepPlan } from '../circuit/plan.ts';
import { coilConditions } from '../engine/sequence/coil-conditions.ts';
import type { CoilConditions, Expression } from '../engine/sequence/coil-conditions.ts';
import { signalGroups } from '../engine/sequence/groups.ts';
import { isForbidden } from '../engine/sequence/interlocks.ts';
import type { ContactTerm } from '../engine/sequence/interlocks.ts';
import { sayMotion, sayMotions } from '../engine/sequence/notation.ts';
import type { LogicPlan, Signal } from '../engine/sequence/step-logic.ts';
import { sayPlace, structuredText } from '../engine/sequence/structured-text.ts';
import type { StProgram } from '../engine/sequence/structured-text.ts';
import { namesOfNetwork } from '../engine/table/rules/names.ts';
import type { Network } from '../network/network.ts';
import { networkOf } from './analyse.ts';
import { interlocksOf } from './coil-logic-locks.ts';
import type { Locks } from './coil-logic-locks.ts';
import { numberedPlan } from './coil-logic-plan.ts';
import type { NumberedPlan } from './coil-logic-plan.ts';
import type { CoilLogic, SignalGroupWords } from './coil-logic-results.ts';

/**
 * What a control has to do for a step plan: the condition of every coil, the signal groups, the interlocks that the
 * rules of the circuit call for, and all of it as structured text. Fails if there is no such plan or it cannot be
 * read. Throws `Cancelled` when the budget says so.
 */
export function coilLogic(circuit: Circuit, planId: string, budget: Budget = unlimited): Result<CoilLogic> {
  const plan = circuit.plans?.find(({ id }) => id === planId);
  if (!plan) {
    const known = (circuit.plans ?? []).map(({ id }) => id).join(', ');
    const remedy = known === '' ? 'This circuit has none.' : `Use one of ${known}.`;
    return bad({ where: 'plans', what: `There is no step plan "${planId}".`, remedy });
  }
  const net = networkOf(circuit, plan.loadCase === undefined ? undefined : { loadCase: plan.loadCase });
  const read = numberedPlan(net, plan);
  if (!read.ok) return read;
  const { logic, coils, orders } = read.value;
  const conditions = coilConditions(logic);
  const locks = interlocksOf(circuit, net, plan, coils, budget);
  const program = programOf(circuit, net, plan, read.value, conditions, locks);
  const say = (e: Expression): string => sayExpression(e, logic, conditions.signals);
  const reads = new Set(
    conditions.coils.flatMap(({ bySignals }) => (bySignals ? signalsIn(bySignals.expression) : [])),
  );
  const endSignals = conditions.ends.map((end) => new Set(signalsIn(end)));
  const nameOf = (coil: number): string => logic.coils[coil] ?? '';
  const groups = groupWords(orders, logic);
  return good({
    plan: plan.id,
    name: plan.name,
    steps: logic.steps.map(({ name, motions, coils: on }, i) => ({
      id: plan.steps[i]?.id ?? '',
      name: name === '' ? String(i + 1) : name,
      motions: motions.length === 0 ? '' : sayMotions(orders[i] ?? [], logic.actuators),
      coils: on.map(nameOf),
      ends: say(conditions.ends[i] as Expression),
    })),
    signals: conditions.signals.map((signal, i) => ({
      kind: signal.type,
      name: saySignal(signal, logic),
      part: partOf(net, signal.type === 'switch' ? net.switches[signal.switch] : net.actuators[signal.actuator]),
      ends: endSignals.flatMap((set, step) => (set.has(i) ? [step] : [])),
      read: reads.has(i),
    })),
    coils: conditions.coils.map(({ coil, on, bySignals, bySteps, clashes }) => ({
      part: coils[coil]?.part ?? '',
      coil: coils[coil]?.coil ?? '',
      name: nameOf(coil),
      on,
      ...(bySignals && { bySignals: { ...bySignals, words: say(bySignals.expression) } }),
      bySteps: { expression: bySteps, words: say(bySteps) },
      clashes,
    })),
    clashes: conditions.clashes.map(({ steps, signals, coils: differ }) => ({
      steps,
      signals: signals.map((signal) => saySignal(conditions.signals[signal] as Signal, logic)),
      coils: differ.map(nameOf),
    })),
    ...(groups.ok && { groups: groups.value }),
    groupProblems: groups.ok ? [] : groups.problems,
    interlocks: locks.interlocks.map(({ reason, terms }) => ({
      rule: reason,
      terms: terms.map((term) => sayTerm(term, logic, program.contacts)),
    })),
    unexpressed: locks.unexpressed,
    warnings: warningsOf(net, read.value, conditions, locks),
    text: {
      signals: structuredText(program, { coils: 'signals' }),
      steps: structuredText(program, { coils: 'steps' }),
    },
  });
}

const partOf = (net: Network, item: { readonly part: number } | undefined): string =>
  net.parts[item?.part ?? -1]?.id ?? '';

const saySignal = (signal: Signal, { actuators, switches }: LogicPlan): string =>
  signal.type === 'switch'
    ? (switches[signal.switch] ?? '')
    : `${actuators[signal.actuator]?.label ?? ''} ${sayPlace(signal.at)}`;

/** `(A out and not B out) or B in`. */
function sayExpression(e: Expression, logic: LogicPlan, signals: readonly Signal[]): string {
  const say = (part: Expression): string => sayExpression(part, logic, signals);
  const bracketed = (part: Expression): string =>
    (part.type === 'any' || part.type === 'all') && part.of.length > 1 ? `(${say(part)})` : say(part);
  switch (e.type) {
    case 'all':
      return e.of.length === 0 ? 'always' : e.of.map(bracketed).join(' and ');
    case 'any':
      return e.of.length === 0 ? 'never' : e.of.map(bracketed).join(' or ');
    case 'not':
      return `not ${bracketed(e.of)}`;
    case 'signal':
      return saySignal(signals[e.signal] as Signal, logic);
    case 'step':
      return `step ${e.step + 1}`;
    case 'timer': {
      const end = logic.steps[e.step]?.end;
      return `${end?.by === 'time' ? +end.after.toFixed(3) : 0} s over`;
    }
  }
}

function signalsIn(e: Expression): readonly number[] {
  if (e.type === 'signal') return [e.signal];
  if (e.type === 'not') return signalsIn(e.of);
  return e.type === 'all' || e.type === 'any' ? e.of.flatMap(signalsIn) : [];
}

const sayTerm = ({ on, off, contacts }: ContactTerm, { coils }: LogicPlan, names: StProgram['contacts']): string =>
  [
    ...on.map((coil) => `${coils[coil] ?? ''} on`),
    ...off.map((coil) => `${coils[coil] ?? ''} off`),
    ...contacts.map(({ contact, closed }) => `${closed ? '' : 'not '}${names[contact]?.name ?? ''}`),
  ].join(' and ');

function groupWords(orders: NumberedPlan['orders'], { actuators }: LogicPlan): Result<SignalGroupWords> {
  const motions = orders.flatMap((order, step) => order.map((together) => ({ together, step })));
  const found = signalGroups(
    motions.map(({ together }) => together),
    actuators,
  );
  if (!found.ok) return found;
  const { division, lastJoinsFirst, count, changeOvers, opposed } = found.value;
  return good({
    motions: motions.map(({ together, step }) => ({ text: sayMotions([together], actuators), step })),
    division,
    lastJoinsFirst,
    count,
    changeOvers,
    opposed: opposed.map(({ step, motion, opposite, signal }) => ({
      motion: step,
      text: `${sayMotion(motion, actuators)} is to start while the end of ${sayMotions([signal], actuators)}, which started ${sayMotions([motions[opposite]?.together.filter((m) => m.actuator === motion.actuator) ?? []], actuators)}, still stands.`,
    })),
  });
}

function programOf(
  circuit: Circuit,
  net: Network,
  plan: StepPlan,
  { logic, coils }: NumberedPlan,
  conditions: CoilConditions,
  { interlocks, unexpressed, contacts }: Locks,
): StProgram {
  const label = (id: string): string => net.parts.find((part) => part.id === id)?.label ?? id;
  const inputs = namesOfNetwork(net).inputs;
  return {
    circuit: circuit.name,
    plan: plan.name,
    logic,
    conditions,
    valves: net.inputs.map((_, input) => coils.flatMap((coil, i) => (coil.input === input ? [i] : []))),
    interlocks,
    contacts: contacts.map(({ input, position }) => ({
      input,
      position,
      name: `${inputs[input]?.label ?? ''} at ${inputs[input]?.positions[position] ?? ''}`,
    })),
    notes: [
      'A sensor is TRUE only while its actuator stands at its place. Rules were checked with the pumps running.',
      ...unexpressed.map(({ rule, why }) => `No interlock for the rule "${rule}": ${why}.`),
    ],
    stepNotes: plan.steps.map(({ levers, stopped }) => [
      ...Object.entries(levers ?? {}).map(([id, position]) => `${label(id)} is held at ${position} by hand`),
      ...(stopped ?? []).map((id) => `${label(id)} stands still; its starter is not part of this program`),
    ]),
  };
}

function warningsOf(
  net: Network,
  { logic, coils, levers }: NumberedPlan,
  { closed, compared }: CoilConditions,
  { interlocks, contacts }: Locks,
): Problem[] {
  const problems: Problem[] = [];
  if (!closed)
    problems.push({
      where: 'plan',
      what: 'As far as the motions show, actuators end where the first step does not begin.',
      remedy: 'Add the steps that take them back, or see to it before the next start.',
    });
  if (!compared)
    problems.push({
      where: 'plan',
      what: 'There are too many sensors to look for conditions without a memory.',
      remedy: 'Use the conditions by steps.',
    });
  logic.steps.forEach(({ coils: on }, i) => {
    const where = `step ${i + 1}`;
    const valves = on.map((coil) => coils[coil]?.input);
    const twice = on.find((coil, k) => valves.indexOf(coils[coil]?.input) < k);
    if (twice !== undefined) {
      const part = net.parts[net.inputs[coils[twice]?.input ?? -1]?.part ?? -1];
      problems.push({
        where,
        what: `It asks for two coils of ${part?.label ?? ''} at once, which the program leaves off.`,
        remedy: 'Leave one of them out of the step.',
      });
    }
    const held = new Set(
      contacts.flatMap(({ input, position }, contact) =>
        (levers[i]?.get(input) ?? net.inputs[input]?.rest) === position ? [contact] : [],
      ),
    );
    const broken = interlocks.filter((lock) => isForbidden([lock], new Set(on), held));
    for (const { reason } of broken)
      problems.push({
        where,
        what: `Its coils are a combination that the rule "${reason}" forbids, so the interlock leaves them off.`,
        remedy: 'Change the step, or the rule.',
      });
  });
  return problems;
}
