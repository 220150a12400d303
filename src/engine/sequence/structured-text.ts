import type { CoilConditions, Expression } from './coil-conditions.ts';
import type { ContactTerm, Interlock, LeverContact } from './interlocks.ts';
import { mayForbidAgain } from './interlocks.ts';
import { sayMotions } from './notation.ts';
import { StNames, stComment, stTime } from './st-names.ts';
import type { LogicPlan, Place } from './step-logic.ts';

export interface StProgram {
  readonly circuit: string;
  readonly plan: string;
  readonly logic: LogicPlan;
  readonly conditions: CoilConditions;
  /** Coils that sit on one valve. */
  readonly valves: readonly (readonly number[])[];
  readonly interlocks: readonly Interlock[];
  /** What the contacts of the interlocks are called: `V2 at raise`. */
  readonly contacts: readonly (LeverContact & { readonly name: string })[];
  /** Said at the top: what the program cannot see to. */
  readonly notes: readonly string[];
  /** Said at a step: `V2 is held at raise by hand`. */
  readonly stepNotes: readonly (readonly string[])[];
}

export interface StOptions {
  /** `signals`: a coil whose steps the signals tell apart is assigned from them; `steps`: all from the step memory. */
  readonly coils: 'signals' | 'steps';
}

const CAUTION = [
  'A draft made from a step plan. It has run on no machine.',
  'A qualified person must review and test it against the documents of the machine and the local codes before use.',
  'It replaces no safety function: emergency stop, guards, two-hand control, safe holding of loads and the like are',
  'built apart from it. A coil that is off does not isolate energy.',
];

/**
 * The control of a step plan as a function block in structured text (IEC 61131-3): inputs for the sensors, pressure
 * switches and lever contacts, outputs for the coils, a step memory, the condition of each coil, and the interlocks
 * with the two coils of a valve against each other.
 */
export function structuredText(program: StProgram, options: StOptions): string {
  return new Writer(program, options).text();
}

/** `in`, `out`, `at 120 mm`. */
export const sayPlace = (at: Place): string => (typeof at === 'number' ? `at ${+(at * 1000).toFixed(3)} mm` : at);

class Writer {
  readonly #program: StProgram;
  readonly #options: StOptions;
  readonly #names = new StNames();
  readonly #block: string;
  readonly #start: string;
  readonly #stop: string;
  readonly #step: string;
  readonly #signals: readonly string[];
  readonly #contacts: readonly string[];
  readonly #coils: readonly string[];
  readonly #asked: readonly string[];
  readonly #timers = new Map<number, string>();

