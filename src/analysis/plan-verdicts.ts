import { formatQuantity } from '../base/units.ts';
import type { PlayStep, Wanted } from '../engine/sequence/play/commands.ts';
import type { LoggedMotion } from '../engine/sequence/play/motion-log.ts';
import type { PlayedStep } from '../engine/sequence/play/play-plan.ts';
import type { Network } from '../network/network.ts';
import type { PlanLevel, PlanProblem, PlanProblemKind } from './plan-results.ts';

/** What a played step did against what it was asked, as problems in words. */
export function problemsOf(net: Network, played: PlayedStep, step: PlayStep, last: boolean): PlanProblem[] {
  return new StepJudge(net, played, step, last).judge();
}

const WAYS = { '+': 'out', '-': 'in', '0': 'to rest' } as const;
const TURNS = { '+': 'A→B', '-': 'B→A', '0': 'to rest' } as const;

class StepJudge {
  readonly #net: Network;
  readonly #played: PlayedStep;
  readonly #step: PlayStep;
  readonly #last: boolean;
  readonly #wanted: readonly Wanted[];
  readonly #found: PlanProblem[] = [];

  constructor(net: Network, played: PlayedStep, step: PlayStep, last: boolean) {
    this.#net = net;
    this.#played = played;
    this.#step = step;
    this.#last = last;
    this.#wanted = step.expect.flat();
  }

