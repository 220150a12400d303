import type { Condition } from './condition.ts';
import { readFigure, readComparison } from './figures.ts';
import type { Named, NamedKind, Names } from './names.ts';
import { namedThings, pressurePoints, otherCoilNames } from './names.ts';
import type { Reader } from './reader.ts';
import { Fault, nearest } from './reader.ts';
import type { Says } from './says.ts';
import { ACTUATOR_SAYS, BLOCKED_SAYS, LINE_SAYS, PUMP_SAYS, TRAPPED_SAYS } from './says.ts';

/** Words for all things of a kind. */
const KINDS: readonly {
  readonly words: readonly string[];
  readonly kind: NamedKind;
  readonly motion?: 'linear' | 'rotary';
}[] = [
  { words: ['lever', 'levers', 'valve', 'valves'], kind: 'valve' },
  { words: ['coil', 'coils'], kind: 'coil' },
  { words: ['actuator', 'actuators'], kind: 'actuator' },
  { words: ['cylinder', 'cylinders'], kind: 'actuator', motion: 'linear' },
  { words: ['motor', 'motors'], kind: 'actuator', motion: 'rotary' },
  { words: ['pump', 'pumps'], kind: 'pump' },
  { words: ['line', 'lines'], kind: 'line' },
];
const EVERY = ['every', 'all', 'each'];
const ANY = ['any', 'some', 'a', 'an'];
const MOST_NAMED = 12;

/** Reads statements about one thing or all things of a kind: `V1 at a`, `every lever rests`, `any line is trapped`. */
export class Statements {
  readonly #in: Reader;
  readonly #names: Names;
  readonly #things: readonly Named[];
  /** Read, but not offered. */
  readonly #unlisted: readonly Named[];

  constructor(reader: Reader, names: Names) {
    this.#in = reader;
    this.#names = names;
    this.#things = namedThings(names);
    this.#unlisted = otherCoilNames(names);
  }