  constructor(program: StProgram, options: StOptions) {
    this.#program = program;
    this.#options = options;
    const { logic, conditions } = program;
    const fresh = (text: string): string => this.#names.fresh(text);
    this.#block = fresh(`Cycle_${program.plan}`);
    this.#start = fresh('Start');
    this.#stop = fresh('Stop');
    this.#step = fresh('StepNo');
    this.#coils = logic.coils.map(fresh);
    this.#signals = conditions.signals.map((signal) =>
      fresh(
        signal.type === 'sensor'
          ? `${logic.actuators[signal.actuator]?.label ?? ''}_${sayPlace(signal.at)}`
          : (logic.switches[signal.switch] ?? ''),
      ),
    );
    this.#contacts = program.contacts.map(({ name }) => fresh(name));
    this.#asked = logic.coils.map((coil) => fresh(`Ask_${coil}`));
    logic.steps.forEach(({ end }, i) => {
      if (end.by === 'time') this.#timers.set(i, fresh(`Timer_${i + 1}`));
    });
  }

  text(): string {
    const { circuit, plan, notes } = this.#program;
    const lines = [
      stComment(`${plan}, of ${circuit}`),
      ...CAUTION.map(stComment),
      ...notes.map(stComment),
      `FUNCTION_BLOCK ${this.#block}`,
      ...this.#declarations(),
      '',
      ...this.#timerCalls(),
      ...this.#cases(),
      `IF ${this.#stop} THEN`,
      `  ${this.#step} := 0;`,
      'END_IF;',
      '',
      ...this.#assignments(),
      ...this.#guard(),
      'END_FUNCTION_BLOCK',
    ];
    return `${lines.join('\n')}\n`;
  }

  #declarations(): string[] {
    const { logic, conditions, contacts } = this.#program;
    const bool = (name: string, words: string): string => `  ${name} : BOOL; ${stComment(words)}`;
    const said = conditions.signals.map((signal) =>
      signal.type === 'sensor'
        ? `${logic.actuators[signal.actuator]?.label ?? ''} stands ${sayPlace(signal.at)}`
        : `${logic.switches[signal.switch] ?? ''}: pressure over its setting`,
    );
    return [
      'VAR_INPUT',
      bool(this.#start, 'starts the cycle; held, it repeats it'),
      bool(this.#stop, 'all coils off; the cycle begins anew'),
      ...this.#signals.map((name, i) => bool(name, said[i] ?? '')),
      ...this.#contacts.map((name, i) => bool(name, `lever contact: ${contacts[i]?.name ?? ''}`)),
      'END_VAR',
      'VAR_OUTPUT',
      ...this.#coils.map((name, i) => bool(name, `coil ${logic.coils[i] ?? ''}`)),
      'END_VAR',
      'VAR',
      `  ${this.#step} : INT := 0; ${stComment('step that runs; 0 = waiting')}`,
      ...[...this.#timers.values()].map((name) => `  ${name} : TON;`),
      ...this.#asked.map((name) => `  ${name} : BOOL;`),
      'END_VAR',
    ];
  }

  #timerCalls(): string[] {
    const calls = [...this.#timers].map(([step, name]) => {
      const end = this.#program.logic.steps[step]?.end;
      const after = end?.by === 'time' ? end.after : 0;
      return `${name}(IN := (${this.#step} = ${step + 1}), PT := ${stTime(after)});`;
    });
    return calls.length > 0 ? [...calls, ''] : [];
  }

  #cases(): string[] {
    const { logic, conditions, stepNotes } = this.#program;
    const next = (step: number): number => (step + 1 < logic.steps.length ? step + 2 : 0);
    const move = (condition: string, to: number): string[] => [
      `    IF ${condition} THEN`,
      `      ${this.#step} := ${to};`,
      '    END_IF;',
    ];
    return [
      `CASE ${this.#step} OF`,
      `  0: ${stComment('waiting; starts with the actuators where the plan starts')}`,
      ...move([this.#start, ...this.#home()].join(' AND '), logic.steps.length > 0 ? 1 : 0),
      ...logic.steps.flatMap(({ name, motions }, i) => [
        `  ${i + 1}: ${stComment([name, sayMotions([motions], logic.actuators)].filter((text) => text !== '').join(': '))}`,
        ...(stepNotes[i] ?? []).map((note) => `    ${stComment(note)}`),
        ...move(this.#say(conditions.ends[i] as Expression), next(i)),
      ]),
      'END_CASE;',
    ];
  }

  /** Sensors that are on where the plan starts. */
  #home(): string[] {
    const { logic, conditions } = this.#program;
    return conditions.signals.flatMap((signal, i) =>
      signal.type === 'sensor' && logic.start[signal.actuator] === signal.at ? [this.#signals[i] as string] : [],
    );
  }

  #assignments(): string[] {
    const { conditions } = this.#program;
    const asked = conditions.coils.flatMap(({ coil, on, bySignals, bySteps }) => {
      const useSignals = bySignals !== undefined && this.#options.coils === 'signals' && on.length > 0;
      const steps = `on in ${on.length === 0 ? 'no step' : `step ${on.map((s) => s + 1).join(', ')}`}`;
      const clash = bySignals === undefined ? '; sensors alone do not tell' : '';
      const name = this.#asked[coil] as string;
      return [
        stComment(`${this.#program.logic.coils[coil] ?? ''}: ${steps}${clash}`),
        useSignals
          ? `${name} := (${this.#step} > 0) AND ${this.#factor(bySignals.expression)};`
          : `${name} := ${this.#say(bySteps)};`,
      ];
    });
    const reasons = this.#program.interlocks.flatMap(({ reason, terms }) =>
      terms.map((term) => stComment(`forbidden: ${this.#sayTerm(term, this.#coils)}; ${reason}`)),
    );
    return [...asked, '', ...reasons, ...this.#coils.map((name, coil) => this.#output(name, coil))];
  }

  /** The coil that is asked for, unless it stands in a forbidden combination. */
  #output(name: string, coil: number): string {
    const { valves, interlocks } = this.#program;
    const others = valves.filter((valve) => valve.includes(coil)).flatMap((valve) => valve.filter((c) => c !== coil));
    const without = interlocks
      .flatMap(({ terms }) => terms)
      .filter(({ on }) => on.includes(coil))
      .map((term) => {
        const rest = { ...term, on: term.on.filter((c) => c !== coil) };
        return this.#isEmpty(rest) ? 'FALSE' : `NOT (${this.#sayTerm(rest, this.#asked)})`;
      });
    const factors = [this.#asked[coil] as string, ...others.map((c) => `NOT ${this.#asked[c] as string}`), ...without];
    return `${name} := ${[...new Set(factors)].join(' AND ')};`;
  }

  #isEmpty({ on, off, contacts }: ContactTerm): boolean {
    return on.length + off.length + contacts.length === 0;
  }

  #guard(): string[] {
    const { interlocks } = this.#program;
    if (!mayForbidAgain(interlocks)) return [];
    const terms = interlocks.flatMap((interlock) => interlock.terms);
    const coils = [...new Set(terms.flatMap(({ on }) => on))];
    return [
      stComment('a coil left off may bring about another forbidden combination: then all of these are off'),
      `IF ${terms.map((term) => `(${this.#sayTerm(term, this.#coils)})`).join(' OR ')} THEN`,
      ...coils.map((coil) => `  ${this.#coils[coil] as string} := FALSE;`),
      'END_IF;',
    ];
  }

  #sayTerm({ on, off, contacts }: ContactTerm, names: readonly string[]): string {
    return [
      ...on.map((c) => names[c] as string),
      ...off.map((c) => `NOT ${names[c] as string}`),
      ...contacts.map(({ contact, closed }) => `${closed ? '' : 'NOT '}${this.#contacts[contact] as string}`),
    ].join(' AND ');
  }

  /** As an operand of AND. */
  #factor(e: Expression): string {
    const said = this.#say(e);
    return e.type === 'any' && e.of.length > 1 ? `(${said})` : said;
  }

  #say(e: Expression): string {
    switch (e.type) {
      case 'all':
        return e.of.length === 0 ? 'TRUE' : e.of.map((part) => this.#factor(part)).join(' AND ');
      case 'any':
        return e.of.length === 0
          ? 'FALSE'
          : e.of
              .map((part) => (part.type === 'all' && part.of.length > 1 ? `(${this.#say(part)})` : this.#say(part)))
              .join(' OR ');
      case 'not':
        return e.of.type === 'signal' ? `NOT ${this.#say(e.of)}` : `NOT (${this.#say(e.of)})`;
      case 'signal':
        return this.#signals[e.signal] ?? 'FALSE';
      case 'step':
        return `(${this.#step} = ${e.step + 1})`;
      case 'timer':
        return `${this.#timers.get(e.step) as string}.Q`;
    }
  }
}