  judge(): PlanProblem[] {
    this.#coils();
    this.#ending();
    for (const motion of this.#played.ledger.motions) this.#motion(motion);
    for (const wanted of this.#wanted) this.#asked(wanted);
    this.#order();
    this.#oil();
    this.#pressure();
    return this.#found;
  }

  #label(actuator: number): string {
    return this.#net.parts[this.#net.actuators[actuator]?.part ?? -1]?.label ?? '';
  }

  #way(actuator: number, way: Wanted['way']): string {
    return (this.#net.actuators[actuator]?.rotary ? TURNS : WAYS)[way];
  }

  #say(
    kind: PlanProblemKind,
    level: PlanLevel,
    actuators: readonly number[],
    what: string,
    remedy: string,
    more: { time?: number; lines?: readonly number[] } = {},
  ): void {
    const parts = actuators.map((i) => this.#net.parts[this.#net.actuators[i]?.part ?? -1]?.id ?? '');
    this.#found.push({
      kind,
      level,
      where: `step ${this.#played.index + 1}`,
      what,
      remedy,
      step: this.#played.index,
      ...(more.time !== undefined && { time: more.time }),
      parts,
      lines: more.lines ?? [],
    });
  }

  #coils(): void {
    for (const input of this.#played.bothOn) {
      const spec = this.#net.inputs[input];
      const part = this.#net.parts[spec?.part ?? -1];
      const on = this.#step.coils.filter((one) => one.input === input).map(({ coil }) => spec?.coils[coil]?.name ?? '');
      this.#say(
        'both coils on',
        'fault',
        [],
        `Coils ${on.join(' and ')} of ${part?.label ?? ''} are on together, which is not permitted: they pull the spool against each other and burn out. It is played as if neither were on.`,
        'Switch one of them off in this step, and lock the two against each other in the control.',
      );
      const found = this.#found.pop();
      if (found) this.#found.push({ ...found, parts: [part?.id ?? ''] });
    }
  }

  #ending(): void {
    const { end, after, stop } = this.#played;
    const at = { time: stop };
    switch (end.as) {
      case 'done':
        return;
      case 'at rest':
        this.#say(
          'never ended',
          'fault',
          [],
          `It never ends: nothing moves any more, and ${this.#missing()}.`,
          this.#unblock(),
          at,
        );
        return;
      case 'too long':
        this.#say(
          'never ended',
          'fault',
          [],
          `It has not ended after ${seconds(this.#step.limit)}: ${this.#missing()}.`,
          'Check the speeds, or give the step more time with "within".',
          at,
        );
        return;
      case 'no steady state':
        this.#say(
          'no steady state',
          'fault',
          [],
          end.words,
          'Mend the circuit there; the plan cannot be played beyond this moment.',
          at,
        );
        return;
      case 'chatter': {
        const moving = this.#net.actuators.flatMap((_, i) => (after.stops[i] === 'between' ? [i] : []));
        this.#say(
          'chatter',
          'fault',
          moving,
          end.hunts
            ? 'Valves that pressures move find no position that agrees with the pressures it causes: they hunt.'
            : 'Valves and motions switch each other to and fro without end.',
          'Part the settings of the valves further, or give their signals another source.',
          at,
        );
        return;
      }
    }
  }

  /** What the end of the step is waiting for. */
  #missing(): string {
    const { ends } = this.#step;
    const { after } = this.#played;
    switch (ends.by) {
      case 'motion': {
        const open = this.#wanted.filter(({ actuator, way }) => after.stops[actuator] !== (way === '+' ? 'out' : 'in'));
        return `${open.map(({ actuator, way }) => `${this.#label(actuator)} is not all the way ${this.#way(actuator, way)}`).join(', ')}`;
      }
      case 'sensor': {
        const at =
          typeof ends.at === 'number'
            ? `at ${millimetres(ends.at)}`
            : `at the ${ends.at === 'in' ? 'inner' : 'outer'} stop`;
        return `${this.#label(ends.actuator)} does not stand ${at}, where its sensor is`;
      }
      case 'pressure': {
        const contact = this.#net.switches[ends.switch];
        const label = this.#net.parts[contact?.part ?? -1]?.label ?? '';
        const stands = this.#played.after.pressures[contact?.line ?? -1] ?? 0;
        return `${label} has not turned ${ends.on ? 'on' : 'off'}: ${bar(stands)} stand at it, and it turns at ${bar((ends.on ? contact?.on : contact?.off) ?? 0)}`;
      }
      case 'time':
        return 'its time is not over';
    }
  }

  #unblock(): string {
    switch (this.#step.ends.by) {
      case 'pressure':
        return 'Set the switch below the pressure that the relief valve allows, or end the step otherwise.';
      default:
        return 'Look at the pressures of this moment: a valve in the wrong position, a load too heavy for the setting, or a blocked line.';
    }
  }

  #motion({ actuator, way, start, from, to, work }: LoggedMotion): void {
    const label = this.#label(actuator);
    if (this.#wanted.some((wanted) => wanted.actuator === actuator && wanted.way === way)) return;
    const { rotary, push } = this.#net.actuators[actuator] ?? { rotary: false, push: { by: 'load' as const } };
    const far = rotary ? `${turns(to - from)} turns` : millimetres(Math.abs(to - from));
    const at = { time: start };
    if (work <= 0) {
      this.#say(
        'load unsecured',
        'fault',
        [actuator],
        `${label} is moved ${this.#way(actuator, way)} by its ${push.by}, ${far}, though nobody asked.`,
        'Hold the load: a lock check or counterbalance valve on its chamber, or a centre that blocks it.',
        at,
      );
    } else if (this.#wanted.some((wanted) => wanted.actuator === actuator)) {
      this.#say(
        'wrong way',
        'fault',
        [actuator],
        `${label} moves ${this.#way(actuator, way)}, ${far}, the other way from what is asked.`,
        'Change the coil or lever of its valve, or swap the lines at its ports.',
        at,
      );
    } else {
      this.#say(
        'moved unasked',
        'fault',
        [actuator],
        `${label} moves ${this.#way(actuator, way)}, ${far}, though nobody asked.`,
        'Find what opens its line in this step: a coil left on, a valve in its last position, a pressure valve that opens.',
        at,
      );
    }
  }

  #asked(wanted: Wanted): void {
    const { actuator, way } = wanted;
    const { before, after, ledger, end, stop } = this.#played;
    const label = this.#label(actuator);
    if (way === '0') {
      return;
    }
    const done = ledger.motions.filter((motion) => motion.actuator === actuator && motion.way === way);
    const stops = this.#net.actuators[actuator]?.stroke !== undefined;
    const target = way === '+' ? 'out' : 'in';
    if (done.length === 0) {
      const there = stops && before.stops[actuator] === target;
      const early = end.as === 'done' && this.#played.stop - this.#played.start < 1e-9;
      this.#say(
        'did not move',
        'fault',
        [actuator],
        there
          ? `${label} is to go ${this.#way(actuator, way)}, but is ${target} already when the step begins.`
          : early
            ? `${label} does not go ${this.#way(actuator, way)}: what ends the step is met before anything moves.`
            : `${label} does not go ${this.#way(actuator, way)}.`,
        there
          ? 'Take it back in an earlier step, or leave the motion out.'
          : early
            ? 'End the step by another signal.'
            : 'Check the commands of this step, the load against the setting, and whether a lighter load takes the flow.',
      );
    } else if (stops && after.stops[actuator] !== target && end.as === 'done' && !this.#endsOn(actuator)) {
      this.#say(
        'not finished',
        'caution',
        [actuator],
        `${label} is still on its way ${this.#way(actuator, way)} when the step ends: it has come to ${millimetres(after.strokes[actuator] ?? 0)}.`,
        'Let its own sensor end the step, or give it more time.',
        { time: stop },
      );
    }
  }

  /** The step is to end before this one is at its stop. */
  #endsOn(actuator: number): boolean {
    const { ends } = this.#step;
    return ends.by === 'pressure' || (ends.by === 'sensor' && ends.actuator === actuator);
  }

  /** A motion of a later group that begins before those of an earlier one have come to their end. */
  #order(): void {
    const { motions } = this.#played.ledger;
    const of = ({ actuator, way }: Wanted): readonly LoggedMotion[] =>
      motions.filter((motion) => motion.actuator === actuator && motion.way === way);
    const { expect } = this.#step;
    expect.slice(1).forEach((group, i) => {
      const earlier = expect[i] ?? [];
      for (const second of group) {
        const begins = of(second)[0];
        for (const first of earlier) {
          const ended = of(first).at(-1);
          if (!begins || !ended || begins.start >= ended.end - 1e-9 || first.actuator === second.actuator) continue;
          const before = begins.start < (of(first)[0]?.start ?? 0);
          this.#say(
            'wrong order',
            'fault',
            [first.actuator, second.actuator],
            `${this.#label(second.actuator)} goes ${this.#way(second.actuator, second.way)} ${before ? 'before' : 'while'} ${this.#label(first.actuator)} ${before ? 'goes' : 'is still going'} ${this.#way(first.actuator, first.way)}; it is to come after.`,
            'Set the sequence valve above the pressure that the first motion needs, or give the second a step of its own.',
            { time: begins.start },
          );
        }
      }
    });
  }

  #oil(): void {
    const { voids, rivals } = this.#played.ledger;
    for (const actuator of voids) {
      this.#say(
        'void forms',
        'caution',
        [actuator],
        `Void forms in the growing chamber of ${this.#label(actuator)}: its load runs ahead of the oil.`,
        'Throttle what leaves the other chamber, or brake it with a counterbalance valve; a make-up check fills the chamber.',
      );
    }
    if (rivals.length > 0) {
      this.#say(
        'undetermined',
        'caution',
        rivals,
        `${rivals.map((i) => this.#label(i)).join(' and ')} share one flow by the losses of their lines alone, so their order and times are not certain.`,
        'Part them by a flow divider, sequence valve or steps of their own.',
      );
    }
  }

  #pressure(): void {
    const { ledger, trapped, end } = this.#played;
    if (ledger.idle.time > 0) {
      this.#say(
        'over relief while idle',
        'caution',
        [],
        `For ${seconds(ledger.idle.time)} nothing moves and the pump goes over its relief valve: ${joules(ledger.idle.energy)} become heat.`,
        'Unload the pump while it waits: a bypass centre, a vented relief valve, or a coil that goes off.',
      );
    } else if (this.#last && end.as === 'done' && ledger.idleAtEnd > 0) {
      this.#say(
        'over relief while idle',
        'caution',
        [],
        `The plan ends with the pump over its relief valve: ${formatQuantity(ledger.idleAtEnd, 'power', 'metric', { digits: 3 })} become heat while it waits.`,
        'End with a step that lets the valves go to rest, on a centre that unloads the pump.',
      );
    }
    if (this.#last && trapped.length > 0) {
      const names = trapped.map((line) => this.#net.lines[line]?.name ?? '').join(', ');
      this.#say(
        'pressure left trapped',
        'caution',
        [],
        `At the end pressure stays shut in: ${names}.`,
        'Let it down before anybody works there: bleed gives the list of lever moves. Follow the machine’s documents.',
        { lines: trapped },
      );
    }
  }
}

const seconds = (s: number): string => formatQuantity(s, 'time', 'metric', { digits: 4 });
const millimetres = (m: number): string => formatQuantity(m, 'length', 'metric', { digits: 4 });
const bar = (pa: number): string => formatQuantity(pa, 'pressure', 'metric', { digits: 3 });
const turns = (rad: number): string => (Math.abs(rad) / (2 * Math.PI)).toFixed(1);
const joules = (j: number): string => (j >= 1000 ? `${(j / 1000).toFixed(1)} kJ` : `${j.toFixed(0)} J`);
