import type { Budget } from '../base/budget.ts';
import { unlimited } from '../base/budget.ts';
import { bad, good } from '../base/result.ts';
import type { Result } from '../base/result.ts';
import type { Circuit } from '../circuit/model.ts';
import type { PlanStep } from '../circuit/plan.ts';
import { parseMotions, sayMotions } from '../engine/sequence/notation.ts';
import type { MotionStep, NotedActuator } from '../engine/sequence/notation.ts';
import { StateTable } from '../engine/table/state-table.ts';
import type { ActuatorVerdict } from '../engine/table/words.ts';
import type { Network } from '../network/network.ts';
import { networkOf, tabulate } from './analyse.ts';
import type { PlanDraft } from './plan-results.ts';

const OUT: readonly ActuatorVerdict[] = ['extends', 'moved out by load', 'moved out by spring'];
const IN: readonly ActuatorVerdict[] = ['retracts', 'moved in by load', 'moved in by spring'];
const STILL: readonly ActuatorVerdict[] = ['at stop', 'stalled', 'held', 'held one way'];
/** Combinations that are gone through for every motion: a second or so with pressures. */
const MOST = 20_000;
const MOST_MOTIONS = 100;

/**
 * Steps for a motion sequence in trade notation: for each motion the combination in which it is the only one that
 * moves, with the fewest valves away from rest, then the fewest changed from the step before: a coil is on only where
 * it is needed. Actuators stand where the motions before have left them. Fails with the first motion that no combination gives. Whether the steps also
 * do it one after another is for the check of the plan. Throws `Cancelled` when the budget says so.
 */
export function draftPlan(
  circuit: Circuit,
  text: string,
  loadCase?: string,
  budget: Budget = unlimited,
): Result<PlanDraft> {
  const net = networkOf(circuit, loadCase === undefined ? undefined : { loadCase });
  const noted = net.actuators.map(({ part, rotary }) => ({ label: net.parts[part]?.label ?? '', rotary }));
  const read = parseMotions(text, noted);
  if (!read.ok) return read;
  const motions = read.value;
  const refusal = refused(net, noted, motions);
  if (refusal) return refusal;
  const out = startOf(net, motions);
  const start = [...out];
  let before: readonly number[] = net.inputs.map(({ rest }) => rest ?? 0);
  const steps: Omit<PlanStep, 'id'>[] = [];
  for (const [i, together] of motions.entries()) {
    const found = rowFor(circuit, net, together, out, before, loadCase, {
      ...budget,
      progress: (share) => budget.progress((i + share) / motions.length),
    });
    if (typeof found === 'string')
      return bad({
        where: `motion ${i + 1}`,
        what: `No combination moves ${sayMotions([together], noted)} and nothing else, ${standing(noted, out)}.`,
        remedy: found,
      });
    before = found;
    steps.push({ ...commandsOf(net, found), expect: sayMotions([together], noted), ends: { by: 'motion' } });
    for (const { actuator, way } of together) out[actuator] = way === '+';
  }
  const id = (i: number): string => net.parts[net.actuators[i]?.part ?? -1]?.id ?? '';
  return good({ start: Object.fromEntries(start.flatMap((is, i) => (is ? [[id(i), 'out']] : []))), steps });
}

function refused(
  net: Network,
  noted: readonly NotedActuator[],
  motions: readonly MotionStep[],
): Result<PlanDraft> | undefined {
  const motor = motions.flat().find(({ actuator }) => noted[actuator]?.rotary);
  if (motor)
    return bad({
      where: 'motions',
      what: `${noted[motor.actuator]?.label ?? ''} is a motor, and steps are drafted for cylinders only.`,
      remedy: 'Leave it out here and add its step by hand, ended by time.',
    });
  if (motions.length > MOST_MOTIONS)
    return bad({
      where: 'motions',
      what: `More than ${MOST_MOTIONS} motions.`,
      remedy: 'Draft them in several plans.',
    });
  const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
  if (count > MOST)
    return bad({
      where: 'circuit',
      what: `It has ${count.toLocaleString('en')} combinations; up to ${MOST.toLocaleString('en')} are gone through for a draft.`,
      remedy: 'Draft from a part of the circuit, or add the steps by hand.',
    });
  return undefined;
}

