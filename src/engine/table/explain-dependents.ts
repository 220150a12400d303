import { emptySet, fullSet } from '../../base/bits.ts';
import { dependentLabel, staged, trips } from '../../network/dependents.ts';
import type { NetDependent, NetPressureShift } from '../../network/network.ts';
import { signalOf } from '../flow/dependents.ts';
import { constantPlanes } from '../paths/dependents.ts';
import type { ActuatorAnswer, DependentReason, PumpAnswer } from './answers.ts';
import type { OneState } from './one-state.ts';
import { sayPressure } from './say-quantities.ts';
import { partId, partLabel, step } from './reasons.ts';
import type { Step } from './reasons.ts';
import { PressureSolver } from './resolve.ts';
import { TouchFinder } from './touched.ts';

export interface DependentWords {
  readonly answers: readonly DependentReason[];
  readonly actuator: (index: number, answer: ActuatorAnswer) => ActuatorAnswer;
  readonly pump: (index: number, answer: PumpAnswer) => PumpAnswer;
}

/** Positions of the dependent valves with their reasons, and what these leave open of the rest. */
export function explainDependents(state: OneState): DependentWords {
  const { net, settled, conditions, row } = state;
  if (net.dependents.length === 0) return { answers: [], actuator: (_, answer) => answer, pump: (_, answer) => answer };
  const solver = new PressureSolver(net, conditions);
  const commanded = net.inputs.map((_, input) => state.position(input));
  const places = conditions.places.map((stop) => ({ stop }));
  const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
  const signal = (shift: NetPressureShift, setting: readonly number[]): number | undefined => {
    const { result } = solver.solve(row, setting);
    return result.status === 'solved' ? signalOf(shift.signals, (line) => solver.pressure(result, line)) : undefined;
  };
  const signalLines = (shift: NetPressureShift): number[] => shift.signals.map(({ line }) => line);

  /** What the pilot has, and what it needs. */
  const against = (shift: NetPressureShift, setting: readonly number[]): string => {
    const has = signal(shift, setting);
    return has === undefined
      ? 'these have no steady pressures, and open paths decide'
      : `pilot ${sayPressure(has, state.units)} against ${sayPressure(shift.setting, state.units)} needed`;
  };

  const standing = (valve: NetDependent, d: number): Step[] => {
    const label = dependentLabel(net, d);
    const me = [partId(state, valve.part)];
    const name = (position: number): string => valve.positions[position] ?? '?';
    const at = settled.setting[d] as number;
    const idle = valve.rest === undefined ? `stays where it was left` : `stays at rest (${name(valve.rest)})`;
    const roller = valve.shifts.find((shift) => shift.by === 'roller');
    if (roller?.by === 'roller') {
      const spec = net.actuators[roller.actuator];
      if (!spec) return [step(`${label} ${idle}: nobody says which actuator trips its roller.`, [], me)];
      const who = partLabel(state, spec.part);
      const where = { between: 'between its stops', in: 'at its inner stop', out: 'at its outer stop' };
      const stop = conditions.places[roller.actuator] ?? 'between';
      return trips(roller, places)
        ? [
            step(
              `${who} is ${where[stop]} and trips ${label}: it stands at ${name(at)}.`,
              [],
              [...me, partId(state, spec.part)],
            ),
          ]
        : [
            step(
              `${label} ${idle}: ${who} is ${where[stop]} and does not trip it.`,
              [],
              [...me, partId(state, spec.part)],
            ),
          ];
    }
    const shifts = valve.shifts.filter((shift) => shift.by === 'pressure');
    const acting = shifts.filter((shift) => staged(shift, commanded));
    if (acting.length === 0) return [step(`${label} ${idle}: its pilot stage asks for nothing else.`, [], me)];
    const to = acting.find((shift) => shift.position === at && at !== valve.rest);
    if (to && (signal(to, settled.setting) ?? Infinity) >= to.setting - 1 - 1e-6 * to.setting)
      return [step(`${label} shifts to ${name(at)}: ${against(to, settled.setting)}.`, signalLines(to), me)];
    return acting.map((shift) =>
      step(
        `${label} ${idle}${acting.length > 1 ? ` rather than going to ${name(shift.position)}` : ''}: ${against(shift, settled.setting)}.`,
        signalLines(shift),
        me,
      ),
    );
  };

  /** Position by position, what the pilots have there. */
  const hunting = (): Step => {
    const said = settled.cycle.map((setting) => {
      const valves = net.dependents.flatMap((valve, d) => {
        const acting = valve.shifts.filter((shift) => shift.by === 'pressure' && staged(shift, commanded));
        const there = acting.map((shift) => (shift.by === 'pressure' ? against(shift, setting) : ''));
        return there.length === 0
          ? []
          : [`${dependentLabel(net, d)} at ${valve.positions[setting[d] as number] ?? '?'}: ${there.join(', ')}`];
      });
      return valves.join('; ');
    });
    return step(
      `No position agrees with the pressures that it causes, so it hunts. ${said.map((text) => `${text}.`).join(' ')}`,
      [],
      net.dependents.map(({ part }) => partId(state, part)),
    );
  };

  const chase = settled.hunts ? hunting() : undefined;
  const answers = net.dependents.map((valve, d): DependentReason => {
    const others = [...new Set(settled.others.map((setting) => setting[d] as number))].map(
      (p) => valve.positions[p] ?? '?',
    );
    const label = dependentLabel(net, d);
    const memory =
      others.length > 0
        ? [
            step(
              `It depends on what came before: ${settled.others.map((setting) => saySetting(state, setting)).join(', or ')} agrees with its pressures as well. What is said here is reached from the rest position.`,
              [],
              [partId(state, valve.part)],
            ),
          ]
        : [];
    const unsearched = settled.searched
      ? []
      : [step('There were too many settings to look for further answers.', [], [partId(state, valve.part)])];
    const at = settled.setting[d] as number;
    return {
      part: partId(state, valve.part),
      label,
      position: at,
      name: valve.positions[at] ?? '?',
      hunts: settled.hunts,
      others,
      steps: chase ? [chase] : [...standing(valve, d), ...memory, ...unsearched],
    };
  });

  const word = row >>> 5;
  const set = settled.hunts ? fullSet(count) : emptySet(count);
  const touched = new TouchFinder(net, conditions, 1).at(word, 1, {
    planes: constantPlanes(net, settled.setting, count),
    hunts: set,
    others: [],
    moved: net.dependents.map(({ shifts }) =>
      shifts.some((shift) => shift.by === 'pressure' && staged(shift, commanded)) ? fullSet(count) : emptySet(count),
    ),
    byPressure: true,
    searched: settled.searched,
  });
  const touches = (plane: Uint32Array | undefined): boolean => (((plane?.[0] ?? 0) >>> (row & 31)) & 1) === 1;
  return {
    answers,
    actuator: (index, said) => {
      if (!touches(touched.actuators[index])) return said;
      if (!chase) return { ...said, onValues: true };
      const { rests: _, ...rest } = said;
      return { ...rest, verdict: 'undetermined', onValues: true, steps: [chase] };
    },
    pump: (index, said) => {
      if (!touches(touched.pumps[index])) return said;
      if (!chase) return { ...said, onValues: true };
      return {
        ...said,
        verdict: 'rests on pressure',
        onValues: true,
        rests: { why: chase.text, candidates: [said.verdict] },
        steps: [chase],
      };
    },
  };
}

const saySetting = (state: OneState, setting: readonly number[]): string =>
  setting
    .map((p, d) => `${dependentLabel(state.net, d)} at ${state.net.dependents[d]?.positions[p] ?? '?'}`)
    .join(' with ');
