import { bad, good } from '../../base/result.ts';
import type { Problem, Result } from '../../base/result.ts';

/** `+`: a cylinder goes out, a motor turns A→B; `-`: the other way; `0`: a motor comes to rest. */
export type Way = '+' | '-' | '0';

export interface Motion {
  /** Number in the list of actuators that the text was read with. */
  readonly actuator: number;
  readonly way: Way;
}

/** Motions that are to happen together. */
export type MotionStep = readonly Motion[];

export interface NotedActuator {
  readonly label: string;
  readonly rotary: boolean;
}

/** Hyphen and plus, and what typesetting makes of them. */
const SIGNS: Readonly<Record<string, Way>> = {
  '+': '+',
  '\uFF0B': '+',
  '-': '-',
  '\u2010': '-',
  '\u2011': '-',
  '\u2012': '-',
  '\u2013': '-',
  '\u2014': '-',
  '\u2212': '-',
  '\uFE63': '-',
  '\uFF0D': '-',
};
const SEPARATOR = /[\s,;→]/;
const HOW = 'Write each motion as a label and a sign, such as "A+ B+ B- A-"; motions at one time stand in parentheses.';

/**
 * Reads a sequence of motions: `A+ B+ B- A-`, `A+ (B+ C-) A- B-` (in parentheses: at one time). A sign may be typed
 * in any of the forms that typesetting gives it, steps may stand close (`A+B+`) or have a comma between them. Where
 * several labels fit, the longest is taken, as written before in any case; a label in double quotes is taken whole
 * (a double quote in it is written twice). `M0` brings a motor to rest. Faults name the column, counted from 1.
 */
export function parseMotions(text: string, actuators: readonly NotedActuator[]): Result<readonly MotionStep[]> {
  try {
    return good(new MotionReader(text, actuators).steps());
  } catch (error) {
    if (error instanceof NotationFault) return bad(error.problem);
    throw error;
  }
}

/** The motions of one step, all at one time, with or without parentheses; a blank text = nothing is to move. */
export function parseStepMotions(text: string, actuators: readonly NotedActuator[]): Result<MotionStep> {
  if (text.trim() === '') return good([]);
  const read = parseMotions(text, actuators);
  if (!read.ok) return read;
  const motions = read.value.flat();
  const twice = motions.find(({ actuator }, i) => motions.findIndex((m) => m.actuator === actuator) < i);
  if (!twice) return good(motions);
  return bad({
    where: 'motions',
    what: `"${actuators[twice.actuator]?.label ?? ''}" is named twice, and the motions of one step happen together.`,
    remedy: 'Leave one of them out, or make two steps.',
  });
}

/** The text that `parseMotions` reads back as these steps. Throws RangeError for an actuator that is not in the list. */
export const sayMotions = (steps: readonly MotionStep[], actuators: readonly NotedActuator[]): string =>
  steps
    .filter((step) => step.length > 0)
    .map((step) => {
      const said = step.map((motion) => sayMotion(motion, actuators)).join(' ');
      return step.length > 1 ? `(${said})` : said;
    })
    .join(' ');

