import type { UnitSystem } from '../../base/units.ts';
import type { NetActuator, Network } from '../../network/network.ts';
import { isEqualSided } from '../paths/actuator-bits.ts';
import { REST_REASONS } from '../paths/motion-bits.ts';
import type { RestReason } from '../paths/motion-bits.ts';
import { sourceLines } from '../paths/reach.ts';
import type { PathConditions } from '../paths/reach.ts';
import { actuatorOutcome, motionWords } from './actuator-outcomes.ts';
import { explainDependents } from './explain-dependents.ts';
import { explainPressures } from './explain-pressures.ts';
import { explainPump } from './explain-pump.ts';
import type { ActuatorAnswer, DependentReason } from './answers.ts';
import type { PumpAnswer } from './answers.ts';
import { explainTrapped } from './explain-trapped.ts';
import type { TrapAnswer } from './answers.ts';
import type { Beside } from './left-behind.ts';
import { findWay, solveOne } from './one-state.ts';
import type { OneState } from './one-state.ts';
import { enclosing, lineName, partId, partLabel, sideName, step, waySteps } from './reasons.ts';
import type { Step } from './reasons.ts';
import type { RowNumbers } from './row-numbers.ts';
import { ACTUATOR_NOTES, ACTUATOR_VERDICTS } from './words.ts';
import type { ActuatorVerdict } from './words.ts';

export interface RowAnswer {
  readonly dependents: readonly DependentReason[];
  readonly actuators: readonly ActuatorAnswer[];
  readonly pumps: readonly PumpAnswer[];
  readonly trapped: readonly TrapAnswer[];
  readonly numbers: RowNumbers;
}

/**
 * Everything one row says, in words, with the lines and parts to light for each link of the reason. `besides`: where
 * levers are held, the circuits one move of a held lever away.
 */
export function explain(
  net: Network,
  conditions: PathConditions,
  row: number,
  units: UnitSystem = 'metric',
  besides: readonly Beside[] = [],
): RowAnswer {
  const state = solveOne(net, conditions, row, undefined, units);
  const pressures = explainPressures(state);
  const dependents = explainDependents(state);
  return {
    dependents: dependents.answers,
    actuators: net.actuators.map((actuator, i) =>
      dependents.actuator(i, pressures.actuator(i, explainActuator(state, i, actuator))),
    ),
    pumps: net.pumps.map((pump, i) => dependents.pump(i, pressures.pump(i, explainPump(state, i, pump)))),
    trapped: explainTrapped(state, besides).filter((entry) => !pressures.flows(entry.line)),
    numbers: pressures.numbers,
  };
}

function explainActuator(state: OneState, index: number, actuator: NetActuator): ActuatorAnswer {
  const outcome = actuatorOutcome(index, actuator, state.block, state.conditions);
  const verdict = ACTUATOR_VERDICTS.find((_, i) => state.is(outcome.verdicts[i])) ?? 'undetermined';
  const notes = ACTUATOR_NOTES.filter((_, i) => state.is(outcome.notes[i]));
  const words = motionWords(actuator);
  const base = {
    part: partId(state, actuator.part),
    label: partLabel(state, actuator.part),
    verdict,
    notes,
    onValues: verdict === 'rests on pressure',
  };
  switch (verdict) {
    case words.out:
      return { ...base, steps: movingSteps(state, index, actuator, 'a') };
    case words.in:
      return { ...base, steps: movingSteps(state, index, actuator, 'b') };
    case 'rests on pressure':
      return { ...base, rests: restsOn(state, index, actuator), steps: restingSteps(state, index, actuator) };
    case 'undetermined':
      return {
        ...base,
        steps: [
          step(
            'The lock checks of this state open and close each other: no setting agrees with the pressures it causes.',
          ),
        ],
      };
    default:
      return { ...base, steps: standingSteps(state, actuator) };
  }
}

