import { coilNames } from '../../base/coil-names.ts';
import { formatNumber } from '../../base/units.ts';
import type {
  LossActuator,
  PlanLevel,
  PlanProblem,
  PlanReport,
  PlanTrace,
  StepMotion,
  StepReport,
  TraceEvent,
} from '../../worker/client.ts';

export const LEVELS: Readonly<Record<PlanLevel, { readonly word: string; readonly stamp: string }>> = {
  fault: { word: 'Fault', stamp: 'danger' },
  caution: { word: 'Caution', stamp: '' },
  note: { word: 'Note', stamp: 'note' },
};
const ORDER: readonly PlanLevel[] = ['fault', 'caution', 'note'];

export const worstFirst = (problems: readonly PlanProblem[]): PlanProblem[] =>
  problems.toSorted((a, b) => ORDER.indexOf(a.level) - ORDER.indexOf(b.level));

/** Time to the millisecond, as the report writes it. */
export const seconds = (s: number): string => `${s.toFixed(3)} s`;

/** `PUSH+ 0 to 1.508 s`: times from the start of the step. */
export function motionWords({ label, way, start, end, atStop, rotary, by }: StepMotion, step: StepReport): string {
  const sign = way === '-' ? '\u2212' : way;
  const short = rotary || atStop ? '' : ', short of its stop';
  return `${label}${sign} ${formatNumber(start - step.start)} to ${formatNumber(end - step.start)} s${by === 'load' ? ' by load' : ''}${short}`;
}

/** What a step did, in one word. */
export function stepVerdict(step: StepReport): { readonly word: string; readonly level: PlanLevel | 'good' | 'none' } {
  if (step.outcome === 'not played') return { word: 'not played', level: 'none' };
  const worst = worstFirst(step.problems)[0];
  if (step.outcome === 'never ended') return { word: 'never ends', level: 'fault' };
  if (worst?.level === 'fault') return { word: 'not as asked', level: 'fault' };
  return worst?.level === 'caution'
    ? { word: 'as asked, caution', level: 'caution' }
    : { word: 'as asked', level: 'good' };
}

/** The plan as a whole, in a few words. */
export function planVerdict({ good, steps, problems }: PlanReport): string {
  if (good) return 'does what it says';
  const faults = [...problems, ...steps.flatMap((step) => step.problems)].filter(({ level }) => level === 'fault');
  return `does not do what it says: ${faults.length} ${faults.length === 1 ? 'fault' : 'faults'}`;
}

/** What happens at a sample, in words; empty = nothing but time goes by. */
export function eventWords(trace: PlanTrace, sample: number): string {
  const { events = [] } = trace.samples[sample] ?? {};
  const stopped = new Set(events.flatMap((event) => (event.kind === 'stop' ? [event.actuator] : [])));
  return events
    .filter((event) => !(event.kind === 'speed' && stopped.has(event.actuator)))
    .flatMap((event) => sayEvent(trace, event, sample))
    .join(', ');
}

function sayEvent(trace: PlanTrace, event: TraceEvent, sample: number): string[] {
  const { actuators, switches, accumulators, samples, coils } = trace;
  const now = samples[sample];
  switch (event.kind) {
    case 'step': {
      const on = coilNames(coils).filter((_, i) => now?.coils[i] === true);
      return [
        `step ${stepName(trace, event.step)} begins${on.length > 0 ? ` with ${on.join(', ')} on` : ', no coil on'}`,
      ];
    }
    case 'step end':
      return [`step ${stepName(trace, event.step)} ends`];
    case 'speed': {
      const speed = now?.speeds[event.actuator] ?? 0;
      const label = actuators[event.actuator]?.label ?? '';
      return [Math.abs(speed) < 1e-9 ? `${label} stands still` : `${label} takes another speed`];
    }
    case 'stop':
      return [`${actuators[event.actuator]?.label ?? ''} all the way ${event.at}`];
    case 'travel':
      return [`${actuators[event.actuator]?.label ?? ''} at its sensor or roller`];
    case 'valve':
      return goneOver(trace, sample, event.position);
    case 'switch':
      return [`${switches[event.switch]?.label ?? ''} turns ${event.on ? 'on' : 'off'}`];
    case 'accumulator':
      return [`${accumulators[event.accumulator]?.label ?? ''} is ${event.is}`];
    case 'stage':
      return [];
  }
}

/** `2 push off`. */
export function stepName({ steps }: PlanTrace, step: number): string {
  const name = steps[step]?.name ?? '';
  return name === '' || name === `${step + 1}` ? `${step + 1}` : `${step + 1} ${name}`;
}

/** Events number the dependent valves by themselves; in the trace they are those that changed, from the end. */
function goneOver({ valves, samples }: PlanTrace, sample: number, position: number): string[] {
  const [before, now] = [samples[sample - 1], samples[sample]];
  const valve = valves.findLastIndex(
    (_, i) => now?.positions[i] === position && before !== undefined && before.positions[i] !== position,
  );
  const { label, positions } = valves[valve] ?? {};
  return label === undefined ? ['a valve goes over'] : [`${label} goes to ${positions?.[position] ?? ''}`];
}

/** `drops in`, `holds`. */
export const lossWords = ({ comes, from, to }: LossActuator): string =>
  from === to ? comes : `${comes} ${to > from ? 'out' : 'in'}`;
