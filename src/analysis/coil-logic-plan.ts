import { coilNames } from '../base/coil-names.ts';
import type { Result } from '../base/result.ts';
import { bad, good } from '../base/result.ts';
import type { StepPlan } from '../circuit/plan.ts';
import type { MotionStep } from '../engine/sequence/notation.ts';
import type { PlayEnd } from '../engine/sequence/play/commands.ts';
import { endProblems } from '../engine/sequence/step-logic.ts';
import type { LogicEnd, LogicPlan, Place } from '../engine/sequence/step-logic.ts';
import type { Network } from '../network/network.ts';
import { readPlan } from './plan-reading.ts';

/** A coil of the circuit: of which input of the network, and which position it holds. */
export interface PlanCoil {
  readonly part: string;
  readonly coil: string;
  readonly name: string;
  readonly input: number;
  readonly position: number;
}

/** A step plan in numbers of the network, and what they stand for. */
export interface NumberedPlan {
  readonly logic: LogicPlan;
  readonly coils: readonly PlanCoil[];
  /** Motions of each step that follow each other. */
  readonly orders: readonly (readonly MotionStep[])[];
  /** Of each step: input → position in which it is held by hand. */
  readonly levers: readonly ReadonlyMap<number, number>[];
}

/** The plan as a control sees it. Fails with what cannot be read, or cannot end by what is said of it. */
export function numberedPlan(net: Network, plan: StepPlan): Result<NumberedPlan> {
  const { start, steps, problems } = readPlan(net, plan);
  if (problems.length > 0) return bad(...problems.map(({ where, what, remedy }) => ({ where, what, remedy })));
  const label = (part: number): string => net.parts[part]?.label ?? '';
  const coils = coilsOf(net);
  const coilAt = (input: number, coil: number): number =>
    coils.findIndex((c) => c.input === input && c.coil === net.inputs[input]?.coils[coil]?.name);
  const logic: LogicPlan = {
    actuators: net.actuators.map(({ part, rotary }) => ({ label: label(part), rotary })),
    start: net.actuators.map(({ stroke }, i): Place => {
      const at = start.strokes[i] ?? 0;
      return at <= 0 ? 'in' : stroke !== undefined && at >= stroke ? 'out' : at;
    }),
    switches: net.switches.map(({ part }) => label(part)),
    coils: coils.map(({ name }) => name),
    steps: steps.map((step, i) => ({
      name: plan.steps[i]?.name ?? '',
      coils: [...new Set(step.coils.map(({ input, coil }) => coilAt(input, coil)))],
      motions: step.expect.flat(),
      earlier: step.expect.slice(0, -1).flatMap((together) => together.map(({ actuator }) => actuator)),
      end: endOf(step.ends),
    })),
  };
  const ends = endProblems(logic);
  if (ends.length > 0) return bad(...ends);
  return good({ logic, coils, orders: steps.map(({ expect }) => expect), levers: steps.map(({ levers }) => levers) });
}

const endOf = (end: PlayEnd): LogicEnd =>
  end.by === 'pressure' ? { by: 'pressure', switch: end.switch, turns: end.on ? 'on' : 'off' } : end;

function coilsOf({ inputs, parts }: Network): PlanCoil[] {
  const coils = inputs.flatMap(({ part, coils: own }, input) =>
    own.map(({ name, position }) => ({
      part: parts[part]?.id ?? '',
      label: parts[part]?.label ?? '',
      name,
      input,
      position,
    })),
  );
  const names = coilNames(coils);
  return coils.map(({ part, name, input, position }, i) => ({
    part,
    coil: name,
    name: names[i] ?? name,
    input,
    position,
  }));
}
