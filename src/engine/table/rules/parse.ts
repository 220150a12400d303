import { bad, good } from '../../../base/result.ts';
import type { Result } from '../../../base/result.ts';
import type { Condition, Rule } from './condition.ts';
import type { Names } from './names.ts';
import { Fault, Reader } from './reader.ts';
import type { Continuation } from './reader.ts';
import { Statements } from './statement.ts';

const WHEN = ['when', 'while', 'whenever', 'if'];
const ONLY = ['only if', 'only when', 'only while'];
const HOW =
  'Write for example "never C1 moves while C2 moves", "always P1 unloaded when every lever rests" or "C1 moves only if V1 at a".';

/**
 * Reads a rule:
 *
 *     never A                 always A                A only if B
 *     never A when B          always A when B         A whenever B
 *     never A unless B        always A unless B
 *
 * A and B are statements joined by `and`, `or`, `not` and parentheses; `not` binds closest, then `and`.
 * A fault is one problem whose place is the column, counted from 1. `wanted` gets what may follow where the text ends.
 */
export function parseRule(text: string, names: Names, wanted?: Continuation[]): Result<Rule> {
  return attempt(() => new RuleParser(text, names, wanted).rule());
}

/** A condition by itself, such as the interlock of an answer, or a question to the table. */
export function parseCondition(text: string, names: Names, wanted?: Continuation[]): Result<Condition> {
  return attempt(() => {
    const parser = new RuleParser(text, names, wanted);
    parser.noRule();
    const condition = parser.condition();
    parser.end('"and" or "or"');
    return condition;
  });
}

function attempt<T>(read: () => T): Result<T> {
  try {
    return good(read());
  } catch (error) {
    if (error instanceof Fault) return bad(error.problem);
    throw error;
  }
}

const not = (of: Condition): Condition => ({ type: 'not', of });
const both = (...of: Condition[]): Condition => ({ type: 'every', of });

class RuleParser {
  readonly #text: string;
  readonly #in: Reader;
  readonly #statements: Statements;
  /** Somebody asks how the text may go on. */
  readonly #asked: boolean;
  #depth = 0;

  constructor(text: string, names: Names, wanted?: Continuation[]) {
    this.#text = text;
    // A full stop may end the sentence.
    this.#in = new Reader(text.replace(/[\s.]+$/, ''), wanted);
    this.#asked = wanted !== undefined;
    this.#statements = new Statements(this.#in, names);
  }

  rule(): Rule {
    const text = this.#text;
    if (this.#in.ended && !this.#asked) throw new Fault(0, 'The rule is empty.', HOW);
    for (const first of ['never', 'always']) {
      if (!this.#in.words(first)) continue;
      this.#in.mark(',');
      if (this.#in.ended && !this.#asked) throw new Fault(this.#in.at, `Nothing follows "${first}".`, HOW);
      const claim = this.condition();
      const wrong = first === 'never' ? claim : not(claim);
      return { text, breaks: this.#within(wrong) };
    }
    const claim = this.condition();
    this.#in.mark(',');
    if (ONLY.some((words) => this.#in.words(words)))
      return { text, breaks: this.#last(both(claim, not(this.condition()))) };
    if (this.#in.words('whenever')) return { text, breaks: this.#last(both(not(claim), this.condition())) };
    throw new Fault(
      this.#in.at,
      this.#in.ended
        ? 'The rule does not say when this must or must not be.'
        : `"${this.#in.next}" does not go on with the rule.`,
      'Begin with "never" or "always", or go on with "only if" or "whenever" and a condition.',
    );
  }

  /** A condition states something; what must or must not be is a rule. */
  noRule(): void {
    const { at, text } = this.#in;
    const first = /^(never|always)\s/i.exec(text)?.[1];
    if (first !== undefined)
      throw new Fault(
        at,
        `"${first}" begins a rule, not a question.`,
        'Leave it out here, or check it with the rules.',
      );
  }

  /** `never` or `always`: where it applies. */
  #within(wrong: Condition): Condition {
    this.#in.mark(',');
    if (WHEN.some((word) => this.#in.words(word))) return this.#last(both(wrong, this.condition()));
    if (this.#in.words('unless')) return this.#last(both(wrong, not(this.condition())));
    if (this.#in.ended) return wrong;
    return this.#last(wrong, '"and", "or", "when", "while", "unless"');
  }

  #last(breaks: Condition, expected = '"and" or "or"'): Condition {
    this.end(expected);
    return breaks;
  }

  end(expected: string): void {
    if (this.#in.ended) return;
    const what =
      this.#in.text[this.#in.at] === ')'
        ? 'This parenthesis closes nothing.'
        : `"${this.#in.next}" does not go on with the rule.`;
    throw new Fault(this.#in.at, what, `End the rule here, or go on with ${expected}.`);
  }

  /** Parts joined by `or`, each of parts joined by `and`. */
  condition(): Condition {
    const parts = [this.#all()];
    while (this.#in.words('or')) parts.push(this.#all());
    return parts.length === 1 ? (parts[0] as Condition) : { type: 'any', of: parts };
  }

  #all(): Condition {
    const parts = [this.#one()];
    while (this.#in.words('and')) parts.push(this.#one());
    return parts.length === 1 ? (parts[0] as Condition) : { type: 'every', of: parts };
  }

  #one(): Condition {
    if (this.#in.words('not')) return not(this.#nested(() => this.#one()));
    const opened = this.#in.at;
    if (!this.#in.mark('(')) return this.#statements.read();
    const inner = this.#nested(() => this.condition());
    if (!this.#in.mark(')')) {
      throw new Fault(
        this.#in.at,
        `The parenthesis of column ${opened + 1} is not closed here.`,
        'Put ")" here, or go on with "and" or "or".',
      );
    }
    return inner;
  }

  #nested(read: () => Condition): Condition {
    this.#depth += 1;
    if (this.#depth > 100) throw new Fault(this.#in.at, 'The rule is nested too deeply.', 'Say it in several rules.');
    const condition = read();
    this.#depth -= 1;
    return condition;
  }
}