/** Source → growing chamber, shrinking chamber → tank or next actuator. */
function movingSteps(state: OneState, index: number, actuator: NetActuator, grows: 'a' | 'b'): Step[] {
  const { motion } = state.block;
  const into = grows === 'a' ? actuator.a : actuator.b;
  const from = grows === 'a' ? actuator.b : actuator.a;
  const shrinks = grows === 'a' ? 'b' : 'a';
  const steps: Step[] = [];
  if (state.is(motion.displaced[index])) {
    const before = drivers(state, index, into);
    steps.push(
      step(
        `${before.map((i) => partLabel(state, state.net.actuators[i]?.part ?? -1)).join(' and ') || 'Another actuator'} pushes its oil on into ${lineName(state, into)}.`,
        [into],
        before.map((i) => partId(state, state.net.actuators[i]?.part ?? -1)),
      ),
    );
  } else {
    steps.push(...feedSteps(state, into));
  }
  steps.push(
    step(
      `${lineName(state, into)} presses on the ${sideName(state, actuator, grows)}.`,
      [into],
      [partId(state, actuator.part)],
    ),
  );
  if (from < 0) {
    steps.push(step('The other side breathes to atmosphere.', [], [partId(state, actuator.part)]));
    return steps;
  }
  steps.push(...leaveSteps(state, index, actuator, from, sideName(state, actuator, shrinks), into));
  return steps;
}

/** The way from whatever presses on a line to that line. */
function feedSteps(state: OneState, into: number): Step[] {
  const { net } = state;
  const sources = sourceLines(net, state.conditions);
  for (const [i, line] of sources.entries()) {
    const field = state.block.reach.pressed[i];
    if (line < 0 || field === undefined || !state.on(field, into)) continue;
    const way = findWay(
      state,
      [line],
      (at) => at === into,
      (at) => state.on(state.block.reach.notFreeToTank, at),
    );
    if (!way) continue;
    const part = net.pumps[i]?.part ?? net.accumulators[i - net.pumps.length]?.part ?? -1;
    return [
      step(`${partLabel(state, part)} presses on ${lineName(state, line)}.`, [line], [partId(state, part)]),
      ...waySteps(state, way),
    ];
  }
  return [];
}

function leaveSteps(
  state: OneState,
  index: number,
  actuator: NetActuator,
  from: number,
  side: string,
  into: number,
): Step[] {
  const r = state.block.reach;
  const head = step(
    `The ${side} lets its oil out into ${lineName(state, from)}.`,
    [from],
    [partId(state, actuator.part)],
  );
  if (state.on(r.toTank, from)) {
    const way = findWay(state, [from], (line) => state.net.lines[line]?.tank === true) ?? pumpLeak(state, from);
    return [
      head,
      ...(way ? waySteps(state, way) : []),
      step('From there it runs to tank.', way ? [...way.lines.slice(-1)] : []),
    ];
  }
  if (!isEqualSided(actuator) && state.is(state.block.motion.chambers[index]?.fromBtoA) && from === actuator.b) {
    const way = findWay(state, [from], (line) => line === into);
    return [
      head,
      ...(way ? waySteps(state, way) : []),
      step(
        'It joins the oil to the cap side: the larger area wins, and the rod goes out fast with the force of the rod area (regenerative).',
        [from, into],
      ),
    ];
  }
  const next = state.net.actuators.findIndex(
    (other, i) =>
      i !== index &&
      (state.is(state.block.motion.displaced[i]) ||
        findWay(state, [from], (line) => line === other.a || line === other.b) !== undefined),
  );
  const target = state.net.actuators[next];
  if (!target) return [head];
  const way = findWay(state, [from], (line) => line === target.a || line === target.b);
  return [
    head,
    ...(way ? waySteps(state, way) : []),
    step(`It goes on into ${partLabel(state, target.part)}, which moves with it.`, way ? way.lines.slice(-1) : [], [
      partId(state, target.part),
    ]),
  ];
}

const pumpLeak = (state: OneState, from: number) =>
  findWay(state, [from], (line) => state.net.pumps.some((pump) => pump.outlet === line));

