import type { Budget } from '../../../base/budget.ts';
import type { Network } from '../../../network/network.ts';
import { bothCoilsOn, commanded, runOf } from './commands.ts';
import type { PlayStep } from './commands.ts';
import type { Machine } from './machine.ts';
import { Player } from './player.ts';
import type { RunResult } from './player.ts';
import type { TraceSample } from './trace.ts';

/** A step as it was played. */
export interface PlayedStep extends RunResult {
  readonly index: number;
  /** Inputs with two coils on against each other. */
  readonly bothOn: readonly number[];
  readonly before: Machine;
  readonly after: Machine;
  /** Shown lines in which pressure is shut in when it ends. */
  readonly trapped: readonly number[];
}

export interface PlayedPlan {
  /** Up to the one that does not end. */
  readonly steps: readonly PlayedStep[];
  readonly samples: readonly TraceSample[];
}

/** Plays steps one after another from a state of the machine, until one of them does not end. Throws `Cancelled`. */
export function playPlan(
  net: Network,
  from: Machine,
  steps: readonly { readonly index: number; readonly step: PlayStep }[],
  budget: Budget,
  shared?: Player,
): { readonly played: PlayedPlan; readonly player: Player } {
  const player = new Player(net, from, budget, shared);
  const done: PlayedStep[] = [];
  for (const { index, step } of steps) {
    const before = player.machine;
    const positions = commanded(net, before.positions, step);
    const result = player.run(runOf(net, index, step, positions));
    const after = player.machine;
    const bothOn = bothCoilsOn(net, step);
    done.push({ ...result, index, bothOn, before, after, trapped: player.memory.trapped(after) });
    if (result.end.as !== 'done') break;
  }
  return { played: { steps: done, samples: player.samples }, player };
}

/** The machine at a moment within a played step: between two samples strokes run straight, and all else stays. */
export function machineWithin(net: Network, step: PlayedStep, samples: readonly TraceSample[], time: number): Machine {
  let at = step.first;
  while (at + 1 < samples.length && samples[at + 1]?.step === step.index && (samples[at + 1]?.time ?? Infinity) <= time)
    at += 1;
  const sample = samples[at] as TraceSample;
  const span = time - sample.time;
  const strokes = net.actuators.map(({ stroke = Infinity }, i) =>
    Math.min(
      stroke,
      Math.max(stroke === Infinity ? -Infinity : 0, (sample.strokes[i] ?? 0) + (sample.speeds[i] ?? 0) * span),
    ),
  );
  const inputs = net.inputs.length;
  return {
    ...step.after,
    strokes,
    stops: net.actuators.map(({ stroke }, i) => {
      const travel = strokes[i] ?? 0;
      if (stroke === undefined) return 'between';
      return travel <= 0 ? 'in' : travel >= stroke ? 'out' : 'between';
    }),
    positions: sample.positions.slice(0, inputs),
    dependents: sample.positions.slice(inputs),
    stored: sample.stored,
    switches: sample.switches,
    held: Uint8Array.from(net.lines, (_, line) => ((sample.pressures[line] ?? 0) >= 1e5 ? 1 : 0)),
    shut: new Uint8Array(net.lines.length),
    pressures: net.lines.map((_, line) => sample.pressures[line] ?? 0),
  };
}