  read(): Condition {
    const start = this.#in.at;
    if (this.#in.words('pressure at')) return this.#pressure(start);
    const quantity = this.#quantity();
    if (quantity) {
      const things =
        quantity.kind === 'valve' && this.#aboutRest()
          ? quantity.things.filter(({ index }) => this.#names.inputs[index]?.rest !== undefined)
          : quantity.things;
      if (things.length === 0)
        throw new Fault(
          start,
          'The circuit has none of these, or none with a rest position.',
          'Leave this out, or name a part.',
        );
      return this.#say(things, quantity.how);
    }
    for (const kind of ['line', 'coil', 'pump', 'valve', 'lever', 'cylinder', 'motor', 'actuator'] as const) {
      const back = this.#in.at;
      if (!this.#in.words(kind)) continue;
      const only = this.#things.filter(
        (thing) => thing.kind === (KINDS.find(({ words }) => words.includes(kind))?.kind ?? kind),
      );
      const found = this.#oneOf(only, kind === 'coil' ? this.#unlisted : []);
      if (found) return this.#say([found], 'every');
      if (kind === 'line' || kind === 'coil') throw this.#unknown(only, `${kind} `);
      // A part may have such a name itself.
      this.#in.at = back;
    }
    const found = this.#oneOf(this.#things, this.#unlisted);
    if (!found) throw this.#unknown(this.#things, '');
    return this.#say([found], 'every');
  }

  #oneOf(things: readonly Named[], unsaid: readonly Named[]): Named | undefined {
    const found = this.#in.oneOf(
      things.map(({ name }) => name),
      'name',
    );
    if (found >= 0 || this.#in.ended) return things[found];
    return unsaid[this.#in.oneOf(unsaid.map(({ name }) => name))];
  }

  #quantity(
    kinds?: readonly NamedKind[],
  ): { readonly things: readonly Named[]; readonly kind: NamedKind; readonly how: 'every' | 'any' | 'no' } | undefined {
    const back = this.#in.at;
    const how = EVERY.some((w) => this.#in.words(w))
      ? 'every'
      : ANY.some((w) => this.#in.words(w))
        ? 'any'
        : this.#in.words('no')
          ? 'no'
          : undefined;
    const found =
      how && KINDS.find(({ kind, words }) => (kinds?.includes(kind) ?? true) && words.some((w) => this.#in.words(w)));
    if (how === undefined || found === undefined) {
      this.#in.at = back;
      return undefined;
    }
    const { kind, motion } = found;
    const things = this.#things.filter(
      (thing) => thing.kind === kind && (motion === undefined || this.#names.actuators[thing.index]?.motion === motion),
    );
    return { things, kind, how };
  }

  #aboutRest(): boolean {
    return ['rests', 'rest', 'is at rest', 'are at rest', 'at rest', 'is not at rest', 'stands at rest'].some((words) =>
      this.#in.peek(words),
    );
  }

  /** What is said of all these things, which are of one kind. */
  #say(things: readonly Named[], how: 'every' | 'any' | 'no'): Condition {
    const start = this.#in.at;
    const copula =
      !this.#in.peek('stands still') && ['is', 'are', 'stays', 'stands'].some((word) => this.#in.words(word));
    const negated = copula ? this.#in.words('not') : this.#in.words('does not') || this.#in.words('do not');
    const predicate = this.#predicate(things, start);
    const each = things.map((thing): Condition => (negated ? { type: 'not', of: predicate(thing) } : predicate(thing)));
    const [only] = each;
    if (how === 'no') return { type: 'not', of: { type: 'any', of: each } };
    return each.length === 1 && only !== undefined ? only : { type: how, of: each };
  }

  #predicate(things: readonly Named[], start: number): (thing: Named) => Condition {
    const kind = things[0]?.kind;
    const one = things.length === 1 ? things[0] : undefined;
    const called = one
      ? `${one.kind === 'line' || one.kind === 'coil' ? `${one.kind} ` : ''}${one.name}`
      : `every ${kind}`;
    switch (kind) {
      case 'valve':
        return this.#position(one, called);
      case 'coil': {
        const on = this.#in.words('on') || this.#in.words('energised') || this.#in.words('energized');
        if (!on && !this.#in.words('off')) throw this.#unsaid(called, ['on', 'off']);
        return ({ index, position }) => {
          const condition: Condition = { type: 'position', input: index, positions: 1 << position };
          return on ? condition : { type: 'not', of: condition };
        };
      }
      case 'actuator': {
        const speed = this.#speed(things);
        if (speed) return speed;
        const verdicts = this.#meaning(ACTUATOR_SAYS, called, ['faster than …', 'slower than …']);
        const moving = this.#speed(things);
        return (thing) => {
          const does: Condition = { type: 'actuator', actuator: thing.index, verdicts };
          return moving ? { type: 'every', of: [does, moving(thing)] } : does;
        };
      }
      case 'pump': {
        const verdicts = this.#meaning(PUMP_SAYS, called);
        return ({ index }) => ({ type: 'pump', pump: index, verdicts });
      }
      case 'line': {
        const says = [...LINE_SAYS, ...BLOCKED_SAYS, ...TRAPPED_SAYS];
        const found = this.#in.oneOf(says.map(({ words }) => words));
        if (found < 0)
          throw this.#unsaid(
            called,
            says.map(({ words }) => words),
          );
        const inTrapped = found - LINE_SAYS.length - BLOCKED_SAYS.length;
        if (inTrapped >= 0)
          return ({ index }) => ({ type: 'trapped', line: index, reasons: TRAPPED_SAYS[inTrapped]?.means ?? [] });
        const inBlocked = found - LINE_SAYS.length;
        if (inBlocked >= 0)
          return ({ index }) => ({ type: 'blocked', line: index, kinds: BLOCKED_SAYS[inBlocked]?.means ?? [] });
        return ({ index }) => ({ type: 'line', line: index, classes: LINE_SAYS[found]?.means ?? [] });
      }
      case undefined:
        throw new Fault(start, 'The circuit has none of these.', 'Leave this out.');
    }
  }

  /** `pressure at V1.A over 160 bar`, `pressure at any pump under 10 bar`. */
  #pressure(start: number): Condition {
    const quantity = this.#quantity(['line', 'pump']);
    const points = quantity ? [] : pressurePoints(this.#names);
    const found = quantity
      ? -1
      : this.#in.oneOf(
          points.map(({ name }) => name),
          'name',
        );
    if (!quantity && found < 0) {
      const { at, next, ended } = this.#in;
      throw new Fault(
        at,
        ended ? 'The name of a line, port or pump should stand here.' : `There is no line, port or pump "${next}".`,
        listed([...new Set(points.map(({ name }) => name))]),
      );
    }
    const things = quantity ? quantity.things : [points[found] as Named];
    if (things.length === 0) throw new Fault(start, 'The circuit has none of these.', 'Leave this out.');
    const copula = this.#in.words('is') || this.#in.words('stays');
    const negated = copula && this.#in.words('not');
    const is = readComparison(this.#in);
    const than = readFigure(this.#in, 'pressure');
    const each = things.map(({ kind, index }): Condition => {
      const one: Condition = { type: 'pressure', of: kind === 'pump' ? 'pump' : 'line', index, is, than };
      return negated ? { type: 'not', of: one } : one;
    });
    const [only] = each;
    if (quantity?.how === 'no') return { type: 'not', of: { type: 'any', of: each } };
    return each.length === 1 && only ? only : { type: quantity?.how === 'any' ? 'any' : 'every', of: each };
  }

  /** `faster than 120 mm/s`, if it comes next. */
  #speed(things: readonly Named[]): ((thing: Named) => Condition) | undefined {
    const faster = this.#in.words('faster than');
    if (!faster && !this.#in.words('slower than')) return undefined;
    const rotary = things.map(({ index }) => this.#names.actuators[index]?.motion === 'rotary');
    if (rotary.includes(true) && rotary.includes(false))
      throw new Fault(
        this.#in.at,
        'Cylinders and motors have different units of speed.',
        'Say it of every cylinder and of every motor apart.',
      );
    const size = readFigure(this.#in, rotary[0] ? 'frequency' : 'speed');
    const than = rotary[0] ? size * 2 * Math.PI : size;
    return ({ index }) => ({ type: 'speed', actuator: index, is: faster ? 'over' : 'under', than });
  }

  #meaning<W>(says: readonly Says<W>[], called: string, also: readonly string[] = []): readonly W[] {
    const found = this.#in.oneOf(says.map(({ words }) => words));
    if (found < 0) throw this.#unsaid(called, [...says.map(({ words }) => words), ...also]);
    return says[found]?.means ?? [];
  }

  /** `rests`, `at rest`, `at a`, `at a/0`. A position called `rest` goes before the rest position. */
  #position(one: Named | undefined, called: string): (thing: Named) => Condition {
    const rests =
      (start: number) =>
      ({ index }: Named): Condition => {
        const rest = this.#names.inputs[index]?.rest;
        if (rest === undefined)
          throw new Fault(
            start,
            `${this.#names.inputs[index]?.label ?? ''} has no rest position.`,
            'Name one of its positions after "at".',
          );
        return { type: 'position', input: index, positions: 1 << rest };
      };
    const start = this.#in.at;
    if (this.#in.words('rests') || this.#in.words('rest')) return rests(start);
    if (!this.#in.words('at') && !this.#in.words('in')) throw this.#unsaid(called, ['at …', 'rests']);
    const place = this.#in.at;
    const names = one ? (this.#names.inputs[one.index]?.positions ?? []) : [];
    let positions = 0;
    do {
      const found = this.#in.oneOf(names, 'name');
      if (found < 0 && positions === 0 && this.#in.words('rest')) return rests(place);
      if (found < 0) {
        const remedy = one
          ? `Use one of ${names.join(', ')}.`
          : 'Of several valves only "rests" can be said; name the valves one by one for other positions.';
        throw new Fault(
          this.#in.at,
          this.#in.ended ? 'A position should stand here.' : `${called} has no position "${this.#in.next}".`,
          remedy,
        );
      }
      positions |= 1 << found;
    } while (this.#in.mark('/'));
    return ({ index }) => ({ type: 'position', input: index, positions });
  }

  #unsaid(called: string, words: readonly string[]): Fault {
    const { at, next, ended } = this.#in;
    return new Fault(
      at,
      ended ? `Nothing is said of ${called}.` : `"${next}" cannot be said of ${called}.`,
      `Say one of: ${words.join('; ')}.`,
    );
  }

  #unknown(things: readonly Named[], prefix: string): Fault {
    const { at, next, ended } = this.#in;
    const names = things.map(({ name }) => name);
    if (ended)
      return new Fault(
        at,
        `The name of a ${prefix === '' ? 'valve, coil, actuator, pump or line' : prefix.trim()} should stand here.`,
        listed(names),
      );
    const meant = nearest(next.replaceAll('"', ''), names);
    return new Fault(
      at,
      `There is no ${prefix}"${next.replaceAll('"', '')}".`,
      meant === undefined ? listed(names) : `Did you mean ${meant}? ${listed(names)}`,
    );
  }
}

function listed(names: readonly string[]): string {
  if (names.length === 0) return 'The circuit has none.';
  const more = names.length > MOST_NAMED ? ` and ${names.length - MOST_NAMED} more` : '';
  return `Use one of ${names.slice(0, MOST_NAMED).join(', ')}${more}; a name may stand in double quotes.`;
}