/** Actuators whose displaced oil gets to `into`. */
function drivers(state: OneState, index: number, into: number): number[] {
  const { motion } = state.block;
  return state.net.actuators.flatMap((other, i) => {
    if (i === index) return [];
    const from = state.is(motion.out[i]) ? other.b : state.is(motion.in[i]) ? other.a : -1;
    return from >= 0 && findWay(state, [from], (line) => line === into) ? [i] : [];
  });
}

/** Why it stands: what each side is fed by, open to, or shut in by. */
function standingSteps(state: OneState, actuator: NetActuator): Step[] {
  const r = state.block.reach;
  const side = (line: number, which: 'a' | 'b'): Step[] => {
    const name = sideName(state, actuator, which);
    if (line < 0) return [step('The other side breathes to atmosphere.', [], [partId(state, actuator.part)])];
    if (state.on(r.anyPressed, line))
      return [
        ...feedSteps(state, line),
        step(`So the ${name} is under pressure.`, [line], [partId(state, actuator.part)]),
      ];
    if (state.on(r.toTank, line)) {
      const way = findWay(state, [line], (at) => state.net.lines[at]?.tank === true) ?? pumpLeak(state, line);
      return [
        step(`The ${name} is open to tank through ${lineName(state, line)}.`, [line], [partId(state, actuator.part)]),
        ...(way ? waySteps(state, way) : []),
      ];
    }
    const wall = enclosing(state, line, actuator.part);
    return [
      { ...wall, text: `The ${name} is sealed. ${wall.text}`, parts: [partId(state, actuator.part), ...wall.parts] },
    ];
  };
  return [...side(actuator.a, 'a'), ...side(actuator.b, 'b')];
}

const REST_TEXT: Record<RestReason, string> = {
  load: 'A load works against it: whether it moves depends on the pressure that the pump can reach.',
  rivals:
    'More than one actuator is offered the flow of the same pump: the one that needs the least pressure goes first.',
  bleed: 'Its fed side is also open to tank through a throttle.',
  'pressure valve': 'The other side can let out only over a pressure valve.',
  'two feeds': 'Both sides are fed, and one of them lets out.',
  'pressed line': 'The other side can let out only into a line under pressure.',
  upstream: 'It is driven by the oil of an actuator that rests on pressure itself.',
  'dependent valve': 'A valve that pressures move stands in the way, and where it stands is for the pressures to say.',
};

function restsOn(
  state: OneState,
  index: number,
  actuator: NetActuator,
): { why: string; candidates: ActuatorVerdict[] } {
  const { motion } = state.block;
  const reasons = REST_REASONS.filter((_, i) => state.is(motion.rests[index]?.[i]));
  const words = motionWords(actuator);
  const candidates = new Set<ActuatorVerdict>();
  if (state.is(motion.out[index])) candidates.add(words.out);
  if (state.is(motion.in[index])) candidates.add(words.in);
  if (reasons.includes('load')) {
    const { way } = actuator.push;
    if (way === 'in' || way === 'both') candidates.add(words.pushedIn);
    if (way === 'out' || way === 'both') candidates.add(words.pushedOut);
  }
  const fedA = state.is(motion.fedA[index]);
  if (reasons.some((name) => name === 'pressure valve' || name === 'pressed line')) {
    candidates.add(fedA ? words.out : words.in);
    candidates.add('held');
  } else {
    candidates.add('stalled');
  }
  if (reasons.length === 0) {
    candidates.clear();
    for (const word of ['held', words.pushedIn, words.pushedOut] as const) candidates.add(word);
    return { why: 'A load pushes it, and its oil has to go through another actuator.', candidates: [...candidates] };
  }
  if (candidates.size < 2) for (const word of [words.out, words.in, 'held'] as const) candidates.add(word);
  return { why: reasons.map((name) => REST_TEXT[name]).join(' '), candidates: [...candidates] };
}

function restingSteps(state: OneState, index: number, actuator: NetActuator): Step[] {
  const { motion } = state.block;
  const grows = state.is(motion.out[index]) ? 'a' : state.is(motion.in[index]) ? 'b' : undefined;
  return grows ? movingSteps(state, index, actuator, grows) : standingSteps(state, actuator);
}
