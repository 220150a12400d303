import type { NetActuator } from '../../network/network.ts';
import { actuatorOutcome } from './actuator-outcomes.ts';
import type { ActuatorAnswer, PumpAnswer } from './answers.ts';
import type { OneState } from './one-state.ts';
import { lineName, partLabel, sideName, step } from './reasons.ts';
import type { Step } from './reasons.ts';
import { actuatorByPressure, creeps, equalRivals, givesWay, movesOverValve, PressureSolver, pumpByPressure } from './resolve.ts';
import { rowNumbers } from './row-numbers.ts';
import type { RowNumbers } from './row-numbers.ts';
import { sayFlow, sayForce, sayPressure, saySpeed } from './say-quantities.ts';

/** The pressure layer's part of an explanation: its verdicts in place of the open ones, and the figures behind them. */
export interface PressureWords {
  readonly actuator: (index: number, answer: ActuatorAnswer) => ActuatorAnswer;
  readonly pump: (index: number, answer: PumpAnswer) => PumpAnswer;
  readonly numbers: RowNumbers;
  /** Oil passes the line over a valve that pressures open. */
  readonly flows: (line: number) => boolean;
}

export function explainPressures(state: OneState): PressureWords {
  const solver = new PressureSolver(state.net, state.conditions);
  const answer = solver.solve(state.row, state.settled.setting);
  const numbers = rowNumbers(solver, state.row, answer);
  const bits = { block: state.block, bit: state.row & 31 };
  const hunts = state.is(state.block.hunts);
  const rivals = equalRivals(solver, bits, answer);

  const actuator = (index: number, said: ActuatorAnswer): ActuatorAnswer => {
    const spec = state.net.actuators[index];
    if (!spec || hunts) return said;
    if (numbers.status !== 'solved')
      return said.rests ? { ...said, steps: [...said.steps, step(numbers.words ?? '')] } : said;
    const moves = state.is(state.block.motion.out[index]) || state.is(state.block.motion.in[index]);
    if (!said.rests && !moves) {
      const yields = said.verdict === 'held' ? givesWay(index, solver, bits, answer) : undefined;
      if (yields) {
        const over = [...new Set(yields.reliefs.map((i) => partLabel(state, state.net.reliefs[i]?.part ?? -1)))];
        const text = `Its ${spec.push.by} presses harder than ${over.join(' and ')} ${over.length > 1 ? 'allow' : 'allows'}: it gives way over that.`;
        return {
          ...said,
          verdict: yields.verdict,
          onValues: true,
          notes: yields.void ? [...said.notes, 'void forms'] : said.notes,
          steps: [...said.steps, step(text, [], [said.part]), figures(state, index, spec, numbers, yields.verdict)],
        };
      }
      const free = said.verdict === 'floats' || said.verdict === 'held one way';
      const leaks = spec.leakage > 0 || (spec.drain?.leakage ?? 0) > 0;
      const way = free || leaks ? creeps(index, answer) : undefined;
      if (way === undefined) return said;
      const note = !free
        ? 'creeps through its own leakage'
        : way === 'out'
          ? 'creeps outward on back pressure'
          : 'creeps inward on back pressure';
      return {
        ...said,
        notes: [...said.notes, note],
        steps: [...said.steps, figures(state, index, spec, numbers, said.verdict)],
      };
    }
    const { unfed } = actuatorOutcome(index, spec, state.block, state.conditions);
    const found = actuatorByPressure(index, solver, bits, answer, unfed, rivals);
    if (!found) return said;
    const { rests, ...rest } = said;
    const notes = found.void && !said.notes.includes('void forms') ? [...said.notes, 'void forms'] : said.notes;
    const why = rests ? [step(rests.why)] : [];
    const against =
      found.verdict.includes('by load') || found.verdict.includes('by spring')
        ? [overcome(state, spec, said.part)]
        : [];
    const onValues = rests !== undefined || found.verdict !== said.verdict;
    return {
      ...rest,
      onValues,
      verdict: found.verdict,
      notes,
      steps: [...said.steps, ...why, ...against, figures(state, index, spec, numbers, found.verdict)],
    };
  };

  const pump = (index: number, said: PumpAnswer): PumpAnswer => {
    if (hunts || (!said.rests && said.verdict !== 'working')) return said;
    const found = pumpByPressure(index, solver, bits, answer);
    if (!found) return said;
    const { rests, steps, ...rest } = said;
    const at = numbers.pumps[index];
    const line = state.net.pumps[index]?.outlet ?? -1;
    const text = `It stands at ${sayPressure(at?.pressure ?? 0, state.units)} and delivers ${sayFlow(at?.delivered ?? 0, state.units)}${over(state, numbers)}.`;
    const onValues = rests !== undefined || found !== said.verdict;
    const why = found === 'unloaded' ? ventedReliefs(state, line, numbers) : [];
    return {
      ...rest,
      onValues,
      verdict: found,
      steps: [...(rests ? [] : steps), ...why, step(text, [line], [said.part])],
    };
  };
  const overValve = !hunts && movesOverValve(bits, answer);
  return { actuator, pump, numbers, flows: (line) => overValve && solver.flows(answer, line) };
}