/** Whoever goes in first stands out at the start. */
function startOf(net: Network, motions: readonly MotionStep[]): boolean[] {
  return net.actuators.map((_, i) => motions.flat().find(({ actuator }) => actuator === i)?.way === '-');
}

/** Positions of the inputs, or what to do about there being none. */
function rowFor(
  circuit: Circuit,
  net: Network,
  together: MotionStep,
  out: readonly boolean[],
  before: readonly number[],
  loadCase: string | undefined,
  budget: Budget,
): readonly number[] | string {
  const id = (i: number): string => net.parts[net.actuators[i]?.part ?? -1]?.id ?? '';
  const places = Object.fromEntries(
    net.actuators.flatMap(({ stroke }, i) =>
      stroke === undefined ? [] : [[id(i), out[i] === true ? ('out' as const) : ('in' as const)]],
    ),
  );
  const conditions = { pumps: 'running' as const, places, ...(loadCase !== undefined && { loadCase }) };
  const table = new StateTable(tabulate(circuit, conditions, budget));
  const wanted = new Map(together.map(({ actuator, way }) => [actuator, way === '+' ? OUT : IN]));
  let best: { readonly positions: readonly number[]; readonly cost: number } | undefined;
  let others: readonly number[] | undefined;
  for (let row = 0; row < table.count; row++) {
    if (table.hunts(row) || ![...wanted].every(([i, verdicts]) => verdicts.includes(table.actuator(i, row)))) continue;
    const too = net.actuators.flatMap((_, i) => (wanted.has(i) || STILL.includes(table.actuator(i, row)) ? [] : [i]));
    if (too.length > 0) {
      if (!others || too.length < others.length) others = too;
      continue;
    }
    const positions = table.positionsOf(row);
    const changed = positions.filter((position, i) => position !== before[i]).length;
    const held = positions.filter((position, i) => position !== net.inputs[i]?.rest).length;
    // One that the load or a spring moves comes after one that a pump moves.
    const driven = [...wanted.keys()].filter((i) => !['extends', 'retracts'].includes(table.actuator(i, row))).length;
    const cost = (held * 1000 + changed) * 1000 + driven;
    if (!best || cost < best.cost) best = { positions, cost };
  }
  if (best) return best.positions;
  if (!others) return 'See in the state table what moves it, and from which place.';
  const said = others.map((i) => net.parts[net.actuators[i]?.part ?? -1]?.label ?? '').join(', ');
  return `Wherever it moves so, ${said} ${others.length === 1 ? 'does' : 'do'} not surely stand still; look at those rows of the state table.`;
}

const standing = (noted: readonly NotedActuator[], out: readonly boolean[]): string =>
  `with ${noted.map(({ label }, i) => `${label} ${out[i] === true ? 'out' : 'in'}`).join(', ')}`;

/** Coils where a coil leads to the position, a lever held elsewhere; what is at rest needs nothing. */
function commandsOf(net: Network, positions: readonly number[]): Pick<PlanStep, 'coils' | 'levers'> {
  const coils: string[] = [];
  const levers: Record<string, string> = {};
  net.inputs.forEach(({ part, rest, coils: own, positions: words }, i) => {
    const position = positions[i] ?? 0;
    if (position === rest) return;
    const id = net.parts[part]?.id ?? '';
    const coil = own.find((each) => each.position === position);
    if (coil) coils.push(`${id}.${coil.name}`);
    else levers[id] = words[position] ?? '';
  });
  return { ...(coils.length > 0 && { coils }), ...(Object.keys(levers).length > 0 && { levers }) };
}