export function sayMotion({ actuator, way }: Motion, actuators: readonly NotedActuator[]): string {
  const label = actuators[actuator]?.label;
  if (label === undefined) throw new RangeError(`there is no actuator ${actuator}`);
  const plain = /^[\p{L}\p{N}_.#/]+( [\p{L}\p{N}_.#/]+)*$/u.test(label);
  // A longer label that goes on with a sign, such as "A+ B", or that differs in blanks, would be read first.
  const goesOn = new RegExp(`^${escaped(label)}(\\s*[${Object.keys(SIGNS).join('').replace('-', '\\-')}]|0|$)`, 'u');
  const hidden = actuators.some(
    (other) => other.label !== label && goesOn.test(other.label.trim().replace(/\s+/g, ' ')),
  );
  return `${plain && !hidden ? label : `"${label.replaceAll('"', '""')}"`}${way}`;
}

const escaped = (text: string): string => text.replace(/[\\^$.*+?()[\]{}|/]/g, '\\$&');

class NotationFault extends Error {
  readonly problem: Problem;

  constructor(at: number, what: string, remedy: string) {
    super(what);
    this.name = 'NotationFault';
    this.problem = { where: `column ${at + 1}`, what, remedy };
  }
}

interface Found {
  readonly actuator: number;
  /** Place after the label. */
  readonly end: number;
}

class MotionReader {
  readonly #text: string;
  readonly #actuators: readonly NotedActuator[];
  #at = 0;

  constructor(text: string, actuators: readonly NotedActuator[]) {
    this.#text = text;
    this.#actuators = actuators;
  }

  steps(): readonly MotionStep[] {
    const steps: MotionStep[] = [];
    this.#skip();
    while (this.#at < this.#text.length) {
      steps.push(this.#text[this.#at] === '(' ? this.#together() : [this.#motion()]);
      this.#skip();
    }
    if (steps.length === 0) throw new NotationFault(0, 'No motion is given.', HOW);
    return steps;
  }

  #skip(): void {
    while (this.#at < this.#text.length && SEPARATOR.test(this.#text[this.#at] as string)) this.#at += 1;
  }

  #together(): MotionStep {
    const open = this.#at;
    const motions: Motion[] = [];
    this.#at += 1;
    this.#skip();
    while (this.#text[this.#at] !== ')') {
      if (this.#at >= this.#text.length)
        throw new NotationFault(open, 'This parenthesis is not closed.', 'Put ")" after the last motion of the step.');
      if (this.#text[this.#at] === '(')
        throw new NotationFault(this.#at, 'Parentheses stand in parentheses.', 'One pair for each step is enough.');
      const at = this.#at;
      const motion = this.#motion();
      if (motions.some(({ actuator }) => actuator === motion.actuator)) {
        const label = this.#actuators[motion.actuator]?.label ?? '';
        throw new NotationFault(at, `"${label}" is to move twice at one time.`, 'Move it in a step of its own.');
      }
      motions.push(motion);
      this.#skip();
    }
    if (motions.length === 0)
      throw new NotationFault(open, 'There is nothing between the parentheses.', 'Leave them out.');
    this.#at += 1;
    return motions;
  }

  #motion(): Motion {
    const at = this.#at;
    if (this.#text[at] === ')')
      throw new NotationFault(at, 'This parenthesis was not opened.', 'Put "(" before the first motion of the step.');
    const found = this.#text[at] === '"' ? this.#quoted() : this.#named();
    if (!found) throw this.#unknown();
    this.#at = found.end;
    const way = this.#way();
    const { label, rotary } = this.#actuators[found.actuator] as NotedActuator;
    if (way === undefined)
      throw new NotationFault(found.end, `After "${label}" the sign is missing.`, `Write "${label}+" or "${label}-".`);
    if (way === '0' && !rotary) {
      throw new NotationFault(
        found.end,
        `"${label}" is no motor, so 0 says nothing of it.`,
        `Write "${label}+" (out) or "${label}-" (in).`,
      );
    }
    return { actuator: found.actuator, way };
  }

  /** The sign at the place, taken; a 0 only with nothing joined to it. */
  #way(): Way | undefined {
    const end = this.#wayEnd(this.#at);
    if (end === undefined) return undefined;
    const sign = this.#text[end - 1] as string;
    this.#at = end;
    return sign === '0' ? '0' : SIGNS[sign];
  }

  /** Place after the sign that follows here, blanks before it left out. */
  #wayEnd(from: number): number | undefined {
    let at = from;
    while (/\s/.test(this.#text[at] ?? '')) at += 1;
    const sign = this.#text[at];
    if (sign === undefined) return undefined;
    if (SIGNS[sign] !== undefined) return at + 1;
    const next = this.#text[at + 1];
    return sign === '0' && at === from && (next === undefined || SEPARATOR.test(next) || next === ')')
      ? at + 1
      : undefined;
  }

  #quoted(): Found | undefined {
    const start = this.#at;
    const match = /^"((?:[^"]|"")*)"/.exec(this.#text.slice(start));
    if (!match) {
      throw new NotationFault(start, 'This quote is not closed.', 'Put a double quote at both ends of the label.');
    }
    const label = (match[1] ?? '').replaceAll('""', '"');
    const same = (a: string): boolean => a.toLowerCase() === label.toLowerCase();
    const exact = this.#actuators.findIndex((a) => a.label === label);
    const actuator = exact >= 0 ? exact : this.#actuators.findIndex((a) => same(a.label));
    return actuator < 0 ? undefined : { actuator, end: start + match[0].length };
  }

  #named(): Found | undefined {
    for (const exact of [true, false]) {
      let best: Found | undefined;
      this.#actuators.forEach(({ label }, actuator) => {
        const end = this.#labelEnd(label, exact);
        if (end === undefined || this.#wayEnd(end) === undefined) return;
        if (!best || end > best.end) best = { actuator, end };
      });
      if (best) return best;
    }
    return this.#unsigned();
  }

  /** A label with no sign after it, so that the fault can say so. */
  #unsigned(): Found | undefined {
    let best: Found | undefined;
    this.#actuators.forEach(({ label }, actuator) => {
      const end = this.#labelEnd(label, false);
      if (end === undefined || /[\p{L}\p{N}]/u.test(this.#text[end] ?? '')) return;
      if (!best || end > best.end) best = { actuator, end };
    });
    return best;
  }

  #labelEnd(label: string, exact: boolean): number | undefined {
    const words = label.split(/\s+/).filter((word) => word !== '');
    if (words.length === 0) return undefined;
    const match = new RegExp(`^${words.map(escaped).join('\\s+')}`, exact ? 'u' : 'iu').exec(
      this.#text.slice(this.#at),
    );
    return match ? this.#at + match[0].length : undefined;
  }

  #unknown(): NotationFault {
    const word =
      /^(?:"(?:[^"]|"")*"|[^\s,;()→+\u2212-]+)/u.exec(this.#text.slice(this.#at))?.[0] ??
      (this.#text[this.#at] as string);
    const known = this.#actuators.map(({ label }) => label).join(', ');
    if (SIGNS[word] !== undefined)
      return new NotationFault(this.#at, `The sign "${word}" has no label before it.`, HOW);
    return new NotationFault(
      this.#at,
      `There is no actuator "${word.replace(/^"|"$/g, '')}".`,
      known === '' ? 'This circuit has no actuators.' : `Use one of ${known}.`,
    );
  }
}
