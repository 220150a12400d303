import { Cancelled } from '../base/budget.ts';
import type { Budget } from '../base/budget.ts';
import type { PlayStep } from '../engine/sequence/play/commands.ts';
import { losePower } from '../engine/sequence/play/lose-power.ts';
import type { LostPower } from '../engine/sequence/play/lose-power.ts';
import type { Machine } from '../engine/sequence/play/machine.ts';
import { machineWithin, playPlan } from '../engine/sequence/play/play-plan.ts';
import type { PlayedPlan, PlayedStep } from '../engine/sequence/play/play-plan.ts';
import type { Player } from '../engine/sequence/play/player.ts';
import type { Network } from '../network/network.ts';
import type { PlanPowerLoss, PlanProblem, PowerLossCase } from './plan-results.ts';
import { POWER_LOSSES } from './plan-results.ts';
import { problemsOf } from './plan-verdicts.ts';

const LOSSES: Readonly<Record<PowerLossCase, { readonly coils: boolean; readonly pumps: boolean }>> = {
  'coils off, pumps running': { coils: true, pumps: false },
  'coils off, pumps stopped': { coils: true, pumps: true },
  'pumps stopped': { coils: false, pumps: true },
};

/** A moment at which the power is lost, and the step that comes when it is back: the same again, or the next. */
interface Moment {
  readonly played: PlayedStep;
  readonly at: PlanPowerLoss['at'];
  readonly time: number;
  readonly machine: Machine;
  readonly speeds: readonly number[];
  readonly resume: number;
}

/** Loss of power in the middle of every step that moves something, and at the end of each. Throws `Cancelled`. */
export function powerLosses(
  net: Network,
  plan: PlayedPlan,
  steps: readonly PlayStep[],
  player: Player,
  budget: Budget,
): PlanPowerLoss[] {
  const moments = momentsOf(net, plan);
  const known = knownFaults(net, plan, steps);
  const replays = new Map<string, string | undefined>();
  return moments.flatMap((moment, i) => {
    budget.progress(i / moments.length);
    return POWER_LOSSES.map((lost): PlanPowerLoss => {
      if (budget.cancelled()) throw new Cancelled();
      const result = losePower(net, moment.machine, moment.speeds, LOSSES[lost], budget, player);
      const key = `${moment.resume}|${sameStanding(result.after)}`;
      if (!replays.has(key)) replays.set(key, whyNot(net, result, moment, steps, known, player, budget));
      const why = replays.get(key);
      return {
        step: moment.played.index,
        at: moment.at,
        time: moment.time,
        lost,
        actuators: result.actuators.map(({ comes, from, to }, a) => {
          const part = net.parts[net.actuators[a]?.part ?? -1];
          return { part: part?.id ?? '', label: part?.label ?? '', comes, from, to };
        }),
        underPressure: result.under.map((line) => net.lines[line]?.name ?? ''),
        resumes: why === undefined,
        ...(why !== undefined && { why }),
      };
    });
  });
}

function momentsOf(net: Network, { steps, samples }: PlayedPlan): Moment[] {
  return steps.flatMap((played): Moment[] => {
    const { motions } = played.ledger;
    const moments: Moment[] = [];
    if (motions.length > 0 && played.end.as === 'done') {
      const start = Math.min(...motions.map((motion) => motion.start));
      const end = Math.max(...motions.map((motion) => motion.end));
      const time = (start + end) / 2;
      const sample = samples.findLast((one) => one.step === played.index && one.time <= time);
      moments.push({
        played,
        at: 'mid-motion',
        time,
        machine: machineWithin(net, played, samples, time),
        speeds: sample?.speeds ?? [],
        resume: played.index,
      });
    }
    const rest = net.actuators.map(() => 0);
    moments.push({
      played,
      at: 'step end',
      time: played.stop,
      machine: played.after,
      speeds: rest,
      resume: played.index + 1,
    });
    return moments;
  });
}

const faultKey = ({ kind, step, parts }: PlanProblem): string => `${kind} ${step ?? ''} ${parts.join()}`;

const faultsOf = (problems: readonly PlanProblem[]): PlanProblem[] => problems.filter(({ level }) => level === 'fault');

function knownFaults(net: Network, { steps: played }: PlayedPlan, steps: readonly PlayStep[]): ReadonlySet<string> {
  const all = played.flatMap((one) => problemsOf(net, one, steps[one.index] as PlayStep, false));
  return new Set(faultsOf(all).map(faultKey));
}

/** The first thing that goes wrong when the plan goes on from there; undefined if it checks out as before. */
function whyNot(
  net: Network,
  { after, end }: LostPower,
  { resume }: Moment,
  steps: readonly PlayStep[],
  known: ReadonlySet<string>,
  player: Player,
  budget: Budget,
): string | undefined {
  if (end.as === 'no steady state') return end.words;
  const rest = steps.flatMap((step, index) => (index >= resume ? [{ index, step }] : []));
  if (rest.length === 0) return undefined;
  const { played } = playPlan(net, after, rest, budget, player);
  for (const one of played.steps) {
    const step = steps[one.index] as PlayStep;
    // Where the interrupted step is given again, what has come to its end meanwhile need not move once more.
    const forgiven = (problem: PlanProblem): boolean =>
      one.index === resume && problem.kind === 'did not move' && one.end.as === 'done';
    const fresh = faultsOf(problemsOf(net, one, step, false)).find(
      (problem) => !known.has(faultKey(problem)) && !forgiven(problem),
    );
    if (fresh) return `Step ${one.index + 1}: ${fresh.what}`;
  }
  return undefined;
}

/** Equal for machines that go on alike: travels to a micrometre, oil to a microlitre. */
const sameStanding = ({ strokes, positions, dependents, stored, switches, running }: Machine): string =>
  [
    strokes.map((s) => Math.round(s * 1e6)),
    positions,
    dependents,
    stored.map((v) => Math.round(v * 1e9)),
    switches,
    running,
  ].join('|');