/** `Cap side 62 bar, rod side 3 bar: it takes 12 L/min and goes 85 mm/s.` */
function figures(state: OneState, index: number, actuator: NetActuator, numbers: RowNumbers, verdict: string): Step {
  const at = numbers.actuators[index];
  const pressure = (line: number): string => sayPressure(numbers.lines[line] ?? 0, state.units);
  const sides = [
    `${capital(sideName(state, actuator, 'a'))} ${pressure(actuator.a)}`,
    ...(actuator.b < 0 ? [] : [`${sideName(state, actuator, 'b')} ${pressure(actuator.b)}`]),
  ].join(', ');
  const moving =
    verdict === 'undetermined'
      ? 'equal rivals, between which only the losses share the flow: the circuit leaves it open'
      : verdict === 'stalled' || (verdict === 'held' && (at?.flow ?? 0) < STILL)
        ? standing(state, index, actuator, numbers)
        : `${sayFlow(at?.flow ?? 0, state.units)}, ${saySpeed(at?.speed ?? 0, actuator.rotary, state.units)}`;
  const parts = [state.net.parts[actuator.part]?.id ?? ''];
  return step(
    `${sides}: ${moving}. From entered and assumed values.`,
    [actuator.a, actuator.b].filter((line) => line >= 0),
    parts,
  );
}

/** The push is stronger than what is fed against it. */
function overcome(state: OneState, actuator: NetActuator, part: string): Step {
  const inward = actuator.push.way === 'in';
  const line = inward ? actuator.a : actuator.b;
  const what = actuator.push.by === 'spring' ? 'spring' : 'load';
  return step(
    `The ${what} is stronger than the pressure that stands against it, and pushes its oil back out into ${lineName(state, line)}.`,
    [line],
    [part],
  );
}

/** Pilot-operated relief valves on the line that let its oil out because their pilot line stands low. */
const ventedReliefs = (state: OneState, line: number, numbers: RowNumbers): Step[] =>
  state.net.reliefs.flatMap(({ part, from, to, vent }, i) =>
    from === line && vent && (numbers.reliefs[i]?.flow ?? 0) > 1e-7
      ? [
          step(
            `${partLabel(state, part)} is vented: its pilot line ${lineName(state, vent.line)} is let down, so it opens ${sayPressure(vent.pressure, state.units)} over that.`,
            [from, to, vent.line].filter((each) => each < state.net.shown),
            [state.net.parts[part]?.id ?? ''],
          ),
        ]
      : [],
  );

/** m³/s: less is no motion. */
const STILL = 0.01e-3 / 60;

/** Why it does not move: what it would take, and who takes the flow instead. */
function standing(state: OneState, index: number, actuator: NetActuator, numbers: RowNumbers): string {
  const { pressing, resisting, spring } = actuator.forces;
  const load = Math.abs(pressing) + resisting + Math.abs(spring);
  const others = numbers.actuators.flatMap((other, i) =>
    i !== index && other.flow > 1e-7 && state.net.actuators[i] ? [partLabel(state, state.net.actuators[i].part)] : [],
  );
  const spilled = numbers.reliefs.filter((relief) => relief.flow > 1e-7).map((relief) => relief.label);
  const force = sayForce(load, actuator.rotary, state.units);
  const why =
    spilled.length > 0
      ? `${spilled.join(' and ')} ${spilled.length > 1 ? 'let' : 'lets'} the flow out before that`
      : others.length > 0
        ? `${others.join(' and ')} ${others.length > 1 ? 'take' : 'takes'} the flow first, at less pressure`
        : 'the pump stands below that';
  return load > 0 ? `too little for its load of ${force}; ${why}` : `nothing moves it; ${why}`;
}

const over = (state: OneState, numbers: RowNumbers): string => {
  const open = numbers.reliefs.filter((relief) => relief.flow > 1e-7);
  return open.length === 0
    ? ''
    : `, of which ${open.map((relief) => `${sayFlow(relief.flow, state.units)} goes over ${relief.label}`).join(' and ')}`;
};

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
